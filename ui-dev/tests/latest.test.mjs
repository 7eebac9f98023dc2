import assert from 'node:assert/strict';
import { test } from 'node:test';
import { setImmediate as turn } from 'node:timers/promises';
import { Latest } from '../../ui/lib/latest.js';

/** Work that ends when the test says so. */
function held() {
  const begun = [];
  const work = (asked) =>
    new Promise((resolve, reject) => {
      begun.push({
        asked,
        answer: () => resolve(`answer to ${asked}`),
        fail: () => reject(new Error(`no answer to ${asked}`)),
      });
    });
  return { begun, work };
}

test('one is under way, and of those that wait only the newest is asked', async () => {
  const { begun, work } = held();
  const answers = [];
  const latest = new Latest(work, (answer) => answers.push(answer), assert.fail);
  for (const asked of ['2', '26', '26.', '26.4']) latest.ask(asked);
  assert.deepEqual(
    begun.map((one) => one.asked),
    ['2'],
  );
  begun[0].answer();
  await turn();
  assert.deepEqual(
    begun.map((one) => one.asked),
    ['2', '26.4'],
  );
  assert.deepEqual(answers, [], 'the answer to what was overtaken is not shown');
  begun[1].answer();
  await turn();
  assert.deepEqual(answers, ['answer to 26.4']);
});

test('after an answer the next one is asked at once', async () => {
  const { begun, work } = held();
  const answers = [];
  const latest = new Latest(work, (answer) => answers.push(answer), assert.fail);
  latest.ask('1');
  begun[0].answer();
  await turn();
  latest.ask('2');
  begun[1].answer();
  await turn();
  assert.deepEqual(answers, ['answer to 1', 'answer to 2']);
});

test('a failure is told and does not stop what follows', async () => {
  const { begun, work } = held();
  const answers = [];
  const failures = [];
  const latest = new Latest(
    work,
    (answer) => answers.push(answer),
    (error) => failures.push(error.message),
  );
  latest.ask('1');
  begun[0].fail();
  await turn();
  latest.ask('2');
  begun[1].answer();
  await turn();
  assert.deepEqual([failures, answers], [['no answer to 1'], ['answer to 2']]);
});

test('after the end nothing is told any more', async () => {
  const { begun, work } = held();
  const latest = new Latest(work, assert.fail, assert.fail);
  latest.ask('1');
  latest.ask('2');
  latest.stop();
  begun[0].answer();
  await turn();
  assert.equal(begun.length, 1);
});
