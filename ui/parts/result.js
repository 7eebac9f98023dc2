// What a check comes to: the one figure that counts, further results, the book's figure beside it, what decides the ±,
// cautions, the working and the air states.

import { h, svg } from '../lib/dom.js';
import { icon, mark } from '../lib/icons.js';
import { noteView } from './note.js';
import { requirementsView } from './requirements.js';
import { drawing } from './shape.js';
import { tableView } from './table.js';

/** Shown where there is no value. */
export const dash = '–';

/**
 * The result strip. While a reading is being typed (`quiet`) a missing figure is a dash without a reason.
 * @param {Desk.Solved} solved
 * @param {{ quiet?: boolean, unusual?: number }} [how]
 */
export function strip(solved, { quiet = false, unusual = 0 } = {}) {
  const { headline } = solved;
  const value = headline.value ?? null;
  const why = value === null && !quiet ? (headline.why_not ?? solved.waits) : null;
  return h(
    'section',
    { key: 'strip', class: 'strip', 'aria-label': 'Result' },
    h('p', { class: 'say' }, h('span', null, headline.says), flag(unusual, solved.cautions.length)),
    h(
      'p',
      { class: 'total' },
      h('b', null, value?.number ?? dash),
      value?.unit && h('span', { class: 'u' }, value.unit),
      value &&
        headline.plus_minus &&
        h('span', { class: plusMinusClass(headline.plus_minus) }, headline.plus_minus.text),
      value && headline.also && h('span', { class: 'of' }, headline.also),
      why && h('span', { class: 'why' }, why),
    ),
    headline.split.length > 0 && splitBar(headline.split),
    headline.minor.length > 0 &&
      h(
        'p',
        { class: 'parts' },
        headline.minor.map((minor) => h('span', null, h('b', null, minor.text), ' ', minor.label)),
      ),
  );
}

/**
 * A count that leads to what it counts.
 * @param {number} unusual
 * @param {number} cautions
 */
function flag(unusual, cautions) {
  const label = unusual > 0 ? counted(unusual, 'unusual reading') : cautions > 0 ? counted(cautions, 'caution') : null;
  if (label === null) return null;
  const aim = unusual > 0 ? '.note.unusual' : '#cautions';
  return h(
    'button',
    {
      type: 'button',
      class: 'flag',
      onclick: () => {
        const found = /** @type {HTMLElement | null} */ (document.querySelector(`main ${aim}`));
        found?.scrollIntoView({ block: 'center' });
        found?.setAttribute('tabindex', '-1');
        found?.focus({ preventScroll: true });
      },
    },
    icon('odd', 'i-s'),
    label,
  );
}

/**
 * @param {number} count
 * @param {string} noun
 */
function counted(count, noun) {
  return count === 1 ? `1 ${noun}` : `${count} ${noun}s`;
}

/** The headline in words, for a screen reader. @param {Desk.Solved} solved */
export function spoken(solved) {
  const { headline } = solved;
  if (!headline.value) return [headline.says, headline.why_not ?? solved.waits ?? 'waits for readings'].join(': ');
  const plusMinus = headline.plus_minus ? `, ${headline.plus_minus.text.replace('±', 'plus or minus')}` : '';
  return `${headline.says}: ${headline.value.number} ${headline.value.unit}${plusMinus}`;
}

/**
 * Sensible solid, latent dotted.
 * @param {Desk.SplitView[]} split
 */
function splitBar(split) {
  let from = 0;
  return svg(
    'svg',
    { class: 'split', width: '100%', height: 12, 'aria-hidden': 'true' },
    svg(
      'defs',
      null,
      svg(
        'pattern',
        { id: 'split-dots', width: 6, height: 6, patternUnits: 'userSpaceOnUse' },
        svg('circle', { class: 'wet-dots', cx: 1.5, cy: 3, r: 1.4 }),
        svg('circle', { class: 'wet-dots', cx: 4.5, cy: 0, r: 1.4 }),
        svg('circle', { class: 'wet-dots', cx: 4.5, cy: 6, r: 1.4 }),
      ),
    ),
    split.map((part) => {
      const x = percent(from);
      from += part.share;
      return [
        svg('rect', { class: part.moist ? 'wet' : 'heat', x, width: percent(part.share), height: 12 }),
        part.moist && svg('rect', { x, width: percent(part.share), height: 12, fill: 'url(#split-dots)' }),
      ];
    }),
    svg('rect', { class: 'box', x: 0, y: 0, width: '100%', height: 12 }),
  );
}

/**
 * How far along a drawing a share reaches.
 * @param {number} share 0 to 1
 */
function percent(share) {
  return `${share * 100}%`;
}

