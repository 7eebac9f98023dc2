import assert from 'node:assert/strict';
import { test } from 'node:test';
import { acted, changed, changeSign, choose, differs, typePlusMinus, typeText } from '../../ui/lib/typed.js';

const dry = { text: '26.4', unit: 'degC', plus_minus: { text: '0.3', unit: 'K' } };
const wet = { text: '17.1', unit: 'degF' };
const typed = () => ({
  choices: { 'flow.basis': 'standard' },
  readings: { 'a.dry_bulb': dry, 'a.wet_bulb': wet },
  accepted: ['flow_far'],
});

test('a swap exchanges texts with their units and ±', () => {
  const after = changed(typed(), { change: 'swap', one: 'a.dry_bulb', other: 'a.wet_bulb' });
  assert.deepEqual(after.readings, { 'a.dry_bulb': wet, 'a.wet_bulb': dry });
});

test('a swap with a field that is not read leaves the other one not read', () => {
  const after = changed(typed(), { change: 'swap', one: 'a.dry_bulb', other: 'b.dry_bulb' });
  assert.deepEqual(after.readings, { 'b.dry_bulb': dry, 'a.wet_bulb': wet });
});

test('a moved reading stands at its new key only', () => {
  const after = changed(typed(), { change: 'move', from: 'a.wet_bulb', to: 'a.dew_point' });
  assert.deepEqual(after.readings, { 'a.dry_bulb': dry, 'a.dew_point': wet });
});

test('a unit is changed without touching the digits or the ±', () => {
  const after = changed(typed(), { change: 'unit', key: 'a.dry_bulb', unit: 'degF' });
  assert.deepEqual(after.readings['a.dry_bulb'], { ...dry, unit: 'degF' });
  const blank = changed(typed(), { change: 'unit', key: 'b.dry_bulb', unit: 'degF' });
  assert.deepEqual(blank.readings['b.dry_bulb'], { text: '', unit: 'degF' });
});

test('a reading that is set keeps its ±', () => {
  const after = changed(typed(), { change: 'type', key: 'a.dry_bulb', text: '26.9', unit: 'degC' });
  assert.deepEqual(after.readings['a.dry_bulb'], { ...dry, text: '26.9' });
});

test('clear takes the reading away', () => {
  assert.deepEqual(changed(typed(), { change: 'clear', key: 'a.dry_bulb' }).readings, { 'a.wet_bulb': wet });
});

test('what is accepted is accepted once', () => {
  const twice = ['odd', 'odd'].reduce((form, code) => changed(form, { change: 'accept', code }), typed());
  assert.deepEqual(twice.accepted, ['flow_far', 'odd']);
});

test('the changes of an act are applied in order, and what was there before is left as it was', () => {
  const before = typed();
  const after = acted(before, {
    label: 'Take this stream away',
    changes: [
      { change: 'clear', key: 'a.wet_bulb' },
      { change: 'choose', key: 'streams', value: '2' },
    ],
  });
  assert.deepEqual(after.readings, { 'a.dry_bulb': dry });
  assert.deepEqual(after.choices, { 'flow.basis': 'standard', streams: '2' });
  assert.deepEqual(before, typed());
});

test('a form that is still empty takes every change', () => {
  for (const change of [
    { change: 'swap', one: 'a', other: 'b' },
    { change: 'move', from: 'a', to: 'b' },
    { change: 'clear', key: 'a' },
  ]) {
    assert.deepEqual(changed({}, change).readings, {});
  }
  assert.deepEqual(changed({}, { change: 'accept', code: 'x' }).accepted, ['x']);
  assert.deepEqual(choose({}, 'k', 'v').choices, { k: 'v' });
});

test('typing holds the unit that stands beside the field, and what was said to be right about the old text is gone', () => {
  const first = typeText({}, 'flow.volume', '5000', 'cfm');
  assert.deepEqual(first.readings['flow.volume'], { text: '5000', unit: 'cfm' });
  const later = typeText({ ...first, accepted: ['far', 'other'] }, 'flow.volume', '500', 'L_s', ['far']);
  assert.deepEqual(later.readings['flow.volume'], { text: '500', unit: 'cfm' });
  assert.deepEqual(later.accepted, ['other']);
});

test('a blank ± is not known', () => {
  assert.deepEqual(typePlusMinus(typed(), 'a.dry_bulb', '0.5', 'K').readings['a.dry_bulb'].plus_minus, {
    text: '0.5',
    unit: 'K',
  });
  assert.equal(typePlusMinus(typed(), 'a.dry_bulb', ' ', 'K').readings['a.dry_bulb'].plus_minus, null);
});

test('the sign key changes the sign of the text', () => {
  for (const [before, after] of [
    ['4.5', '−4.5'],
    ['−4.5', '4.5'],
    ['-4.5', '4.5'],
    ['4.5-', '4.5'],
    ['+4.5', '−4.5'],
    ['', '−'],
    ['−', ''],
    [' 12 °F', '−12 °F'],
  ]) {
    assert.equal(changeSign(before), after);
  }
});

test('a form differs when something was typed, not by the order of its keys', () => {
  assert.equal(differs({ choices: { a: '1', b: '2' } }, { choices: { b: '2', a: '1' }, readings: {} }), false);
  assert.equal(differs(typed(), { ...typed(), accepted: [] }), true);
  assert.equal(differs(typeText({}, 'a', '1', 'm'), {}), true);
});
