// A table that is a result in itself, or the equal of a drawing.

import { h } from '../lib/dom.js';

/**
 * @param {Desk.TableView} table
 * @param {{ titled?: boolean }} [how] whether the title stands above it already
 */
export function tableView(table, { titled = false } = {}) {
  /** @param {number} column */
  const isNumber = (column) => table.rows.length > 0 && table.rows.every((row) => row[column]?.number);
  return h(
    'div',
    { class: 'table-frame' },
    h(
      'table',
      { class: 'tbl' },
      h('caption', { class: titled ? 'sr' : null }, table.title),
      h(
        'thead',
        null,
        h(
          'tr',
          null,
          table.columns.map((name, column) => h('th', { scope: 'col', class: isNumber(column) ? 'r' : null }, name)),
        ),
      ),
      h(
        'tbody',
        null,
        table.rows.map((row) =>
          h(
            'tr',
            null,
            row.map((cell, column) =>
              column === 0 && !cell.number
                ? h('th', { scope: 'row', 'data-h': table.columns[column] }, cell.text)
                : h('td', { class: cell.number ? 'r' : null, 'data-h': table.columns[column] }, cell.text),
            ),
          ),
        ),
      ),
    ),
  );
}
