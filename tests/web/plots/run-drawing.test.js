import assert from 'node:assert/strict';
import { test } from 'node:test';
import { curvesOf, drawPercentiles, drawRuns, finish } from '../../../web/plots/run-drawing.js';

const level = (count, y) => Array.from({ length: count }, () => ({ values: Float64Array.of(y, y) }));
const request = (groups, more = {}) => ({
  placing: { x: Float64Array.of(0, 6), yZero: 0, yPerUnit: 1 },
  width: 6,
  height: 4,
  groups: Uint8Array.from(groups),
  colours: [[0, 0, 200], [200, 0, 0]],
  ...more,
});
const pixel = (pixels, column, row) => [...pixels.subarray((row * 6 + column) * 4, (row * 6 + column) * 4 + 4)];

test('each group has its colour, and what is left out is not drawn', () => {
  const curves = curvesOf([...level(1, 0.5), ...level(1, 1.5), ...level(1, 2.5)], 2);
  const pixels = finish(drawRuns(curves, request([0, 1, 255])));
  assert.deepEqual(pixel(pixels, 2, 0).slice(0, 3), [0, 0, 200]);
  assert.deepEqual(pixel(pixels, 2, 1).slice(0, 3), [200, 0, 0]);
  assert.deepEqual(pixel(pixels, 2, 2), [0, 0, 0, 0]);
});

test('a pause comes after each hundred runs', () => {
  const steps = drawRuns(curvesOf(level(350, 1.5), 2), request(new Array(350).fill(0)));
  let pauses = 0;
  while (!steps.next().done) pauses++;
  assert.equal(pauses, 3 + 2);
});

test('what is absent stays absent in the kept curves', () => {
  const { values, count, points } = curvesOf([{ values: Float64Array.of(1, NaN) }, { values: Float64Array.of(3, 4) }], 2);
  assert.deepEqual([count, points, ...values], [2, 2, 1, NaN, 3, 4]);
});

test('percentile curves are taken over the runs at each frequency', () => {
  const runs = Array.from({ length: 101 }, (_, i) => ({ values: Float64Array.from({ length: 120 }, (_, k) => i + k) }));
  const [low, median] = finish(drawPercentiles(curvesOf(runs, 120), [0, 50]));
  assert.equal(low.length, 120);
  for (const k of [0, 49, 50, 119]) {
    assert.equal(low[k], k);
    assert.equal(median[k], 50 + k);
  }
});
