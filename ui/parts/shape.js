// A drawing as the desk describes it, made element by element: no text of it is ever read as markup.

import { svg } from '../lib/dom.js';

/**
 * @param {Desk.ShapeView} shape
 * @param {Record<string, string>} [more] further attributes of the outermost element
 * @returns {SVGElement}
 */
export function drawing(shape, more = {}) {
  return svg(
    shape.name,
    { ...shape.attributes, ...more },
    shape.text,
    (shape.children ?? []).map((child) => drawing(child)),
  );
}
