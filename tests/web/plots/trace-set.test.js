import assert from 'node:assert/strict';
import { test } from 'node:test';
import { overlayOfTraces, traceSetOf } from '../../../web/plots/trace-set.js';

const overlay = () => ({
  quantity: 'gain',
  basis: 'asMeasured',
  unit: 'dB re 1 V/Pa',
  frequencyHz: [10, 100, 1000],
  runs: [{ runId: 'a', serial: 'S1', outcome: 'pass', values: [0, null, -3] }, { runId: 'b', serial: 'S2', outcome: null, values: [0, -1, -2] }],
  golden: { runId: 'g', serial: 'G', values: [0, -1, -3] },
  limits: [{ name: 'Top', side: 'upper', frequencyHz: [10, 1000], values: [1, 2] }],
});

test('an absent value of an answer is NaN in the plot, never zero', () => {
  const set = traceSetOf(overlay());
  assert.ok(Number.isNaN(set.runs[0].values[1]));
  assert.deepEqual([set.runs[0].values[0], set.runs[0].values[2]], [0, -3]);
});

test('an overlay keeps its unit, golden run, outcomes and limits', () => {
  const set = traceSetOf(overlay());
  assert.equal(set.unit, 'dB re 1 V/Pa');
  assert.equal(set.golden.serial, 'G');
  assert.deepEqual(set.runs.map((run) => run.outcome), ['pass', null]);
  assert.deepEqual([...set.limits[0].values], [1, 2]);
});

test('curves stay the same object while only the limits change', () => {
  const first = overlay();
  const second = { ...first, limits: [] };
  assert.equal(traceSetOf(first).runs, traceSetOf(second).runs);
  assert.equal(traceSetOf(first).frequencyHz, traceSetOf(second).frequencyHz);
  assert.notEqual(traceSetOf(first).runs, traceSetOf(overlay()).runs);
});

test('a limit may be given by its corners', () => {
  const set = traceSetOf({ ...overlay(), limits: [{ name: 'L', side: 'lower', corners: [{ frequencyHz: 20, value: -1 }, { frequencyHz: 50, value: -2 }] }] });
  assert.deepEqual([...set.limits[0].frequencyHz, ...set.limits[0].values], [20, 50, -1, -2]);
  assert.equal(set.limits[0].side, 'lower');
});

test('traces of different grids are laid on their union and not beyond their spans', () => {
  const laid = overlayOfTraces([
    { runId: 'a', serial: 'S1', trace: { frequencyHz: [10, 1000], gainDb: [0, -20] } },
    { runId: 'b', serial: 'S2', trace: { frequencyHz: [100, 10_000], gainDb: [5, 5] } },
  ], 'gain');
  assert.deepEqual([...laid.frequencyHz], [10, 100, 1000, 10_000]);
  assert.ok(Math.abs(laid.runs[0].values[1] + 10) < 1e-12);
  assert.deepEqual([...laid.runs[1].values], [NaN, 5, 5, 5]);
});

test('a run without phase is left out of a phase plot, and its grid too', () => {
  const laid = overlayOfTraces([
    { runId: 'a', serial: 'S1', trace: { frequencyHz: [10, 1000], gainDb: [0, -20], phaseDeg: null } },
    { runId: 'b', serial: 'S2', trace: { frequencyHz: [100, 200], gainDb: [5, 5], phaseDeg: [-10, -20] } },
  ], 'phase');
  assert.deepEqual(laid.runs.map((run) => run.serial), ['S2']);
  assert.deepEqual([...laid.frequencyHz], [100, 200]);
  assert.equal(traceSetOf(laid).unit, 'deg');
});

test('phases that begin a turn apart are laid beside each other', () => {
  const trace = (phaseDeg, frequencyHz = [10, 100]) => ({ frequencyHz, gainDb: [0, 0], phaseDeg });
  const runs = [{ runId: 'a', serial: 'S1', trace: trace([-179, -200]) }, { runId: 'b', serial: 'S2', trace: trace([179, 160]) }];
  assert.deepEqual(overlayOfTraces(runs, 'phase').runs.map(({ values }) => [...values]), [[-179, -200], [-181, -200]]);
  const golden = { runId: 'g', serial: 'G', trace: trace([181, 170]) };
  assert.deepEqual(overlayOfTraces(runs, 'phase', { golden }).runs.map(({ values }) => [...values]), [[181, 160], [179, 160]]);
});

test('phases of runs that share no frequency stay as they are', () => {
  const runs = [[10, 100], [1000, 2000]].map((frequencyHz, i) => ({ runId: `${i}`, serial: `S${i}`, trace: { frequencyHz, gainDb: [0, 0], phaseDeg: [400 * i, 400 * i] } }));
  assert.deepEqual([...overlayOfTraces(runs, 'phase').runs[1].values.slice(2)], [400, 400]);
});
