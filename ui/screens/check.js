// The form of a check with its live result: typed at the left or above, worked out at the right or in the strip.

import { ask, Fault } from '../api.js';
import { h } from '../lib/dom.js';
import { rememberFiled } from '../lib/filed.js';
import { icon } from '../lib/icons.js';
import { Keeper, quietMs } from '../lib/keeper.js';
import { Latest } from '../lib/latest.js';
import { notice } from '../lib/notice.js';
import { asked, unasked } from '../lib/reading.js';
import { address, placeOf } from '../lib/route.js';
import { say, sayInQuiet } from '../lib/say.js';
import { button, go, goBack, goInstead, Screen } from '../lib/screen.js';
import { openSheet } from '../lib/sheet.js';
import { differs } from '../lib/typed.js';
import { ChartPanel } from '../parts/chart.js';
import { Form } from '../parts/form.js';
import { noteView } from '../parts/note.js';
import { placeSheet } from '../parts/place-sheet.js';
import { beside, results, spoken, strip } from '../parts/result.js';

/** @typedef {{ typed: Desk.Typed, place: Desk.Place }} Kept */

export class Check extends Screen {
  /** @type {Desk.Solved | null} */
  #solved = null;
  /** @type {Desk.Place} */
  #place = {};
  /** @type {string | null} */
  #draft = null;
  /** @type {string | null} The entry that this corrects. */
  #corrects = null;
  /** @type {string | null} When the draft was kept last. */
  #kept = null;
  /** @type {string | null} Why the last wish was not granted. */
  #refused = null;
  #filing = false;
  /** The address is another screen's by now. */
  #left = false;
  /** @type {Desk.Typed} What stood in the form when it was opened. */
  #first = {};
  #form = new Form(
    {},
    () => this.#changed(),
    () => this.render(),
  );
  #solver = new Latest(
    (/** @type {Kept} */ { typed, place }) => ask({ ask: 'solve', check: this.#check(), typed, place }, 'solved'),
    (solved) => this.#take(solved),
    (error) => this.#say(error),
  );
  #drawer = new Latest(
    async (/** @type {Kept} */ { typed, place }) => ({
      drawn: await ask({ ask: 'draw', check: this.#check(), typed, place }, 'solved', 'overtaken'),
      typed,
    }),
    ({ drawn, typed }) => {
      // What was drawn for an older form is of no use to the one that stands here now.
      if (drawn.reply === 'solved' && typed === this.#form.typed) this.#take(drawn);
    },
    (error) => this.#say(error),
  );
  /** Waits for a pause in typing before draws are asked for. */
  #pause = 0;
  #chart = new ChartPanel(
    'chart',
    () => this.render(),
    (act) => this.#form.act(act),
  );
  #keeper = new Keeper((/** @type {Kept} */ kept) => this.#keep(kept));

  async load() {
    const opened = await this.#open();
    this.#draft = opened.draft ?? null;
    this.#corrects = opened.corrects ?? null;
    this.#place = opened.place;
    this.#first = opened.typed;
    this.#form.typed = opened.typed;
    this.#solved = opened.solved;
    this.#form.see(opened.solved.sections, opened.solved.notes);
    this.#charted(opened.solved);
    this.#drawLater();
  }

  #open() {
    const { check, draft, entry } = this.route;
    if (draft) return ask({ ask: 'open_draft', draft }, 'form');
    if (entry) return ask({ ask: 'correct', entry }, 'form');
    return ask({ ask: 'start', check: check ?? '', place: placeOf(this.route) }, 'form');
  }

  connectedCallback() {
    super.connectedCallback();
    const flush = () => this.#keeper.flush();
    document.addEventListener('visibilitychange', flush, { signal: this.gone });
    addEventListener('pagehide', flush, { signal: this.gone });
    this.addEventListener('focusout', flush, { signal: this.gone });
    this.addEventListener('focusin', (event) => bringIntoSight(event), { signal: this.gone });
  }

  async leave() {
    this.#left = true;
    this.#solver.stop();
    this.#drawer.stop();
    clearTimeout(this.#pause);
    await this.#keeper.flush();
  }

  #check() {
    return this.#solved?.check.id ?? '';
  }

  /** What is typed has changed: work it out, and keep it after a moment of quiet. */
  #changed() {
    this.#refused = null;
    this.render();
    const now = { typed: this.#form.typed, place: this.#place };
    clearTimeout(this.#pause);
    this.#solver.ask(now);
    if (this.#draft || differs(now.typed, this.#first)) this.#keeper.touch(now);
  }

  /** @param {Desk.Solved} solved */
  #take(solved) {
    this.#solved = solved;
    this.#form.see(solved.sections, solved.notes);
    this.#charted(solved);
    this.render();
    this.#drawLater();
    sayInQuiet(spoken(solved));
  }

  /** Draws are made when typing rests; until then a result that wants them stands without a ±. */
  #drawLater() {
    clearTimeout(this.#pause);
    if (!this.#solved?.wants_draws) return;
    const now = { typed: this.#form.typed, place: this.#place };
    this.#pause = window.setTimeout(() => this.#drawer.ask(now), quietMs);
  }

  /** Every check that has air states shows its chart. @param {Desk.Solved} solved */
  #charted(solved) {
    const { typed } = this.#form;
    const check = solved.check.id;
    this.#chart.show(solved.states.length > 0 ? { of: 'form', check, typed, place: this.#place } : null);
  }

  settle() {
    super.settle();
    this.#chart.fit();
  }

  /** @param {Kept} kept */
  async #keep({ typed, place }) {
    try {
      const reply = await ask(
        { ask: 'keep_draft', draft: this.#draft, check: this.#check(), typed, place, corrects: this.#corrects },
        'draft_kept',
      );
      this.#draft = reply.draft;
      this.#kept = reply.at;
      // Coming back or reloading leads to the draft, not to a new form.
      if (!this.#left && !this.#filing) history.replaceState(history.state, '', address(['draft', reply.draft]));
      this.render();
    } catch (error) {
      this.#say(error);
    }
  }

  /** @param {unknown} error */
  #say(error) {
    this.#refused = error instanceof Error ? error.message : String(error);
    this.render();
    say(this.#refused);
  }

  async #file() {
    if (this.#filing) return;
    this.#form.typing = false;
    this.render();
    if (!this.#place.site) {
      const place = await placeSheet(this.#place, 'File it');
      if (!place) return;
      this.#place = place;
    }
    this.#filing = true;
    // A save under way decides which draft goes with the filing.
    await this.#keeper.flush();
    try {
      const filed = await ask(
        {
          ask: 'file',
          draft: this.#draft,
          check: this.#check(),
          typed: this.#form.typed,
          place: this.#place,
          corrects: this.#corrects,
        },
        'filed',
      );
      await this.#keeper.stop();
      rememberFiled({
        filed,
        check: this.#check(),
        typed: this.#form.typed,
        place: this.#place,
        corrects: this.#corrects,
        at: performance.now(),
      });
      goInstead(address(['entry', filed.entry]));
      say(`${filed.says}. ${filed.place}`);
    } catch (error) {
      this.#filing = false;
      this.#say(error);
      if (error instanceof Fault && error.field) this.#point(error.field);
    }
  }

  /** @param {string} key */
  #point(key) {
    document.getElementById(`field-${key.replace(/[^a-zA-Z0-9_]+/g, '-')}`)?.focus();
  }

  async #more() {
    const wish = await openSheet('This check', (/** @type {import('../lib/sheet.js').Sheet<string>} */ sheet) => [
      row('Where it is made', this.#place.site ? (this.#solved?.subtitle ?? '') : 'Not chosen yet', () =>
        sheet.close('place'),
      ),
      row('Units', 'Changes what is shown. What you typed stays as you typed it.', () => sheet.close('units')),
      row('Discard', 'What is typed here goes. It can be brought back for a moment.', () => sheet.close('discard')),
    ]);
    if (wish === 'place') await this.#move();
    if (wish === 'units') go('#/units');
    if (wish === 'discard') await this.#discard();
  }

  async #move() {
    const place = await placeSheet(this.#place, 'Set the place');
    if (!place) return;
    this.#place = place;
    // What the place knows (its pressure) fills what is still blank; what was typed stays.
    const { typed } = await ask({ ask: 'start', check: this.#check(), place }, 'form');
    this.#form.typed = {
      ...this.#form.typed,
      choices: { ...typed.choices, ...this.#form.typed.choices },
      readings: { ...typed.readings, ...this.#form.typed.readings },
    };
    this.#first = {};
    this.#changed();
  }

  async #discard() {
    await this.#keeper.stop();
    const draft = this.#draft;
    if (draft) {
      await ask({ ask: 'discard_draft', draft }, 'done').catch((error) => this.#say(error));
      notice({ says: 'Draft discarded', undo: () => bringBack(draft) });
    }
    goBack('#/');
  }

  draw() {
    const solved = this.#solved;
    if (!solved) return null;
    const form = this.#form;
    const sections = form.draw();
    const stands = solved.stage === 'solved';
    return [
      this.frame(
        {
          title: solved.check.label,
          where: [
            solved.subtitle,
            this.#corrects && [' ', h('span', { class: 'draft-kept' }, 'corrects a filed entry')],
            this.#kept && [' ', h('span', { class: 'draft-kept' }, `draft kept ${this.#kept}`)],
          ],
          invented: solved.invented,
          up: '#/checks',
          aside: h(
            'button',
            {
              type: 'button',
              class: 'icon-btn',
              'aria-label': 'More: place, units, discard',
              'aria-haspopup': 'dialog',
              onclick: () => this.#more(),
            },
            icon('more'),
          ),
        },
        h(
          'div',
          { class: 'two' },
          h(
            'div',
            { class: 'given' },
            h(
              'form',
              {
                class: 'typed',
                autocomplete: 'off',
                novalidate: true,
                onsubmit: (/** @type {Event} */ event) => event.preventDefault(),
              },
              sections,
            ),
            h('div', { class: 'beside' }, beside(solved)),
          ),
          h(
            'div',
            { class: 'answer' },
            strip(solved, { quiet: form.typing, unusual: form.unusual() }),
            h(
              'div',
              { class: 'results', key: 'results' },
              results(solved, {
                notes: form.notesApart(),
                act: (act) => form.act(act),
                chart: this.#chart.draw(),
                requirements: form.typed.requirements ?? [],
                ask: (requirement, index) => form.put(requirementsPut(form.typed, requirement, index)),
              }),
            ),
            h(
              'div',
              { class: 'acts-bar', key: 'acts' },
              this.#refused && noteView({ id: 'refused', tone: 'impossible', lead: this.#refused }),
              stands
                ? button(this.#corrects ? 'File the correction' : 'File', () => this.#file(), {
                    icon: 'book',
                    kind: form.unusual() > 0 ? '' : 'go',
                    disabled: this.#filing,
                  })
                : button('Keep as draft', () => this.#later(), { icon: 'pencil' }),
            ),
          ),
        ),
      ),
    ];
  }

  /** Leaves the form as a draft. */
  async #later() {
    this.#keeper.touch({ typed: this.#form.typed, place: this.#place });
    await this.#keeper.flush();
    if (this.#refused) return;
    notice({ says: this.#kept ? `Draft kept ${this.#kept}` : 'Draft kept' });
    goBack('#/');
  }
}

/**
 * @param {Desk.Typed} typed
 * @param {Desk.TypedRequirement | null} requirement none takes the one at `index` off
 * @param {number | null} index
 */
function requirementsPut(typed, requirement, index) {
  return requirement ? asked(typed, requirement, index) : unasked(typed, index ?? -1);
}

/** @param {string} draft */
async function bringBack(draft) {
  await ask({ ask: 'restore_draft', draft }, 'form');
  go(address(['draft', draft]));
}

/**
 * @param {string} label
 * @param {string} says
 * @param {() => void} choose
 */
function row(label, says, choose) {
  return h(
    'button',
    { type: 'button', class: 'row', onclick: choose },
    h('span', null, h('span', { class: 't' }, label), says && h('span', { class: 's' }, says)),
    icon('right', 'i-s'),
  );
}

/**
 * On a phone, the field being typed in goes to the middle, clear of the strip and the keyboard.
 * @param {FocusEvent} event
 */
function bringIntoSight(event) {
  const input = /** @type {HTMLInputElement} */ (event.target);
  // What opens a sheet stays where it is tapped.
  if (input.nodeName === 'INPUT' && !input.readOnly && matchMedia('(pointer: coarse)').matches)
    input.scrollIntoView({ block: 'center' });
}
