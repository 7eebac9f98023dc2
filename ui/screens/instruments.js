// The register of instruments, and the classes that a new one can start from.

import { ask } from '../api.js';
import { h } from '../lib/dom.js';
import { icon } from '../lib/icons.js';
import { address } from '../lib/route.js';
import { button, go, Screen } from '../lib/screen.js';
import { openSheet } from '../lib/sheet.js';
import { radioRow } from '../parts/form-sheets.js';
import { linkRow, listSection } from '../parts/rows.js';

export class Instruments extends Screen {
  /** @type {Desk.InstrumentsView | null} */
  #register = null;

  async load() {
    this.#register = await ask({ ask: 'instruments' }, 'instruments');
  }

  async #add() {
    const classes = this.#register?.classes ?? [];
    const blank = 'blank';
    const chosen = await openSheet('What is it?', (/** @type {import('../lib/sheet.js').Sheet<string>} */ sheet) => [
      h(
        'p',
        { class: 'mute' },
        'Figures by class are common practice, to start from. The instrument’s own paper counts.',
      ),
      h(
        'div',
        { role: 'radiogroup', 'aria-label': 'Class' },
        radioRow({ label: 'Something else', help: 'Starts blank', on: false, choose: () => sheet.close(blank) }),
        classes.map((one) =>
          radioRow({ label: one.label, help: one.help, on: false, choose: () => sheet.close(one.value) }),
        ),
      ),
    ]);
    if (chosen) go(address(['instruments', 'new'], { class: chosen === blank ? null : chosen }));
  }

  draw() {
    const register = this.#register;
    if (!register) return null;
    const row = (/** @type {Desk.InstrumentRow} */ one) =>
      linkRow({
        key: one.instrument,
        href: address(['instrument', one.instrument]),
        title: one.name,
        says: [one.says, one.due && [h('br'), h(one.overdue ? 'strong' : 'span', null, one.due)]],
        hang: one.overdue && icon('odd'),
        invented: one.invented,
      });
    const used = register.instruments.filter((one) => !one.withdrawn);
    const out = register.instruments.filter((one) => one.withdrawn);
    return this.frame(
      {
        title: 'Instruments',
        where: register.says,
        up: '#/',
        acts: button('Add an instrument', () => this.#add(), { icon: 'plus', kind: 'go' }),
      },
      listSection(
        'In use',
        used.length > 0
          ? used.map(row)
          : h('p', { class: 'mute' }, 'None yet. Without one, type a ± beside each reading.'),
      ),
      out.length > 0 && listSection('Out of use', out.map(row)),
      used.length > 1 && h('p', { class: 'ask' }, 'Probes are held side by side from the screen of a visit.'),
    );
  }
}
