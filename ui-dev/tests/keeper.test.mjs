import assert from 'node:assert/strict';
import { test } from 'node:test';
import { setImmediate as turn } from 'node:timers/promises';
import { Keeper, quietMs } from '../../ui/lib/keeper.js';

/** A clock that moves when the test says so. */
class FakeClock {
  now = 0;
  timers = new Map();
  next = 1;
  setTimeout(work, ms) {
    this.timers.set(this.next, { at: this.now + ms, work });
    return this.next++;
  }
  clearTimeout(timer) {
    this.timers.delete(timer);
  }
  async pass(ms) {
    this.now += ms;
    for (const [id, { at, work }] of [...this.timers]) {
      if (at > this.now) continue;
      this.timers.delete(id);
      work();
    }
    await turn();
  }
}

test('a draft is kept after 300 ms of quiet, not before', async () => {
  const clock = new FakeClock();
  const saved = [];
  const keeper = new Keeper(async (value) => saved.push(value), clock);
  keeper.touch('2');
  await clock.pass(299);
  keeper.touch('26');
  await clock.pass(299);
  assert.deepEqual(saved, []);
  await clock.pass(1);
  assert.deepEqual(saved, ['26']);
  await clock.pass(10_000);
  assert.deepEqual(saved, ['26'], 'the same text is kept once');
});

test('leaving keeps at once what is not kept yet', async () => {
  const clock = new FakeClock();
  const saved = [];
  const keeper = new Keeper(async (value) => saved.push(value), clock);
  keeper.touch('26.4');
  await keeper.flush();
  assert.deepEqual(saved, ['26.4']);
  await keeper.flush();
  await clock.pass(quietMs);
  assert.deepEqual(saved, ['26.4']);
});

test('a second save waits for the first, which gives the draft its identity', async () => {
  const clock = new FakeClock();
  const begun = [];
  const keeper = new Keeper((value) => new Promise((resolve) => begun.push({ value, resolve })), clock);
  keeper.touch('1');
  await clock.pass(quietMs);
  keeper.touch('2');
  await clock.pass(quietMs);
  assert.deepEqual(
    begun.map((one) => one.value),
    ['1'],
  );
  begun[0].resolve();
  await turn();
  assert.deepEqual(
    begun.map((one) => one.value),
    ['1', '2'],
  );
});

test('after the end nothing is kept, and the end waits for what had begun', async () => {
  const clock = new FakeClock();
  const begun = [];
  const keeper = new Keeper((value) => new Promise((resolve) => begun.push({ value, resolve })), clock);
  keeper.touch('1');
  await clock.pass(quietMs);
  keeper.touch('2');
  let ended = false;
  const end = keeper.stop().then(() => {
    ended = true;
  });
  await turn();
  assert.equal(ended, false);
  begun[0].resolve();
  await end;
  keeper.touch('3');
  await clock.pass(quietMs);
  await keeper.flush();
  assert.deepEqual(
    begun.map((one) => one.value),
    ['1'],
  );
});
