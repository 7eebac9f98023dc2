// About the app: its limits and cautions, its version, where the ledger is.

import { ask } from '../api.js';
import { h } from '../lib/dom.js';
import { Screen } from '../lib/screen.js';
import { listSection } from '../parts/rows.js';

export class About extends Screen {
  /** @type {Desk.About | null} */
  #about = null;

  async load() {
    this.#about = await ask({ ask: 'about' }, 'about');
  }

  draw() {
    const about = this.#about;
    if (!about) return null;
    return this.frame(
      { title: 'About Dewledger', up: '#/', where: `Version ${about.version}` },
      listSection(
        'Limits and cautions',
        about.says.map((says) => h('p', { class: 'paragraph' }, says)),
      ),
      listSection('The ledger', [
        h('p', { class: 'paragraph' }, 'Everything is kept on this device, in one file:'),
        h('p', { class: 'path' }, about.ledger),
      ]),
      listSection(
        'Letters',
        h(
          'p',
          { class: 'paragraph' },
          'Atkinson Hyperlegible Next and Source Serif 4, both under the SIL Open Font License 1.1.',
        ),
      ),
    );
  }
}
