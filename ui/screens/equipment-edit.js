// Adds equipment to a site, or changes it.

import { ask, Fault } from '../api.js';
import { h } from '../lib/dom.js';
import { address } from '../lib/route.js';
import { button, goInstead, Screen } from '../lib/screen.js';
import { entryField } from '../parts/entry-field.js';
import { noteView } from '../parts/note.js';
import { classChips } from '../parts/place-sheet.js';

export class EquipmentEdit extends Screen {
  #site = '';
  #where = '';
  #tag = '';
  #class = '';
  #note = '';
  #invented = false;
  /** @type {{ field: string | null, message: string } | null} */
  #fault = null;

  async load() {
    const { equipment, site } = this.route;
    if (equipment) {
      const view = await ask({ ask: 'equipment', equipment }, 'equipment');
      [this.#tag, this.#class, this.#note] = [view.tag, view.class, view.note];
      [this.#site, this.#where, this.#invented] = [view.place.site ?? '', view.site, view.invented];
    } else {
      const view = await ask({ ask: 'site', site: site ?? '' }, 'site');
      [this.#site, this.#where, this.#invented] = [view.site, view.name, view.invented];
    }
  }

  async #save() {
    try {
      const saved = await ask(
        {
          ask: 'save_equipment',
          equipment: this.route.equipment ?? null,
          site: this.#site,
          tag: this.#tag,
          class: this.#class,
          note: this.#note,
        },
        'equipment',
      );
      goInstead(address(['equipment', saved.place.equipment ?? '']));
    } catch (error) {
      this.#fault = {
        field: error instanceof Fault ? error.field : null,
        message: /** @type {Error} */ (error).message,
      };
      this.render();
    }
  }

  /** @param {string} field */
  #error(field) {
    return this.#fault?.field === field ? this.#fault.message : null;
  }

  draw() {
    const known = ['tag', 'class'];
    return this.frame(
      {
        title: this.route.equipment ? 'Change the equipment' : 'Add equipment',
        where: this.#where,
        invented: this.#invented,
        up: address(['site', this.#site]),
        acts: button('Save', () => this.#save(), { kind: 'go', icon: 'tick' }),
      },
      this.#fault &&
        !known.includes(this.#fault.field ?? '') &&
        noteView({ id: 'fault', tone: 'impossible', lead: this.#fault.message }),
      h(
        'div',
        { class: 'sec' },
        entryField({
          id: 'tag',
          label: 'Tag, as on the drawing',
          value: this.#tag,
          input: (text) => {
            this.#tag = text;
          },
          error: this.#error('tag'),
        }),
        entryField({
          id: 'class',
          label: 'What it is',
          value: this.#class,
          input: (text) => {
            this.#class = text;
          },
          error: this.#error('class'),
        }),
        classChips(this.#class, (name) => {
          this.#class = name;
          this.render();
        }),
        entryField({
          id: 'note',
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
