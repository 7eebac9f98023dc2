// The sheet of one reading: what it was read with, its ±, how it was held, and its takes. It stays open while the form
// behind it is worked out anew, and shows what the desk makes of each change at once.

import { h } from '../lib/dom.js';
import { icon } from '../lib/icons.js';
import { said, take, takeText, withoutTake } from '../lib/reading.js';
import { say } from '../lib/say.js';
import { button, go, link } from '../lib/screen.js';
import { openSheet, sheetActs } from '../lib/sheet.js';
import { changeSign } from '../lib/typed.js';
import { toNext } from '../lib/typing.js';
import { radioRow } from './form-sheets.js';

/** @typedef {import('./form.js').Form} Form */
/** @typedef {import('./form.js').Reading} Reading */

/** @typedef {'with' | 'held' | 'takes'} SheetPart */

/** @type {SheetPart} The part used last: one who takes one reading after the other finds the key at once. */
let last = 'with';

/**
 * @param {Form} form
 * @param {Reading} view
 * @param {SheetPart} [first] the part that stands open at first
 */
export async function readingSheet(form, view, first = last) {
  const elsewhere = 'instruments';
  let part = first;
  // What stands in the field already is what the display shows: one tap makes it the first take.
  const typing = { text: view.with?.takes.rows.length ? '' : form.text(view) };
  const done = await openSheet(view.label, (/** @type {import('../lib/sheet.js').Sheet<string>} */ sheet) => {
    form.watch(() => {
      const taken = document.querySelectorAll('.takes li').length;
      sheet.redraw();
      const takes = document.querySelectorAll('.takes li');
      if (takes.length > taken) takes[takes.length - 1]?.scrollIntoView({ block: 'nearest' });
    });
    const now = form.readings().find((one) => one.key === view.key) ?? view;
    const taken = now.with?.takes.rows.length ?? 0;
    const parts = /** @type {const} */ ([
      ['with', 'Read with'],
      ['held', 'Place'],
      ['takes', taken > 0 ? `Takes: ${taken}` : 'Takes'],
    ]);
    const done = (/** @type {string} */ kind) => button('Done', () => sheet.close(), { kind });
    return [
      h('p', { class: 'mute', 'aria-live': 'polite' }, `${now.name}. ${now.plus_minus || 'No ± is needed.'}`),
      now.with &&
        h(
          'div',
          { class: 'seg', role: 'group', 'aria-label': 'About this reading' },
          parts.map(([id, label]) =>
            h(
              'button',
              {
                type: 'button',
                class: part === id ? 'on' : null,
                'aria-pressed': String(part === id),
                onclick: () => {
                  part = id;
                  last = id;
                  sheet.redraw();
                },
              },
              label,
            ),
          ),
        ),
      (!now.with || part === 'with') && [
        now.with && probes(form, now, now.with, () => sheet.close(elsewhere)),
        now.with && madeOf(now.with),
        plusMinus(form, now),
      ],
      now.with && part === 'held' && held(form, now, now.with),
      now.with && part === 'takes'
        ? [takes(form, now, now.with), takeKey(form, now, typing, sheet.redraw, done('narrow'))]
        : sheetActs(done('go')),
    ];
  });
  form.watch(null);
  if (done === elsewhere) go('#/instruments');
}

/**
 * @param {Form} form
 * @param {Reading} view
 * @param {Desk.ReadWith} beside
 * @param {() => void} toRegister
 */
function probes(form, view, beside, toRegister) {
  return [
    h('h3', { id: 'sheet-probes' }, 'Read with'),
    h(
      'div',
      { role: 'radiogroup', 'aria-labelledby': 'sheet-probes' },
      beside.probes.map((option) =>
        radioRow({
          label: option.label,
          help: option.help,
          on: option.value === (beside.probe ?? ''),
          choose: () => form.put(said(form.typed, view.key, { probe: option.value }, view.unit.id)),
        }),
      ),
    ),
    h('p', { class: 'sheet-foot' }, link('Instruments: add one, or change its accuracy', toRegister)),
    beside.corrected && h('p', { class: 'ask' }, beside.corrected),
  ];
}

/**
 * A ± typed by hand, which stands for the instrument.
 * @param {Form} form
 * @param {Reading} view
 */
