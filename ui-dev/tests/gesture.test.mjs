// Fingers on a drawing.

import assert from 'node:assert/strict';
import { test } from 'node:test';
import { Fingers } from '../../ui/lib/gesture.js';

/** @param {number} x @param {number} y */
const at = (x, y) => ({ x, y });

test('a finger that hardly moves is a tap, two in a moment are two taps', () => {
  const fingers = new Fingers();
  fingers.down(1, at(100, 100));
  assert.equal(fingers.move(1, at(103, 102)), null);
  assert.equal(fingers.up(1, at(103, 102), 1000), 'tap');
  fingers.down(1, at(104, 100));
  assert.equal(fingers.up(1, at(104, 100), 1200), 'twice');
  // A third tap begins anew, as does a late or a distant one.
  fingers.down(1, at(104, 100));
  assert.equal(fingers.up(1, at(104, 100), 1300), 'tap');
  fingers.down(1, at(104, 100));
  assert.equal(fingers.up(1, at(104, 100), 2000), 'tap');
  fingers.down(1, at(200, 100));
  assert.equal(fingers.up(1, at(200, 100), 2100), 'tap');
});

test('one finger drags from where it came down', () => {
  const fingers = new Fingers();
  fingers.down(1, at(100, 100));
  assert.deepEqual(fingers.move(1, at(130, 90)), { dx: 30, dy: -10, zoom: 1, about: at(100, 100) });
  assert.deepEqual(fingers.move(1, at(101, 100)), { dx: 1, dy: 0, zoom: 1, about: at(100, 100) });
  assert.equal(fingers.up(1, at(101, 100), 1000), null);
  assert.equal(fingers.moving, false);
});

test('two fingers pinch about their middle', () => {
  const fingers = new Fingers();
  fingers.down(1, at(100, 100));
  fingers.down(2, at(200, 100));
  fingers.move(1, at(50, 100));
  assert.deepEqual(fingers.move(2, at(250, 100)), { dx: 0, dy: 0, zoom: 2, about: at(150, 100) });
  // The finger that stays goes on as a drag, and is no tap.
  assert.equal(fingers.up(1, at(50, 100), 1000), null);
  assert.deepEqual(fingers.move(2, at(260, 100)), { dx: 10, dy: 0, zoom: 1, about: at(250, 100) });
  assert.equal(fingers.up(2, at(260, 100), 1100), null);
  fingers.down(1, at(10, 10));
  assert.equal(fingers.up(1, at(10, 10), 1200), 'tap');
});

test('a finger that the system takes to scroll does nothing more', () => {
  const fingers = new Fingers();
  fingers.down(1, at(100, 100));
  fingers.lost(1);
  assert.equal(fingers.move(1, at(100, 200)), null);
  assert.equal(fingers.up(1, at(100, 200), 1000), null);
});
