// What is asked of a check's results, and the answers: a section below the results, and the sheet that asks.

import { h } from '../lib/dom.js';
import { icon } from '../lib/icons.js';
import { button, link } from '../lib/screen.js';
import { openSheet, sheetActs } from '../lib/sheet.js';
import { toNext } from '../lib/typing.js';
import { noteView } from './note.js';

/** @typedef {(requirement: Desk.TypedRequirement | null, index: number | null) => void} Put */

/**
 * @param {Desk.RequirementsView} view
 * @param {Desk.TypedRequirement[]} typed
 * @param {Put | null} put none where nothing can be changed any more
 */
export function requirementsView(view, typed, put) {
  if (view.verdicts.length === 0 && (!put || view.figures.length === 0)) return null;
  return h(
    'section',
    { key: 'requirements', class: 'sec', 'aria-labelledby': 'requirements-title' },
    h('div', { class: 'sec-head' }, h('h2', { id: 'requirements-title' }, 'Requirements')),
    view.verdicts.map((verdict) => verdictView(verdict, typed[verdict.index] ?? null, view, put)),
    put &&
      h(
        'div',
        { class: 'acts' },
        link('Hold a result against a requirement', () => ask(view, null, null, put), 'plus'),
      ),
    put &&
      notTaken(view.before, typed).map((before) =>
        h(
          'button',
          {
            key: `before ${before.says}`,
            type: 'button',
            class: 'row',
            onclick: () => put(before.requirement, null),
          },
          h('span', null, h('span', { class: 't' }, before.says), h('span', { class: 's' }, 'Ask the same again')),
          icon('pull'),
        ),
      ),
  );
}

/**
 * @param {Desk.VerdictView} verdict
 * @param {Desk.TypedRequirement | null} typed
 * @param {Desk.RequirementsView} view
 * @param {Put | null} put
 */
function verdictView(verdict, typed, view, put) {
  return h(
    'div',
    { key: `verdict ${verdict.index}`, class: `verdict ${verdict.answer ?? 'open'}` },
    h('p', { class: 'asked' }, verdict.asked),
    verdict.word && h('p', { class: 'word' }, icon(sign(verdict.answer ?? null)), h('strong', null, verdict.word)),
    verdict.says && h('p', null, verdict.says, verdict.chance && ` ${upperFirst(verdict.chance)}.`),
    verdict.decides.map((says) => h('p', null, says)),
    verdict.why_not && h('p', null, verdict.why_not.says),
    verdict.share && h('p', { class: 'mute' }, verdict.share),
    verdict.errors.map((error) => h('p', { class: 'wrong-words' }, error.says)),
    put &&
      typed &&
      h(
        'div',
        { class: 'acts' },
        link('Change', () => ask(view, typed, verdict.index, put), 'pencil'),
        link('Take it off', () => put(null, verdict.index), 'close'),
      ),
  );
}

/**
 * What was asked before and does not stand here yet.
 * @param {Desk.BeforeView[]} before
 * @param {Desk.TypedRequirement[]} typed
 */
function notTaken(before, typed) {
  const taken = new Set(typed.map((one) => JSON.stringify(one)));
  return before.filter((one) => !taken.has(JSON.stringify(one.requirement)));
}

/** @param {string | null} answer */
function sign(answer) {
  if (answer === 'meets') return 'tick';
  if (answer === 'falls_short') return 'short';
  return answer === 'goes_over' ? 'over' : 'odd';
}