function plusMinus(form, view) {
  const typed = form.typed.readings?.[view.key]?.plus_minus ?? null;
  const text = typed?.text ?? '';
  const unit = view.plus_minus_units.find((one) => one.id === typed?.unit) ?? view.plus_minus_unit;
  const alike = form
    .readings()
    .filter((other) => other.key !== view.key && other.plus_minus_text.trim() === '' && sameUnits(other, view))
    .map((other) => other.key);
  return [
    h('h3', { id: 'sheet-pm' }, 'Its ±, by hand'),
    h(
      'p',
      { class: 'mute' },
      'How far it may be off: 95 times in 100 the true value lies within it. Typed here it counts in place of the instrument’s. Blank is not known.',
    ),
    h(
      'div',
      { class: 'entry' },
      h('input', {
        type: 'text',
        inputmode: 'decimal',
        enterkeyhint: 'done',
        autocomplete: 'off',
        'aria-label': `± of ${view.name}`,
        value: text,
        onkeydown: toNext,
        oninput: (/** @type {Event} */ event) =>
          form.plusMinus([view.key], /** @type {HTMLInputElement} */ (event.target).value, unit.id),
      }),
      h('span', { class: 'unit' }, unit.symbol),
    ),
    view.plus_minus_units.length > 1 &&
      h(
        'div',
        { class: 'chips gap', role: 'group', 'aria-label': 'Unit of the ±' },
        view.plus_minus_units.map((one) =>
          h(
            'button',
            {
              type: 'button',
              class: one.id === unit.id ? 'chip on' : 'chip',
              'aria-pressed': String(one.id === unit.id),
              onclick: () => form.plusMinus([view.key], text, one.id),
            },
            one.symbol,
          ),
        ),
      ),
    text.trim() !== '' &&
      alike.length > 0 &&
      h(
        'p',
        { class: 'sheet-foot' },
        link(
          `The same for ${alike.length === 1 ? 'the other reading' : `the ${alike.length} other readings`} in ${view.unit.symbol} without one`,
          () => form.plusMinus(alike, text, unit.id),
        ),
      ),
  ];
}

/** @param {Desk.ReadWith} beside */
function madeOf(beside) {
  if (beside.parts.length === 0) return null;
  return [
    h('h3', { id: 'sheet-parts' }, 'What the ± is made of'),
    h(
      'ul',
      { class: 'made-of', 'aria-labelledby': 'sheet-parts' },
      beside.parts.map((part) => h('li', null, h('span', null, part.label), h('b', null, part.text))),
    ),
  ];
}

/**
 * @param {Form} form
 * @param {Reading} view
 * @param {Desk.ReadWith} beside
 */
function held(form, view, beside) {
  const spot = beside.spot;
  const put = (/** @type {Partial<Desk.TypedSpot>} */ change) =>
    form.put(said(form.typed, view.key, { spot: { ...spot, ...change } }, view.unit.id));
  const width = (
    /** @type {string} */ label,
    /** @type {'spread' | 'plus_minus'} */ name,
    /** @type {string} */ help,
  ) =>
    h(
      'div',
      { class: 'field' },
      h('div', { class: 'field-top' }, h('label', { for: `spot-${name}` }, label)),
      h(
        'div',
        { class: 'entry' },
        h('input', {
          id: `spot-${name}`,
          type: 'text',
          inputmode: 'decimal',
          enterkeyhint: 'next',
          autocomplete: 'off',
          'aria-describedby': `spot-${name}-help`,
          onkeydown: toNext,
          value: spot[name]?.text ?? '',
          oninput: (/** @type {Event} */ event) =>
            put({
              [name]: {
                text: /** @type {HTMLInputElement} */ (event.target).value,
                unit: spot[name]?.unit ?? beside.spread_unit.id,
              },
            }),
        }),
        h('span', { class: 'unit' }, beside.spread_unit.symbol),
      ),
      h('p', { class: 'ask', id: `spot-${name}-help` }, help),
    );
  return [
    h('h3', { id: 'sheet-held' }, 'How it was held'),
    h(
      'div',
      { role: 'radiogroup', 'aria-labelledby': 'sheet-held' },
      beside.held.map((option) =>
        radioRow({
          label: option.label,
          help: option.help,
          on: option.value === spot.held,
          choose: () => put({ held: option.value }),
        }),
      ),
    ),
    spot.held === 'grid' && [
      h(
        'div',
        { class: 'field' },
        h('div', { class: 'field-top' }, h('label', { for: 'spot-points' }, 'Points')),
        h(
          'div',
          { class: 'entry' },
          h('input', {
            id: 'spot-points',
            type: 'text',
            inputmode: 'numeric',
            enterkeyhint: 'next',
            autocomplete: 'off',
            onkeydown: toNext,
            value: spot.points ?? '',
            oninput: (/** @type {Event} */ event) =>
              put({ points: /** @type {HTMLInputElement} */ (event.target).value }),
          }),
        ),
      ),
      width('Spread of the points', 'spread', 'Standard deviation of single points; the reading is their mean.'),
    ],
    spot.held !== '' &&
      width('± of the place', 'plus_minus', 'What the place adds by itself (95 %); blank adds nothing.'),
    view.error && h('p', { class: 'ask wrong-words', role: 'alert' }, view.error.says),
    beside.usual.length > 0 && [
      h('h3', null, 'Usual figures'),
      h(
        'div',
        { class: 'stack' },
        beside.usual.map((usual) =>
          link(usual.label, () => form.put(said(form.typed, view.key, { spot: usual.spot }, view.unit.id))),
        ),
      ),
    ],
  ];
}