/**
 * The results below the headline.
 * @param {Desk.Solved} solved
 * @param {object} how
 * @param {Desk.NoteView[]} how.notes the notes that stand here
 * @param {(act: Desk.Act) => void} [how.act]
 * @param {Desk.TypedRequirement[]} [how.requirements] as typed
 * @param {import('./requirements.js').Put | null} [how.ask] none where nothing can be changed any more
 * @param {import('../lib/dom.js').Child} [how.chart]
 */
export function results(solved, { notes, act, requirements = [], ask = null, chart = null }) {
  const groups = solved.groups.filter((group) => group.rows.length > 0);
  return [
    notes.length > 0 &&
      h(
        'section',
        { key: 'notes', class: 'sec', 'aria-labelledby': 'notes-title' },
        head('notes-title', 'Notes'),
        notes.map((note) => noteView({ ...note, id: `note-${note.code.replace(/[^a-zA-Z0-9_]+/g, '-')}`, act })),
      ),
    requirementsView(solved.requirements, requirements, ask),
    groups.slice(0, 1).map(groupView),
    chart,
    solved.curves.map(curveView),
    solved.tables.map(tableSection),
    groups.slice(1).map(groupView),
    solved.versus.length > 0 &&
      h(
        'section',
        { key: 'versus', class: 'sec', 'aria-labelledby': 'versus-title' },
        head('versus-title', 'Book constants would say'),
        solved.versus.map((versus, at) => versusView(versus, at === 0)),
      ),
  ];
}

/** @param {Desk.CurveView} curve @param {number} at */
function curveView(curve, at) {
  const id = `curve-${at}`;
  return h(
    'section',
    { key: id, class: 'sec curve', 'aria-labelledby': id },
    head(id, curve.title),
    drawing(curve.drawing, { role: 'img', 'aria-label': curve.says }),
    h(
      'details',
      null,
      h('summary', null, h('span', null, 'The same as a table'), icon('down', 'i-s')),
      tableView(curve.table, { titled: true }),
    ),
  );
}

/** @param {Desk.TableView} table @param {number} at */
function tableSection(table, at) {
  const id = `table-${at}`;
  return h(
    'section',
    { key: id, class: 'sec', 'aria-labelledby': id },
    head(id, table.title),
    tableView(table, { titled: true }),
  );
}

/**
 * What stands behind the results: what decides the ±, cautions, the air states, the working.
 * @param {Desk.Solved} solved
 */
export function beside(solved) {
  return [
    driversView(solved.drivers),
    cautionsView(solved.cautions),
    statesView(solved.states),
    workingView(solved.working),
  ];
}

/**
 * @param {string} id
 * @param {string} title
 * @param {string | null} [aside]
 */
function head(id, title, aside) {
  return h('div', { class: 'sec-head' }, h('h2', { id }, title), aside && h('p', null, aside));
}

/** @param {Desk.ResultGroup} group */
function groupView(group) {
  const id = `group-${group.title.replace(/\W+/g, '-')}`;
  if (group.folded) {
    return h(
      'details',
      { key: id, class: 'sec folded' },
      h('summary', null, h('h2', null, group.title), icon('down', 'i-s')),
      group.aside && h('p', { class: 'mute' }, group.aside),
      figures(group.rows, group.title),
    );
  }
  return h(
    'section',
    { key: id, class: 'sec', 'aria-labelledby': id },
    head(id, group.title, group.aside),
    figures(group.rows, group.title),
  );
}

/**
 * A list of figures, like an index.
 * @param {Desk.ResultRow[]} rows
 * @param {string} caption
 */
export function figures(rows, caption) {
  return h(
    'table',
    { class: 'figs' },
    h('caption', { class: 'sr' }, caption),
    h(
      'thead',
      { class: 'sr' },
      h(
        'tr',
        null,
        ['What', 'Value', 'Unit', '±'].map((title) => h('th', { scope: 'col' }, title)),
      ),
    ),
    h(
      'tbody',
      null,
      rows.map((row) =>
        h(
          'tr',
          { key: row.key, class: row.strong ? 'fig sum' : 'fig' },
          h(
            'th',
            { scope: 'row' },
            row.label,
            row.condition && h('small', null, row.condition),
            row.withheld && h('small', null, row.withheld),
          ),
          h('td', { class: 'n' }, h('b', null, row.value?.number ?? dash)),
          h('td', { class: 'u' }, row.value?.unit ?? ''),
          plusMinusCell(row),
        ),
      ),
    ),
  );
}

/**
 * A ± has the face of its result; where it is not known, that is said in words.
 * @param {Desk.ResultRow} row
 */
function plusMinusCell({ value, plus_minus: plusMinus }) {
  if (!value || !plusMinus) return h('td', { class: 'pm' });
  return h('td', { class: plusMinusClass(plusMinus) }, plusMinus.text);
}

