import assert from 'node:assert/strict';
import test from 'node:test';
import { SendQueue, waitMs } from '../../../web/pages/send-queue.js';

/** A queue whose work ends when the test says so, and whose time the test moves. */
function scene({ atOnce = 2, mostTries = 3 } = {}) {
  const begun = [];
  const timers = [];
  const queue = new SendQueue({
    atOnce, mostTries, changed: () => {},
    work: (item) => new Promise((resolve) => { begun.push({ item, end: async (came) => { resolve(came); await settled(); } }); }),
    timers: { set: (act, ms) => timers.push({ act, ms }), clear: (timer) => { timers[timer - 1].act = () => {}; } },
  });
  const end = (item, kind = 'done', sentence = '') => begun.findLast((one) => one.item === item).end({ kind, sentence });
  return { queue, begun, timers, end, items: () => begun.map(({ item }) => item) };
}

const settled = () => new Promise((resolve) => { setImmediate(resolve); });

test('So many are under way at once, in their order', async () => {
  const { queue, items, end } = scene();
  queue.add([1, 2, 3, 4]);
  assert.deepEqual([items(), queue.state, queue.length], [[1, 2], 'running', 4]);
  await end(1);
  assert.deepEqual(items(), [1, 2, 3]);
  await end(2);
  await end(3);
  await end(4);
  assert.deepEqual([items(), queue.state], [[1, 2, 3, 4], 'idle']);
});

test('What got no answer is tried again first, and the whole queue waits with it', async () => {
  const { queue, items, timers, end } = scene();
  queue.add([1, 2, 3]);
  await end(1, 'again', 'Gone.');
  await end(2, 'again', 'Gone.');
  assert.deepEqual([queue.state, queue.sentence, queue.nextTryMs, timers.length, items()], ['waiting', 'Gone.', 1_000, 1, [1, 2]]);
  timers[0].act();
  assert.deepEqual(items().slice(2).sort(), [1, 2]);
  await end(1);
  await end(2);
  await end(3);
  assert.equal(queue.state, 'idle');
});

test('Waits grow and end at half a minute, and an answer sets them back', async () => {
  assert.deepEqual([1, 2, 3, 6, 20].map(waitMs), [1_000, 2_000, 4_000, 30_000, 30_000]);
  const { queue, timers, end } = scene({ atOnce: 1 });
  queue.add([1, 2]);
  await end(1, 'again');
  timers[0].act();
  await end(1, 'again');
  assert.equal(queue.nextTryMs, 2_000);
  timers[1].act();
  await end(1);
  await end(2, 'again');
  assert.equal(queue.nextTryMs, 1_000);
});

test('After some failures in a row it stands still until it is resumed', async () => {
  const { queue, items, timers, end } = scene({ atOnce: 1, mostTries: 2 });
  queue.add([1]);
  await end(1, 'again', 'Gone.');
  timers[0].act();
  await end(1, 'again', 'Gone.');
  assert.deepEqual([queue.state, queue.sentence, queue.length], ['still', 'Gone.', 1]);
  queue.resume();
  assert.deepEqual([queue.state, items()], ['running', [1, 1, 1]]);
  await end(1);
  assert.equal(queue.state, 'idle');
});

test('A stop holds everything at once and loses nothing', async () => {
  const { queue, items, end } = scene({ atOnce: 1 });
  queue.add([1, 2]);
  await end(1, 'stop', 'You are not signed in.');
  assert.deepEqual([queue.state, queue.sentence, queue.length, items()], ['still', 'You are not signed in.', 2, [1]]);
  queue.resume();
  assert.deepEqual(items(), [1, 1]);
});

test('What has not begun can be taken out again', async () => {
  const { queue, items, end } = scene({ atOnce: 1 });
  queue.add([1, 2, 3]);
  assert.deepEqual(queue.drop((item) => item === 3), [3]);
  await end(1);
  await end(2);
  assert.deepEqual([items(), queue.state], [[1, 2], 'idle']);
});
