// A sheet from below: one question, closed by its answer, by Back, by Escape or by a tap beside it.

import { h, show } from './dom.js';
import { icon } from './icons.js';

/**
 * @template Answer
 * @typedef {{ close: (answer?: Answer) => void, redraw: () => void }} Sheet
 */

/** @typedef {{ dialog: HTMLDialogElement, end: () => void }} Open */

/** @type {Open[]} */
const open = [];
let titles = 0;

/** How many sheets the present step of the history stands for. */
function depth() {
  return history.state?.sheets ?? 0;
}

window.addEventListener('popstate', () => {
  while (open.length > depth()) open.pop()?.end();
});

/** Closes every sheet, when another screen comes. */
export function dropSheets() {
  while (open.length > 0) open.pop()?.end();
}

/**
 * Opens a sheet; gives its answer, or undefined when it was left without one. Each sheet is a step of the history, so
 * that Back closes it and nothing else.
 * @template Answer
 * @param {string} title
 * @param {(sheet: Sheet<Answer>) => import('./dom.js').Child} draw
 * @param {'' | 'whole'} [size] `whole` takes the whole window
 * @returns {Promise<Answer | undefined>}
 */
export function openSheet(title, draw, size = '') {
  return new Promise((resolve) => {
    const before = /** @type {HTMLElement | null} */ (document.activeElement);
    titles += 1;
    const id = `sheet-${titles}`;
    const dialog = /** @type {HTMLDialogElement} */ (
      h('dialog', { class: `sheet ${size}`.trim(), 'aria-labelledby': id })
    );
    /** @type {Answer | undefined} */
    let answer;
    const sheet = {
      /** @param {Answer} [given] */
      close(given) {
        answer = given;
        // The rest happens when the step is taken back, so that what follows may go to another screen.
        if (open.at(-1)?.dialog === dialog) history.back();
      },
      redraw() {
        show(
          dialog,
          h(
            'div',
            { class: 'sheet-head' },
            h('h2', { id }, title),
            h(
              'button',
              { type: 'button', class: 'icon-btn', 'aria-label': 'Close', onclick: () => sheet.close() },
              icon('close'),
            ),
          ),
          h('div', { class: 'sheet-body' }, draw(sheet)),
        );
      },
    };
    dialog.addEventListener('cancel', (event) => {
      event.preventDefault();
      sheet.close();
    });
    // Where the system closes it of itself, the step of the history goes too.
    dialog.addEventListener('close', () => sheet.close(answer));
    dialog.addEventListener('click', (event) => {
      if (event.target === dialog && isBeside(dialog, event)) sheet.close();
    });
    sheet.redraw();
    document.body.append(dialog);
    open.push({
      dialog,
      end() {
        dialog.close();
        dialog.remove();
        if (before?.isConnected) before.focus({ preventScroll: true });
        resolve(answer);
      },
    });
    history.pushState({ ...history.state, sheets: open.length }, '');
    dialog.showModal();
    // What stands at the foot is in sight already.
    const atFoot = /** @type {HTMLElement | null} */ (dialog.querySelector('[data-first]'));
    const first = /** @type {HTMLElement | null} */ (
      dialog.querySelector('[aria-checked="true"], .sheet-body input, .sheet-body button')
    );
    if (atFoot) atFoot.focus({ preventScroll: true });
    else first?.focus();
  });
}

/**
 * @param {HTMLDialogElement} dialog
 * @param {MouseEvent} event
 */
function isBeside(dialog, event) {
  const box = dialog.getBoundingClientRect();
  return event.clientX < box.left || event.clientX > box.right || event.clientY < box.top || event.clientY > box.bottom;
}

/**
 * The acts of a sheet: they stay in sight at its foot, the main one at the right under the thumb.
 * @param {...import('./dom.js').Child} acts
 */
export function sheetActs(...acts) {
  return h('div', { class: 'sheet-acts' }, acts);
}
