// Adds a site, or changes one.

import { ask, Fault } from '../api.js';
import { h } from '../lib/dom.js';
import { address } from '../lib/route.js';
import { button, goInstead, Screen } from '../lib/screen.js';
import { elevationUnits, entryField } from '../parts/entry-field.js';
import { noteView } from '../parts/note.js';

export class SiteEdit extends Screen {
  #name = '';
  #elevation = '';
  #note = '';
  #invented = false;
  /** @type {Desk.UnitView | null} */
  #unit = null;
  /** @type {Desk.UnitView[]} */
  #units = [];
  /** @type {{ field: string | null, message: string } | null} */
  #fault = null;

  async load() {
    const { site } = this.route;
    if (site) {
      const view = await ask({ ask: 'site', site }, 'site');
      [this.#name, this.#elevation, this.#note] = [view.name, view.elevation_text, view.note];
      [this.#unit, this.#units, this.#invented] = [view.elevation_unit, view.elevation_units, view.invented];
    } else {
      const { chosen, units } = await elevationUnits();
      [this.#unit, this.#units] = [chosen, units];
    }
  }

  async #save() {
    try {
      const saved = await ask(
        {
          ask: 'save_site',
          site: this.route.site ?? null,
          name: this.#name,
          elevation: { text: this.#elevation, unit: this.#unit?.id ?? null },
          note: this.#note,
        },
        'site',
      );
      goInstead(address(['site', saved.site]));
    } catch (error) {
      this.#fault = {
        field: error instanceof Fault ? error.field : null,
        message: /** @type {Error} */ (error).message,
      };
      this.render();
      document.querySelector('main [aria-invalid]')?.scrollIntoView({ block: 'center' });
    }
  }

  /** @param {string} field */
  #error(field) {
    return this.#fault?.field === field ? this.#fault.message : null;
  }

  draw() {
    const known = ['name', 'elevation'];
    return this.frame(
      {
        title: this.route.site ? 'Change the site' : 'Add a site',
        invented: this.#invented,
        up: '#/sites',
        acts: button('Save', () => this.#save(), { kind: 'go', icon: 'tick' }),
      },
      this.#fault &&
        !known.includes(this.#fault.field ?? '') &&
        noteView({ id: 'fault', tone: 'impossible', lead: this.#fault.message }),
      h(
        'div',
        { class: 'sec' },
        entryField({
          id: 'site-name',
          label: 'Name of the site',
          value: this.#name,
          input: (text) => {
            this.#name = text;
          },
          error: this.#error('name'),
        }),
        entryField({
          id: 'site-elevation',
          label: 'Elevation above sea level',
          help: 'Gives the air pressure where no barometer is read. Leave it blank where it is not known.',
          value: this.#elevation,
          input: (text) => {
            this.#elevation = text;
          },
          error: this.#error('elevation'),
          number: true,
          signed: true,
          ...(this.#unit ? { unit: this.#unit } : {}),
          units: this.#units,
          choose: (unit) => {
            this.#unit = unit;
            this.render();
          },
          redraw: () => this.render(),
        }),
        entryField({
          id: 'site-note',
          label: 'Anything worth knowing',
          value: this.#note,
          input: (text) => {
            this.#note = text;
          },
          long: true,
        }),
      ),
    );
  }
}
