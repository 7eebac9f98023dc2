// One site: its equipment, visits and entries.

import { ask } from '../api.js';
import { h } from '../lib/dom.js';
import { icon } from '../lib/icons.js';
import { address } from '../lib/route.js';
import { linkButton, Screen } from '../lib/screen.js';
import { entryRow, equipmentRow, listSection, textLink, visitRow } from '../parts/rows.js';

export class Site extends Screen {
  /** @type {Desk.SiteView | null} */
  #site = null;

  async load() {
    this.#site = await ask({ ask: 'site', site: this.route.site ?? '' }, 'site');
  }

  draw() {
    const site = this.#site;
    if (!site) return null;
    const today = site.visits.find((visit) => visit.open);
    return this.frame(
      {
        title: site.name,
        where: site.says,
        invented: site.invented,
        up: '#/sites',
        aside: h(
          'a',
          { class: 'icon-btn', href: address(['site', site.site, 'edit']), 'aria-label': 'Change the site' },
          icon('pencil'),
        ),
        acts: [
          today
            ? linkButton('See the visit', address(['visit', today.visit]), { icon: 'today', kind: 'narrow' })
            : linkButton('Start a visit', address(['site', site.site, 'visit', 'new']), { icon: 'today' }),
          linkButton('Start a check', address(['checks'], { site: site.site, visit: today?.visit }), {
            icon: 'checks',
            kind: 'go',
          }),
        ],
      },
      h(
        'div',
        { class: 'two' },
        h(
          'div',
          null,
          site.note && h('p', { class: 'gap' }, site.note),
          listSection('Equipment', [
            site.equipment.map(equipmentRow),
            h('p', null, textLink('Add equipment', address(['site', site.site, 'equipment', 'new']), 'plus')),
          ]),
          listSection('Visits', [
            site.visits.length === 0 &&
              h(
                'p',
                { class: 'mute' },
                'None yet. A visit holds the pressure here and the outdoor air for every check made in it.',
              ),
            site.visits.map(visitRow),
            today &&
              h('p', null, textLink('Start another visit', address(['site', site.site, 'visit', 'new']), 'plus')),
          ]),
        ),
        h(
          'div',
          null,
          listSection(
            'Entries',
            site.entries.length > 0
              ? site.entries.map(entryRow)
              : h('p', { class: 'mute' }, 'Nothing is filed here yet.'),
          ),
        ),
      ),
    );
  }
}
