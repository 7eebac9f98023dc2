// Which screen an address names, and back. An address is what stands behind # in the window's location.

/** @typedef {{ name: string } & Record<string, string>} Route */

/** Every screen's address. `:name` is a part that varies. Everything behind ? is carried along. */
const routes = [
  ['home', ''],
  ['checks', 'checks'],
  ['check', 'check/:check'],
  ['check', 'draft/:draft'],
  ['check', 'correct/:entry'],
  ['sites', 'sites'],
  ['site-edit', 'sites/new'],
  ['site', 'site/:site'],
  ['site-edit', 'site/:site/edit'],
  ['equipment-edit', 'site/:site/equipment/new'],
  ['visit-edit', 'site/:site/visit/new'],
  ['equipment', 'equipment/:equipment'],
  ['equipment-edit', 'equipment/:equipment/edit'],
  ['visit', 'visit/:visit'],
  ['visit-edit', 'visit/:visit/edit'],
  ['run', 'visit/:visit/run/new'],
  ['run', 'visit/:visit/run/:run'],
  ['entry', 'entry/:entry'],
  ['instruments', 'instruments'],
  ['instrument', 'instruments/new'],
  ['instrument', 'instrument/:instrument'],
  ['units', 'units'],
  ['appearance', 'appearance'],
  ['about', 'about'],
].map(([name = '', path = '']) => ({ name, parts: path === '' ? [] : path.split('/') }));

/**
 * The screen that an address names; the first screen for one that is not known.
 * @param {string} hash as `#/site/3?visit=5`
 * @returns {Route}
 */
export function readRoute(hash) {
  const [path = '', query = ''] = hash.replace(/^#?\/?/, '').split('?', 2);
  const given = path === '' ? [] : path.split('/').map(decode);
  for (const { name, parts } of routes) {
    if (parts.length !== given.length) continue;
    if (!parts.every((part, at) => (part.startsWith(':') ? given[at] !== '' : part === given[at]))) continue;
    /** @type {Route} */
    const route = { name };
    for (const [key, value] of new URLSearchParams(query)) if (key !== 'name') route[key] = value;
    parts.forEach((part, at) => {
      if (part.startsWith(':')) route[part.slice(1)] = given[at] ?? '';
    });
    return route;
  }
  return { name: 'home' };
}

/** @param {string} part */
function decode(part) {
  try {
    return decodeURIComponent(part);
  } catch {
    return '';
  }
}

/**
 * The address `path` with what follows it. Members that are not set are left out.
 * @param {string[]} path as `['site', id, 'edit']`
 * @param {Record<string, string | null | undefined>} [query]
 */
export function address(path, query = {}) {
  const search = new URLSearchParams();
  for (const [key, value] of Object.entries(query)) if (value) search.set(key, value);
  const tail = search.size > 0 ? `?${search}` : '';
  return `#/${path.map(encodeURIComponent).join('/')}${tail}`;
}

/**
 * The place that an address carries.
 * @param {Route} route
 * @returns {Desk.Place}
 */
export function placeOf(route) {
  /** @type {Desk.Place} */
  const place = {};
  if (route.site) place.site = route.site;
  if (route.equipment) place.equipment = route.equipment;
  if (route.visit) place.visit = route.visit;
  return place;
}

/** The root screen that a screen belongs to; its tab is marked.
 * @param {Route} route
 */
export function tabOf(route) {
  switch (route.name) {
    case 'check':
    case 'checks':
      return 'checks';
    case 'sites':
    case 'site':
    case 'site-edit':
    case 'equipment':
    case 'equipment-edit':
    case 'visit':
    case 'visit-edit':
    case 'run':
    case 'entry':
      return 'sites';
    case 'instrument':
      return 'instruments';
    default:
      return route.name;
  }
}
