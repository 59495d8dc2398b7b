import assert from 'node:assert/strict';
import { test } from 'node:test';
import { indexAtOrUnder, nearestIndex, onGrid, unionOf, valueAt } from '../../../web/plots/curve.js';

const gridHz = [10, 100, 1000];

test('the index at or under a frequency is -1 below the grid and the last above it', () => {
  assert.deepEqual([5, 10, 99, 100, 5000].map((f) => indexAtOrUnder(gridHz, f)), [-1, 0, 0, 1, 2]);
});

test('the nearest point is nearest in log f', () => {
  assert.deepEqual([1, 31, 32, 300, 1e6].map((f) => nearestIndex(gridHz, f)), [0, 0, 1, 1, 2]);
  assert.equal(nearestIndex([], 10), -1);
});

test('a curve runs straight against log f between its points', () => {
  assert.ok(Math.abs(valueAt(gridHz, [0, -20, -60], Math.sqrt(10 * 100)) + 10) < 1e-12);
  assert.ok(Math.abs(valueAt(gridHz, [0, -20, -60], Math.sqrt(1e5)) + 40) < 1e-12);
});

test('a point is read exactly, though its neighbour is absent', () => assert.equal(valueAt(gridHz, [NaN, -20.123456789, NaN], 100), -20.123456789));

test('nothing is read outside the span or on a piece with an absent end', () => {
  for (const f of [9.99, 1000.01, 300]) assert.ok(Number.isNaN(valueAt(gridHz, [0, -20, NaN], f)));
});

test('on a grid of its own a curve is itself', () => assert.deepEqual([...onGrid(gridHz, [1, 2, 3], gridHz)], [1, 2, 3]));

test('the union has each frequency once and ascending', () => {
  assert.deepEqual([...unionOf([[10, 1000], [2, 10, 100]])], [2, 10, 100, 1000]);
  assert.deepEqual([...unionOf([])], []);
});
