// One visit: the pressure here, the outdoor air, how the equipment was running, and what was filed.

import { ask } from '../api.js';
import { h } from '../lib/dom.js';
import { icon } from '../lib/icons.js';
import { address } from '../lib/route.js';
import { linkButton, Screen } from '../lib/screen.js';
import { figures } from '../parts/result.js';
import { entryRow, linkRow, listSection, textLink } from '../parts/rows.js';

export class Visit extends Screen {
  /** @type {Desk.VisitView | null} */
  #visit = null;

  async load() {
    this.#visit = await ask({ ask: 'visit', visit: this.route.visit ?? '' }, 'visit');
  }

  draw() {
    const one = this.#visit;
    if (!one) return null;
    const { site, visit } = one.place;
    const facts = [
      ['People', one.people],
      ['How it was running', one.running],
    ].filter(([, says]) => says);
    return this.frame(
      {
        title: one.when,
        where: one.site,
        invented: one.invented,
        up: address(['site', site ?? '']),
        aside: h(
          'a',
          {
            class: 'icon-btn',
            href: address(['visit', visit ?? '', 'edit'], { site }),
            'aria-label': 'Change the visit',
          },
          icon('pencil'),
        ),
        acts:
          one.open && linkButton('Start a check', address(['checks'], { site, visit }), { icon: 'checks', kind: 'go' }),
      },
      h(
        'div',
        { class: 'two' },
        h(
          'div',
          null,
          listSection('Here', [
            figures(one.rows, 'Pressure and outdoor air'),
            facts.length > 0 &&
              h(
                'dl',
                { class: 'facts' },
                facts.map(([name, says]) => [h('dt', null, name), h('dd', null, says)]),
              ),
          ]),
        ),
        h(
          'div',
          null,
          listSection('Probes side by side', [
            one.runs.map((run) =>
              linkRow({
                key: run.value,
                href: address(['visit', visit ?? '', 'run', run.value]),
                title: run.label,
                says: run.help ?? '',
              }),
            ),
            one.runs.length === 0 &&
              h(
                'p',
                { class: 'mute' },
                'Held in the same air at the start and the end, probes show how far they differ.',
              ),
            h('p', null, textLink('Run probes side by side', address(['visit', visit ?? '', 'run', 'new']), 'plus')),
          ]),
          listSection(
            'Entries',
            one.entries.length > 0
              ? one.entries.map(entryRow)
              : h('p', { class: 'mute' }, 'Nothing is filed in it yet.'),
          ),
          h(
            'div',
            { class: 'sec' },
            linkRow({ href: address(['site', site ?? '']), title: one.site, says: 'The site' }),
          ),
        ),
      ),
    );
  }
}
