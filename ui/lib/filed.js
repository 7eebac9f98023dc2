// What was filed last, while the app is open: so that it can be undone, and the next check begun, from the entry's screen.

/**
 * @typedef {object} LastFiled
 * @property {Desk.Filed} filed
 * @property {string} check
 * @property {Desk.Typed} typed what was typed, for reopening the form after Undo
 * @property {Desk.Place} place
 * @property {string | null} corrects
 * @property {number} at when, on the page's own clock
 */

/** @type {LastFiled | null} */
let last = null;

/** @param {LastFiled} filed */
export function rememberFiled(filed) {
  last = filed;
}

export function forgetFiled() {
  last = null;
}

/**
 * What is remembered of an entry; null when it was not the last one filed.
 * @param {string} entry
 */
export function lastFiled(entry) {
  return last?.filed.entry === entry ? last : null;
}
