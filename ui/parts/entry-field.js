// A field outside a check's form: a name, a note, an elevation.

import { ask } from '../api.js';
import { h } from '../lib/dom.js';
import { icon } from '../lib/icons.js';
import { say } from '../lib/say.js';
import { openSheet } from '../lib/sheet.js';
import { changeSign } from '../lib/typed.js';
import { toNext } from '../lib/typing.js';
import { radioRow } from './form-sheets.js';
import { noteView } from './note.js';

/** The unit that elevations are typed in, and those that they can be typed in. */
export async function elevationUnits() {
  const { rows } = await ask({ ask: 'units' }, 'units');
  const row = rows.find((one) => one.quantity === 'elevation');
  if (!row) throw new Error('Elevation has no units.');
  return { chosen: row.chosen, units: row.units };
}

/**
 * @typedef {object} EntryField
 * @property {string} id
 * @property {string} label
 * @property {string} value
 * @property {(text: string) => void} input
 * @property {string} [help]
 * @property {string | null} [error]
 * @property {boolean} [number] digits are typed
 * @property {boolean} [signed]
 * @property {boolean} [long] several lines
 * @property {Desk.UnitView} [unit]
 * @property {Desk.UnitView[]} [units]
 * @property {(unit: Desk.UnitView) => void} [choose]
 * @property {() => void} [redraw]
 */

/** @param {EntryField} field */
export function entryField(field) {
  const { id, label, value, error } = field;
  const describes = [...(field.help ? [`${id}-help`] : []), ...(error ? [`${id}-error`] : [])].join(' ') || null;
  const props = {
    id,
    'aria-describedby': describes,
    'aria-invalid': error ? 'true' : null,
    value,
    oninput: (/** @type {Event} */ event) => field.input(/** @type {HTMLInputElement} */ (event.target).value),
  };
  return h(
    'div',
    { key: id, class: error ? 'field wrong' : 'field' },
    h(
      'div',
      { class: 'field-top' },
      h('label', { for: id }, label, field.unit && h('span', { class: 'sr' }, `, in ${field.unit.name}`)),
    ),
    h(
      'div',
      { class: field.number ? 'entry' : 'entry words' },
      field.signed &&
        h(
          'button',
          {
            type: 'button',
            class: 'sign',
            'aria-label': `Change sign of ${label}`,
            onclick: () => {
              const text = changeSign(/** @type {HTMLInputElement} */ (document.getElementById(id)).value);
              field.input(text);
              say(text.startsWith('\u2212') ? 'minus' : 'plus');
              field.redraw?.();
            },
          },
          icon('sign'),
        ),
      field.long
        ? h('textarea', { ...props, rows: 3 })
        : h('input', {
            ...props,
            type: 'text',
            inputmode: field.number ? 'decimal' : null,
            enterkeyhint: 'next',
            autocomplete: 'off',
            onkeydown: toNext,
          }),
      field.unit && unitChip(field),
    ),
    field.help && h('p', { class: 'ask', id: `${id}-help` }, field.help),
    error && noteView({ id: `${id}-error`, tone: 'impossible', lead: error }),
  );
}

/** @param {EntryField} field */
function unitChip({ label, unit, units = [], choose }) {
  if (!unit) return null;
  if (units.length < 2 || !choose) return h('span', { class: 'unit' }, unit.symbol);
  return h(
    'button',
    {
      type: 'button',
      class: 'unit',
      'aria-haspopup': 'dialog',
      onclick: async () => {
        const chosen = await openSheet(`${label}: unit`, (sheet) =>
          h(
            'div',
            { role: 'radiogroup', 'aria-label': 'Unit' },
            units.map((one) =>
              radioRow({ label: one.symbol, help: one.name, on: one.id === unit.id, choose: () => sheet.close(one) }),
            ),
          ),
        );
        if (chosen) choose(chosen);
      },
    },
    h('span', null, unit.symbol),
    icon('down', 'i-s'),
    h('span', { class: 'sr' }, `, unit of ${label}, change`),
  );
}
