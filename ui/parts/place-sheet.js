// Where a check is made: site, equipment, visit; each can be added on the spot.

import { ask } from '../api.js';
import { h } from '../lib/dom.js';
import { icon } from '../lib/icons.js';
import { button, link } from '../lib/screen.js';
import { openSheet } from '../lib/sheet.js';
import { elevationUnits, entryField } from './entry-field.js';
import { radioRow } from './form-sheets.js';

/** Kinds of equipment that are offered; another can be typed. */
export const classes = [
  'Air handler',
  'Rooftop unit',
  'Fan coil',
  'Coil',
  'Heat exchanger',
  'Humidifier',
  'Fan',
  'Chiller',
  'Boiler',
  'Room',
];

/**
 * Asks for the place; undefined when the sheet was left.
 * @param {Desk.Place} given
 * @param {string} label what the main button says
 * @returns {Promise<Desk.Place | undefined>}
 */
export async function placeSheet(given, label) {
  const { sites } = await ask({ ask: 'sites' }, 'sites');
  const asker = new PlaceAsker(sites, given, label);
  if (given.site) await asker.openSite(given.site);
  else if (sites.length === 0) await asker.addSite();
  return openSheet('Where is this?', (/** @type {import('../lib/sheet.js').Sheet<Desk.Place>} */ sheet) =>
    asker.draw(sheet),
  );
}

/** @typedef {{ what: 'site', name: string, elevation: string, unit: Desk.UnitView, units: Desk.UnitView[] }} NewSite */
/** @typedef {{ what: 'equipment', tag: string, class: string }} NewEquipment */

class PlaceAsker {
  #sites;
  #label;
  /** @type {Desk.Place} */
  #place;
  /** @type {Desk.SiteView | null} */
  #site = null;
  /** @type {NewSite | NewEquipment | null} What is being added. */
  #adding = null;
  #says = '';
  /** @type {import('../lib/sheet.js').Sheet<Desk.Place> | null} */
  #sheet = null;

  /**
   * @param {Desk.SiteRow[]} sites
   * @param {Desk.Place} place
   * @param {string} label
   */
  constructor(sites, place, label) {
    this.#sites = sites;
    this.#place = { ...place };
    this.#label = label;
  }

