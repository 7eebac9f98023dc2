// A form as the desk describes it: sections, readings, choices, and what is said about them. It holds what is typed and
// says when it changed; it reads no number.

import { h } from '../lib/dom.js';
import { icon, mark } from '../lib/icons.js';
import { say } from '../lib/say.js';
import { link } from '../lib/screen.js';
import { acted, changeSign, choose, typePlusMinus, typeText } from '../lib/typed.js';
import { toNext, whenReleased } from '../lib/typing.js';
import { choiceSheet, unitSheet } from './form-sheets.js';
import { noteView } from './note.js';
import { readingSheet } from './reading-sheet.js';

/** @typedef {Desk.ReadingView & { field: 'reading' }} Reading */
/** @typedef {Desk.ChoiceView & { field: 'choice' }} Choice */

export class Form {
  /** @type {Desk.Typed} What is typed. */
  typed;
  /** @type {Desk.SectionView[]} */
  sections = [];
  /** @type {Desk.NoteView[]} */
  notes = [];
  /** A reading is being typed: nothing new is complained about until the field is left. */
  typing = false;
  /** What is complained about on the screen now. */
  #shown = new Set();
  /** Sections that the person has opened or folded. */
  /** @type {Map<string, boolean>} */
  #open = new Map();
  #changed;
  #redraw;
  /** @type {(() => void) | null} */
  #watcher = null;

  /**
   * @param {Desk.Typed} typed
   * @param {() => void} changed called when what is typed has changed
   * @param {() => void} redraw called when only the look has changed
   */
  constructor(typed, changed, redraw) {
    this.typed = typed;
    this.#changed = changed;
    this.#redraw = redraw;
  }

  /**
   * Takes in what the desk says about what is typed.
   * @param {Desk.SectionView[]} sections
   * @param {Desk.NoteView[]} notes
   */
  see(sections, notes) {
    this.sections = sections;
    this.notes = notes;
    this.#watcher?.();
  }

  /**
   * Called whenever the desk has said something new: a sheet over the form is drawn anew. None ends it.
   * @param {(() => void) | null} watcher
   */
  watch(watcher) {
    this.#watcher = watcher;
  }

  /**
   * What a sheet said of a reading, or asked of a result.
   * @param {Desk.Typed} typed
   */
  put(typed) {
    this.#put(typed, true);
  }

