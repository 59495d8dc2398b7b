import assert from 'node:assert/strict';
import { test } from 'node:test';
import { plotModel } from '../../../web/plots/plot-model.js';
import { runBeside, runUnder } from '../../../web/plots/run-pointing.js';

const model = plotModel({
  upper: { quantity: 'gain', frequencyHz: [10, 1000], runs: Array.from({ length: 20 }, (_, i) => ({ runId: `r${i}`, serial: `S${i}`, outcome: i === 3 ? 'fail' : 'pass', values: [-10 * i, -10 * i] })) },
  lower: { quantity: 'phase', frequencyHz: [10, 1000], runs: [{ runId: 'r5', serial: 'S5', values: [-45, -45] }] },
  basis: 'asMeasured', levelHz: NaN, chosen: null,
});
const panel = (key, top) => ({ key, left: 0, right: 200, top, bottom: top + 200, x: (f) => 100 * (Math.log10(f) - 1), y: (v) => top - v, frequencyAt: (x) => 10 ** (x / 100 + 1) });
const panels = [panel('upper', 0), panel('lower', 200)];
const off = (...keys) => new Set(keys);

test('the run under a pointer is found in the panel where the pointer is', () => {
  assert.equal(runUnder(model, off(), panels, { x: 100, y: 52 }), 'r5');
  assert.equal(runUnder(model, off(), panels, { x: 100, y: 243 }), 'r5');
  assert.equal(runUnder(model, off(), panels, { x: 100, y: 300 }), null);
});

test('what is switched off is not pointed at', () => {
  assert.equal(runUnder(model, off('r3'), panels, { x: 100, y: 30 }), null);
  assert.equal(runUnder(model, off('background'), panels, { x: 100, y: 52 }), null);
  assert.equal(runUnder(model, off('background'), panels, { x: 100, y: 31 }), 'r3');
});

test('beside the panel there is no run', () => {
  assert.equal(runUnder(model, off(), panels, { x: -5, y: 50 }), null);
  assert.equal(runUnder(model, off(), [], { x: 5, y: 50 }), null);
});

test('keys walk by the value at the cursor and leave out what is switched off', () => {
  assert.equal(runBeside(model, off(), 100, 'r4', 1), 'r3');
  assert.equal(runBeside(model, off('r3'), 100, 'r4', 1), 'r2');
  assert.equal(runBeside(model, off(), 100, 'r0', 1), null);
});
