// An instrument with its probes: identity, calibration, and the accuracy statement as its paper prints it. What the
// statement comes to is worked out while one types.

import { ask, Fault } from '../api.js';
import { find, h } from '../lib/dom.js';
import { icon } from '../lib/icons.js';
import { Latest } from '../lib/latest.js';
import { notice } from '../lib/notice.js';
import { button, goBack, link, Screen } from '../lib/screen.js';
import { whenReleased } from '../lib/typing.js';
import { entryField } from '../parts/entry-field.js';
import { noteView } from '../parts/note.js';
import { choose } from '../parts/requirements.js';

export class Instrument extends Screen {
  /** @type {Desk.InstrumentForm | null} */
  #form = null;
  /** @type {Desk.TypedInstrument} */
  #typed = {};
  /** @type {{ field: string | null, message: string } | null} */
  #fault = null;
  /** One has tried to keep it: what is blank and wanted is said from now on. */
  #tried = false;
  /** @type {string | null} The field being typed in: nothing new is complained about until it is left. */
  #typing = null;
  #asker = new Latest(
    (/** @type {Desk.TypedInstrument} */ typed) =>
      ask({ ask: 'instrument_form', instrument: this.route.instrument ?? null, typed }, 'instrument_form'),
    (form) => {
      this.#form = form;
      this.render();
    },
    (error) => {
      this.#fault = { field: null, message: /** @type {Error} */ (error).message };
      this.render();
    },
  );

  async load() {
    const { instrument } = this.route;
    this.#form = await ask(
      { ask: 'instrument_form', instrument: instrument ?? null, class: this.route.class ?? null },
      'instrument_form',
    );
    this.#typed = this.#form.typed;
  }

  connectedCallback() {
    super.connectedCallback();
    const left = () => {
      if (this.#typing === null) return;
      // What is inserted above a button while a finger is on it would push it away from under it.
      whenReleased(() => {
        this.#typing = null;
        this.render();
      });
    };
    this.addEventListener('focusout', left, { signal: this.gone });
  }

  async leave() {
    this.#asker.stop();
  }

  /** @param {Desk.TypedInstrument} typed */
  #put(typed) {
    this.#typed = typed;
    this.#fault = null;
    this.render();
    this.#asker.ask(typed);
  }

  /**
   * @param {number} at
   * @param {Partial<Desk.TypedProbe>} change
   */
  #probe(at, change) {
    const probes = [...(this.#typed.probes ?? [])];
    probes[at] = { ...probes[at], ...change };
    this.#put({ ...this.#typed, probes });
  }

  /**
   * @param {number} at
   * @param {number} band
   * @param {Partial<Desk.TypedBand>} change
   */
  #band(at, band, change) {
    const bands = [...(this.#typed.probes?.[at]?.bands ?? [])];
    bands[band] = { ...bands[band], ...change };
    this.#probe(at, { bands });
  }

  async #save() {
    this.#tried = true;
    try {
      const saved = await ask(
        { ask: 'save_instrument', instrument: this.route.instrument ?? null, typed: this.#typed },
        'instrument_saved',
      );
      notice({ says: saved.says });
      goBack('#/instruments');
    } catch (error) {
      this.#fault = {
        field: error instanceof Fault ? error.field : null,
        message: /** @type {Error} */ (error).message,
      };
      this.#typing = null;
      this.render();
      if (this.#fault.field) find(this, `#${elementId(this.#fault.field)}`)?.focus();
    }
  }

  /** @param {boolean} withdrawn */
  async #withdraw(withdrawn) {
    await this.attempt(async () => {
      await ask({ ask: 'withdraw_instrument', instrument: this.route.instrument ?? '', withdrawn }, 'instruments');
      await this.reload();
    });
  }

  /**
   * What is wrong with a field: while it is typed in nothing, and of a blank one nothing until one tries to keep it.
   * @param {string} field
   * @param {string} value
   */
  #wrong(field, value) {
    if (this.#typing === field) return null;
    if (this.#fault?.field === field) return this.#fault.message;
    if (value.trim() === '' && !this.#tried) return null;
    return this.#form?.errors.find((error) => error.field === field)?.says ?? null;
  }

  /**
   * @param {string} field its place in the form
   * @param {string} label
   * @param {string} value
   * @param {(text: string) => void} input
   * @param {{ help?: string, number?: boolean, unit?: string, long?: boolean }} [how]
   */
  #entry(field, label, value, input, how = {}) {
    return entryField({
      id: elementId(field),
      label,
      value,
      input: (text) => {
        this.#typing = field;
        input(text);
      },
      error: this.#wrong(field, value),
      ...(how.help ? { help: how.help } : {}),
      ...(how.number ? { number: true } : {}),
      ...(how.long ? { long: true } : {}),
      ...(how.unit ? { unit: { id: '', symbol: how.unit, name: how.unit } } : {}),
    });
  }

  draw() {
    const form = this.#form;
    if (!form) return null;
    const typed = this.#typed;
    const probes = typed.probes ?? [];
    const fault = this.#fault;
    const apart = fault && !(fault.field && find(this, `#${elementId(fault.field)}`)) ? fault.message : null;
    return this.frame(
      {
        title: form.instrument ? (typed.name ?? '').trim() || 'Instrument' : 'New instrument',
        where: form.withdrawn ? 'Out of use' : 'What its own paper says overrides what a class says.',
        up: '#/instruments',
        acts: button('Keep it', () => this.#save(), { kind: 'go', icon: 'tick' }),
      },
      apart && noteView({ id: 'fault', tone: 'impossible', lead: apart }),
      h(
        'section',
        { class: 'sec', key: 'identity', 'aria-labelledby': 'identity' },
        h('div', { class: 'sec-head' }, h('h2', { id: 'identity' }, 'Which one')),
        this.#entry('name', 'Name', typed.name ?? '', (name) => this.#put({ ...this.#typed, name }), {
          help: 'As the team calls it',
        }),
        this.#entry('serial', 'Serial number', typed.serial ?? '', (serial) => this.#put({ ...this.#typed, serial })),
        this.#entry('note', 'Note', typed.note ?? '', (note) => this.#put({ ...this.#typed, note }), { long: true }),
      ),
      probes.map((probe, at) => this.#probeView(form, probe, at, probes.length)),
      h(
        'div',
        { class: 'acts', key: 'add' },
        link(
          'Add a probe',
          () =>
            this.#put({
              ...this.#typed,
              probes: [...probes, { quantity: 'temperature', unit: 'degC', bands: [{}] }],
            }),
          'plus',
        ),
      ),
      h(
        'div',
        { class: 'acts', key: 'use' },
        form.instrument &&
          link(form.withdrawn ? 'Bring it back into use' : 'Take it out of use', () => this.#withdraw(!form.withdrawn)),
      ),
    );
  }

  /**
   * @param {Desk.InstrumentForm} form
   * @param {Desk.TypedProbe} probe
   * @param {number} at
   * @param {number} count
   */
  #probeView(form, probe, at, count) {
    const around = form.probes[at];
    const place = `probes.${at}`;
    const id = `probe-${at}`;
    const name = probe.name?.trim() || form.quantities.find((one) => one.value === probe.quantity)?.label || '';
    const unitWrong = this.#wrong(`${place}.unit`, probe.unit ?? '');
    const coverage = form.coverages.find((one) => one.value === (probe.coverage || 'limits'));
    return h(
      'section',
      { class: 'sec', key: id, 'aria-labelledby': id },
      h('div', { class: 'sec-head' }, h('h2', { id }, count > 1 ? `Probe ${at + 1}: ${name}` : 'What it reads')),
      h(
        'p',
        { class: 'comes-to', 'aria-live': 'polite' },
        around?.comes_to ? `Comes to ${around.comes_to}` : 'Its ± is not known yet',
      ),
      h(
        'div',
        { class: 'pair tight' },
        this.#entry(`${place}.name`, 'Called', probe.name ?? '', (text) => this.#probe(at, { name: text })),
        h(
          'div',
          { class: 'field' },
          h('div', { class: 'field-top' }, h('label', { for: `${id}-quantity` }, 'Reads')),
          choose(
            '',
            probe.quantity ?? '',
            form.quantities,
            (quantity) => this.#probe(at, { quantity, unit: '' }),
            `${id}-quantity`,
          ),
        ),
        h(
          'div',
          { class: 'field' },
          h('div', { class: 'field-top' }, h('label', { for: elementId(`${place}.unit`) }, 'Accuracy is stated in')),
          choose(
            '',
            probe.unit ?? '',
            [
              { value: '', label: 'Choose' },
              ...(around?.units ?? []).map((one) => ({ value: one.id, label: one.symbol || one.name })),
            ],
            (unit) => this.#probe(at, { unit }),
            elementId(`${place}.unit`),
          ),
          unitWrong && h('p', { class: 'ask wrong-words' }, unitWrong),
        ),
        h(
          'div',
          { class: 'field' },
          h('div', { class: 'field-top' }, h('label', { for: `${id}-coverage` }, 'The stated width is')),
          choose(
            '',
            probe.coverage || 'limits',
            form.coverages,
            (coverage) => this.#probe(at, { coverage }),
            `${id}-coverage`,
          ),
        ),
      ),
      coverage?.help && h('p', { class: 'ask' }, `${coverage.label}. ${coverage.help}.`),
      (probe.bands ?? []).map((band, index) => this.#bandView(probe, band, at, index, around?.unit ?? '')),
      h(
        'div',
        { class: 'acts' },
        link('Another band', () => this.#probe(at, { bands: [...(probe.bands ?? []), {}] }), 'plus'),
        (probe.bands ?? []).length > 1 &&
          link('Take the last band away', () => this.#probe(at, { bands: withoutLast(probe.bands ?? []) }), 'close'),
      ),
      h(
        'div',
        { class: 'pair tight' },
        this.#entry(
          `${place}.range`,
          'Upper end of its range',
          probe.range ?? '',
          (range) => this.#probe(at, { range }),
          {
            number: true,
            unit: around?.unit ?? '',
          },
        ),
        this.#entry(
          `${place}.resolution`,
          'Step of the display',
          probe.resolution ?? '',
          (resolution) => this.#probe(at, { resolution }),
          {
            number: true,
            unit: around?.unit ?? '',
          },
        ),
        this.#entry(
          `${place}.calibration_share`,
          'Part that is calibration',
          probe.calibration_share ?? '',
          (calibration_share) => this.#probe(at, { calibration_share }),
          { number: true, unit: '%' },
        ),
        this.#entry(
          `${place}.response`,
          'Shows a change after',
          probe.response ?? '',
          (response) => this.#probe(at, { response }),
          {
            number: true,
            unit: 's',
          },
        ),
      ),
      h(
        'p',
        { class: 'ask' },
        'The part that is calibration is the same at each reading of this probe, so it cancels in a difference; 80 % where blank. The range is wanted where the paper gives % of range.',
      ),
      h(
        'div',
        { class: 'pair tight' },
        this.#entry(
          `${place}.calibrated`,
          'Calibrated on',
          probe.calibrated ?? '',
          (calibrated) => this.#probe(at, { calibrated }),
          { help: 'As 2026-03-01' },
        ),
        this.#entry(`${place}.due`, 'Due again on', probe.due ?? '', (due) => this.#probe(at, { due }), {
          help: 'As 2027-03-01',
        }),
      ),
      h(
        'div',
        { class: 'pair' },
        count > 1 &&
          this.#entry(`${place}.serial`, 'Serial number of the probe', probe.serial ?? '', (serial) =>
            this.#probe(at, { serial }),
          ),
        (around?.reads ?? []).map((way) =>
          h(
            'div',
            { class: 'field' },
            h('div', { class: 'field-top' }, h('label', { for: `${id}-${way.key}` }, way.label)),
            choose(
              '',
              way.value ?? '',
              [{ value: '', label: 'Not said' }, ...way.options],
              (value) => this.#probe(at, { reads: { ...probe.reads, [way.key]: value } }),
              `${id}-${way.key}`,
            ),
            h('p', { class: 'ask' }, way.options.find((one) => one.value === way.value)?.help ?? ''),
          ),
        ),
      ),
      count > 1 &&
        h(
          'div',
          { class: 'acts' },
          link(
            'Take this probe away',
            () => this.#put({ ...this.#typed, probes: (this.#typed.probes ?? []).filter((_, other) => other !== at) }),
            'close',
          ),
        ),
    );
  }

  /**
   * @param {Desk.TypedProbe} probe
   * @param {Desk.TypedBand} band
   * @param {number} at
   * @param {number} index
   * @param {string} unit
   */
  #bandView(probe, band, at, index, unit) {
    const place = `probes.${at}.bands.${index}`;
    const many = (probe.bands ?? []).length > 1;
    const last = index === (probe.bands ?? []).length - 1;
    const field = (
      /** @type {'up_to' | 'absolute' | 'of_reading' | 'of_range' | 'counts'} */ name,
      /** @type {string} */ label,
      /** @type {string} */ symbol,
    ) =>
      this.#entry(`${place}.${name}`, label, band[name] ?? '', (text) => this.#band(at, index, { [name]: text }), {
        number: true,
        unit: symbol,
      });
    return h(
      'fieldset',
      { class: 'band', key: `band ${index}` },
      h('legend', null, many ? `Band ${index + 1}` : 'Accuracy, ±'),
      h(
        'div',
        { class: 'pair tight' },
        many && (!last || band.up_to) && field('up_to', 'Up to a reading of', unit),
        field('absolute', 'Fixed part', unit),
        field('of_reading', 'Of the reading', '%'),
        field('of_range', 'Of the range', '%'),
        field('counts', 'Steps of the display', 'steps'),
      ),
      h(
        'button',
        {
          type: 'button',
          class: 'check-row',
          role: 'checkbox',
          'aria-checked': String(band.greater ?? false),
          onclick: () => this.#band(at, index, { greater: !band.greater }),
        },
        h('span', { class: 'box', 'aria-hidden': 'true' }, band.greater && icon('tick', 'i-s')),
        'The greater of fixed part and share of the reading counts, not their sum',
      ),
    );
  }
}

/**
 * An element's id made of a field's place such as `probes.0.unit`.
 * @param {string} field
 */
function elementId(field) {
  return field.replace(/\W+/g, '-');
}

/**
 * The bands without the last one; what is the last one then has no upper end.
 * @param {Desk.TypedBand[]} bands
 */
function withoutLast(bands) {
  return bands.slice(0, -1).map((band, at) => (at === bands.length - 2 ? { ...band, up_to: '' } : band));
}
