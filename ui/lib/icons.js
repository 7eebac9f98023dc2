// The icons, drawn for this project on a grid of 24: lines of 2, square ends, at most one filled dot.

import { svg } from './dom.js';

/** Paths of each icon; a path that begins with `=` is drawn with a line of 4, with `#` as squares, with `o` it is a filled dot `x y r`. */
const paths = {
  today: ['M5 3h14v18H5z M9 3v18 M12.5 9h3.5 M12.5 13h3.5'],
  checks: ['M4 6h3 M4 12h3 M4 18h3 M10 6h10 M10 12h10 M10 18h10', '=M4 6h3'],
  sites: ['M2 21h20 M5 21V7l7-4v18 M12 10h7v11 M8 9v2 M8 14v2'],
  units: ['M3 8h18v8H3z M7 8v4 M11 8v3 M15 8v4 M19 8v3'],
  instruments: ['M10 3h4v11a4 4 0 1 1-4 0z M14 6h4 M14 10h3', 'o12 17.5 1.6'],
  appearance: ['M12 4a8 8 0 1 0 0 16z M12 4a8 8 0 0 1 0 16'],
  about: ['M6 2h9l4 4v16H6z M12.5 10.5v7', 'o12.5 7 1.4'],
  back: ['M15 4l-8 8 8 8'],
  down: ['M5 9l7 7 7-7'],
  up: ['M5 15l7-7 7 7'],
  right: ['M9 4l8 8-8 8'],
  more: ['#M5 12h.01 M12 12h.01 M19 12h.01'],
  plus: ['M12 4v16 M4 12h16'],
  sign: ['M6 12h12'],
  odd: ['M12 2.5 21.5 12 12 21.5 2.5 12z M12 7.5v5.5', 'M12 15v2.2'],
  wrong: ['M3 3h18v18H3z M8 8l8 8 M16 8l-8 8'],
  pull: ['M4 20h16 M12 3v12 M7 10l5 5 5-5'],
  swap: ['M4 8h14 M14 4l4 4-4 4 M20 16H6 M10 12l-4 4 4 4'],
  again: ['M19 8a8 8 0 1 0 1 6 M20 3v6h-6'],
  book: ['M3 4h7l2 2 2-2h7v15h-7l-2 2-2-2H3z M12 6v15'],
  tick: ['M4 13l5 5L20 6'],
  // A limit and an arrow: one that does not reach up to it, one that goes beyond it.
  short: ['M4 4h16 M12 21v-11 M7 15l5-5 5 5'],
  over: ['M4 16h16 M12 22V4 M7 9l5-5 5 5'],
  pencil: ['M4 20l1-5L16 4l4 4L9 19z'],
  find: ['M10 4a6 6 0 1 0 0 12a6 6 0 0 0 0-12z M14.5 14.5L21 21'],
  whole: ['M4 10V4h6 M20 14v6h-6 M4 4l7 7 M20 20l-7-7'],
  frame: ['M4 9V4h5 M15 4h5v5 M20 15v5h-5 M9 20H4v-5 M9 12h6 M12 9v6'],
  close: ['M5 5l14 14 M19 5L5 19'],
};

/** @typedef {keyof typeof paths} IconName */

/**
 * An icon. It always has words beside it, so it is hidden from screen readers.
 * @param {IconName} name
 * @param {string} [size] `i-s` for the small size
 */
export function icon(name, size = '') {
  return svg(
    'svg',
    { class: `i ${size}`.trim(), viewBox: '0 0 24 24', 'aria-hidden': 'true' },
    paths[name].map((path) => {
      if (path.startsWith('o')) {
        const [cx, cy, r] = path.slice(1).split(' ');
        return svg('circle', { cx, cy, r, class: 'i-dot' });
      }
      if (path.startsWith('#')) return svg('path', { d: path.slice(1), class: 'i-square' });
      return path.startsWith('=') ? svg('path', { d: path.slice(1), class: 'i-bold' }) : svg('path', { d: path });
    }),
  );
}

/** The app's sign: half a drop hung beneath the ledger's double rule, beside the copper margin. */
export function sign() {
  return svg(
    'svg',
    { class: 'app-sign', viewBox: '60 60 452 392', 'aria-hidden': 'true' },
    svg('path', { class: 'sign-margin', d: 'M140 60v392' }),
    svg('path', { class: 'sign-rule', d: 'M152 150h360M152 206h360' }),
    svg('path', { class: 'sign-drop', d: 'M176 216h288c-24 4-36 18-36 44a108 138 0 0 1-216 0c0-26-12-40-36-44z' }),
  );
}

/**
 * Letter and shape of a place, the same everywhere.
 * @param {Desk.MarkView} mark
 */
export function mark({ letter, shape }) {
  const at = shape === 'triangle' ? 21 : shape === 'hanging_triangle' ? 15.5 : 18.4;
  return svg(
    'svg',
    { class: 'mark', viewBox: '0 0 26 26', 'aria-hidden': 'true' },
    outline(shape),
    svg('text', { x: 13, y: at }, letter),
  );
}

/** @param {string} shape */
function outline(shape) {
  switch (shape) {
    case 'square':
      return svg('rect', { class: 'o', x: 3, y: 3, width: 20, height: 20 });
    case 'triangle':
      return svg('path', { class: 'o', d: 'M13 1 25.5 24H.5z' });
    case 'hanging_triangle':
      return svg('path', { class: 'o', d: 'M13 25 25.5 2H.5z' });
    case 'diamond':
      return svg('path', { class: 'o', d: 'M13 .8 25.2 13 13 25.2 .8 13z' });
    default:
      return svg('circle', { class: 'o', cx: 13, cy: 13, r: 11 });
  }
}
