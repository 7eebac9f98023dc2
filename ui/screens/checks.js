// The checks, by what a person wants to know.

import { ask } from '../api.js';
import { h } from '../lib/dom.js';
import { icon } from '../lib/icons.js';
import { address, placeOf } from '../lib/route.js';
import { Screen } from '../lib/screen.js';
import { linkRow, listSection } from '../parts/rows.js';

export class Checks extends Screen {
  /** @type {Desk.CheckName[]} */
  #checks = [];
  #wanted = '';
  /** @type {{ place: Desk.Place, name: string, invented: boolean } | null} Where a check started now may belong. */
  #here = null;
  /** Whether a check started now is made there. A place is never taken without being asked for. */
  #isHere = false;

  async load() {
    const [{ checks }, overview] = await Promise.all([
      ask({ ask: 'checks' }, 'checks'),
      ask({ ask: 'overview' }, 'overview'),
    ]);
    this.#checks = checks;
    const place = placeOf(this.route);
    if (place.site) {
      const { name, invented } = await ask({ ask: 'site', site: place.site }, 'site');
      this.#here = { place, name, invented };
      this.#isHere = true;
    } else if (overview.here) {
      const { place: there, site, invented } = overview.here;
      this.#here = { place: there, name: site, invented };
    }
  }

  draw() {
    const words = this.#wanted.toLowerCase().split(/\s+/).filter(Boolean);
    const found = this.#checks.filter((check) => {
      const text = `${check.label} ${check.question} ${check.takes} ${check.group}`.toLowerCase();
      return words.every((word) => text.includes(word));
    });
    const groups = [...new Set(found.map((check) => check.group))];
    const place = this.#isHere ? this.#here?.place : {};
    return this.frame(
      {
        title: 'What do you want to know?',
        root: true,
        where: this.#isHere ? `At ${this.#here?.name}` : 'The place is asked for when it is filed.',
        invented: this.#isHere && (this.#here?.invented ?? false),
      },
      h(
        'div',
        { class: 'field find' },
        h('label', { class: 'label', for: 'find-check' }, 'Find a check'),
        h(
          'div',
          { class: 'entry words' },
          h('span', { class: 'lens' }, icon('find')),
          h('input', {
            id: 'find-check',
            type: 'search',
            enterkeyhint: 'search',
            autocomplete: 'off',
            value: this.#wanted,
            oninput: (/** @type {Event} */ event) => {
              this.#wanted = /** @type {HTMLInputElement} */ (event.target).value;
              this.render();
            },
          }),
        ),
      ),
      this.#here && this.#placeChip(this.#here.name),
      h('p', { class: 'sr', role: 'status' }, words.length > 0 ? `${found.length} found` : ''),
      found.length === 0 &&
        words.length > 0 &&
        h('p', { class: 'gap' }, 'No check has all of these words. Fewer words find more.'),
      groups.map((group) =>
        listSection(
          group,
          found
            .filter((check) => check.group === group)
            .map((check) =>
              linkRow({
                key: check.id,
                href: address(['check', check.id], { ...place }),
                title: check.question,
                says: [h('b', null, check.label), `: ${check.takes}`],
              }),
            ),
        ),
      ),
    );
  }

  /** @param {string} name */
  #placeChip(name) {
    return h(
      'div',
      { class: 'chips gap-small', key: 'here' },
      h(
        'button',
        {
          type: 'button',
          class: this.#isHere ? 'chip on' : 'chip',
          'aria-pressed': String(this.#isHere),
          onclick: () => {
            this.#isHere = !this.#isHere;
            this.render();
          },
        },
        `At ${name}`,
      ),
    );
  }
}