  /** @param {string} site */
  async openSite(site) {
    this.#site = await ask({ ask: 'site', site }, 'site');
    if (this.#place.site !== site) this.#place = { site };
    const today = this.#site.visits.find((visit) => visit.open);
    if (!this.#place.visit && today) this.#place.visit = today.visit;
  }

  async addSite() {
    const { chosen, units } = await elevationUnits();
    this.#adding = { what: 'site', name: '', elevation: '', unit: chosen, units };
  }

  /** @param {() => Promise<void>} work */
  async #try(work) {
    this.#says = '';
    try {
      await work();
    } catch (error) {
      this.#says = /** @type {Error} */ (error).message;
    }
    this.#sheet?.redraw();
  }

  /** @param {import('../lib/sheet.js').Sheet<Desk.Place>} sheet */
  draw(sheet) {
    this.#sheet = sheet;
    return [
      this.#says &&
        h('div', { class: 'note wrong', role: 'alert' }, icon('wrong'), h('p', { class: 'lead' }, this.#says)),
      this.#adding ? this.#add(this.#adding) : this.#site ? this.#whatAndWhen(this.#site, sheet) : this.#which(),
    ];
  }

  #which() {
    return [
      h(
        'div',
        { role: 'radiogroup', 'aria-label': 'Site' },
        this.#sites.map((site) =>
          radioRow({
            label: site.name,
            help: site.invented ? `Invented example. ${site.says}` : site.says,
            on: false,
            choose: () => this.#try(() => this.openSite(site.site)),
          }),
        ),
      ),
      link('Add a site', () => this.#try(() => this.addSite()), 'plus'),
    ];
  }

  /**
   * @param {Desk.SiteView} site
   * @param {import('../lib/sheet.js').Sheet<Desk.Place>} sheet
   */
  #whatAndWhen(site, sheet) {
    const pick = (/** @type {Partial<Desk.Place>} */ part) => {
      this.#place = { ...this.#place, ...part };
      sheet.redraw();
    };
    const visits = site.visits.filter((visit) => visit.open || visit.visit === this.#place.visit);
    return [
      h(
        'p',
        { class: 'chosen' },
        h('strong', null, site.name),
        link('Another site', () => {
          this.#site = null;
          sheet.redraw();
        }),
      ),
      h('h3', null, 'Equipment'),
      h(
        'div',
        { role: 'radiogroup', 'aria-label': 'Equipment' },
        site.equipment.map((one) =>
          radioRow({
            label: one.tag,
            help: one.says,
            on: one.equipment === this.#place.equipment,
            choose: () => pick({ equipment: one.equipment }),
          }),
        ),
        radioRow({
          label: 'None in particular',
          on: !this.#place.equipment,
          choose: () => pick({ equipment: undefined }),
        }),
      ),
      link(
        'Add equipment',
        () => {
          this.#adding = { what: 'equipment', tag: '', class: '' };
          sheet.redraw();
        },
        'plus',
      ),
      h('h3', null, 'Visit'),
      h(
        'div',
        { role: 'radiogroup', 'aria-label': 'Visit' },
        visits.map((visit) =>
          radioRow({
            label: visit.when,
            help: visit.says,
            on: visit.visit === this.#place.visit,
            choose: () => pick({ visit: visit.visit }),
          }),
        ),
        radioRow({ label: 'Without a visit', on: !this.#place.visit, choose: () => pick({ visit: undefined }) }),
      ),
      !visits.some((visit) => visit.open) &&
        link('Start a visit now', () => this.#try(() => this.#startVisit(site.site)), 'plus'),
      h(
        'div',
        { class: 'stack gap' },
        button(this.#label, () => sheet.close(this.#place), { kind: 'go', icon: 'book' }),
      ),
    ];
  }

  /** @param {string} site */
  async #startVisit(site) {
    const visit = await ask({ ask: 'save_visit', visit: null, site, people: '', running: '', typed: {} }, 'visit');
    this.#site = await ask({ ask: 'site', site }, 'site');
    this.#place = { ...this.#place, visit: visit.place.visit };
  }

  /** @param {NewSite | NewEquipment} adding */
  #add(adding) {
    const cancel = link('Back to the list', () => {
      this.#adding = null;
      this.#sheet?.redraw();
    });
    if (adding.what === 'site') {
      return [
        entryField({
          id: 'add-name',
          label: 'Name of the site',
          value: adding.name,
          input: (text) => {
            adding.name = text;
          },
        }),
        entryField({
          id: 'add-elevation',
          label: 'Elevation above sea level',
          help: 'Gives the air pressure where no barometer is read. Leave it blank where it is not known.',
          value: adding.elevation,
          input: (text) => {
            adding.elevation = text;
          },
          number: true,
          signed: true,
          unit: adding.unit,
          units: adding.units,
          choose: (unit) => {
            adding.unit = unit;
            this.#sheet?.redraw();
          },
          redraw: () => this.#sheet?.redraw(),
        }),
        h(
          'div',
          { class: 'stack gap' },
          button('Add the site', () => this.#try(() => this.#saveSite(adding)), { kind: 'go' }),
          this.#sites.length > 0 && cancel,
        ),
      ];
    }
    return [
      entryField({
        id: 'add-tag',
        label: 'Tag, as on the drawing',
        value: adding.tag,
        input: (text) => {
          adding.tag = text;
        },
      }),
      entryField({
        id: 'add-class',
        label: 'What it is',
        value: adding.class,
        input: (text) => {
          adding.class = text;
        },
      }),
      classChips(adding.class, (name) => {
        adding.class = name;
        this.#sheet?.redraw();
      }),
      h(
        'div',
        { class: 'stack gap' },
        button('Add the equipment', () => this.#try(() => this.#saveEquipment(adding)), { kind: 'go' }),
        cancel,
      ),
    ];
  }

  /** @param {NewSite} adding */
  async #saveSite({ name, elevation, unit }) {
    this.#site = await ask(
      { ask: 'save_site', site: null, name, elevation: { text: elevation, unit: unit.id }, note: '' },
      'site',
    );
    this.#place = { site: this.#site.site };
    this.#adding = null;
    this.#sites = (await ask({ ask: 'sites' }, 'sites')).sites;
  }

  /** @param {NewEquipment} adding */
  async #saveEquipment({ tag, class: what }) {
    const site = this.#place.site ?? '';
    const made = await ask({ ask: 'save_equipment', equipment: null, site, tag, class: what, note: '' }, 'equipment');
    this.#site = await ask({ ask: 'site', site }, 'site');
    this.#place = { ...this.#place, equipment: made.place.equipment };
    this.#adding = null;
  }
}

/**
 * Kinds of equipment to tap.
 * @param {string} chosen
 * @param {(name: string) => void} choose
 */
export function classChips(chosen, choose) {
  return h(
    'div',
    { class: 'chips gap-small', role: 'group', 'aria-label': 'What it is' },
    classes.map((name) =>
      h(
        'button',
        {
          type: 'button',
          class: name === chosen ? 'chip on' : 'chip',
          'aria-pressed': String(name === chosen),
          onclick: () => choose(name),
        },
        name,
      ),
    ),
  );
}
