// The appearance. The ledger holds the choice; a copy in the page's own storage puts it on before the first paint.

import { ask } from '../api.js';

const name = 'dewledger-theme';
const dark = matchMedia('(prefers-color-scheme: dark)');
const contrast = matchMedia('(prefers-contrast: more)');

/** @type {Desk.Theme} */
let chosen = 'system';

/**
 * Puts a theme on.
 * @param {Desk.Theme} theme
 */
export function wear(theme) {
  chosen = theme;
  try {
    if (theme === 'system') localStorage.removeItem(name);
    else localStorage.setItem(name, theme);
  } catch {
    // Without storage the theme comes a moment later, from the ledger.
  }
  document.documentElement.dataset.theme = theme === 'system' ? systemTheme() : theme;
}

function systemTheme() {
  if (contrast.matches) return 'contrast';
  return dark.matches ? 'dark' : 'light';
}

/** Follows the ledger's choice, and the system where that is the choice. */
export async function followTheme() {
  for (const wish of [dark, contrast]) {
    wish.addEventListener('change', () => {
      if (chosen === 'system') wear('system');
    });
  }
  try {
    wear((await ask({ ask: 'appearance' }, 'appearance')).theme);
  } catch {
    // The first screen says what is wrong with the ledger; until then the theme stays as it is.
  }
}
