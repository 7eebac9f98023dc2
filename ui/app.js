// Puts the shell on the page and shows the screen that the address names.

import { find, h } from './lib/dom.js';
import { icon, sign } from './lib/icons.js';
import { readRoute, tabOf } from './lib/route.js';
import { listenPlace } from './lib/say.js';
import { tabs } from './lib/screen.js';
import { dropSheets } from './lib/sheet.js';
import { followTheme } from './lib/theme.js';
import { About } from './screens/about.js';
import { Appearance } from './screens/appearance.js';
import { Check } from './screens/check.js';
import { Checks } from './screens/checks.js';
import { Entry } from './screens/entry.js';
import { Equipment } from './screens/equipment.js';
import { EquipmentEdit } from './screens/equipment-edit.js';
import { Home } from './screens/home.js';
import { Instrument } from './screens/instrument.js';
import { Instruments } from './screens/instruments.js';
import { Run } from './screens/run.js';
import { Site } from './screens/site.js';
import { SiteEdit } from './screens/site-edit.js';
import { Sites } from './screens/sites.js';
import { Units } from './screens/units.js';
import { Visit } from './screens/visit.js';
import { VisitEdit } from './screens/visit-edit.js';

/** @type {Record<string, new () => import('./lib/screen.js').Screen>} */
const screens = {
  about: About,
  appearance: Appearance,
  check: Check,
  checks: Checks,
  'equipment-edit': EquipmentEdit,
  equipment: Equipment,
  entry: Entry,
  home: Home,
  instrument: Instrument,
  instruments: Instruments,
  run: Run,
  'site-edit': SiteEdit,
  site: Site,
  sites: Sites,
  units: Units,
  'visit-edit': VisitEdit,
  visit: Visit,
};
for (const [name, screen] of Object.entries(screens)) customElements.define(`${name}-screen`, screen);

const place = h('div', { class: 'place' });
const rail = h('nav', { class: 'rail', 'aria-label': 'Main' });

/** How far down each step of the history was left. */
/** @type {Map<number, number>} */
const depths = new Map();
/** The step of the history that is shown. */
let at = 0;
/** Only the newest address counts when one is left before its screen is filled. */
let asked = 0;
/** @type {import('./lib/screen.js').Screen | null} */
let shown = null;

async function showScreen() {
  asked += 1;
  const mine = asked;
  depths.set(at, scrollY);
  dropSheets();
  await shown?.leave();
  if (mine !== asked) return;

  const returns = typeof history.state?.at === 'number';
  if (returns) at = history.state.at;
  else {
    at += 1;
    history.replaceState({ at }, '');
  }

  const route = readRoute(location.hash);
  const screen = new (screens[route.name] ?? Home)();
  await screen.open(route);
  if (mine !== asked) return;

  const first = shown === null;
  shown = screen;
  place.replaceChildren(screen);
  markRail(tabOf(route));
  scrollTo(0, returns ? (depths.get(at) ?? 0) : 0);
  if (!first) find(screen, 'h1')?.focus({ preventScroll: true });
}

/** @param {string} chosen */
function markRail(chosen) {
  for (const link of rail.querySelectorAll('a')) {
    const on = link.dataset.name === chosen;
    link.classList.toggle('on', on);
    if (on) link.setAttribute('aria-current', 'page');
    else link.removeAttribute('aria-current');
  }
}

function fillRail() {
  const rows = [
    ...tabs,
    { name: 'instruments', label: 'Instruments', href: '#/instruments', icon: /** @type {const} */ ('instruments') },
    { name: 'appearance', label: 'Appearance', href: '#/appearance', icon: /** @type {const} */ ('appearance') },
    { name: 'about', label: 'About', href: '#/about', icon: /** @type {const} */ ('about') },
  ];
  rail.append(
    h('div', { class: 'brand' }, sign(), 'Dewledger'),
    ...rows.map((row) => h('a', { href: row.href, 'data-name': row.name }, icon(row.icon), row.label)),
    h('p', { class: 'rail-foot mute' }, 'Everything is kept on this device.'),
  );
}

async function start() {
  const app = document.getElementById('app');
  if (!app) return;
  fillRail();
  app.append(
    h('a', { class: 'skip', href: '#main', onclick: skip }, 'Skip to the content'),
    rail,
    place,
    listenPlace(),
  );
  history.scrollRestoration = 'manual';
  if (history.state?.at) at = history.state.at;
  else history.replaceState({ at: 0 }, '');
  window.addEventListener('hashchange', showScreen);
  window.addEventListener('resize', () => shown?.settle());
  await Promise.all([followTheme(), showScreen()]);
}

/** @param {Event} event */
function skip(event) {
  // An address of its own would be taken for a screen's.
  event.preventDefault();
  find(place, 'h1')?.focus();
}

start();
