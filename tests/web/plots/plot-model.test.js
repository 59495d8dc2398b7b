import assert from 'node:assert/strict';
import { test } from 'node:test';
import { outcomeWord } from '../../../web/plots/named-runs.js';
import { describe, plotModel } from '../../../web/plots/plot-model.js';

const gain = (count = 3, more = {}) => ({
  quantity: 'gain',
  basis: 'asMeasured',
  frequencyHz: [10, 100, 1000],
  runs: Array.from({ length: count }, (_, i) => ({ runId: `r${i}`, serial: `S${i}`, outcome: i === 1 ? 'fail' : 'pass', values: [i, -1, -20] })),
  golden: { runId: 'g', serial: 'G7', values: [0, -1, -20] },
  limits: [{ name: 'Top', side: 'upper', frequencyHz: [10, 1000], values: [4, 4] }],
  ...more,
});
const phase = (more = {}) => ({ quantity: 'phase', frequencyHz: [5, 1000], runs: [{ runId: 'r0', serial: 'S0', values: [0, -90] }], ...more });
const question = (more = {}) => ({ upper: gain(), lower: null, basis: 'asMeasured', levelHz: 100, chosen: null, ...more });
const words = { quantityWord: (set) => (set.quantity === 'gain' ? 'Gain' : 'Phase'), frequencyText: (f) => `${f} Hz`, outcomeWord };

test('without an overlay there is nothing to show', () => {
  assert.equal(plotModel(question({ upper: null })), null);
  assert.equal(plotModel(question({ upper: gain(0, { frequencyHz: [] }) })), null);
});

test('two overlays are two panels on one span of frequencies', () => {
  const model = plotModel(question({ lower: phase() }));
  assert.deepEqual(model.panels.map((p) => p.key), ['upper', 'lower']);
  assert.deepEqual(model.frequency, { min: 5, max: 1000 });
});

test('phase alone is shown in its own panel', () => assert.deepEqual(plotModel(question({ upper: null, lower: phase() })).panels.map((p) => p.key), ['lower']));

test('a named run is not in the background of any panel', () => {
  const model = plotModel(question({ upper: gain(20), lower: phase() }));
  assert.deepEqual(model.named.map((n) => n.run.runId), ['r1']);
  assert.equal(model.background, 19);
  assert.equal(model.panels[0].groups[1], 255);
  assert.equal(model.panels[1].groups[0], 0);
});

test('changed limits leave the curves the same object on every basis', () => {
  const first = gain();
  for (const basis of ['asMeasured', 'minusGolden', 'levelled']) {
    const [before, after] = [first, { ...first, limits: [] }].map((upper) => plotModel(question({ upper, basis })));
    assert.equal(before.panels[0].set.runs, after.panels[0].set.runs, basis);
  }
});

test('another level or another golden run does make other curves', () => {
  const first = gain();
  const at = (levelHz) => plotModel(question({ upper: first, basis: 'levelled', levelHz })).panels[0].set.runs;
  assert.notEqual(at(10), at(100));
  assert.equal(at(100)[2].values[0], 3);
  const other = { ...first, golden: { runId: 'h', serial: 'H', values: [1, 1, 1] } };
  plotModel(question({ upper: first, basis: 'minusGolden' }));
  assert.deepEqual([...plotModel(question({ upper: other, basis: 'minusGolden' })).panels[0].set.runs[0].values], [-1, -2, -21]);
});

test('what could not come along is noted once', () => {
  const model = plotModel(question({ upper: gain(3, { golden: null }), lower: phase(), basis: 'minusGolden' }));
  assert.equal(model.notes.length, 1);
});

test('the description names what is shown and who does not pass', () => {
  assert.equal(describe(plotModel(question({ lower: phase() })), words), 'Gain and phase of 3 runs from 5 Hz to 1000 Hz, golden run G7, one limit. S1 fails.');
  assert.equal(describe(plotModel(question({ upper: gain(1, { golden: null, limits: [] }) })), words), 'Gain of S0 from 10 Hz to 1000 Hz, no golden run, no limits.');
});

test('those who do not pass and have no name are counted', () => {
  const many = gain(30);
  many.runs.forEach((run, i) => { if (i < 11) run.outcome = 'fail'; });
  assert.match(describe(plotModel(question({ upper: many })), words), /S7 fails, 3 more do not pass\.$/);
});