  /** Decides what may be complained about now: while one types, only what was there already. */
  #weigh() {
    const found = new Set();
    for (const field of this.fields()) if (field.error) found.add(`error ${field.key}`);
    for (const note of this.notes) found.add(`note ${note.code}`);
    this.#shown = this.typing ? new Set([...found].filter((one) => this.#shown.has(one))) : found;
  }

  /** Notes that may stand on the screen now. */
  standing() {
    return this.notes.filter((note) => this.#shown.has(`note ${note.code}`));
  }

  /**
   * Notes that stand at a field. What makes it wrong stands there as its error already.
   * @param {Desk.FieldView} field
   */
  #notesOn(field) {
    return this.standing().filter((note) => note.field === field.key && !(field.error && note.tone === 'impossible'));
  }

  /** Notes that stand at no field of the form. */
  notesApart() {
    const keys = new Set(this.fields().map((field) => field.key));
    return this.standing().filter((note) => !note.field || !keys.has(note.field));
  }

  /** How many unusual readings stand that nobody has said to be right. */
  unusual() {
    return this.standing().filter((note) => note.tone === 'unusual' && !note.accepted).length;
  }

  /** All fields in order. */
  fields() {
    return this.sections.flatMap((section) => section.fields);
  }

  /** @returns {Reading[]} */
  readings() {
    return this.fields().filter((field) => field.field === 'reading');
  }

  /**
   * What is typed in a reading.
   * @param {Desk.ReadingView} view
   */
  text(view) {
    return this.typed.readings?.[view.key]?.text ?? '';
  }

  /**
   * @param {Desk.ReadingView} view
   * @param {string} text
   */
  type(view, text) {
    this.typing = true;
    const about = this.notes.filter((note) => note.field === view.key).map((note) => note.code);
    this.#put(typeText(this.typed, view.key, text, view.unit.id, about));
  }

  /** A field was left: from now on it may be complained about. */
  left() {
    if (!this.typing) return;
    // What is inserted above a button while a finger or the mouse is on it would push it away from under it.
    whenReleased(() => {
      this.typing = false;
      this.#redraw();
    });
  }

  /** @param {Desk.Act} act */
  act(act) {
    this.#put(acted(this.typed, act), true);
  }

  /**
   * @param {string} key
   * @param {string} value
   */
  choose(key, value) {
    this.#put(choose(this.typed, key, value), true);
  }

  /**
   * @param {string} key
   * @param {string} unit
   */
  unit(key, unit) {
    this.#put(acted(this.typed, { label: '', changes: [{ change: 'unit', key, unit }] }), true);
  }

  /**
   * @param {string[]} keys
   * @param {string} text
   * @param {string} unit
   */
  plusMinus(keys, text, unit) {
    this.#put(
      keys.reduce((typed, key) => typePlusMinus(typed, key, text, unit), this.typed),
      true,
    );
  }

  /**
   * Puts last visit's reading into the field.
   * @param {Reading} view
   */
  pull(view) {
    if (!view.was) return;
    const { text, unit } = view.was;
    this.#put(
      acted(this.typed, { label: '', changes: [{ change: 'type', key: view.key, text, unit: unit.id }] }),
      true,
    );
  }

  /** @param {string} key */
  toggle(key, open = false) {
    this.#open.set(key, open);
    this.#redraw();
  }

  /**
   * @param {Desk.Typed} typed
   * @param {boolean} [complete] it came from one tap, so it may be complained about
   */
  #put(typed, complete = false) {
    if (complete) this.typing = false;
    this.typed = typed;
    this.#changed();
  }

  /** The sections as elements. */
  draw() {
    this.#weigh();
    const last = this.readings().at(-1)?.key;
    return this.sections.map((section) => this.#section(section, last));
  }

  /**
   * @param {Desk.SectionView} section
   * @param {string | undefined} last key of the last reading of the form
   */
  #section(section, last) {
    const id = elementId('section', section.key);
    const complaints = section.fields.some((field) => this.#complains(field));
    const folds = section.folded || Boolean(section.summary) || this.#open.has(section.key);
    const open = complaints || (this.#open.get(section.key) ?? !section.folded);
    return h(
      'section',
      { key: `section ${section.key}`, class: 'sec', 'aria-labelledby': id },
      section.mark && h('span', { class: 'hang' }, mark(section.mark)),
      h(
        'div',
        { class: 'sec-head' },
        folds
          ? h(
              'h2',
              { id },
              h(
                'button',
                {
                  type: 'button',
                  class: 'fold',
                  'aria-expanded': String(open),
                  onclick: () => this.toggle(section.key, !open),
                },
                h('span', { class: 'fold-title' }, section.title),
                section.aside && h('span', { class: 'mute' }, section.aside),
                icon(open ? 'up' : 'down', 'i-s'),
              ),
            )
          : h('h2', { id }, section.title),
        !folds && section.aside && h('p', null, section.aside),
      ),
      !open && section.summary && h('p', { class: 'summary' }, section.summary),
      open && [
        h(
          'div',
          { class: 'pair' },
          section.fields.map((field) =>
            field.field === 'reading' ? this.#reading(field, field.key === last) : this.#choice(field),
          ),
        ),
        section.readout && h('p', { class: 'section-readout' }, section.readout),
        section.acts.length > 0 &&
          h(
            'div',
            { class: 'acts' },
            section.acts.map((act) => link(act.label, () => this.act(act))),
          ),
      ],
    );
  }

  /** @param {Desk.FieldView} field */
  #complains(field) {
    if (field.error && this.#shown.has(`error ${field.key}`)) return true;
    return this.standing().some((note) => note.field === field.key && note.tone !== 'remark' && !note.accepted);
  }

  /**
   * @param {Reading} view
   * @param {boolean} last
   */
  #reading(view, last) {
    const id = elementId('field', view.key);
    const mean = view.with?.takes.mean ?? null;
    const text = mean ?? this.text(view);
    const error = view.error && this.#shown.has(`error ${view.key}`) ? view.error : null;
    const notes = this.#notesOn(view);
    const odd = view.unusual && notes.some((note) => note.tone === 'unusual' && !note.accepted);
    // A long number needs the room.
    const wasBelow = view.was && text.length + wasFigure(view).length > 9;
    const asides = [
      view.help && { id: `${id}-help`, says: view.help },
      text.trim() === '' && view.assumed && { id: `${id}-assumed`, says: view.assumed },
      wasBelow && { id: `${id}-was`, says: `was ${wasFigure(view)}` },
      view.read_as && { id: `${id}-read`, says: view.read_as },
      view.with?.takes.says && {
        id: `${id}-takes`,
        says: [h('strong', null, view.with.takes.word), '. ', view.with.takes.says],
      },
      view.with?.corrected && { id: `${id}-corrected`, says: view.with.corrected },
    ].filter((one) => one !== null && one !== undefined && one !== false && one !== '');
    const describes = [
      ...asides.map((one) => one.id),
      ...(error ? [`${id}-error`] : []),
      ...notes.map((note) => elementId('note', note.code)),
      `${id}-pm`,
    ];
    return h(
      'div',
      { key: `field ${view.pick?.key ?? view.key}`, class: `field${fault(error, text === '')}${odd ? ' odd' : ''}` },
      h(
        'div',
        { class: 'field-top' },
        view.pick ? this.#pick(view.pick, view.label) : h('label', { for: id }, view.label),
        h(
          'button',
          {
            type: 'button',
            class: 'meter',
            id: `${id}-pm`,
            'aria-haspopup': 'dialog',
            onclick: () => readingSheet(this, view),
          },
          view.with?.probe
            ? [h('u', { class: 'probe' }, view.with.label), h('span', { class: 'pm' }, view.plus_minus)]
            : h('u', null, view.plus_minus || 'add a ±'),
          h('span', { class: 'sr' }, `, ± of ${view.label}, change`),
        ),
      ),
      h(
        'div',
        { class: 'entry' },
        view.signed &&
          mean === null &&
          h(
            'button',
            {
              type: 'button',
              class: 'sign',
              'aria-label': `Change sign of ${view.label}`,
              onclick: () => this.#sign(view, id),
            },
            icon('sign'),
          ),
        h('input', {
          id,
          type: 'text',
          inputmode: 'decimal',
          enterkeyhint: last ? 'done' : 'next',
          autocomplete: 'off',
          autocapitalize: 'off',
          spellcheck: 'false',
          'aria-label': view.name,
          'aria-describedby': describes.join(' '),
          'aria-invalid': error && text !== '' ? 'true' : null,
          readonly: mean !== null,
          title: mean === null ? null : 'The mean of its takes: tap to see them',
          value: text,
          onclick: mean === null ? null : () => readingSheet(this, view, 'takes'),
          oninput: (/** @type {Event} */ event) =>
            this.type(view, /** @type {HTMLInputElement} */ (event.target).value),
          onblur: () => this.left(),
          onkeydown: (/** @type {KeyboardEvent} */ event) => toNext(event),
        }),
        !wasBelow && this.#was(view, text),
        this.#unit(view),
      ),
      asides.map((one) => h('p', { class: 'ask', id: one.id }, one.says)),
      error &&
        noteView({
          id: `${id}-error`,
          tone: text === '' ? 'unusual' : 'impossible',
          lead: error.says,
          acts: error.acts,
          act: (act) => this.act(act),
        }),
      notes.map((note) => noteView({ ...note, id: elementId('note', note.code), act: (act) => this.act(act) })),
    );
  }

  /**
   * @param {Desk.ChoiceView} pick
   * @param {string} label
   */
  #pick(pick, label) {
    return h(
      'button',
      { type: 'button', class: 'pick', 'aria-haspopup': 'dialog', onclick: () => choiceSheet(this, pick) },
      label,
      icon('down', 'i-s'),
      h('span', { class: 'sr' }, `, ${pick.label}, change`),
    );
  }

  /**
   * @param {Reading} view
   * @param {string} text
   */
  #was(view, text) {
    if (!view.was) return null;
    const { was } = view;
    const figure = wasFigure(view);
    if (text !== '') return h('span', { class: 'was' }, `was ${figure}`);
    return h(
      'button',
      { type: 'button', class: 'was act', title: was.when, onclick: () => this.pull(view) },
      icon('pull', 'i-s'),
      h('span', { class: 'sr' }, `${view.label}: take the reading of ${was.when}, `),
      figure,
    );
  }

  /** @param {Reading} view */
  #unit(view) {
    if (view.units.length < 2) return view.unit.symbol && h('span', { class: 'unit' }, view.unit.symbol);
    return h(
      'button',
      { type: 'button', class: 'unit', 'aria-haspopup': 'dialog', onclick: () => unitSheet(this, view) },
      h('span', null, view.unit.symbol),
      icon('down', 'i-s'),
      h('span', { class: 'sr' }, `, unit of ${view.label}, change`),
    );
  }

  /**
   * @param {Reading} view
   * @param {string} id
   */
  #sign(view, id) {
    const text = changeSign(this.text(view));
    this.type(view, text);
    say(text.startsWith('\u2212') ? 'minus' : 'plus');
    document.getElementById(id)?.focus();
  }

  /** @param {Choice} view */
  #choice(view) {
    const id = elementId('field', view.key);
    const error = view.error && this.#shown.has(`error ${view.key}`) ? view.error : null;
    const notes = this.#notesOn(view);
    const chosen = view.options.find((option) => option.value === view.value);
    const short = view.options.length <= 3 && view.options.every((option) => option.label.length <= 12 && !option.help);
    const describes = [...(view.help ? [`${id}-help`] : []), ...(error ? [`${id}-error`] : [])].join(' ') || null;
    return h(
      'div',
      { key: `field ${view.key}`, class: `field${fault(error, !chosen)}` },
      h('div', { class: 'field-top' }, h('span', { class: 'label', id: `${id}-label` }, view.label)),
      short
        ? h(
            'div',
            { class: 'seg', role: 'group', 'aria-labelledby': `${id}-label`, 'aria-describedby': describes },
            view.options.map((option) =>
              h(
                'button',
                {
                  type: 'button',
                  class: option.value === view.value ? 'on' : null,
                  'aria-pressed': String(option.value === view.value),
                  onclick: () => this.choose(view.key, option.value),
                },
                option.label,
              ),
            ),
          )
        : h(
            'button',
            {
              type: 'button',
              class: 'choice',
              id,
              'aria-haspopup': 'dialog',
              'aria-labelledby': `${id}-label ${id}-value`,
              'aria-describedby': describes,
              onclick: () => choiceSheet(this, view),
            },
            h('span', { id: `${id}-value`, class: chosen ? null : 'open' }, chosen?.label ?? 'Choose'),
            icon('down', 'i-s'),
          ),
      view.help && h('p', { class: 'ask', id: `${id}-help` }, view.help),
      error &&
        noteView({
          id: `${id}-error`,
          tone: chosen ? 'impossible' : 'unusual',
          lead: error.says,
          acts: error.acts,
          act: (act) => this.act(act),
        }),
      notes.map((note) => noteView({ ...note, id: elementId('note', note.code), act: (act) => this.act(act) })),
    );
  }
}

/**
 * How a field is marked: a question that hangs on a blank one is not a wrong answer.
 * @param {Desk.Message | null} error
 * @param {boolean} blank
 */
function fault(error, blank) {
  if (!error) return '';
  return blank ? ' odd' : ' wrong';
}

/**
 * Last visit's reading, with its unit where that is another one.
 * @param {Desk.ReadingView} view
 */
function wasFigure({ was, unit }) {
  if (!was) return '';
  return was.unit.id === unit.id ? was.text : `${was.text}\u00a0${was.unit.symbol}`;
}

/**
 * An element's id made of a key such as `entering.dry_bulb`.
 * @param {string} kind
 * @param {string} key
 */
export function elementId(kind, key) {
  return `${kind}-${key.replace(/[^a-zA-Z0-9_]+/g, '-')}`;
}
