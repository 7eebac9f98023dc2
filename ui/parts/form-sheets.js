// The sheets of a form's fields: which property, which unit, which ±.

import { h, svg } from '../lib/dom.js';
import { go } from '../lib/screen.js';
import { openSheet } from '../lib/sheet.js';

/** @typedef {import('./form.js').Form} Form */

/**
 * Arrow keys go along the rows of one question.
 * @param {KeyboardEvent} event
 */
function alongRows(event) {
  const step = { ArrowDown: 1, ArrowRight: 1, ArrowUp: -1, ArrowLeft: -1 }[event.key];
  const row = /** @type {HTMLElement} */ (event.currentTarget);
  const rows = /** @type {HTMLElement[]} */ ([...(row.parentElement?.children ?? [])]);
  if (!step || rows.length === 0) return;
  event.preventDefault();
  rows[(rows.indexOf(row) + step + rows.length) % rows.length]?.focus();
}

/**
 * One row of a sheet that is chosen by a tap.
 * @param {{ label: string, help?: string | null | undefined, on: boolean, choose: () => void }} row
 */
export function radioRow({ label, help, on, choose }) {
  return h(
    'button',
    { type: 'button', class: 'row', role: 'radio', 'aria-checked': String(on), onclick: choose, onkeydown: alongRows },
    h('span', null, h('span', { class: 't' }, label), help && h('span', { class: 's' }, help)),
    svg(
      'svg',
      { class: 'radio', viewBox: '0 0 24 24', 'aria-hidden': 'true' },
      svg('circle', { cx: 12, cy: 12, r: 10 }),
      on && svg('circle', { class: 'on', cx: 12, cy: 12, r: 5 }),
    ),
  );
}

/**
 * @param {Form} form
 * @param {Desk.ChoiceView} choice
 */
export async function choiceSheet(form, choice) {
  const value = await openSheet(choice.label, (sheet) => [
    choice.help && h('p', { class: 'mute' }, choice.help),
    h(
      'div',
      { role: 'radiogroup', 'aria-label': choice.label },
      choice.options.map((option) =>
        radioRow({
          label: option.label,
          help: option.help,
          on: option.value === choice.value,
          choose: () => sheet.close(option.value),
        }),
      ),
    ),
  ]);
  if (value !== undefined) form.choose(choice.key, value);
}

/**
 * @param {Form} form
 * @param {Desk.ReadingView} view
 */
export async function unitSheet(form, view) {
  const all = 'all units';
  const unit = await openSheet(`${view.label}: unit`, (sheet) => [
    h('p', { class: 'mute' }, 'The number stays as you typed it; this says what it is in.'),
    h(
      'div',
      { role: 'radiogroup', 'aria-label': 'Unit' },
      view.units.map((one) =>
        radioRow({ label: one.symbol, help: one.name, on: one.id === view.unit.id, choose: () => sheet.close(one.id) }),
      ),
    ),
    h(
      'p',
      { class: 'sheet-foot' },
      h('button', { type: 'button', class: 'link', onclick: () => sheet.close(all) }, 'All units'),
    ),
  ]);
  if (unit === all) go('#/units');
  else if (unit !== undefined) form.unit(view.key, unit);
}
