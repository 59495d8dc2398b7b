import assert from 'node:assert/strict';
import { test } from 'node:test';
import { nearestRun, neighbourRun } from '../../../web/plots/nearest-run.js';

const frequencyHz = Float64Array.of(1, 10, 100, 1000);
const panel = { x: (f) => 100 * Math.log10(f), y: (v) => 100 - v, left: 0, right: 300, top: 0, bottom: 200 };
const frequencyAt = (x) => 10 ** (x / 100);
const curve = (runId, values) => ({ runId, values: Float64Array.from(values) });
const find = (curves, x, y, reach = 8) => nearestRun(curves, frequencyHz, panel, frequencyAt, { x, y }, reach);

const curves = [curve('flat', [0, 0, 0, 0]), curve('falling', [0, 0, -50, -100]), curve('gap', [20, NaN, NaN, 20])];

test('the nearest line is found between its points', () => {
  assert.equal(find(curves, 150, 99).curve.runId, 'flat');
  assert.equal(find(curves, 150, 124).curve.runId, 'falling');
});

test('the distance is to the line, not to its points', () => {
  const found = find(curves, 250, 172);
  assert.equal(found.curve.runId, 'falling');
  assert.ok(Math.abs(found.distance - 3 * Math.cos(Math.atan(0.5))) < 1e-9);
});

test('out of reach there is none', () => {
  assert.equal(find(curves, 150, 60), null);
  assert.equal(find([], 150, 100), null);
});

test('no line runs over an absent value, but its lone points are found', () => {
  assert.equal(find(curves, 150, 80), null);
  assert.equal(find(curves, 298, 81).curve.runId, 'gap');
  assert.equal(find(curves, 2, 79).curve.runId, 'gap');
});

test('zoomed in between two points of the grid the line is still found', () => {
  const close = { ...panel, x: (f) => 10_000 * (Math.log10(f) - 1.5) };
  assert.equal(nearestRun(curves, frequencyHz, close, (x) => 10 ** (1.5 + x / 10_000), { x: 50, y: 125 }, 8).curve.runId, 'falling');
});

test('a steep line is reached from the side', () => assert.equal(find([curve('cliff', [0, 0, 2000, 0])], 110, 40).curve.runId, 'cliff'));

test('keys walk through the curves by their values at the cursor', () => {
  const at = (values) => values[2];
  const walked = [curve('a', [0, 0, 5, 0]), curve('b', [0, 0, -5, 0]), curve('c', [0, 0, NaN, 0]), curve('d', [0, 0, 1, 0])];
  assert.equal(neighbourRun(walked, at, null, 1).runId, 'b');
  assert.equal(neighbourRun(walked, at, 'b', 1).runId, 'd');
  assert.equal(neighbourRun(walked, at, 'd', 1).runId, 'a');
  assert.equal(neighbourRun(walked, at, 'a', 1), null);
  assert.equal(neighbourRun(walked, at, null, -1).runId, 'a');
  assert.equal(neighbourRun(walked, at, 'a', -1).runId, 'd');
});

test('curves of equal value are walked through one by one', () => {
  const same = [curve('a', [0, 0, 1, 0]), curve('b', [0, 0, 1, 0]), curve('c', [0, 0, 1, 0])];
  const at = (values) => values[2];
  assert.deepEqual(['a', 'b'].map((from) => neighbourRun(same, at, from, 1).runId), ['b', 'c']);
});
