// What every screen has: a title line, the margin, a bottom bar, and a plain word where something went wrong.

import { h, show } from './dom.js';
import { icon } from './icons.js';
import { clearNotice, noticeBar, watchNotices } from './notice.js';
import { readRoute, tabOf } from './route.js';

/** @typedef {import('./dom.js').Child} Child */
/** @typedef {import('./icons.js').IconName} IconName */

/** The root screens, in the order of the tabs. */
export const tabs = /** @type {const} */ ([
  { name: 'home', label: 'Today', href: '#/', icon: 'today' },
  { name: 'checks', label: 'Checks', href: '#/checks', icon: 'checks' },
  { name: 'sites', label: 'Sites', href: '#/sites', icon: 'sites' },
  { name: 'units', label: 'Units', href: '#/units', icon: 'units' },
]);

/**
 * @typedef {object} Frame
 * @property {string} title
 * @property {Child} [where] a line below the title
 * @property {boolean} [root] one of the tabs: no way back, the tabs below
 * @property {string} [up] where Back goes when there is nothing to go back to
 * @property {boolean} [invented] invented example data
 * @property {Child} [aside] acts at the right of the title
 * @property {boolean} [plain] without the margin
 * @property {Child} [acts] the bottom bar of a task
 */

export class Screen extends HTMLElement {
  /** @type {import('./route.js').Route} */
  route = { name: 'home' };
  /** @type {Error | null} What stopped the screen from being filled. */
  problem = null;
  #gone = new AbortController();

  /** Aborted when the screen is left. */
  get gone() {
    return this.#gone.signal;
  }

  /** Fetches what the screen shows. Overridden by each screen. */
  async load() {}

  /**
   * What the screen shows. Overridden by each screen.
   * @returns {Child}
   */
  draw() {
    return null;
  }

  /** Called when the screen is about to be left; the next one waits for it. */
  async leave() {}

  /**
   * Fills the screen for an address; a fault is kept to be shown.
   * @param {import('./route.js').Route} route
   */
  async open(route) {
    this.route = route;
    await this.reload();
  }

  /** Fetches again and draws. */
  async reload() {
    try {
      await this.load();
      this.problem = null;
    } catch (error) {
      this.problem = /** @type {Error} */ (error);
    }
    this.render();
  }

  /**
   * Does what was asked for; a fault is shown in place of the screen, with a way to try again.
   * @param {() => Promise<void>} work
   */
  async attempt(work) {
    try {
      await work();
    } catch (error) {
      this.problem = /** @type {Error} */ (error);
      this.render();
    }
  }

  connectedCallback() {
    this.classList.add('screen');
    watchNotices(() => this.render(), this.gone);
    this.render();
  }

  disconnectedCallback() {
    this.#gone.abort();
  }

  /** Draws the screen as it stands. */
  render() {
    if (!this.isConnected) return;
    show(this, this.problem ? this.#fault(this.problem) : this.draw());
    this.settle();
  }

  /** When the bars would take half of the window (doubled text, a short window), they stop sticking. */
  settle() {
    let bars = 0;
    for (const bar of this.querySelectorAll('.strip, .foot')) bars += /** @type {HTMLElement} */ (bar).offsetHeight;
    document.body.classList.toggle('big', bars > innerHeight * 0.45);
  }

  /** @param {Error} problem */
  #fault(problem) {
    const root = tabs.some((tab) => tab.name === this.route.name);
    return this.frame(
      { title: 'Dewledger', root, up: '#/' },
      h(
        'div',
        { class: 'note wrong', role: 'alert' },
        icon('wrong'),
        h('div', null, h('strong', { class: 'lead' }, problem.message)),
      ),
      h(
        'p',
        { class: 'gap' },
        h('button', { type: 'button', class: 'btn slim', onclick: () => this.reload() }, icon('again'), 'Try again'),
      ),
    );
  }

  /**
   * Title line, content and bottom bar.
   * @param {Frame} frame
   * @param {...Child} content
   * @returns {Child[]}
   */
  frame(frame, ...content) {
    document.title = frame.title === 'Dewledger' ? frame.title : `${frame.title} – Dewledger`;
    return [
      h(
        'header',
        { class: frame.root ? 'top root' : 'top' },
        !frame.root && backButton(frame.up ?? '#/'),
        h(
          'div',
          { class: 'grow' },
          h('h1', { tabindex: '-1' }, frame.title),
          (frame.where || frame.invented) &&
            h('p', { class: 'where' }, frame.invented && [inventedMark(), ' '], frame.where),
        ),
        frame.aside,
      ),
      h('main', { id: 'main', class: frame.plain ? 'plain' : null }, h('div', { class: 'wrapq' }, content)),
      this.#foot(frame),
    ];
  }

  /** @param {Frame} frame */
  #foot(frame) {
    const bars = [
      noticeBar(),
      frame.acts && h('div', { class: 'acts-bar' }, frame.acts),
      frame.root && tabBar(tabOf(readRoute(location.hash))),
    ].filter(Boolean);
    return bars.length > 0 && h('footer', { class: 'foot' }, bars);
  }
}

/** @param {string} chosen */
function tabBar(chosen) {
  return h(
    'nav',
    { class: 'tabs', 'aria-label': 'Main' },
    tabs.map((tab) =>
      h(
        'a',
        {
          href: tab.href,
          class: tab.name === chosen ? 'on' : null,
          'aria-current': tab.name === chosen ? 'page' : null,
        },
        icon(tab.icon),
        tab.label,
      ),
    ),
  );
}

/** @param {string} up */
function backButton(up) {
  return h(
    'button',
    { type: 'button', class: 'icon-btn back', 'aria-label': 'Back', onclick: () => goBack(up) },
    icon('back'),
  );
}

/** The mark of invented example data. */
export function inventedMark() {
  return h('span', { class: 'invented' }, 'Invented example');
}

/**
 * Back by one screen; to `up` when this is the first one.
 * @param {string} up
 */
export function goBack(up) {
  if ((history.state?.at ?? 0) > 0) history.back();
  else goInstead(up);
}

/**
 * To another screen.
 * @param {string} href
 */
export function go(href) {
  location.hash = href;
}

/**
 * To another screen, which takes this one's place: Back does not lead here again.
 * @param {string} href
 */
export function goInstead(href) {
  clearNotice();
  // The engines differ in what they keep of a step that is replaced, so the step stays and only its address changes.
  scrollTo(0, 0);
  history.replaceState(history.state, '', href);
  dispatchEvent(new Event('hashchange'));
}

/**
 * A button with words and, mostly, an icon.
 * @param {string} label
 * @param {(event: Event) => void} onclick
 * @param {{ icon?: IconName, kind?: string, disabled?: boolean }} [how]
 */
export function button(label, onclick, how = {}) {
  return h(
    'button',
    { type: 'button', class: `btn ${how.kind ?? ''}`.trim(), disabled: how.disabled, onclick },
    how.icon && icon(how.icon),
    h('span', null, label),
  );
}

/**
 * A link to another screen, drawn as a button.
 * @param {string} label
 * @param {string} href
 * @param {{ icon?: IconName, kind?: string }} [how]
 */
export function linkButton(label, href, how = {}) {
  return h('a', { class: `btn ${how.kind ?? ''}`.trim(), href }, how.icon && icon(how.icon), h('span', null, label));
}

/**
 * An act in the text.
 * @param {string} label
 * @param {(event: Event) => void} onclick
 * @param {IconName} [name]
 */
export function link(label, onclick, name) {
  return h('button', { type: 'button', class: 'link', onclick }, name && icon(name, 'i-s'), h('span', null, label));
}
