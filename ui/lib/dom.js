// Elements made by hand and kept in step with what should be shown. No text is ever read as markup.

/** @typedef {Node | string | number | null | undefined | false | Child[]} Child */
/** @typedef {Record<string, unknown>} Props */

const svgSpace = 'http://www.w3.org/2000/svg';

/** What an element was made with, beside its attributes. */
/** @type {WeakMap<Node, { key?: string, value?: string, on: Record<string, (event: any) => void> }>} */
const made = new WeakMap();

/** @param {Event} event */
function hand(event) {
  const element = /** @type {Element} */ (event.currentTarget);
  made.get(element)?.on[event.type]?.(event);
}

/**
 * An HTML element. `key` tells it from its siblings when they change, `value` is what an input holds, `on…` are its
 * listeners; everything else is an attribute, left out when null or false.
 * @param {string} tag
 * @param {Props | null} [props]
 * @param {...Child} children
 * @returns {HTMLElement}
 */
export function h(tag, props, ...children) {
  return /** @type {HTMLElement} */ (build(document.createElement(tag), props, children));
}

/**
 * An SVG element, made as `h` makes one.
 * @param {string} tag
 * @param {Props | null} [props]
 * @param {...Child} children
 * @returns {SVGElement}
 */
export function svg(tag, props, ...children) {
  return /** @type {SVGElement} */ (build(document.createElementNS(svgSpace, tag), props, children));
}

/**
 * @param {Element} element
 * @param {Props | null | undefined} props
 * @param {Child[]} children
 */
function build(element, props, children) {
  /** @type {{ key?: string, value?: string, on: Record<string, (event: any) => void> }} */
  const how = { on: {} };
  for (const [name, value] of Object.entries(props ?? {})) {
    if (value === null || value === undefined || value === false) continue;
    if (name === 'key') how.key = String(value);
    else if (name === 'value' && isEntry(element)) how.value = String(value);
    else if (name.startsWith('on')) how.on[name.slice(2)] = /** @type {(event: any) => void} */ (value);
    else element.setAttribute(name, value === true ? '' : String(value));
  }
  element.append(...nodes(children));
  if (how.value !== undefined) /** @type {HTMLInputElement} */ (element).value = how.value;
  for (const type of Object.keys(how.on)) element.addEventListener(type, hand);
  made.set(element, how);
  return element;
}

/** @param {Element} element */
function isEntry(element) {
  return element.nodeName === 'INPUT' || element.nodeName === 'TEXTAREA' || element.nodeName === 'SELECT';
}

/**
 * @param {Child[]} children
 * @returns {Node[]}
 */
function nodes(children) {
  return children.flatMap((child) => {
    if (child === null || child === undefined || child === false) return [];
    if (Array.isArray(child)) return nodes(child);
    return [child instanceof Node ? child : document.createTextNode(String(child))];
  });
}

/**
 * Makes `parent` hold `children`, keeping the elements that are there already: so focus, caret, scroll and an opened
 * part stay where they are.
 * @param {Element} parent
 * @param {...Child} children
 */
export function show(parent, ...children) {
  match(parent, nodes(children));
}

/** @param {Node} node */
function keyOf(node) {
  return made.get(node)?.key;
}

/**
 * @param {Element} parent
 * @param {Node[]} wanted
 */
function match(parent, wanted) {
  const wantedKeys = new Set(wanted.map(keyOf));
  /** @type {Map<string, Node>} */
  const keyed = new Map();
  for (const child of [...parent.childNodes]) {
    const key = keyOf(child);
    if (key === undefined) continue;
    if (wantedKeys.has(key)) keyed.set(key, child);
    else child.remove();
  }
  /** @type {Set<Node>} */
  const kept = new Set();
  let next = parent.firstChild;
  for (const node of wanted) {
    const key = keyOf(node);
    const old = key === undefined ? ahead(next, (child) => child.nodeName === node.nodeName) : keyed.get(key);
    if (!old || old.nodeName !== node.nodeName) {
      parent.insertBefore(node, next);
      kept.add(node);
      continue;
    }
    // Moving an element takes the focus out of it, so what stands in between goes instead where that is possible.
    const inOrder = key === undefined || old === next || ahead(next, (child) => child.nextSibling === old);
    renew(old, node);
    kept.add(old);
    if (inOrder) next = old.nextSibling;
    else parent.insertBefore(old, next);
  }
  for (const child of [...parent.childNodes]) if (!kept.has(child)) child.remove();
}

/**
 * The first of the unkeyed nodes from `start` on that is `such`; none past a keyed one.
 * @param {ChildNode | null} start
 * @param {(node: ChildNode) => boolean} such
 */
function ahead(start, such) {
  for (let node = start; node && keyOf(node) === undefined; node = node.nextSibling) if (such(node)) return node;
  return null;
}

/**
 * Makes `old` what `fresh` is.
 * @param {Node} old
 * @param {Node} fresh
 */
function renew(old, fresh) {
  if (!(old instanceof Element) || !(fresh instanceof Element)) {
    if (old.nodeValue !== fresh.nodeValue) old.nodeValue = fresh.nodeValue;
    return;
  }
  for (const { name } of [...old.attributes]) {
    // Whether a part is opened belongs to the person.
    if (!fresh.hasAttribute(name) && !(name === 'open' && old.nodeName === 'DETAILS')) old.removeAttribute(name);
  }
  for (const { name, value } of fresh.attributes) {
    if (old.getAttribute(name) !== value) old.setAttribute(name, value);
  }
  const was = made.get(old) ?? { on: {} };
  const how = made.get(fresh) ?? { on: {} };
  for (const type of Object.keys(how.on)) if (!was.on[type]) old.addEventListener(type, hand);
  for (const type of Object.keys(was.on)) if (!how.on[type]) old.removeEventListener(type, hand);
  made.set(old, how);
  match(old, [...fresh.childNodes]);
  if (how.value !== undefined && /** @type {HTMLInputElement} */ (old).value !== how.value) {
    /** @type {HTMLInputElement} */ (old).value = how.value;
  }
}

/**
 * The one element of `parent` that `selector` names, when it is there.
 * @param {ParentNode} parent
 * @param {string} selector
 */
export function find(parent, selector) {
  return /** @type {HTMLElement | null} */ (parent.querySelector(selector));
}
