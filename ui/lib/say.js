// What is said to a screen reader without moving the focus.

/** Milliseconds of quiet before a changed result is said: not each figure that passes while one types. */
const quietMs = 500;

/** @type {HTMLElement | null} */
let place = null;
/** @type {ReturnType<typeof setTimeout> | undefined} */
let timer;

/** The element that is read out; it must be on the page before there is anything to say. */
export function listenPlace() {
  place = document.createElement('p');
  place.className = 'sr';
  place.setAttribute('role', 'status');
  return place;
}

/**
 * Says `text` at once.
 * @param {string} text
 */
export function say(text) {
  clearTimeout(timer);
  if (place && place.textContent !== text) place.textContent = text;
}

/**
 * Says `text` when nothing else has come for a moment.
 * @param {string} text
 */
export function sayInQuiet(text) {
  clearTimeout(timer);
  timer = setTimeout(() => say(text), quietMs);
}
