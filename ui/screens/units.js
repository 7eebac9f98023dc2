// Units, quantity by quantity, with two presets.

import { ask } from '../api.js';
import { h } from '../lib/dom.js';
import { Screen } from '../lib/screen.js';
import { listSection } from '../parts/rows.js';

/** @type {{ preset: Desk.Preset, label: string, says: string }[]} */
const presets = [
  { preset: 'ip', label: 'IP', says: '°F, cfm' },
  { preset: 'si', label: 'SI', says: '°C, L/s' },
];

export class Units extends Screen {
  /** @type {Desk.UnitsView | null} */
  #units = null;

  async load() {
    this.#units = await ask({ ask: 'units' }, 'units');
  }

  /** @param {Desk.Request} request */
  async #choose(request) {
    await this.attempt(async () => {
      this.#units = await ask(request, 'units');
      this.render();
    });
  }

  draw() {
    const units = this.#units;
    if (!units) return null;
    return this.frame(
      { title: 'Units', root: true, where: 'For this device. A field’s own chip changes that field.' },
      h(
        'div',
        { class: 'sec' },
        h(
          'div',
          { class: 'seg', role: 'group', 'aria-label': 'All at once' },
          presets.map(({ preset, label, says }) =>
            h(
              'button',
              {
                type: 'button',
                class: units.preset === preset ? 'on' : null,
                'aria-pressed': String(units.preset === preset),
                onclick: () => this.#choose({ ask: 'choose_preset', preset }),
              },
              label,
              h('small', null, says),
            ),
          ),
          !units.preset && h('span', { class: 'on' }, 'My mix'),
        ),
        h('p', { class: 'ask' }, 'Changes what is shown. What you typed stays as you typed it.'),
      ),
      listSection(
        'Quantity by quantity',
        units.rows.map((row) =>
          h(
            'div',
            { class: 'units-row', key: row.quantity },
            h(
              'p',
              { id: `units-${row.quantity}` },
              h('span', { class: 't' }, upperFirst(row.label)),
              h('span', { class: 'example' }, row.example),
            ),
            h(
              'div',
              { class: 'chips', role: 'group', 'aria-labelledby': `units-${row.quantity}` },
              row.units.map((unit) =>
                h(
                  'button',
                  {
                    type: 'button',
                    class: unit.id === row.chosen.id ? 'chip on' : 'chip',
                    'aria-pressed': String(unit.id === row.chosen.id),
                    title: unit.name,
                    onclick: () => this.#choose({ ask: 'choose_unit', quantity: row.quantity, unit: unit.id }),
                  },
                  unit.symbol || unit.name,
                ),
              ),
            ),
          ),
        ),
      ),
    );
  }
}

/** @param {string} text */
function upperFirst(text) {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
