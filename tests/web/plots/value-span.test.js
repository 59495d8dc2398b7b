import assert from 'node:assert/strict';
import { test } from 'node:test';
import { traceSetOf } from '../../../web/plots/trace-set.js';
import { spanOf } from '../../../web/plots/value-span.js';

const set = (more = {}) => traceSetOf({
  quantity: 'gain',
  frequencyHz: [10, 100, 1000],
  runs: [{ runId: 'a', serial: 'S1', values: [0, null, -40] }],
  ...more,
});
const limit = (value, side = 'upper') => ({ name: 'L', side, frequencyHz: [10, 1000], values: [value, value] });

test('every value is inside with a little room', () => {
  const { min, max } = spanOf(set());
  assert.ok(min < -40 && min > -45 && max > 0 && max < 5);
});

test('the golden run counts', () => assert.ok(spanOf(set({ golden: { runId: 'g', serial: 'G', values: [10, 0, 0] } })).max > 10));

test('a limit near the curves is shown', () => assert.ok(spanOf(set({ limits: [limit(15)] })).max > 15));

test('a limit far from the curves does not press them flat', () => assert.ok(spanOf(set({ limits: [limit(500), limit(-900, 'lower')] })).max < 5));

test('a curve without any change still gets a span', () => {
  const { min, max } = spanOf(set({ runs: [{ runId: 'a', serial: 'S1', values: [3, 3, 3] }] }));
  assert.ok(min < 3 && max > 3);
});

test('without any curve the limits make the span, and without those there is one all the same', () => {
  const limited = spanOf(set({ runs: [], limits: [limit(7), limit(5, 'lower')] }));
  assert.ok(limited.min < 5 && limited.max > 7);
  const bare = spanOf(set({ runs: [] }));
  assert.ok(bare.min < bare.max);
});

test('only the frequencies in view count', () => assert.ok(spanOf(set(), { min: 5, max: 50 }).min > -1));

test('infinite values do not count', () => {
  const { min, max } = spanOf(set({ runs: [{ runId: 'a', serial: 'S1', values: [0, -Infinity, -10] }] }));
  assert.ok(min > -11.5 && max < 1.5);
});
