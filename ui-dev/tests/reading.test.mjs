import assert from 'node:assert/strict';
import { test } from 'node:test';
import { asked, said, take, takeText, unasked, withoutTake } from '../../ui/lib/reading.js';

const key = 'leaving.wet_bulb';
const read = () => ({ choices: { a: 'b' }, readings: { [key]: { text: '11.4', unit: 'degF', plus_minus: null } } });

test('what is said of a reading keeps its text and the unit that it was typed beside', () => {
  const after = said(read(), key, { probe: 'i1/2' }, 'degC');
  assert.deepEqual(after.readings[key], { text: '11.4', unit: 'degF', plus_minus: null, probe: 'i1/2' });
  assert.deepEqual(after.choices, { a: 'b' });
});

test('what is said of a blank reading holds the unit that stands beside it', () => {
  assert.deepEqual(said({}, key, { spot: { held: 'point' } }, 'degC').readings[key], {
    text: '',
    unit: 'degC',
    spot: { held: 'point' },
  });
});

test('no probe at all is said, not left out: blank and unsaid differ', () => {
  assert.equal(said(read(), key, { probe: '' }, 'degC').readings[key].probe, '');
  assert.equal('probe' in said(read(), key, { takes: [] }, 'degC').readings[key], false);
});

test('takes are kept in the order they were made, each with its time', () => {
  const before = read();
  const one = take(before, key, '11.4', 'degC', '2026-12-01T14:05:00Z');
  const two = take(one, key, '11,5', 'degC', '2026-12-01T14:05:20Z');
  assert.deepEqual(two.readings[key].takes, [
    { text: '11.4', at: '2026-12-01T14:05:00Z' },
    { text: '11,5', at: '2026-12-01T14:05:20Z' },
  ]);
  assert.deepEqual(before, read(), 'what was there before is left as it was');
  assert.equal(two.readings[key].unit, 'degF', 'a take is in the unit of its reading');
});

test('a take is removed by its place, even where two are alike', () => {
  let typed = read();
  for (const at of ['t1', 't2', 't3']) typed = take(typed, key, '11.4', 'degC', at);
  assert.deepEqual(
    withoutTake(typed, key, 1, 'degC').readings[key].takes.map((one) => one.at),
    ['t1', 't3'],
  );
});

test('a take shows the unit beside it once', () => {
  assert.equal(takeText('11.4', '°C'), '11.4\u00a0°C');
  assert.equal(takeText('−1,5', '°C'), '−1,5\u00a0°C');
  assert.equal(takeText('52 F', '°C'), '52 F');
  assert.equal(takeText('5 %', 'K'), '5 %');
});

test('a requirement is added, put in the place of another, and taken off', () => {
  const one = { figure: 'total', direction: 'at_least', value: { text: '48' } };
  const two = { ...one, direction: 'at_most' };
  const three = { ...one, value: { text: '50' } };
  const both = asked(asked({}, one, null), two, null);
  assert.deepEqual(both.requirements, [one, two]);
  assert.deepEqual(asked(both, three, 0).requirements, [three, two]);
  assert.deepEqual(unasked(both, 0).requirements, [two]);
  assert.deepEqual(both.requirements, [one, two], 'what was there before is left as it was');
});
