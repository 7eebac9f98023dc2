// Rows of lists: entries, sites, equipment, visits, checks.

import { h, svg } from '../lib/dom.js';
import { icon } from '../lib/icons.js';
import { address } from '../lib/route.js';
import { inventedMark } from '../lib/screen.js';

/**
 * A row that leads to another screen.
 * @param {{ key?: string, href: string, title: import('../lib/dom.js').Child, says?: import('../lib/dom.js').Child, invented?: boolean, hang?: import('../lib/dom.js').Child }} row
 */
export function linkRow({ key, href, title, says, invented = false, hang }) {
  return h(
    'a',
    { class: 'row', href, key },
    hang && h('span', { class: 'hang' }, hang),
    h(
      'span',
      null,
      h('span', { class: 't' }, title),
      (says || invented) && h('span', { class: 's' }, invented && [inventedMark(), ' '], says),
    ),
    icon('right', 'i-s'),
  );
}

/** @param {Desk.EntryRow} entry */
export function entryRow(entry) {
  return h(
    'a',
    { class: entry.withdrawn ? 'row withdrawn' : 'row', href: address(['entry', entry.entry]), key: entry.entry },
    h(
      'span',
      null,
      h('span', { class: 't' }, entry.label),
      h(
        'span',
        { class: 's' },
        entry.invented && [inventedMark(), ' '],
        entry.withdrawn && [h('b', null, 'Withdrawn.'), ' '],
        entry.says,
      ),
      h('span', { class: 'figure' }, entry.figure),
    ),
    icon('right', 'i-s'),
  );
}

/** @param {Desk.SiteRow} site */
export function siteRow(site) {
  return linkRow({
    key: site.site,
    href: address(['site', site.site]),
    title: site.name,
    says: site.says,
    invented: site.invented,
  });
}

/** @param {Desk.EquipmentRow} one */
export function equipmentRow(one) {
  return linkRow({ key: one.equipment, href: address(['equipment', one.equipment]), title: one.tag, says: one.says });
}

/** A visit hangs on the margin rule; filled is now. @param {Desk.VisitRow} visit */
export function visitRow(visit) {
  return h(
    'a',
    { class: 'visit', href: address(['visit', visit.visit]), key: visit.visit },
    svg(
      'svg',
      { class: visit.open ? 'knot now' : 'knot', viewBox: '0 0 12 12', 'aria-hidden': 'true' },
      svg('circle', { cx: 6, cy: 6, r: 4.5 }),
    ),
    h('span', null, h('span', { class: 'when' }, visit.when), visit.says && h('span', { class: 's' }, visit.says)),
    h('span', { class: 'count' }, visit.count),
  );
}

/**
 * A section of a list.
 * @param {string} title
 * @param {import('../lib/dom.js').Child} content
 * @param {string | null} [aside]
 */
export function listSection(title, content, aside) {
  const id = `list-${title.replace(/\W+/g, '-')}`;
  return h(
    'section',
    { class: 'sec', 'aria-labelledby': id, key: id },
    h('div', { class: 'sec-head' }, h('h2', { id }, title), aside && h('p', null, aside)),
    content,
  );
}

/**
 * A link in the text, with an icon.
 * @param {string} label
 * @param {string} href
 * @param {import('../lib/icons.js').IconName} [name]
 */
export function textLink(label, href, name) {
  return h('a', { class: 'link', href }, name && icon(name, 'i-s'), h('span', null, label));
}
