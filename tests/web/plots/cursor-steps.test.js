import assert from 'node:assert/strict';
import { test } from 'node:test';
import { inside, sliderFrequency, sliderPlace, sliderPlaces, stepped } from '../../../web/plots/cursor-steps.js';

const gridHz = Float64Array.of(10, 20, 50, 100);
const span = { min: 10, max: 1000 };

test('a step goes to the next point of the grid, and from between two points to the nearer side', () => {
  assert.equal(stepped(gridHz, 20, 1), 50);
  assert.equal(stepped(gridHz, 20, -1), 10);
  assert.equal(stepped(gridHz, 30, 1), 50);
  assert.equal(stepped(gridHz, 30, -1), 20);
});

test('steps end with the grid', () => {
  assert.equal(stepped(gridHz, 50, 10), 100);
  assert.equal(stepped(gridHz, 50, -10), 10);
  assert.equal(stepped(gridHz, 5, 1), 10);
  assert.equal(stepped(gridHz, 500, -1), 100);
});

test('a slider and the frequency agree', () => {
  assert.equal(sliderPlace(span, 100), sliderPlaces / 2);
  assert.equal(sliderFrequency(span, 0, 500, gridHz), 10);
  assert.equal(sliderFrequency(span, sliderPlaces, 500, gridHz), 1000);
});

test('one place of the slider is a point of the grid', () => assert.equal(sliderFrequency(span, sliderPlace(span, 20) + 1, 20, gridHz), 50));

test('where the grid has no further point in view the slider goes on by its places', () => {
  const atHz = sliderFrequency({ min: 15, max: 40 }, sliderPlace({ min: 15, max: 40 }, 20) + 1, 20, gridHz);
  assert.ok(atHz > 20 && atHz < 21);
});

test('a frequency outside the span comes to its end', () => assert.deepEqual([1, 50, 1e6].map((f) => inside(span, f)), [10, 50, 1000]));