/** @param {string} text */
function upperFirst(text) {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/**
 * @param {Desk.RequirementsView} view
 * @param {Desk.TypedRequirement | null} typed
 * @param {number | null} index
 * @param {Put} put
 */
async function ask(view, typed, index, put) {
  const first = view.figures[0];
  if (!first) return;
  /** @type {Desk.TypedRequirement} */
  let now = typed ?? { figure: first.figure, direction: 'at_least', value: { text: '' }, source: '' };
  let rated = Object.keys(now.conditions ?? {}).length > 0;
  const errors = (index === null ? null : view.verdicts[index]?.errors) ?? [];
  /** @param {string} field */
  const wrong = (field) =>
    errors.filter((error) => error.field === field).map((error) => h('p', { class: 'ask wrong-words' }, error.says));
  // What stands at no field of the sheet.
  const apart = errors.filter((error) => !/^(value|other|risk|plus_minus|conditions\..*)$/.test(error.field));
  const folded = errors.some((error) => /^(risk|plus_minus|conditions\.)/.test(error.field));
  const done = await openSheet(
    'A requirement',
    (/** @type {import('../lib/sheet.js').Sheet<Desk.TypedRequirement>} */ sheet) => {
      const figure = view.figures.find((one) => one.figure === now.figure) ?? first;
      /** @param {Partial<Desk.TypedRequirement>} change */
      const set = (change, redraw = true) => {
        now = { ...now, ...change };
        if (redraw) sheet.redraw();
      };
      /**
       * @param {string} label
       * @param {'value' | 'other' | 'plus_minus'} name
       * @param {Desk.UnitView} unit
       * @param {Desk.UnitView[]} units
       * @param {string} [help]
       */
      const number = (label, name, unit, units, help) =>
        h(
          'div',
          { class: 'field' },
          h('div', { class: 'field-top' }, h('label', { for: `asked-${name}` }, label)),
          h(
            'div',
            { class: 'entry' },
            h('input', {
              id: `asked-${name}`,
              type: 'text',
              inputmode: 'decimal',
              enterkeyhint: 'next',
              autocomplete: 'off',
              onkeydown: toNext,
              value: now[name]?.text ?? '',
              oninput: (/** @type {Event} */ event) =>
                set({ [name]: { text: textOf(event), unit: now[name]?.unit ?? unit.id } }, false),
            }),
            units.length > 1
              ? choose(`Unit of ${label.toLowerCase()}`, now[name]?.unit ?? unit.id, units.map(unitOption), (value) =>
                  set({ [name]: { text: now[name]?.text ?? '', unit: value } }),
                )
              : h('span', { class: 'unit' }, unit.symbol),
          ),
          help && h('p', { class: 'ask' }, help),
          wrong(name),
        );
      return [
        h('p', { class: 'mute' }, 'There are no built-in limits. Type what is asked, and where that is written.'),
        h(
          'div',
          { class: 'field' },
          h('div', { class: 'field-top' }, h('label', { for: 'asked-figure' }, 'Result')),
          choose(
            '',
            now.figure,
            view.figures.map((one) => ({ value: one.figure, label: one.label })),
            (value) => set({ figure: value, value: { text: now.value.text } }),
            'asked-figure',
          ),
        ),
        h(
          'div',
          { class: 'field' },
          h('div', { class: 'field-top' }, h('label', { for: 'asked-direction' }, 'It must be')),
          choose('', now.direction, view.directions, (value) => set({ direction: value }), 'asked-direction'),
        ),
        number(
          now.direction === 'within' ? 'Nominal figure' : now.direction === 'between' ? 'Lower limit' : 'Limit',
          'value',
          figure.unit,
          figure.units,
        ),
        now.direction === 'between' && number('Upper limit', 'other', figure.unit, figure.units),
        now.direction === 'within' &&
          number('Tolerance', 'other', figure.width_unit, [figure.width_unit], 'As a figure, or in %: 5 %'),
        words('Written in', 'asked-source', now.source ?? '', (text) => set({ source: text }, false)),
        h(
          'details',
          { class: 'sec folded', open: folded },
          h('summary', null, h('h3', null, 'Conditions, risk, its own ±'), icon('down', 'i-s')),
          words(
            'Risk of a wrong “meets”, %',
            'asked-risk',
            now.risk ?? '',
            (text) => set({ risk: text }, false),
            '5 where blank',
          ),
          wrong('risk'),
          number(
            '± of the requirement itself',
            'plus_minus',
            figure.width_unit,
            [figure.width_unit],
            'Where its maker states one',
          ),
          h(
            'p',
            { class: 'ask' },
            'A rating holds at its own conditions only. Type them, and it is held against readings that agree with them; without them no share of it is given.',
          ),
          !rated &&
            link('Type the conditions of the rating', () => {
              rated = true;
              sheet.redraw();
            }),
          rated &&
            view.conditions.map((condition) =>
              h(
                'div',
                { class: 'field' },
                h('div', { class: 'field-top' }, h('label', { for: `asked-${condition.key}` }, condition.label)),
                h(
                  'div',
                  { class: 'entry' },
                  h('input', {
                    id: `asked-${condition.key}`,
                    type: 'text',
                    inputmode: 'decimal',
                    enterkeyhint: 'next',
                    autocomplete: 'off',
                    onkeydown: toNext,
                    value: now.conditions?.[condition.key]?.text ?? '',
                    oninput: (/** @type {Event} */ event) =>
                      set(
                        {
                          conditions: {
                            ...now.conditions,
                            [condition.key]: {
                              text: textOf(event),
                              unit: now.conditions?.[condition.key]?.unit ?? condition.unit.id,
                            },
                          },
                        },
                        false,
                      ),
                  }),
                  h('span', { class: 'unit' }, condition.unit.symbol),
                ),
                wrong(`conditions.${condition.key}`),
              ),
            ),
        ),
        apart.length > 0 &&
          noteView({ id: 'asked-errors', tone: 'impossible', lead: apart.map((error) => error.says).join(' ') }),
        sheetActs(button('Hold it against this', () => sheet.close(now), { kind: 'go' })),
      ];
    },
  );
  if (done) put(done, index);
}

/** @param {Event} event */
function textOf(event) {
  return /** @type {HTMLInputElement} */ (event.target).value;
}

/** @param {Desk.UnitView} unit */
function unitOption(unit) {
  return { value: unit.id, label: unit.symbol };
}

/**
 * @param {string} label
 * @param {string} id
 * @param {string} value
 * @param {(text: string) => void} input
 * @param {string} [help]
 */
function words(label, id, value, input, help) {
  return h(
    'div',
    { class: 'field' },
    h('div', { class: 'field-top' }, h('label', { for: id }, label)),
    h(
      'div',
      { class: 'entry words' },
      h('input', {
        id,
        type: 'text',
        enterkeyhint: 'next',
        autocomplete: 'off',
        onkeydown: toNext,
        value,
        oninput: (/** @type {Event} */ event) => input(textOf(event)),
      }),
    ),
    help && h('p', { class: 'ask' }, help),
  );
}

/**
 * One of several, in the system's own list.
 * @param {string} label for a screen reader, where no label stands beside it
 * @param {string} value
 * @param {{ value: string, label: string }[]} options
 * @param {(value: string) => void} chosen
 * @param {string} [id]
 */
export function choose(label, value, options, chosen, id) {
  return h(
    'select',
    {
      id: id ?? null,
      class: 'select',
      'aria-label': label || null,
      value,
      onchange: (/** @type {Event} */ event) => chosen(/** @type {HTMLSelectElement} */ (event.target).value),
    },
    options.map((option) => h('option', { value: option.value }, option.label)),
  );
}
