// A note: what, why, and what one tap could do about it. Its edge and its icon tell the kind, not its colour.

import { h } from '../lib/dom.js';
import { icon } from '../lib/icons.js';
import { link } from '../lib/screen.js';

/**
 * @typedef {object} Note
 * @property {string} id
 * @property {Desk.Tone} tone
 * @property {string} lead
 * @property {string | null} [reason]
 * @property {Desk.Act[]} [acts]
 * @property {boolean} [accepted]
 * @property {(act: Desk.Act) => void} [act] without it the acts are left out
 */

/** @param {Note} note */
export function noteView({ id, tone, lead, reason, acts = [], accepted = false, act }) {
  // A sentence that says what is wrong leads; what mends it follows in plain type.
  const [, first = lead, rest = ''] = reason ? [] : (/^(.+?[.!?])\s+(\p{Lu}.*)$/su.exec(lead) ?? []);
  const heavy = tone === 'impossible' || (tone === 'unusual' && !accepted);
  const kind = tone === 'impossible' ? 'wrong' : heavy ? 'unusual' : 'plain';
  const name = tone === 'impossible' ? 'wrong' : heavy ? 'odd' : accepted ? 'tick' : 'pencil';
  return h(
    'div',
    { key: id, id, class: `note ${kind}` },
    icon(name),
    h(
      'div',
      { class: 'note-body' },
      h('p', { class: 'lead' }, tone === 'impossible' && h('span', { class: 'sr' }, 'Error: '), first),
      rest && h('p', null, rest),
      reason && h('p', null, reason),
      accepted && h('p', { class: 'mute' }, 'You said that it is right.'),
      act &&
        !accepted &&
        acts.length > 0 &&
        h(
          'div',
          { class: 'acts' },
          acts.map((one) => link(one.label, () => act(one), one.changes[0]?.change === 'swap' ? 'swap' : undefined)),
        ),
    ),
  );
}
