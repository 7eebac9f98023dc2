// A filed entry, as it was filed. Right after filing it also holds the way back and what comes next.

import { ask } from '../api.js';
import { h } from '../lib/dom.js';
import { forgetFiled, lastFiled } from '../lib/filed.js';
import { icon } from '../lib/icons.js';
import { notice, undoMs } from '../lib/notice.js';
import { address } from '../lib/route.js';
import { button, go, goInstead, link, linkButton, Screen } from '../lib/screen.js';
import { ChartPanel } from '../parts/chart.js';
import { beside, results, strip } from '../parts/result.js';
import { linkRow, listSection } from '../parts/rows.js';

export class Entry extends Screen {
  /** @type {Desk.EntryView | null} */
  #entry = null;
  /** @type {string | null} */
  #refused = null;

  #chart = new ChartPanel('chart', () => this.render(), null);

  async load() {
    const entry = this.route.entry ?? '';
    this.#entry = await ask({ ask: 'entry', entry }, 'entry');
    this.#chart.show(this.#entry.solved.states.length > 0 ? { of: 'entry', entry } : null);
  }

  settle() {
    super.settle();
    this.#chart.fit();
  }

  connectedCallback() {
    super.connectedCallback();
    const left = this.#undoLeft();
    if (left > 0) {
      const timer = setTimeout(() => this.render(), left);
      this.gone.addEventListener('abort', () => clearTimeout(timer));
    }
  }

  /** Milliseconds for which Undo is still offered. */
  #undoLeft() {
    const last = lastFiled(this.route.entry ?? '');
    // Taking back a correction would withdraw what it corrects too; it is corrected again instead.
    return last && !last.corrects ? Math.max(0, last.at + undoMs - performance.now()) : 0;
  }

  /** Takes the filing back; the form comes back as it was typed, as a draft. */
  async #undo() {
    const last = lastFiled(this.route.entry ?? '');
    if (!last) return;
    await this.#try(async () => {
      await ask({ ask: 'withdraw_entry', entry: last.filed.entry }, 'done');
      const { check, typed, place, corrects } = last;
      const { draft } = await ask({ ask: 'keep_draft', draft: null, check, typed, place, corrects }, 'draft_kept');
      forgetFiled();
      goInstead(address(['draft', draft]));
    });
  }

  async #withdraw() {
    const entry = this.route.entry ?? '';
    await this.#try(async () => {
      await ask({ ask: 'withdraw_entry', entry }, 'done');
      forgetFiled();
      await this.reload();
      notice({ says: 'Withdrawn', undo: () => this.#restore() });
    });
  }

  async #restore() {
    await this.#try(async () => {
      await ask({ ask: 'restore_entry', entry: this.route.entry ?? '' }, 'done');
      await this.reload();
    });
  }

  /** @param {() => Promise<void>} work */
  async #try(work) {
    this.#refused = null;
    try {
      await work();
    } catch (error) {
      this.#refused = /** @type {Error} */ (error).message;
    }
    this.render();
  }

  draw() {
    const entry = this.#entry;
    if (!entry) return null;
    const { solved, place } = entry;
    const last = lastFiled(entry.entry);
    return this.frame(
      {
        title: solved.check.label,
        where: `${entry.says}. ${entry.filed}`,
        invented: entry.invented,
        up: place.equipment ? address(['equipment', place.equipment]) : address(['site', place.site ?? '']),
      },
      last && !entry.withdrawn && this.#banner(last),
      entry.withdrawn &&
        h(
          'div',
          { class: 'note plain' },
          icon('pencil'),
          h(
            'div',
            { class: 'note-body' },
            h('p', { class: 'lead' }, 'Withdrawn'),
            h('p', null, 'It stays in the ledger and counts no more.'),
            h(
              'div',
              { class: 'acts' },
              link('Bring it back', () => this.#restore()),
            ),
          ),
        ),
      this.#refused &&
        h('div', { class: 'note wrong', role: 'alert' }, icon('wrong'), h('p', { class: 'lead' }, this.#refused)),
      h(
        'div',
        { class: 'two' },
        h(
          'div',
          { class: 'given' },
          h(
            'section',
            { class: 'sec', 'aria-labelledby': 'as-typed' },
            h('div', { class: 'sec-head' }, h('h2', { id: 'as-typed' }, 'As typed')),
            h(
              'table',
              { class: 'figs' },
              h(
                'thead',
                { class: 'sr' },
                h(
                  'tr',
                  null,
                  ['Reading', 'As typed', '±'].map((title) => h('th', { scope: 'col' }, title)),
                ),
              ),
              h(
                'tbody',
                null,
                entry.readings.map((row) =>
                  h(
                    'tr',
                    { class: 'fig' },
                    h('th', { scope: 'row' }, row.label, row.with && h('small', null, row.with)),
                    h('td', { class: 'n as-typed' }, row.text),
                    h('td', { class: 'pm as-typed' }, row.plus_minus),
                  ),
                ),
              ),
            ),
          ),
          entry.revisions.length > 1 &&
            listSection(
              'Revisions',
              h(
                'ol',
                { class: 'revisions' },
                entry.revisions.map((revision) =>
                  h(
                    'li',
                    { class: revision.current ? 'current' : null },
                    h('span', null, revision.says, revision.current && h('b', null, ' stands')),
                    h('span', { class: 'figure' }, revision.figure),
                  ),
                ),
              ),
            ),
          h(
            'div',
            { class: 'beside' },
            beside(solved),
            h(
              'div',
              { class: 'sec' },
              place.equipment &&
                linkRow({ href: address(['equipment', place.equipment]), title: 'The equipment', says: entry.says }),
              place.site && linkRow({ href: address(['site', place.site]), title: 'The site' }),
            ),
          ),
        ),
        h(
          'div',
          { class: 'answer' },
          strip(solved),
          h('div', { class: 'results' }, results(solved, { notes: solved.notes, chart: this.#chart.draw() })),
          !entry.withdrawn &&
            h(
              'div',
              { class: 'acts-bar', key: 'acts' },
              button('Withdraw', () => this.#withdraw(), { kind: 'narrow' }),
              button('Correct', () => go(address(['correct', entry.entry])), { icon: 'pencil' }),
            ),
        ),
      ),
    );
  }

  /** @param {import('../lib/filed.js').LastFiled} last */
  #banner({ filed, check, place }) {
    const { site, equipment, visit } = place;
    return h(
      'div',
      { class: 'filed' },
      h(
        'p',
        { class: 'filed-line' },
        icon('book'),
        h('strong', null, filed.says),
        filed.place && h('span', null, filed.place),
        this.#undoLeft() > 0 && link('Undo', () => this.#undo()),
      ),
      h(
        'div',
        { class: 'next-acts' },
        linkButton('Another check here', address(['checks'], { site, equipment, visit }), {
          kind: 'go',
          icon: 'checks',
        }),
        linkButton('Same check, next equipment', address(['check', check], { site, visit }), { icon: 'again' }),
      ),
    );
  }
}
