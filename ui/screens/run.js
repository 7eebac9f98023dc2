// Probes side by side: several held in the same air, at the start or the end of a visit.

import { ask } from '../api.js';
import { h } from '../lib/dom.js';
import { icon } from '../lib/icons.js';
import { Latest } from '../lib/latest.js';
import { notice } from '../lib/notice.js';
import { address } from '../lib/route.js';
import { button, goBack, linkButton, Screen } from '../lib/screen.js';
import { toNext } from '../lib/typing.js';
import { noteView } from '../parts/note.js';
import { choose } from '../parts/requirements.js';

export class Run extends Screen {
  /** @type {Desk.RunView | null} */
  #run = null;
  /** @type {Desk.TypedRun} */
  #typed = { quantity: 'temperature', when: 'start' };
  /** @type {string | null} */
  #fault = null;
  #asker = new Latest(
    (/** @type {Desk.TypedRun} */ typed) =>
      ask({ ask: 'run_form', visit: this.#visit(), index: this.#index(), typed }, 'run'),
    (run) => {
      this.#run = run;
      this.render();
    },
    (error) => {
      this.#fault = /** @type {Error} */ (error).message;
      this.render();
    },
  );

  #visit() {
    return this.route.visit ?? '';
  }

  #index() {
    return this.route.run === undefined ? null : Number(this.route.run);
  }

  async load() {
    this.#run = await ask({ ask: 'run_form', visit: this.#visit(), index: this.#index() }, 'run');
    this.#typed = this.#run.typed;
  }

  async leave() {
    this.#asker.stop();
  }

  /** @param {Partial<Desk.TypedRun>} change */
  #put(change) {
    this.#typed = { ...this.#typed, ...change };
    this.#fault = null;
    this.render();
    this.#asker.ask(this.#typed);
  }

  /**
   * @param {Desk.RunRow} row
   * @param {string} text
   */
  #type(row, text) {
    const rows = (this.#typed.rows ?? []).filter((one) => one.probe !== row.probe);
    this.#put({ rows: [...rows, { probe: row.probe, value: { text, unit: row.unit.id } }] });
  }

  async #save() {
    try {
      await ask({ ask: 'save_run', visit: this.#visit(), index: this.#index(), typed: this.#typed }, 'visit');
      notice({ says: 'Kept with the visit' });
      goBack(address(['visit', this.#visit()]));
    } catch (error) {
      this.#fault = /** @type {Error} */ (error).message;
      this.render();
    }
  }

  draw() {
    const run = this.#run;
    if (!run) return null;
    const typed = this.#typed;
    const text = (/** @type {Desk.RunRow} */ row) =>
      (typed.rows ?? []).find((one) => one.probe === row.probe)?.value.text ?? '';
    return this.frame(
      {
        title: 'Probes side by side',
        where: run.title,
        up: address(['visit', this.#visit()]),
        acts: run.rows.length > 1 && button('Keep it', () => this.#save(), { kind: 'go', icon: 'tick' }),
      },
      this.#fault && noteView({ id: 'fault', tone: 'impossible', lead: this.#fault }),
      run.rows.length < 2 && [
        h('p', { class: 'lede' }, 'Two or more probes that read the same are needed.'),
        h('p', { class: 'gap' }, linkButton('Instruments', '#/instruments', { kind: 'left' })),
      ],
      run.rows.length > 1 &&
        h(
          'section',
          { class: 'sec', 'aria-labelledby': 'run-rows' },
          h('div', { class: 'sec-head' }, h('h2', { id: 'run-rows' }, 'What each shows')),
          h(
            'div',
            { class: 'pair' },
            h(
              'div',
              { class: 'field' },
              h('div', { class: 'field-top' }, h('label', { for: 'run-quantity' }, 'They read')),
              choose(
                '',
                typed.quantity,
                run.quantities,
                (quantity) => this.#put({ quantity, rows: [], against: null }),
                'run-quantity',
              ),
            ),
            h(
              'div',
              { class: 'field' },
              h('div', { class: 'field-top' }, h('span', { class: 'label', id: 'run-when' }, 'At the')),
              h(
                'div',
                { class: 'seg', role: 'group', 'aria-labelledby': 'run-when' },
                [
                  ['start', 'Start'],
                  ['end', 'End'],
                ].map(([value = '', label = '']) =>
                  h(
                    'button',
                    {
                      type: 'button',
                      class: typed.when === value ? 'on' : null,
                      'aria-pressed': String(typed.when === value),
                      onclick: () => this.#put({ when: value }),
                    },
                    label,
                  ),
                ),
              ),
            ),
          ),
          run.rows.map((row) =>
            h(
              'div',
              { class: 'field', key: row.probe },
              h(
                'div',
                { class: 'field-top' },
                h('label', { for: `run-${row.probe}` }, row.label),
                row.offset &&
                  h(
                    'span',
                    { class: row.too_far ? 'too-far' : 'mute', 'aria-live': 'polite' },
                    row.too_far && icon('odd', 'i-s'),
                    row.offset,
                  ),
              ),
              h(
                'div',
                { class: 'entry' },
                h('input', {
                  id: `run-${row.probe}`,
                  type: 'text',
                  inputmode: 'decimal',
                  enterkeyhint: 'next',
                  autocomplete: 'off',
                  onkeydown: toNext,
                  value: text(row),
                  oninput: (/** @type {Event} */ event) =>
                    this.#type(row, /** @type {HTMLInputElement} */ (event.target).value),
                }),
                h('span', { class: 'unit' }, row.unit.symbol),
              ),
              row.error && h('p', { class: 'wrong-words' }, row.error),
            ),
          ),
          h('p', { class: 'section-readout', 'aria-live': 'polite' }, run.says),
          h(
            'div',
            { class: 'field' },
            h('div', { class: 'field-top' }, h('label', { for: 'run-against' }, 'Held against')),
            choose(
              '',
              typed.against ?? '',
              [
                { value: '', label: 'The mean of all' },
                ...run.rows.map((row) => ({ value: row.probe, label: row.label })),
              ],
              (against) => this.#put({ against }),
              'run-against',
            ),
          ),
          h(
            'button',
            {
              type: 'button',
              class: 'check-row',
              role: 'checkbox',
              'aria-checked': String(typed.apply ?? false),
              onclick: () => this.#put({ apply: !typed.apply }),
            },
            h('span', { class: 'box', 'aria-hidden': 'true' }, typed.apply && icon('tick', 'i-s')),
            'Take what was found off every reading of this visit; each says so',
          ),
        ),
    );
  }
}
