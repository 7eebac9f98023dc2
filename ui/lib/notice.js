// What has just been done, with the way back: it stands above the bottom bar for ten seconds.

import { h } from './dom.js';
import { say } from './say.js';

/** Milliseconds that Undo is offered for. */
export const undoMs = 10_000;

/** @typedef {{ says: string, undo?: () => void | Promise<void> }} Notice */

/** @type {Notice | null} */
let current = null;
/** @type {ReturnType<typeof setTimeout> | undefined} */
let timer;
/** @type {Set<() => void>} */
const watchers = new Set();

/** @param {Notice | null} next */
function put(next) {
  current = next;
  for (const watcher of watchers) watcher();
}

/**
 * Says what has been done.
 * @param {Notice} next
 */
export function notice(next) {
  clearTimeout(timer);
  timer = setTimeout(() => put(null), undoMs);
  put(next);
  say(next.undo ? `${next.says}. It can be undone.` : next.says);
}

/** Takes the notice away. */
export function clearNotice() {
  clearTimeout(timer);
  if (current) put(null);
}

/**
 * Calls `watcher` whenever a notice comes or goes, until `signal` is aborted.
 * @param {() => void} watcher
 * @param {AbortSignal} signal
 */
export function watchNotices(watcher, signal) {
  watchers.add(watcher);
  signal.addEventListener('abort', () => watchers.delete(watcher));
}

/** The notice as an element; null when there is none. */
export function noticeBar() {
  if (!current) return null;
  const { says, undo } = current;
  return h(
    'div',
    { key: 'notice', class: 'notice' },
    h('p', null, says),
    undo &&
      h(
        'button',
        {
          type: 'button',
          class: 'link',
          onclick: () => {
            clearNotice();
            undo();
          },
        },
        'Undo',
      ),
  );
}
