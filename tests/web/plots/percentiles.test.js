import assert from 'node:assert/strict';
import { test } from 'node:test';
import { percentileCurves, percentileOf, usualPercentiles } from '../../../web/plots/percentiles.js';

// Seeded, so that a failure can be seen again.
function random(seed) {
  let state = seed;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

test('the ends are the least and the greatest, the middle of an even number lies between two', () => {
  assert.equal(percentileOf([1, 2, 10], 3, 0), 1);
  assert.equal(percentileOf([1, 2, 10], 3, 100), 10);
  assert.equal(percentileOf([1, 2, 10], 3, 50), 2);
  assert.equal(percentileOf([1, 2, 4, 10], 4, 50), 3);
});

// Definition 7 by hand: the place in 0..4 is p x 4, so 5 % lies 0.2 of the way from 15 to 20.
test('percentiles are those of the definition that they name', () => {
  const expected = new Map([[5, 16], [25, 20], [40, 29], [95, 48]]);
  for (const [percent, value] of expected) assert.ok(Math.abs(percentileOf([15, 20, 35, 40, 50], 5, percent) - value) < 1e-12, `${percent} %`);
});

test('of no value there is no percentile', () => assert.ok(Number.isNaN(percentileOf([], 0, 50))));

test('percentile curves do not cross, and half the runs lie between the quartiles', () => {
  const next = random(7);
  const curves = Array.from({ length: 101 }, () => Float64Array.from({ length: 40 }, () => next() * 10 - 5));
  const fan = percentileCurves(curves, usualPercentiles, { from: 0, to: 40 });
  for (let i = 0; i < 40; i++) {
    for (let k = 1; k < fan.length; k++) assert.ok(fan[k][i] >= fan[k - 1][i]);
    assert.equal(curves.filter((values) => values[i] >= fan[1][i] && values[i] <= fan[3][i]).length, 51);
  }
});

test('the order of the runs does not matter, and they are left as they were', () => {
  const next = random(3);
  const curves = Array.from({ length: 70 }, () => Float64Array.of(next(), next()));
  const before = curves.map((values) => [...values]);
  const fan = percentileCurves(curves, [5, 50], { from: 0, to: 2 });
  assert.deepEqual(percentileCurves([...curves].reverse(), [5, 50], { from: 0, to: 2 }), fan);
  assert.deepEqual(curves.map((values) => [...values]), before);
});

test('absent values are left out, and too few runs give none', () => {
  const curves = [Float64Array.of(1, NaN), Float64Array.of(3, 5), Float64Array.of(NaN, NaN)];
  const [median] = percentileCurves(curves, [50], { from: 0, to: 2, fewest: 2 });
  assert.equal(median[0], 2);
  assert.ok(Number.isNaN(median[1]));
});

test('frequencies taken in slices give the same as taken at once', () => {
  const next = random(11);
  const curves = Array.from({ length: 64 }, () => Float64Array.from({ length: 10 }, next));
  const [whole] = percentileCurves(curves, [75], { from: 0, to: 10 });
  const sliced = [0, 4, 8].flatMap((from) => [...percentileCurves(curves, [75], { from, to: Math.min(10, from + 4) })[0]]);
  assert.deepEqual(sliced, [...whole]);
});
