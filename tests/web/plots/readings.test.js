import assert from 'node:assert/strict';
import { test } from 'node:test';
import { goldenReadings, limitReadings, runReadings, spreadAt } from '../../../web/plots/readings.js';
import { traceSetOf } from '../../../web/plots/trace-set.js';

const gain = traceSetOf({
  quantity: 'gain',
  frequencyHz: [10, 100, 1000],
  runs: [
    { runId: 'a', serial: 'S1', outcome: 'pass', values: [0, -1, -20] },
    { runId: 'b', serial: 'S2', outcome: 'fail', values: [0.5, 3, -20] },
    { runId: 'c', serial: 'S3', outcome: null, values: [0, null, -22] },
  ],
  golden: { runId: 'g', serial: 'G', values: [0, -0.5, -20.5] },
  limits: [
    { name: 'Top', side: 'upper', frequencyHz: [10, 200], values: [1, 1] },
    { name: 'Floor', side: 'lower', frequencyHz: [10, 100], values: [-3, -3] },
  ],
});
const phase = traceSetOf({ quantity: 'phase', frequencyHz: [10, 1000], runs: [{ runId: 'a', serial: 'S1', outcome: 'pass', values: [-5, -85] }] });

test('each run is read in every panel that has it, with the margin there', () => {
  const [a, b] = runReadings([gain, phase], 100, ['a', 'b']);
  assert.deepEqual(a.readings[0], { value: -1, margin: { margin: 2, limit: 'Top' } });
  assert.ok(Math.abs(a.readings[1].value + 45) < 1e-12);
  assert.equal(a.readings[1].margin, null);
  assert.deepEqual(b.readings, [{ value: 3, margin: { margin: -2, limit: 'Top' } }, null]);
});

test('the runs come in the order asked for, and an unknown one is left out', () => {
  assert.deepEqual(runReadings([gain], 100, ['b', 'gone', 'a']).map((r) => r.serial), ['S2', 'S1']);
});

test('an absent value reads as absent, with no margin', () => {
  const [c] = runReadings([gain], 100, ['c']);
  assert.ok(Number.isNaN(c.readings[0].value));
  assert.equal(c.readings[0].margin, null);
});

test('the golden run is read where there is one', () => {
  const [reading, none] = goldenReadings([gain, phase], 10);
  assert.equal(reading.value, 0);
  assert.equal(none, null);
});

test('only limits that stand at the frequency are named', () => {
  assert.deepEqual(limitReadings(gain, 50).map((l) => l.name), ['Top', 'Floor']);
  assert.deepEqual(limitReadings(gain, 150).map((l) => l.name), ['Top']);
  assert.deepEqual(limitReadings(gain, 500), []);
});

test('the spread names the run with the least margin and counts the absent ones', () => {
  assert.deepEqual(spreadAt(gain, 100), { count: 2, absent: 1, least: -1, greatest: 3, worst: { serial: 'S2', margin: -2, limit: 'Top' } });
});

test('outside the sweep nothing is read', () => {
  const spread = spreadAt(gain, 5);
  assert.equal(spread.count, 0);
  assert.ok(Number.isNaN(spread.least));
});
