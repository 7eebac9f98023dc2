// Today: go on with a draft, start a check, see what was filed last.

import { ask } from '../api.js';
import { h } from '../lib/dom.js';
import { icon } from '../lib/icons.js';
import { notice } from '../lib/notice.js';
import { address } from '../lib/route.js';
import { button, go, link, linkButton, Screen } from '../lib/screen.js';
import { entryRow, linkRow, listSection, siteRow, textLink } from '../parts/rows.js';

export class Home extends Screen {
  /** @type {Desk.Overview | null} */
  #overview = null;
  #adding = false;

  async load() {
    this.#overview = await ask({ ask: 'overview' }, 'overview');
  }

  async #addDemo() {
    if (this.#adding) return;
    this.#adding = true;
    this.render();
    await this.attempt(async () => {
      this.#overview = await ask({ ask: 'add_demo' }, 'overview');
      notice({ says: 'The demo site is there. Everything in it is invented.' });
    });
    this.#adding = false;
    this.render();
  }

  /** @param {Desk.DraftRow} draft */
  async #discard(draft) {
    await this.attempt(async () => {
      await ask({ ask: 'discard_draft', draft: draft.draft }, 'done');
      await this.reload();
      notice({ says: `Draft discarded: ${draft.label}`, undo: () => this.#bringBack(draft.draft) });
    });
  }

  /** @param {string} draft */
  async #bringBack(draft) {
    await this.attempt(async () => {
      await ask({ ask: 'restore_draft', draft }, 'form');
      await this.reload();
    });
  }

  draw() {
    const overview = this.#overview;
    if (!overview) return null;
    const { here } = overview;
    return this.frame(
      {
        title: 'Today',
        root: true,
        where: here ? [`At ${here.site}. ${here.says}`] : 'Everything is kept on this device.',
        invented: here?.invented ?? false,
      },
      overview.ledger_note &&
        h(
          'div',
          { class: 'note unusual', role: 'alert' },
          icon('odd'),
          h('p', { class: 'lead' }, overview.ledger_note),
        ),
      h(
        'div',
        { class: 'two' },
        h(
          'div',
          null,
          overview.empty && this.#welcome(),
          overview.drafts.slice(0, 1).map((draft) => this.#draft(draft)),
          overview.drafts.length > 1 && this.#olderDrafts(overview.drafts.slice(1)),
          listSection('Start', [
            h(
              'div',
              { class: 'stack' },
              linkButton('Start a check', address(['checks'], { ...here?.place }), {
                icon: 'checks',
                kind: overview.drafts.length === 0 && !overview.empty ? 'left go' : 'left',
              }),
              here?.place.site && linkButton('See where I am', whereHref(here.place), { icon: 'sites', kind: 'left' }),
            ),
          ]),
        ),
        h(
          'div',
          null,
          overview.entries.length > 0 && listSection('Filed last', overview.entries.map(entryRow)),
          !overview.empty &&
            listSection('Sites', [overview.sites.map(siteRow), h('p', null, textLink('All sites', '#/sites'))]),
          h(
            'div',
            { class: 'sec only-phone' },
            linkRow({ href: '#/instruments', title: 'Instruments', says: 'Probes, accuracy, calibration dates' }),
            linkRow({ href: '#/appearance', title: 'Appearance', says: 'Light, dark, high contrast' }),
            linkRow({ href: '#/about', title: 'About Dewledger', says: 'Limits, cautions, where the ledger is' }),
          ),
        ),
      ),
    );
  }

  #welcome() {
    return h(
      'section',
      { class: 'sec', 'aria-labelledby': 'welcome' },
      h('div', { class: 'sec-head' }, h('h2', { id: 'welcome' }, 'The ledger is empty')),
      h(
        'p',
        { class: 'lede' },
        'Readings in, heat out, at the pressure of the building you stand in, with a ± that says how far to trust it.',
      ),
      h(
        'div',
        { class: 'stack gap' },
        button(this.#adding ? 'Adding' : 'Add the demo site', () => this.#addDemo(), {
          kind: 'go left',
          icon: 'book',
          disabled: this.#adding,
        }),
      ),
      h('p', { class: 'ask' }, 'An invented school with two visits, to try things on. It is marked on every screen.'),
    );
  }

  /** @param {Desk.DraftRow[]} drafts */
  #olderDrafts(drafts) {
    return listSection(
      'Not finished either',
      drafts.map((draft) =>
        h(
          'div',
          { class: 'draft-row', key: draft.draft },
          linkRow({ href: address(['draft', draft.draft]), title: draft.label, says: draft.says }),
          link('Discard', () => this.#discard(draft)),
        ),
      ),
    );
  }

  /** The newest draft. @param {Desk.DraftRow} draft */
  #draft(draft) {
    const id = `draft-${draft.draft}`;
    return h(
      'div',
      { class: 'sec', key: id },
      h('span', { class: 'hang' }, icon('pencil')),
      h('div', { class: 'sec-head' }, h('h2', null, 'Not finished')),
      h(
        'p',
        { class: 'lede' },
        h('strong', null, draft.label),
        h('span', { class: 'sr' }, ' '),
        h('span', { class: 'says' }, draft.says),
      ),
      h(
        'div',
        { class: 'draft-acts' },
        button('Continue', () => go(address(['draft', draft.draft])), { kind: 'go slim' }),
        link('Discard', () => this.#discard(draft)),
      ),
    );
  }
}

/** @param {Desk.Place} place */
function whereHref(place) {
  if (place.visit) return address(['visit', place.visit]);
  return address(['site', place.site ?? '']);
}