/**
 * The takes so far, what they come to, and whether they stand still.
 * @param {Form} form
 * @param {Reading} view
 * @param {Desk.ReadWith} beside
 */
function takes(form, view, beside) {
  const { rows, word, says, steadiness } = beside.takes;
  return [
    rows.length === 0 &&
      h(
        'p',
        { class: 'lede gap' },
        'Type what the display shows and take it: each take keeps its time, and their mean is the reading.',
      ),
    word &&
      h(
        'p',
        { class: `steadiness ${steadiness}`, 'aria-live': 'polite' },
        h('strong', null, word),
        says && h('span', null, says),
      ),
    rows.length > 0 &&
      h(
        'ol',
        { class: 'takes', 'aria-label': 'Takes so far' },
        rows.map((row, index) =>
          h(
            'li',
            null,
            h('span', { class: 'at' }, row.at),
            h('b', null, takeText(row.text, view.unit.symbol)),
            h(
              'button',
              {
                type: 'button',
                class: 'icon-btn',
                'aria-label': `Remove the take of ${row.at}, ${row.text}`,
                onclick: () => form.put(withoutTake(form.typed, view.key, index, view.unit.id)),
              },
              icon('close', 'i-s'),
            ),
            row.error && h('span', { class: 'wrong-words' }, row.error),
          ),
        ),
      ),
    view.error && h('p', { class: 'ask wrong-words', role: 'alert' }, view.error.says),
    rows.length > 1 &&
      beside.takes.at_time_of.length > 1 && [
        h('h3', { id: 'sheet-aba' }, 'What counts'),
        h(
          'div',
          { role: 'radiogroup', 'aria-labelledby': 'sheet-aba' },
          beside.takes.at_time_of.map((option) =>
            radioRow({
              label: option.label,
              help: option.help,
              on: option.value === beside.takes.at_time_of_value,
              choose: () => form.put(said(form.typed, view.key, { at_time_of: option.value }, view.unit.id)),
            }),
          ),
        ),
      ],
  ];
}

/**
 * The field for the next take and the large key under the thumb.
 * @param {Form} form
 * @param {Reading} view
 * @param {{ text: string }} typing
 * @param {() => void} redraw
 * @param {HTMLElement} done
 */
function takeKey(form, view, typing, redraw, done) {
  const id = 'take-text';
  const stamp = () => {
    const input = document.getElementById(id);
    input?.focus();
    if (typing.text.trim() === '') return;
    form.put(take(form.typed, view.key, typing.text.trim(), view.unit.id, new Date().toISOString()));
    say(`Taken: ${typing.text}`);
    typing.text = '';
    redraw();
  };
  return h(
    'div',
    { class: 'sheet-acts' },
    h(
      'div',
      { class: 'entry' },
      view.signed &&
        h(
          'button',
          {
            type: 'button',
            class: 'sign',
            'aria-label': 'Change sign of the take',
            onclick: () => {
              typing.text = changeSign(typing.text);
              redraw();
            },
          },
          icon('sign'),
        ),
      h('input', {
        id,
        type: 'text',
        inputmode: 'decimal',
        enterkeyhint: 'enter',
        autocomplete: 'off',
        'data-first': true,
        'aria-label': `Next take of ${view.name}`,
        value: typing.text,
        oninput: (/** @type {Event} */ event) => {
          typing.text = /** @type {HTMLInputElement} */ (event.target).value;
        },
        onkeydown: (/** @type {KeyboardEvent} */ event) => {
          if (event.key !== 'Enter' || event.isComposing) return;
          event.preventDefault();
          stamp();
        },
      }),
      h('span', { class: 'unit' }, view.unit.symbol),
    ),
    done,
    h(
      'button',
      {
        type: 'button',
        class: 'btn go take',
        // The keyboard stays up for the next take.
        onpointerdown: (/** @type {Event} */ event) => event.preventDefault(),
        onclick: stamp,
      },
      h('span', null, 'Take'),
    ),
  );
}

/**
 * Whether two readings can be typed in the same units, so that one instrument may have read both.
 * @param {Desk.ReadingView} one
 * @param {Desk.ReadingView} other
 */
function sameUnits(one, other) {
  return (
    one.unit.id === other.unit.id &&
    one.units.map((unit) => unit.id).join() === other.units.map((unit) => unit.id).join()
  );
}
