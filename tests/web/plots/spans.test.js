import assert from 'node:assert/strict';
import { test } from 'node:test';
import { between, carried, logAxis, moved, placeOf, straightAxis, valueAtPlace, within, zoomed } from '../../../web/plots/spans.js';

const audio = { min: 20, max: 20_000 };
const near = (actual, expected, tolerance = 1e-9) => assert.ok(Math.abs(actual - expected) <= tolerance * Math.max(1, Math.abs(expected)), `${actual} is not ${expected}`);

test('a decade is a third of three decades', () => near(placeOf(logAxis, audio, 200), 1 / 3));

test('place and value are each other\'s inverse on both axes', () => {
  for (const axis of [logAxis, straightAxis]) {
    for (const place of [0, 0.1, 0.5, 0.99, 1, 1.2]) near(placeOf(axis, audio, valueAtPlace(axis, audio, place)), place);
  }
});

test('zooming leaves the value under the pointer where it is', () => {
  for (const axis of [logAxis, straightAxis]) {
    for (const place of [0, 0.3, 1]) {
      const value = valueAtPlace(axis, audio, place);
      near(placeOf(axis, zoomed(axis, audio, 0.5, place), value), place);
    }
  }
});

test('zooming out undoes zooming in', () => {
  const back = zoomed(logAxis, zoomed(logAxis, audio, 0.25, 0.7), 4, 0.7);
  near(back.min, audio.min);
  near(back.max, audio.max);
});

test('moving by a third of three decades is a decade', () => {
  const span = moved(logAxis, audio, 1 / 3);
  near(span.min, 200);
  near(span.max, 200_000);
});

test('a box drawn from right to left is the same box', () => assert.deepEqual(between(logAxis, audio, 0.8, 0.2), between(logAxis, audio, 0.2, 0.8)));

test('a span inside its bounds stays itself', () => {
  const span = { min: 100, max: 1000 };
  assert.equal(within(logAxis, span, audio), span);
});

test('a span beyond its bounds is moved in and keeps its length', () => {
  const span = within(logAxis, { min: 2, max: 200 }, audio);
  assert.equal(span.min, 20);
  near(span.max, 2000);
});

test('a span longer than its bounds is the bounds', () => assert.deepEqual(within(logAxis, { min: 1, max: 1e6 }, audio), audio));

test('a span is never shorter than the least share', () => {
  const span = within(logAxis, { min: 1000, max: 1000 }, audio, 0.01);
  near(placeOf(logAxis, audio, span.max) - placeOf(logAxis, audio, span.min), 0.01);
});

test('two fingers carry what is under them along', () => {
  for (const axis of [logAxis, straightAxis]) {
    const values = [0.3, 0.6].map((place) => valueAtPlace(axis, audio, place));
    const span = carried(axis, audio, [0.3, 0.6], [0.1, 0.9]);
    near(placeOf(axis, span, values[0]), 0.1);
    near(placeOf(axis, span, values[1]), 0.9);
  }
});

test('fingers one above the other move a span and do not tear it', () => {
  const span = carried(straightAxis, { min: 0, max: 10 }, [0.5, 0.5], [0.6, 0.6]);
  near(span.min, -1);
  near(span.max, 9);
});
