// The appearance: as the system says, or one's own choice.

import { ask } from '../api.js';
import { h } from '../lib/dom.js';
import { Screen } from '../lib/screen.js';
import { wear } from '../lib/theme.js';
import { radioRow } from '../parts/form-sheets.js';

/** @type {{ theme: Desk.Theme, label: string, help: string }[]} */
const themes = [
  { theme: 'system', label: 'As the system', help: 'Light or dark, and high contrast where the system asks for it' },
  { theme: 'light', label: 'Light', help: 'Paper. For outdoors and in doubt' },
  { theme: 'dark', label: 'Dark', help: 'Slate. For dark rooms' },
  { theme: 'contrast', label: 'High contrast', help: 'Black on white, thick lines' },
];

export class Appearance extends Screen {
  /** @type {Desk.Theme} */
  #theme = 'system';

  async load() {
    this.#theme = (await ask({ ask: 'appearance' }, 'appearance')).theme;
  }

  /** @param {Desk.Theme} theme */
  async #choose(theme) {
    await this.attempt(async () => {
      this.#theme = (await ask({ ask: 'choose_appearance', theme }, 'appearance')).theme;
      wear(this.#theme);
      this.render();
    });
  }

  draw() {
    return this.frame(
      { title: 'Appearance', up: '#/', where: 'Kept in the ledger' },
      h(
        'div',
        { class: 'sec', role: 'radiogroup', 'aria-label': 'Appearance' },
        themes.map(({ theme, label, help }) =>
          radioRow({ label, help, on: theme === this.#theme, choose: () => this.#choose(theme) }),
        ),
      ),
    );
  }
}