/** An interval stands where a ± would mislead. @param {Desk.PlusMinusView} plusMinus */
function plusMinusClass({ si, interval }) {
  if (typeof si === 'number') return 'pm';
  return interval ? 'pm interval' : 'pm unknown';
}

/**
 * @param {Desk.Versus} versus
 * @param {boolean} open whether the parts of the gap stand open at first
 */
function versusView(versus, open) {
  return h(
    'div',
    { key: versus.title, class: 'versus-block' },
    h(
      'div',
      { class: 'versus' },
      h('div', null, h('h3', null, versus.title), h('p', null, versus.reason)),
      h('p', { class: 'book' }, h('del', null, versus.book.number), ' ', versus.book.unit),
    ),
    h('p', { class: 'gap-line' }, versus.gap, versus.verdict && [': ', h('strong', null, versus.verdict)]),
    versus.parts.length > 0 &&
      h(
        'details',
        { class: 'gap-parts', open },
        h('summary', null, h('span', null, 'What makes the gap'), icon('down', 'i-s')),
        gapBars(versus.parts),
      ),
  );
}

/**
 * Signed parts as bars to both sides of a middle line.
 * @param {Desk.VersusPart[]} parts
 */
function gapBars(parts) {
  const widest = Math.max(...parts.map((part) => Math.abs(part.share)), Number.MIN_VALUE);
  return h(
    'ul',
    { class: 'bars' },
    parts.map((part) =>
      h(
        'li',
        { class: 'drv' },
        h('span', null, part.label),
        svg(
          'svg',
          { width: '100%', height: 14, 'aria-hidden': 'true' },
          svg('rect', {
            class: 'd-bar',
            x: percent(0.5 + Math.min(0, part.share / widest) / 2),
            y: 2,
            width: percent(Math.abs(part.share / widest) / 2),
            height: 10,
          }),
          svg('line', { class: 'd-zero', x1: '50%', x2: '50%', y1: 0, y2: 14 }),
        ),
        h('b', null, part.text),
      ),
    ),
  );
}

/** @param {Desk.Drivers} drivers */
function driversView(drivers) {
  if (drivers.rows.length === 0 && !drivers.says) return null;
  return h(
    'section',
    { key: 'drivers', class: 'sec', 'aria-labelledby': 'drivers-title' },
    head('drivers-title', 'What decides the ±', drivers.rows.length > 0 ? drivers.aside : null),
    drivers.rows.length > 0 &&
      h(
        'ul',
        { class: 'bars' },
        drivers.rows.map((row, at) =>
          h(
            'li',
            { class: at === 0 ? 'drv first' : 'drv' },
            h('span', null, row.label),
            svg(
              'svg',
              { width: '100%', height: 14, 'aria-hidden': 'true' },
              svg('rect', { class: 'd-bar', y: 1, width: percent(row.share), height: 12 }),
              svg('rect', { class: 'd-rest', x: 0, y: 1, width: '100%', height: 12 }),
            ),
            h('b', null, row.text),
          ),
        ),
      ),
    drivers.says && h('p', { class: 'mute gap-small' }, drivers.says),
  );
}

/** @param {Desk.CautionView[]} cautions */
function cautionsView(cautions) {
  if (cautions.length === 0) return null;
  return h(
    'section',
    { key: 'cautions', class: 'sec', id: 'cautions', 'aria-labelledby': 'cautions-title' },
    head('cautions-title', 'Cautions'),
    cautions.map((caution, at) =>
      h(
        'div',
        { key: `caution ${at}`, class: 'note caution' },
        icon('odd'),
        h('div', { class: 'note-body' }, h('p', { class: 'lead' }, caution.title), h('p', null, caution.says)),
      ),
    ),
  );
}

/** @param {Desk.StateView[]} states */
function statesView(states) {
  if (states.length === 0) return null;
  return h(
    'details',
    { key: 'states', class: 'sec folded' },
    h(
      'summary',
      null,
      h('h2', null, states.length === 1 ? 'The air state in full' : 'The air states in full'),
      icon('down', 'i-s'),
    ),
    h(
      'div',
      { class: 'states' },
      states.map((state) =>
        h(
          'div',
          { class: 'state' },
          h('h3', null, state.mark && mark(state.mark), state.label),
          figures(state.rows, state.label),
        ),
      ),
    ),
  );
}

/** @param {Desk.StepView[]} steps */
function workingView(steps) {
  if (steps.length === 0) return null;
  return h(
    'details',
    { key: 'working', class: 'sec folded' },
    h('summary', null, h('h2', null, 'The working'), icon('down', 'i-s')),
    h(
      'ol',
      { class: 'working' },
      steps.map((step) =>
        h(
          'li',
          null,
          h('h3', null, step.title),
          h('p', { class: 'formula' }, step.formula),
          h('p', { class: 'formula' }, step.numbers),
          h('p', { class: 'mute' }, step.source),
        ),
      ),
    ),
  );
}
