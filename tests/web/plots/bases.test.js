import assert from 'node:assert/strict';
import { test } from 'node:test';
import { levelled, minusGolden, onBasis, unwrapped } from '../../../web/plots/bases.js';
import { valueAt } from '../../../web/plots/curve.js';
import { traceSetOf } from '../../../web/plots/trace-set.js';

const set = (more = {}) => traceSetOf({
  quantity: 'gain',
  frequencyHz: [10, 100, 1000],
  runs: [{ runId: 'a', serial: 'S1', values: [1, -1, -31] }, { runId: 'b', serial: 'S2', values: [null, -2, null] }],
  golden: { runId: 'g', serial: 'G', values: [0, -2, -30] },
  limits: [{ name: 'Top', side: 'upper', frequencyHz: [20, 1000], values: [2, 2] }],
  ...more,
});

test('less itself the golden run is zero', () => assert.deepEqual([...minusGolden(set()).set.golden.values], [0, 0, 0]));

test('less the golden run a curve is the difference, and absent where it was', () => {
  const { runs } = minusGolden(set()).set;
  assert.deepEqual([...runs[0].values], [1, 1, -1]);
  assert.deepEqual([...runs[1].values], [NaN, 0, NaN]);
});

test('a margin to a limit is the same before and after the golden run is taken away', () => {
  const before = set();
  const after = minusGolden(before).set;
  for (const f of before.frequencyHz.filter((hz) => hz >= 20)) {
    const marginBefore = valueAt(before.limits[0].frequencyHz, before.limits[0].values, f) - valueAt(before.frequencyHz, before.runs[0].values, f);
    const marginAfter = valueAt(after.limits[0].frequencyHz, after.limits[0].values, f) - valueAt(after.frequencyHz, after.runs[0].values, f);
    assert.ok(Math.abs(marginBefore - marginAfter) < 1e-12, `at ${f} Hz`);
  }
});

test('a limit less the golden run keeps its step', () => {
  const stepped = set({ limits: [{ name: 'Step', side: 'upper', frequencyHz: [10, 100, 100, 1000], values: [5, 5, 1, 1] }] });
  const { frequencyHz, values } = minusGolden(stepped).set.limits[0];
  assert.deepEqual([...frequencyHz], [10, 100, 100, 1000]);
  assert.deepEqual([...values], [5, 7, 3, 31]);
});

test('a phase difference is that of the ratio, without whole turns', () => {
  const turned = set({
    quantity: 'phase',
    runs: [{ runId: 'a', serial: 'S1', values: [-10, -170, 170] }],
    golden: { runId: 'g', serial: 'G', values: [-730, -900, -930] },
    limits: [{ name: 'P', side: 'upper', frequencyHz: [10, 1000], values: [-700, -900] }],
  });
  const made = minusGolden(turned).set;
  assert.deepEqual([...made.runs[0].values], [0, 10, 20]);
  assert.deepEqual([...made.limits[0].values], [30, 100, 30]);
});

test('without a golden run the curves stay as measured and it is said', () => {
  const bare = set({ golden: null });
  const made = minusGolden(bare);
  assert.equal(made.set, bare);
  assert.match(made.notes[0], /No golden run/);
});

test('a levelled curve is zero where it is levelled and keeps its shape', () => {
  const made = levelled(set(), 100);
  assert.deepEqual([...made.set.runs[0].values], [2, 0, -30]);
  assert.deepEqual([...made.set.golden.values], [2, 0, -28]);
});

test('limits do not come along when curves are levelled, and it is said', () => {
  const made = levelled(set(), 100);
  assert.deepEqual(made.set.limits, []);
  assert.match(made.notes[0], /as measured/);
});

test('a run without a level at the frequency is told of', () => {
  const made = levelled(set(), 1000);
  assert.match(made.notes.join(' '), /One run has no level/);
  assert.ok(made.set.runs[1].values.every(Number.isNaN));
});

test('levelling leaves phase as it is', () => {
  const phases = set({ quantity: 'phase' });
  assert.equal(levelled(phases, 100).set.runs, phases.runs);
});

test('what the server has made on another basis is not made again', () => {
  const made = set({ basis: 'minusGolden' });
  assert.equal(onBasis(made, 'minusGolden', 0).set, made);
  const plain = set();
  assert.equal(onBasis(plain, 'asMeasured', 0).set, plain);
  assert.equal(onBasis(plain, 'levelled', 100).set.basis, 'levelled');
});

test('an unwrapped phase starts in (-180, 180] and has no step over half a turn', () => {
  assert.deepEqual([...unwrapped(Float64Array.of(-180, 180, 350, NaN, 160, 540))], [180, 180, 350, NaN, 520, 540]);
});
