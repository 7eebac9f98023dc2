// One piece of equipment and its entries.

import { ask } from '../api.js';
import { h } from '../lib/dom.js';
import { icon } from '../lib/icons.js';
import { address } from '../lib/route.js';
import { linkButton, Screen } from '../lib/screen.js';
import { entryRow, linkRow, listSection } from '../parts/rows.js';

export class Equipment extends Screen {
  /** @type {Desk.EquipmentView | null} */
  #equipment = null;
  /** @type {string | undefined} The visit that a check started here belongs to. */
  #visit;

  async load() {
    this.#equipment = await ask({ ask: 'equipment', equipment: this.route.equipment ?? '' }, 'equipment');
    const { site } = this.#equipment.place;
    this.#visit = site
      ? (await ask({ ask: 'site', site }, 'site')).visits.find((visit) => visit.open)?.visit
      : undefined;
  }

  draw() {
    const one = this.#equipment;
    if (!one) return null;
    const { site, equipment } = one.place;
    return this.frame(
      {
        title: one.tag,
        where: one.class ? `${one.class}, ${one.site}` : one.site,
        invented: one.invented,
        up: address(['site', site ?? '']),
        aside: h(
          'a',
          {
            class: 'icon-btn',
            href: address(['equipment', equipment ?? '', 'edit']),
            'aria-label': 'Change the equipment',
          },
          icon('pencil'),
        ),
        acts: linkButton('Start a check', address(['checks'], { site, equipment, visit: this.#visit }), {
          icon: 'checks',
          kind: 'go',
        }),
      },
      one.note && h('p', { class: 'gap' }, one.note),
      listSection(
        'Entries',
        one.entries.length > 0 ? one.entries.map(entryRow) : h('p', { class: 'mute' }, 'Nothing is filed for it yet.'),
      ),
      h('div', { class: 'sec' }, linkRow({ href: address(['site', site ?? '']), title: one.site, says: 'The site' })),
    );
  }
}
