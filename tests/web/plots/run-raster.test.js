import assert from 'node:assert/strict';
import { test } from 'node:test';
import { addCurve, emptyDensity, opacityOf, paint } from '../../../web/plots/run-raster.js';

const draw = (x, values, { width = 20, height = 10 } = {}) => {
  const density = emptyDensity(width, height);
  addCurve(density, { x: Float64Array.from(x), yZero: 0, yPerUnit: 1 }, Float64Array.from(values));
  return { ...density, at: (column, row) => density.cover[column * height + row] };
};
const sum = (density) => density.cover.reduce((a, b) => a + b, 0);
const near = (actual, expected, tolerance = 1e-5) => assert.ok(Math.abs(actual - expected) <= tolerance, `${actual} is not ${expected}`);

test('a level line covers its length, each column once', () => {
  const drawn = draw([0, 20], [4.5, 4.5]);
  near(sum(drawn), 20);
  for (let column = 0; column < 20; column++) near(drawn.at(column, 4), 1);
});

test('a line between two rows is shared by them', () => {
  const drawn = draw([0, 20], [4.75, 4.75]);
  near(drawn.at(3, 4), 0.75);
  near(drawn.at(3, 5), 0.25);
});

test('points within a column do not cover it more than once', () => {
  const x = Array.from({ length: 201 }, (_, i) => i / 10);
  near(sum(draw(x, x.map(() => 5.5))), 20);
});

test('the same line with more points on it is the same picture', () => {
  const coarse = draw([0, 20], [1, 9]);
  const x = Array.from({ length: 41 }, (_, i) => i / 2);
  const fine = draw(x, x.map((v) => 1 + (8 * v) / 20));
  coarse.cover.forEach((covered, i) => near(fine.cover[i], covered));
});

test('a slanted line covers as much as it is long', () => near(sum(draw([0, 20], [100, 80], { width: 20, height: 200 })), 20 * Math.SQRT2, 1e-3));

test('a narrow peak inside one column is seen', () => {
  const drawn = draw([0, 10.2, 10.4, 10.6, 20], [8.5, 8.5, 1.5, 8.5, 8.5]);
  for (let row = 2; row < 8; row++) assert.ok(drawn.at(10, row) > 0.8, `row ${row}`);
});

test('nothing is drawn over an absent value', () => {
  const drawn = draw([0, 5, 10, 15, 20], [5.5, 5.5, NaN, 5.5, 5.5]);
  for (let column = 6; column < 15; column++) assert.equal(drawn.at(column, 5), 0);
  near(sum(drawn), 10);
});

test('a point alone is a dot, at an end of the curve too', () => {
  assert.ok(draw([2.5, 10.5, 18.5], [NaN, 5, NaN]).at(10, 5) > 0.4);
  assert.ok(draw([2.5, 10.5, 18.5], [NaN, NaN, 5]).at(18, 5) > 0.4);
  assert.ok(draw([2.5, 10.5, 18.5], [5, NaN, NaN]).at(2, 5) > 0.4);
});

test('what lies outside the picture is cut off, and what crosses it comes in where it should', () => {
  near(draw([-100, 120], [-100, 120], { width: 20, height: 20 }).at(10, 10), 1, 0.3);
  assert.equal(sum(draw([0, 20], [50, 60])), 0);
  assert.equal(sum(draw([30, 40], [5, 5])), 0);
  assert.equal(sum(draw([-40, -30], [5, 5])), 0);
  assert.ok(Number.isFinite(sum(draw([-1e6, 1e6], [-1e9, 1e9]))));
});

test('a lone line among a thousand stays visible, and more lines are darker', () => {
  assert.ok(opacityOf(1, 1000) >= 0.3);
  const covers = [0, 0.2, 1, 2, 10, 100, 1000];
  for (let i = 1; i < covers.length; i++) assert.ok(opacityOf(covers[i], 1000) > opacityOf(covers[i - 1], 1000));
  assert.ok(opacityOf(1e6, 1000) <= 1);
});

test('the picture has the colour of the lines and is clear beside them', () => {
  const density = emptyDensity(4, 3);
  addCurve(density, { x: Float64Array.of(0, 4), yZero: 0, yPerUnit: 1 }, Float64Array.of(1.5, 1.5));
  const pixels = new Uint8ClampedArray(4 * 3 * 4);
  paint([{ density, colour: [10, 20, 30], count: 1 }], pixels);
  assert.deepEqual([...pixels.subarray(0, 4)], [0, 0, 0, 0]);
  assert.deepEqual([...pixels.subarray(4 * 4, 4 * 4 + 3)], [10, 20, 30]);
  assert.ok(pixels[4 * 4 + 3] > 200);
});

test('the later group lies on top', () => {
  const made = (colour) => {
    const density = emptyDensity(2, 1);
    density.cover.fill(1);
    return { density, colour, count: 1 };
  };
  const pixels = new Uint8ClampedArray(8);
  paint([made([0, 0, 255]), made([255, 0, 0])], pixels);
  assert.ok(pixels[0] > pixels[2] * 4);
});
