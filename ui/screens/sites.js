// All sites.

import { ask } from '../api.js';
import { h } from '../lib/dom.js';
import { Screen } from '../lib/screen.js';
import { siteRow, textLink } from '../parts/rows.js';

export class Sites extends Screen {
  /** @type {Desk.SiteRow[]} */
  #sites = [];

  async load() {
    this.#sites = (await ask({ ask: 'sites' }, 'sites')).sites;
  }

  draw() {
    return this.frame(
      { title: 'Sites', root: true, where: 'A site is a building with its elevation.' },
      h(
        'div',
        { class: 'sec' },
        this.#sites.length === 0 && h('p', { class: 'lede' }, 'None yet.'),
        this.#sites.map(siteRow),
        h('p', null, textLink('Add a site', '#/sites/new', 'plus')),
      ),
    );
  }
}
