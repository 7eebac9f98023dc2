// Starts a visit, or changes one: the pressure here and the outdoor air as a form, worked out while one types.

import { ask } from '../api.js';
import { h } from '../lib/dom.js';
import { Latest } from '../lib/latest.js';
import { address } from '../lib/route.js';
import { button, goInstead, Screen } from '../lib/screen.js';
import { entryField } from '../parts/entry-field.js';
import { Form } from '../parts/form.js';
import { noteView } from '../parts/note.js';

export class VisitEdit extends Screen {
  /** @type {Desk.VisitFormView | null} */
  #view = null;
  #invented = false;
  #people = '';
  #running = '';
  /** @type {string | null} */
  #fault = null;
  #form = new Form(
    {},
    () => this.#changed(),
    () => this.render(),
  );
  #asker = new Latest(
    (/** @type {Desk.Typed} */ typed) => this.#ask(typed),
    (view) => this.#take(view),
    (error) => this.#say(error),
  );

  async load() {
    const view = await this.#ask(null);
    this.#invented = (await ask({ ask: 'site', site: view.site }, 'site')).invented;
    [this.#people, this.#running, this.#form.typed] = [view.people, view.running, view.typed];
    this.#take(view);
  }

  async leave() {
    this.#asker.stop();
  }

  /** @param {Desk.Typed | null} typed */
  #ask(typed) {
    return ask(
      { ask: 'visit_form', visit: this.route.visit ?? null, site: this.route.site ?? this.#view?.site ?? '', typed },
      'visit_form',
    );
  }

  /** @param {Desk.VisitFormView} view */
  #take(view) {
    this.#view = view;
    this.#form.see(view.sections, view.notes);
    this.render();
  }

  #changed() {
    this.#fault = null;
    this.render();
    this.#asker.ask(this.#form.typed);
  }

  /** @param {unknown} error */
  #say(error) {
    this.#fault = /** @type {Error} */ (error).message;
    this.render();
  }

  async #save() {
    this.#form.typing = false;
    try {
      const saved = await ask(
        {
          ask: 'save_visit',
          visit: this.#view?.visit ?? null,
          site: this.#view?.site ?? '',
          people: this.#people,
          running: this.#running,
          typed: this.#form.typed,
        },
        'visit',
      );
      goInstead(address(['visit', saved.place.visit ?? '']));
    } catch (error) {
      this.#say(error);
    }
  }

  draw() {
    const view = this.#view;
    if (!view) return null;
    const sections = this.#form.draw();
    return this.frame(
      {
        title: view.visit ? 'Change the visit' : 'Start a visit',
        where: view.site_name,
        invented: this.#invented,
        up: address(['site', view.site]),
        acts: button(view.visit ? 'Save' : 'Start the visit', () => this.#save(), { kind: 'go', icon: 'tick' }),
      },
      this.#fault && noteView({ id: 'fault', tone: 'impossible', lead: this.#fault }),
      h(
        'div',
        { class: 'visit-form' },
        sections,
        this.#form
          .notesApart()
          .map((note) => noteView({ ...note, id: `note-${note.code}`, act: (act) => this.#form.act(act) })),
        h(
          'section',
          { class: 'sec', key: 'who', 'aria-labelledby': 'who' },
          h('div', { class: 'sec-head' }, h('h2', { id: 'who' }, 'Who and how')),
          entryField({
            id: 'people',
            label: 'People',
            value: this.#people,
            input: (text) => {
              this.#people = text;
            },
          }),
          entryField({
            id: 'running',
            label: 'How the equipment is running',
            help: 'Valves, dampers, fan speed, stages: what a later visit must match to be compared.',
            value: this.#running,
            input: (text) => {
              this.#running = text;
            },
            long: true,
          }),
        ),
      ),
    );
  }
}
