import assert from 'node:assert/strict';
import { test } from 'node:test';
import { logTicks, prefixed, straightTicks } from '../../../web/plots/ticks.js';

const texts = (ticks) => ticks.filter((t) => t.text !== '').map((t) => t.text);

test('a wide log axis has texts at 1, 2 and 5 and majors at powers of ten', () => {
  const ticks = logTicks({ min: 20, max: 20_000 }, 900);
  assert.deepEqual(texts(ticks), ['20', '50', '100', '200', '500', '1\u00a0k', '2\u00a0k', '5\u00a0k', '10\u00a0k', '20\u00a0k']);
  assert.deepEqual(ticks.filter((t) => t.major).map((t) => t.value), [100, 1000, 10_000]);
  assert.equal(ticks.length, 8 + 9 + 9 + 2);
});

test('a narrow log axis has texts at powers of ten only', () => assert.deepEqual(texts(logTicks({ min: 10, max: 1e5 }, 200)), ['10', '100', '1\u00a0k', '10\u00a0k', '100\u00a0k']));

test('a log axis of many decades leaves texts out rather than laying them over each other', () => {
  const ticks = texts(logTicks({ min: 1e-3, max: 1e9 }, 220));
  assert.ok(ticks.length >= 4 && ticks.length <= 7, ticks.join(' '));
});

test('a span with fewer than four log ticks gets straight steps', () => {
  const ticks = logTicks({ min: 1000, max: 1090 }, 700);
  assert.ok(ticks.length >= 4);
  const steps = ticks.slice(1).map((t, i) => t.value - ticks[i].value);
  for (const step of steps) assert.ok(Math.abs(step - steps[0]) < 1e-9);
  assert.equal(ticks[0].text, '1\u00a0k');
});

test('log ticks under 1 Hz are exact decimals', () => assert.deepEqual(logTicks({ min: 0.1, max: 1 }, 500).map((t) => t.value), [0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 1]));

test('straight ticks are multiples of 1, 2 or 5 and no more than asked for', () => {
  assert.deepEqual(straightTicks({ min: -63, max: 4 }, 8).map((t) => t.text), ['\u221260', '\u221250', '\u221240', '\u221230', '\u221220', '\u221210', '0']);
  assert.deepEqual(straightTicks({ min: -0.31, max: 0.29 }, 7).map((t) => t.text), ['\u22120.3', '\u22120.2', '\u22120.1', '0', '0.1', '0.2']);
});

test('zero is the major tick of a straight axis', () => assert.deepEqual(straightTicks({ min: -10, max: 10 }, 5).filter((t) => t.major).map((t) => t.value), [0]));

test('an angle is divided in parts of a turn', () => {
  assert.deepEqual(straightTicks({ min: -360, max: 0 }, 5, { angle: true }).map((t) => t.value), [-360, -270, -180, -90, 0]);
  assert.deepEqual(straightTicks({ min: -100, max: 10 }, 8, { angle: true }).map((t) => t.value), [-90, -75, -60, -45, -30, -15, 0]);
  assert.deepEqual(straightTicks({ min: -3600, max: 0 }, 6, { angle: true }).map((t) => t.value), [-3600, -2880, -2160, -1440, -720, 0]);
});

test('the text of a tick has its prefix, and no blank where it has none', () => assert.deepEqual([0, 50, 1000, -2.5e-6].map(prefixed), ['0', '50', '1\u00a0k', '\u22122.5\u00a0µ']));
