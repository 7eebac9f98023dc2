// Fingers on a drawing: a drag, a pinch, a tap, two taps. In pixels of the screen; what they mean is the desk's.

/** @typedef {{ x: number, y: number }} Point */

/**
 * What fingers have done since they came down.
 * @typedef {object} Moved
 * @property {number} dx
 * @property {number} dy
 * @property {number} zoom
 * @property {Point} about where the fingers came down: the point that stays under them
 */

/** A finger that moves less is a tap, px. */
const still = 8;
/** A second tap within this many milliseconds and pixels makes two. */
const twiceMs = 350;
const twicePx = 30;

export class Fingers {
  /** @type {Map<number, Point>} */
  #now = new Map();
  /** @type {Map<number, Point>} */
  #from = new Map();
  #moving = false;
  /** @type {{ at: number, point: Point } | null} */
  #lastTap = null;

  /** Whether a drag or a pinch is under way. */
  get moving() {
    return this.#moving;
  }

  /**
   * @param {number} id
   * @param {Point} point
   */
  down(id, point) {
    this.#now.set(id, point);
    this.#begin();
    if (this.#now.size > 1) this.#moving = true;
  }

  /** What is done from here on counts from here. */
  #begin() {
    this.#from = new Map(this.#now);
  }

  /**
   * @param {number} id
   * @param {Point} point
   * @returns {Moved | null} null while it may still be a tap, or where the finger is not down
   */
  move(id, point) {
    if (!this.#now.has(id)) return null;
    this.#now.set(id, point);
    const [from, now] = [[...this.#from.values()], [...this.#now.values()]];
    const [start, here] = [middle(from), middle(now)];
    if (!this.#moving && Math.hypot(here.x - start.x, here.y - start.y) < still) return null;
    this.#moving = true;
    const [was, is] = [spread(from), spread(now)];
    return { dx: here.x - start.x, dy: here.y - start.y, zoom: was > 0 && is > 0 ? is / was : 1, about: start };
  }

  /**
   * @param {number} id
   * @param {Point} point
   * @param {number} at milliseconds
   * @returns {'tap' | 'twice' | null}
   */
  up(id, point, at) {
    if (!this.#now.delete(id)) return null;
    this.#begin();
    if (this.#moving) {
      this.#moving = this.#now.size > 0;
      return null;
    }
    const last = this.#lastTap;
    const twice =
      last && at - last.at < twiceMs && Math.hypot(point.x - last.point.x, point.y - last.point.y) < twicePx;
    this.#lastTap = twice ? null : { at, point };
    return twice ? 'twice' : 'tap';
  }

  /**
   * The system took the finger, to scroll.
   * @param {number} id
   */
  lost(id) {
    this.#now.delete(id);
    this.#begin();
    this.#moving = this.#now.size > 0;
  }
}

/** @param {Point[]} points */
function middle(points) {
  const sum = points.reduce((all, one) => ({ x: all.x + one.x, y: all.y + one.y }), { x: 0, y: 0 });
  const count = Math.max(points.length, 1);
  return { x: sum.x / count, y: sum.y / count };
}

/** How far two fingers are apart; 0 for one. @param {Point[]} points */
function spread([one, other]) {
  return one && other ? Math.hypot(one.x - other.x, one.y - other.y) : 0;
}
