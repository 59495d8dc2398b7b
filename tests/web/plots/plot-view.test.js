import assert from 'node:assert/strict';
import { test } from 'node:test';
import { changedView, frequencyIn, isWhole, parseView, printView, wholeView } from '../../../web/plots/plot-view.js';

test('the whole view is no text', () => {
  assert.equal(printView(wholeView), '');
  assert.ok(isWhole(parseView('')));
  assert.ok(isWhole(parseView(null)));
});

test('what is printed is parsed back', () => {
  const views = [
    { frequency: { min: 20, max: 2000 }, upper: null, lower: null },
    { frequency: null, upper: { min: -6, max: 3 }, lower: null },
    { frequency: null, upper: null, lower: { min: -180, max: 0 } },
    { frequency: { min: 0.5, max: 2.5e6 }, upper: { min: -0.25, max: 0.5 }, lower: { min: 1e-6, max: 2e-6 } },
  ];
  for (const view of views) assert.deepEqual(parseView(printView(view)), view);
});

test('a short span far from zero keeps its ends apart', () => {
  const text = printView({ frequency: { min: 999_999.123, max: 1_000_001.456 }, upper: null, lower: null });
  const { min, max } = parseView(text).frequency;
  assert.ok(Math.abs(min - 999_999.123) < 1e-4 && Math.abs(max - 1_000_001.456) < 1e-4, text);
});

test('printing what was parsed changes nothing more', () => {
  const text = printView({ frequency: { min: 123.456789, max: 4567.891 }, upper: { min: -3.0103, max: 0.1 }, lower: null });
  assert.equal(printView(parseView(text)), text);
});

test('a text that is no view is the whole view', () => {
  for (const text of ['x', '20', '20~', '~20', '200~20', '-5~20', '0~20', '1~2,3~4,5~6,7~8', '1~2,,NaN~4', '1~Infinity', '1~2~3', ' ~ ']) assert.ok(isWhole(parseView(text)), text);
});

const whole = { frequency: { min: 20, max: 20_000 }, panels: [{ key: 'upper', span: { min: -60, max: 10 } }] };

test('a view stays within the sweep and near the curves', () => {
  const { frequency, upper } = changedView(wholeView, whole, { frequency: { min: 2, max: 200 }, values: [{ key: 'upper', span: { min: -5000, max: -4990 } }] });
  assert.ok(Math.abs(frequency.min - 20) < 1e-9 && Math.abs(frequency.max - 2000) < 1e-6);
  assert.ok(upper.min >= -200 && Math.abs(upper.max - upper.min - 10) < 1e-6);
});

test('zooming out to everything is the whole view again', () => {
  const view = changedView(wholeView, whole, { frequency: { min: 100, max: 200 } });
  assert.ok(!isWhole(view));
  assert.ok(isWhole(changedView(view, whole, { frequency: { min: 1, max: 1e6 } })));
});

test('what is not changed stays, and a panel that is not there is left alone', () => {
  const view = { frequency: { min: 100, max: 200 }, upper: null, lower: null };
  assert.deepEqual(changedView(view, whole, { values: [{ key: 'lower', span: { min: 0, max: 1 } }] }), view);
});

test('a view of another sweep is brought into this one', () => {
  assert.deepEqual(frequencyIn(wholeView, whole.frequency), whole.frequency);
  assert.ok(frequencyIn({ ...wholeView, frequency: { min: 1e5, max: 1e6 } }, whole.frequency).max <= 20_000);
});
