import assert from 'node:assert/strict';
import { test } from 'node:test';
import { onGrid } from '../../../web/plots/curve.js';
import { goldenCorners, simplified } from '../../../web/plots/golden-corners.js';

const points = 400;
const frequencyHz = Array.from({ length: points }, (_, i) => 10 * 1e4 ** (i / (points - 1)));
const lowPass = frequencyHz.map((f) => -10 * Math.log10(1 + (f / 1000) ** 4));
const peaky = frequencyHz.map((f) => -20 * Math.log10(Math.hypot(1 - (f / 2000) ** 2, f / 2000 / 5)));
const wavy = frequencyHz.map((f) => 0.3 * Math.sin(9 * Math.log(f)) + 0.05 * Math.sin(140 * Math.log(f)));

function deviations(golden, side, request) {
  const made = goldenCorners({ frequencyHz, values: golden }, { side, ...request });
  const limit = onGrid(made.corners.map((c) => c.frequencyHz), made.corners.map((c) => c.value), frequencyHz);
  const sign = side === 'upper' ? 1 : -1;
  return { made, inward: golden.map((value, i) => sign * (value + sign * request.distance - limit[i])) };
}

test('the limit is never more lenient than the golden run with the distance, and strict by no more than the tolerance', () => {
  for (const golden of [lowPass, peaky, wavy]) {
    for (const side of ['upper', 'lower']) {
      const { made, inward } = deviations(golden, side, { distance: 1, tolerance: 0.1, step: 0.01 });
      assert.ok(Math.min(...inward) >= -1e-9, `${side}: too lenient by ${-Math.min(...inward)} dB`);
      assert.ok(Math.max(...inward) <= made.tolerance + 1e-9, `${side}: too strict by ${Math.max(...inward)} dB`);
    }
  }
});

test('few corners do: far fewer than points', () => {
  const { made } = deviations(lowPass, 'upper', { distance: 1, tolerance: 0.1, step: 0.01 });
  assert.equal(made.tolerance, 0.1);
  assert.ok(made.corners.length <= points / 16, `${made.corners.length} corners`);
});

test('a straight curve needs two corners', () => {
  const straight = frequencyHz.map((f) => -20 * Math.log10(f));
  const { made } = deviations(straight, 'lower', { distance: 0.5, tolerance: 0.01 });
  assert.equal(made.corners.length, 2);
  assert.ok(Math.abs(made.corners[0].value - (straight[0] - 0.5)) < 1e-9);
});

test('a finer tolerance keeps at least as many corners', () => {
  const count = (tolerance) => goldenCorners({ frequencyHz, values: wavy }, { side: 'upper', distance: 1, tolerance, most: 1000 }).corners.length;
  assert.ok(count(0.01) >= count(0.1) && count(0.1) >= count(0.5));
});

test('too many corners widen the tolerance, which is told', () => {
  const { made } = deviations(wavy, 'upper', { distance: 1, tolerance: 0.001, most: 12 });
  assert.ok(made.corners.length <= 12 && made.tolerance > 0.001);
  assert.match(made.notes.join(' '), /stricter/);
});

test('values are whole steps', () => {
  const { made } = deviations(peaky, 'lower', { distance: 1, tolerance: 0.2, step: 0.05 });
  for (const { value } of made.corners) assert.ok(Math.abs(value / 0.05 - Math.round(value / 0.05)) < 1e-6);
});

test('corners stand at the golden run\'s own frequencies, ascending, inside the span asked for', () => {
  const made = goldenCorners({ frequencyHz, values: lowPass }, { side: 'upper', distance: 1, tolerance: 0.1, fromHz: 100, toHz: 5000 });
  for (const { frequencyHz: f } of made.corners) assert.ok(frequencyHz.includes(f) && f >= 100 && f <= 5000);
  for (let i = 1; i < made.corners.length; i++) assert.ok(made.corners[i].frequencyHz > made.corners[i - 1].frequencyHz);
});

test('of a golden run with gaps the longest stretch is taken, and it is said', () => {
  const gappy = lowPass.map((value, i) => (i === 50 || i === 300 ? NaN : value));
  const made = goldenCorners({ frequencyHz, values: gappy }, { side: 'upper', distance: 1, tolerance: 0.1 });
  assert.equal(made.corners[0].frequencyHz, frequencyHz[51]);
  assert.equal(made.corners.at(-1).frequencyHz, frequencyHz[299]);
  assert.match(made.notes[0], /gaps/);
});

test('without two points there is no limit, and it is said', () => {
  const made = goldenCorners({ frequencyHz: [10, 100], values: [NaN, 0] }, { side: 'upper', distance: 1, tolerance: 0.1 });
  assert.deepEqual(made.corners, []);
  assert.match(made.notes[0], /no two points/);
});

test('simplifying keeps the ends and every point that matters', () => {
  const line = [0, 1, 2, 3, 4].map((x) => ({ x, y: x === 2 ? 1 : 0 }));
  assert.deepEqual(simplified(line, 0.4), [0, 1, 2, 3, 4]);
  assert.deepEqual(simplified(line, 1), [0, 4]);
});
