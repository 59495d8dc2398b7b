import assert from 'node:assert/strict';
import { test } from 'node:test';
import { forbiddenAreas, limitAt, limitLines, marginAt, marginTo, namePlace } from '../../../web/plots/limit-area.js';
import { limitOf } from '../../../web/plots/trace-set.js';

const limit = (side, corners) => limitOf({ name: `${side} one`, side, corners: corners.map(([frequencyHz, value]) => ({ frequencyHz, value })) });
const panel = { x: (f) => 100 * Math.log10(f), y: (v) => 100 - v, left: 0, right: 400, top: 0, bottom: 200 };

test('a limit runs straight against log f', () => assert.ok(Math.abs(limitAt(limit('upper', [[10, 0], [1000, -20]]), 100) + 10) < 1e-12));

test('at a step the stricter value holds', () => {
  const steps = [[10, 5], [100, 5], [100, 1], [1000, 1]];
  assert.equal(limitAt(limit('upper', steps), 100), 1);
  assert.equal(limitAt(limit('lower', steps), 100), 5);
  assert.equal(limitAt(limit('upper', steps), 99.99), 5);
  assert.equal(limitAt(limit('lower', steps), 100.01), 1);
});

test('a step at an end of a limit holds there too', () => {
  assert.equal(limitAt(limit('upper', [[10, 0], [100, 0], [100, -7]]), 100), -7);
  assert.equal(limitAt(limit('lower', [[10, 0], [10, 3], [100, 3]]), 10), 3);
});

test('outside its span a limit has no value', () => {
  for (const f of [9.99, 1000.01]) assert.ok(Number.isNaN(limitAt(limit('upper', [[10, 0], [1000, 0]]), f)));
});

test('where a limit has no value on one side of a frequency the other side holds', () => {
  const broken = limitOf({ name: 'x', side: 'upper', frequencyHz: [10, 100, 1000, 1e4], values: [1, 2, null, 4] });
  assert.equal(limitAt(broken, 100), 2);
  assert.ok(Number.isNaN(limitAt(broken, 200)));
});

test('a margin is positive inside on either side', () => {
  assert.equal(marginTo(limit('upper', [[10, 3], [100, 3]]), 50, 1), 2);
  assert.equal(marginTo(limit('lower', [[10, 3], [100, 3]]), 50, 1), -2);
});

test('the margin there is the least over the limits, with the name of its limit', () => {
  const limits = [limit('upper', [[10, 3], [100, 3]]), limit('lower', [[10, 0], [100, 0]])];
  assert.deepEqual(marginAt(limits, 50, 1), { margin: 1, limit: 'lower one' });
  assert.equal(marginAt(limits, 5, 1), null);
  assert.equal(marginAt(limits, 50, NaN), null);
});

test('the area of an upper limit reaches the top of the panel, that of a lower one the bottom', () => {
  assert.deepEqual(forbiddenAreas(limit('upper', [[10, 0], [100, 0]]), panel), [[100, 100, 200, 100, 200, 0, 100, 0]]);
  assert.deepEqual(forbiddenAreas(limit('lower', [[10, 0], [100, 0]]), panel), [[100, 100, 200, 100, 200, 200, 100, 200]]);
});

test('the area never folds over where the limit lies beyond the panel\'s edge', () => {
  const [polygon] = forbiddenAreas(limit('upper', [[10, 150], [100, 0]]), panel);
  assert.equal(Math.min(...polygon.filter((_, i) => i % 2 === 1)), -50);
  assert.equal(polygon.at(-1), -50);
});

test('an absent value splits the line, and a lone point draws none', () => {
  const broken = limitOf({ name: 'x', side: 'upper', frequencyHz: [1, 10, 100, 1000, 1e4], values: [1, 1, null, 4, null] });
  assert.deepEqual(limitLines(broken, panel), [[0, 99, 100, 99]]);
});

test('the name stands on the forbidden side and inside the panel', () => {
  const above = namePlace(limit('upper', [[10, 0], [1000, 0]]), panel, 60, 12);
  const under = namePlace(limit('lower', [[10, 0], [1000, 0]]), panel, 60, 12);
  assert.ok(above.y < 100 - 6 && under.y > 100 + 6);
  assert.equal(above.x, 200);
});

test('the name is clear of a slanted line', () => {
  const slanted = limit('upper', [[10, 0], [1000, 80]]);
  const place = namePlace(slanted, panel, 60, 12);
  for (const x of [place.x - 30, place.x, place.x + 30]) assert.ok(place.y + 6 < panel.y(limitAt(slanted, 10 ** (x / 100))));
});

test('a limit out of view has no place for its name', () => {
  assert.equal(namePlace(limit('upper', [[1e5, 0], [1e6, 0]]), panel, 60, 12), null);
  assert.equal(namePlace(limit('upper', [[10, 500], [1000, 500]]), panel, 60, 12), null);
});
