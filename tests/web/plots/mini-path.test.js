import assert from 'node:assert/strict';
import { test } from 'node:test';
import { miniPath, spansOf } from '../../../web/plots/mini-path.js';

const box = { width: 100, height: 30 };
const points = (path) => [...path.matchAll(/([ML])(\S+?) ([^ML]+)/g)].map(([, pen, x, y]) => ({ pen, x: Number(x), y: Number(y) }));

test('a curve runs from edge to edge, its greatest value at the top', () => {
  assert.deepEqual(points(miniPath([10, 100, 1000], [0, -20, -60], box)), [{ pen: 'M', x: 0, y: 0 }, { pen: 'L', x: 50, y: 10 }, { pen: 'L', x: 100, y: 30 }]);
});

test('of ten thousand points few are drawn, and a peak of one point is among them', () => {
  const frequencyHz = Array.from({ length: 10_000 }, (_, i) => 10 * 1000 ** (i / 9999));
  const values = frequencyHz.map((_, i) => (i === 4321 ? 40 : 0));
  const drawn = points(miniPath(frequencyHz, values, box));
  assert.ok(drawn.length <= 4 * 2 * 100, `${drawn.length} points`);
  assert.equal(drawn.filter(({ y }) => y === 0).length, 1);
});

test('x never goes back', () => {
  const frequencyHz = Array.from({ length: 2000 }, (_, i) => 10 * 1000 ** (i / 1999));
  const drawn = points(miniPath(frequencyHz, frequencyHz.map((f) => Math.sin(f)), box));
  for (let i = 1; i < drawn.length; i++) assert.ok(drawn[i].x >= drawn[i - 1].x);
});

test('an absent value lifts the pen', () => {
  assert.deepEqual(points(miniPath([10, 100, 1000, 10_000], [0, NaN, -3, -6], box)).map(({ pen }) => pen), ['M', 'M', 'L']);
});

test('a curve that hardly changes is drawn flat, in the middle', () => {
  for (const { y } of points(miniPath([10, 100], [0, 0.001], { ...box, leastLength: 1 }))) assert.ok(Math.abs(y - 15) < 0.1);
});

test('without a value there is no path', () => {
  assert.equal(miniPath([10, 100], [NaN, NaN], box), '');
  assert.equal(miniPath([], [], box), '');
  assert.equal(spansOf([10], [1]), null);
});
