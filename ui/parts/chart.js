// The psychrometric chart of a form or an entry. The desk draws it and reads it; here are the fingers, the keys and the
// room that there is. A place on the chart or a value in it is never worked out here.

import { ask } from '../api.js';
import { find, h } from '../lib/dom.js';
import { Fingers } from '../lib/gesture.js';
import { icon } from '../lib/icons.js';
import { Latest } from '../lib/latest.js';
import { button, link } from '../lib/screen.js';
import { openSheet } from '../lib/sheet.js';
import { radioRow } from './form-sheets.js';
import { drawing } from './shape.js';
import { tableView } from './table.js';

/** One step of a zoom key. */
const zoomStep = 1.5;
/** One step of an arrow key, px; a fine one with Shift. */
const stepPx = 8;

/** @typedef {{ x_px: number, y_px: number }} Px */
/** @typedef {{ window?: Desk.ChartWindow | null, gesture?: Desk.ChartGesture, tap?: Px }} Wish */

export class ChartPanel {
  /** @type {Desk.ChartOf | null} */
  #of = null;
  /** @type {Desk.ChartView | null} */
  #view = null;
  /** @type {Desk.ChartWindow | null} What is looked at; null follows the states. */
  #window = null;
  /** @type {string | null} */
  #family = null;
  /** @type {Desk.ChartPlace | null} */
  #cross = null;
  /** @type {{ width: number, height: number, text: number } | null} The room there is. */
  #room = null;
  /** @type {Desk.ChartWindow | null} What was looked at when the fingers came down. */
  #held = null;
  #fingers = new Fingers();
  #asker = new Latest(
    (/** @type {Desk.Request} */ request) => ask(request, 'chart'),
    (reply) => this.#take(reply),
    () => this.#lose(),
  );
  #name;
  #redraw;
  #act;
  #whole;

  /**
   * @param {string} name tells two charts on a page apart
   * @param {() => void} redraw
   * @param {((act: Desk.Act) => void) | null} act puts what is read into the form
   * @param {boolean} [whole] it has the whole screen
   */
  constructor(name, redraw, act, whole = false) {
    this.#name = name;
    this.#redraw = redraw;
    this.#act = act;
    this.#whole = whole;
  }

  /**
   * Draws the chart of this; null when there is no air state.
   * @param {Desk.ChartOf | null} of
   */
  show(of) {
    this.#of = of;
    if (of === null) this.#view = null;
    else this.#ask({});
  }

  /** @param {Wish} wish */
  #ask({ window = this.#window, gesture, tap }) {
    if (!this.#of || !this.#room) return;
    const { width, height, text } = this.#room;
    this.#asker.ask({
      ask: 'chart',
      of: this.#of,
      look: {
        name: this.#name,
        width_px: width,
        height_px: height,
        text_px: text,
        family: this.#family,
        window,
        gesture: gesture ?? null,
        cross: this.#cross,
        tap: tap ?? null,
      },
    });
  }

  /** @param {Desk.ChartView} view */
  #take(view) {
    if (!this.#of) return;
    this.#view = view;
    this.#window = view.moved ? view.window : null;
    this.#cross = view.cross?.place ?? null;
    this.#redraw();
  }

  /** What is typed now has no states: the chart goes until there are some again. */
  #lose() {
    this.#view = null;
    this.#redraw();
  }

  /** Called after each drawing of the screen: asks again when the room has changed. */
  fit() {
    const paper = this.#paper();
    if (!paper || paper.clientWidth === 0) return;
    const width = paper.clientWidth;
    const text = 0.875 * Number.parseFloat(getComputedStyle(document.documentElement).fontSize);
    const tall = Math.min(width * (width < 480 ? 1.1 : 0.82), 620, innerHeight * 0.8);
    const height = this.#whole ? paper.clientHeight : Math.max(tall, 240);
    const room = this.#room;
    if (room && room.width === width && Math.abs(room.height - height) < 1 && room.text === text) return;
    this.#room = { width, height, text };
    this.#ask({});
  }

  #paper() {
    return find(document, `#paper-${this.#name}`);
  }

  /** @param {{ clientX: number, clientY: number }} event */
  #point({ clientX, clientY }) {
    const box = this.#paper()?.getBoundingClientRect();
    return { x: clientX - (box?.left ?? 0), y: clientY - (box?.top ?? 0) };
  }

  /**
   * @param {number} factor
   * @param {{ x: number, y: number }} [about]
   */
  #zoom(factor, about) {
    this.#ask({ gesture: { zoom: factor, about: about ? px(about) : null } });
  }

  /** @param {PointerEvent} event */
  #down(event) {
    if (event.pointerType === 'mouse' && event.button !== 0) return;
    /** @type {Element} */ (event.currentTarget).setPointerCapture(event.pointerId);
    this.#fingers.down(event.pointerId, this.#point(event));
    this.#held = this.#view?.window ?? null;
  }

  /** @param {PointerEvent} event */
  #move(event) {
    const moved = this.#fingers.move(event.pointerId, this.#point(event));
    if (!moved) return;
    const { dx, dy, zoom, about } = moved;
    this.#ask({ window: this.#held, gesture: { dx_px: dx, dy_px: dy, zoom, about: px(about) } });
  }

  /** @param {PointerEvent} event */
  #up(event) {
    const point = this.#point(event);
    const taps = this.#fingers.up(event.pointerId, point, event.timeStamp);
    this.#held = this.#view?.window ?? null;
    if (taps === 'tap') this.#ask({ tap: px(point) });
    if (taps === 'twice') this.#zoom(2, point);
  }

  /** @param {WheelEvent} event */
  #wheel(event) {
    // On the page the wheel scrolls; a pinch on a trackpad comes as a wheel with the control key.
    if (!this.#whole && !event.ctrlKey) return;
    event.preventDefault();
    this.#zoom(event.deltaY < 0 ? 1.2 : 1 / 1.2, this.#point(event));
  }

  /** @param {KeyboardEvent} event */
  #key(event) {
    if (event.altKey || event.ctrlKey || event.metaKey) return;
    const by = event.shiftKey ? 1 : stepPx;
    const way = {
      ArrowLeft: { x: -by, y: 0 },
      ArrowRight: { x: by, y: 0 },
      ArrowUp: { x: 0, y: -by },
      ArrowDown: { x: 0, y: by },
    }[event.key];
    if (way) this.#step(way);
    else if (event.key === '+' || event.key === '=') this.#zoom(zoomStep);
    else if (event.key === '-' || event.key === '\u2212') this.#zoom(1 / zoomStep);
    else if (event.key === '0') this.#reframe();
    else if (event.key === 'Escape' && this.#cross && !this.#whole) this.#clear();
    else return;
    event.preventDefault();
  }

  /** Moves the cross; the first key puts it into the middle. @param {{ x: number, y: number }} way */
  #step(way) {
    const at = this.#view?.cross?.at;
    const room = this.#room;
    if (!room) return;
    this.#ask({
      tap: at ? { x_px: at.x_px + way.x, y_px: at.y_px + way.y } : { x_px: room.width / 2, y_px: room.height / 2 },
    });
  }

  #reframe() {
    this.#window = null;
    this.#ask({});
  }

  #clear() {
    this.#cross = null;
    this.#ask({});
  }

  async #chooseFamily() {
    const view = this.#view;
    if (!view) return;
    const family = await openSheet('Lines', (sheet) =>
      h(
        'div',
        { role: 'radiogroup', 'aria-label': 'Lines' },
        view.families.map((one) =>
          radioRow({
            label: one.label,
            help: one.help,
            on: one.value === view.family,
            choose: () => sheet.close(one.value),
          }),
        ),
      ),
    );
    if (!family) return;
    this.#family = family;
    this.#ask({});
  }

  /** The chart on the whole screen: a look of its own, which this one takes over when it is left. */
  async #openWhole() {
    /** @type {import('../lib/sheet.js').Sheet<Desk.Act> | null} */
    let open = null;
    const large = new ChartPanel(
      `${this.#name}whole`,
      () => {
        open?.redraw();
        large.fit();
      },
      this.#act && ((act) => open?.close(act)),
      true,
    );
    large.#family = this.#family;
    large.#window = this.#window;
    large.#cross = this.#cross;
    large.#of = this.#of;
    const fit = () => large.fit();
    addEventListener('resize', fit);
    requestAnimationFrame(fit);
    const act = await openSheet(
      'Psychrometric chart',
      (/** @type {import('../lib/sheet.js').Sheet<Desk.Act>} */ sheet) => {
        open = sheet;
        return large.draw();
      },
      'whole',
    );
    removeEventListener('resize', fit);
    open = null;
    large.#asker.stop();
    this.#family = large.#family;
    this.#window = large.#window;
    this.#cross = large.#cross;
    this.#ask({});
    if (act) this.#act?.(act);
  }

  async #put() {
    const acts = this.#view?.cross?.acts ?? [];
    const act =
      acts.length === 1
        ? acts[0]
        : await openSheet('Put the cross into', (/** @type {import('../lib/sheet.js').Sheet<Desk.Act>} */ sheet) =>
            h(
              'div',
              null,
              acts.map((one) =>
                h(
                  'button',
                  { type: 'button', class: 'row', onclick: () => sheet.close(one) },
                  h('span', null, h('span', { class: 't' }, one.label)),
                  icon('right', 'i-s'),
                ),
              ),
            ),
          );
    if (act) this.#act?.(act);
  }

  /** The chart, its keys, what is read at the cross, and the same as a table. */
  draw() {
    if (!this.#of) return null;
    const view = this.#view;
    const title = `chart-${this.#name}`;
    const says = `says-${this.#name}`;
    const content = [
      h(
        'div',
        {
          key: 'paper',
          id: `paper-${this.#name}`,
          class: 'chart-paper',
          tabindex: '0',
          role: 'application',
          'aria-label':
            'Psychrometric chart. Arrow keys move a cross that reads the air, plus and minus zoom, 0 frames it.',
          'aria-describedby': says,
          onpointerdown: (/** @type {PointerEvent} */ event) => this.#down(event),
          onpointermove: (/** @type {PointerEvent} */ event) => this.#move(event),
          onpointerup: (/** @type {PointerEvent} */ event) => this.#up(event),
          onpointercancel: (/** @type {PointerEvent} */ event) => this.#fingers.lost(event.pointerId),
          onwheel: (/** @type {WheelEvent} */ event) => this.#wheel(event),
          onkeydown: (/** @type {KeyboardEvent} */ event) => this.#key(event),
        },
        view && drawing(view.drawing, { 'aria-hidden': 'true' }),
      ),
      h('p', { key: 'says', class: 'sr', id: says }, view?.says ?? ''),
      view && this.#keys(view),
      view && this.#readout(view),
    ];
    if (this.#whole) return h('div', { class: 'chart-whole' }, content);
    return h(
      'section',
      { key: title, class: 'sec chart-sec', 'aria-labelledby': title },
      h('div', { class: 'sec-head' }, h('h2', { id: title }, 'Psychrometric chart')),
      content,
      view && tableView(view.table),
      view?.outlines && h('p', { class: 'mute gap-small' }, view.outlines),
    );
  }

  /** @param {Desk.ChartView} view */
  #keys(view) {
    const family = view.families.find((one) => one.value === view.family)?.label ?? '';
    /**
     * @param {string} label
     * @param {import('../lib/icons.js').IconName} name
     * @param {() => void} onclick
     * @param {boolean} [disabled]
     */
    const key = (label, name, onclick, disabled = false) =>
      h(
        'button',
        { key: label, type: 'button', class: 'icon-btn', 'aria-label': label, disabled, onclick },
        icon(name),
      );
    return h(
      'div',
      { key: 'keys', class: 'chart-keys' },
      h(
        'button',
        { type: 'button', class: 'chip', 'aria-haspopup': 'dialog', onclick: () => this.#chooseFamily() },
        h('span', { class: 'sr' }, 'Lines: '),
        h('span', null, family),
        icon('down', 'i-s'),
      ),
      h(
        'div',
        { class: 'chart-zoom', role: 'group', 'aria-label': 'Zoom' },
        key('Frame the states', 'frame', () => this.#reframe(), !view.moved),
        key('Smaller', 'sign', () => this.#zoom(1 / zoomStep)),
        key('Larger', 'plus', () => this.#zoom(zoomStep)),
        !this.#whole && key('Whole screen', 'whole', () => this.#openWhole()),
      ),
    );
  }

  /** What is read at the cross: a box that stays where it is. @param {Desk.ChartView} view */
  #readout({ cross }) {
    return h(
      'div',
      { key: 'readout', class: 'readout' },
      h(
        'p',
        { class: 'readout-head' },
        h('b', null, 'At the cross'),
        cross && link('Take it away', () => this.#clear()),
      ),
      h(
        'div',
        { role: 'status' },
        !cross && h('p', { class: 'mute' }, 'Tap the chart, or use the arrow keys on it, to read the air there.'),
        cross?.fog && h('p', { class: 'fog-says' }, cross.fog),
        cross &&
          h(
            'dl',
            null,
            cross.rows.map((row) =>
              h(
                'div',
                null,
                h('dt', null, row.label),
                h('dd', null, row.value?.number ?? '–', ' ', h('small', null, row.value?.unit ?? '')),
              ),
            ),
          ),
      ),
      this.#act &&
        cross &&
        cross.acts.length > 0 &&
        h(
          'div',
          { class: 'readout-acts' },
          button(
            cross.acts.length === 1 ? (cross.acts[0]?.label ?? '') : 'Put the cross into the form',
            () => this.#put(),
            { kind: 'slim' },
          ),
        ),
    );
  }
}

/** @param {{ x: number, y: number }} point */
function px({ x, y }) {
  return { x_px: x, y_px: y };
}
