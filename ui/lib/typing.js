// What typing on a form needs of the keyboard and of the pointer.

/**
 * Enter goes to the next field and never files half a form; in the last one it puts the keyboard away.
 * @param {KeyboardEvent} event
 */
export function toNext(event) {
  if (event.key !== 'Enter' || event.isComposing) return;
  event.preventDefault();
  const input = /** @type {HTMLInputElement} */ (event.target);
  const all = /** @type {HTMLInputElement[]} */ ([
    ...(input.closest('dialog, main')?.querySelectorAll('input, textarea') ?? []),
  ]);
  const next = all[all.indexOf(input) + 1];
  if (next) {
    next.focus();
    next.select();
  } else input.blur();
}

let pressed = false;
addEventListener(
  'pointerdown',
  () => {
    pressed = true;
  },
  true,
);
for (const type of ['pointerup', 'pointercancel'])
  addEventListener(
    type,
    () => {
      pressed = false;
    },
    true,
  );

/**
 * Does `work` when no button is held down, and after the click that letting go makes.
 * @param {() => void} work
 */
export function whenReleased(work) {
  if (!pressed) {
    work();
    return;
  }
  const done = () => {
    removeEventListener('pointerup', done, true);
    removeEventListener('pointercancel', done, true);
    setTimeout(work);
  };
  addEventListener('pointerup', done, true);
  addEventListener('pointercancel', done, true);
}
