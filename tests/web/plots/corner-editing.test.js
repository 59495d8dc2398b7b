import assert from 'node:assert/strict';
import { test } from 'node:test';
import { cornerProblems, crossedLimits, deleteCorner, insertCorner, insertOnLine, moveCorner, sortCorners } from '../../../web/plots/corner-editing.js';

const corners = (...pairs) => pairs.map(([frequencyHz, value]) => ({ frequencyHz, value }));
const given = Object.freeze(corners([10, 0], [100, 0], [100, -3], [1000, -3]).map(Object.freeze));
const limit = (side, pairs, more = {}) => ({ name: `${side} one`, side, quantity: 'gainDb', basis: 'absolute', corners: corners(...pairs), ...more });

test('a corner comes in by its frequency, behind those that stand there', () => {
  assert.equal(insertCorner(given, { frequencyHz: 50, value: 1 }).index, 1);
  assert.equal(insertCorner(given, { frequencyHz: 100, value: 1 }).index, 3);
  assert.equal(insertCorner(given, { frequencyHz: 5, value: 1 }).index, 0);
  assert.equal(insertCorner(given, { frequencyHz: 5000, value: 1 }).corners.at(-1).value, 1);
  assert.equal(insertCorner([], { frequencyHz: 5, value: 1 }).corners.length, 1);
});

test('a corner put on the line leaves the limit\'s shape as it is', () => {
  const { corners: made, index } = insertOnLine(corners([10, 0], [1000, -20]), 100);
  assert.equal(index, 1);
  assert.ok(Math.abs(made[1].value + 10) < 1e-12);
});

test('a corner put outside the span carries the end\'s value on', () => {
  assert.equal(insertOnLine(given, 5).corners[0].value, 0);
  assert.equal(insertOnLine(given, 5000).corners.at(-1).value, -3);
});

test('a dragged corner does not pass its neighbours', () => {
  const low = moveCorner(corners([10, 0], [100, 0], [1000, 0]), 1, { frequencyHz: 2, value: 5 });
  assert.deepEqual(low[1], { frequencyHz: 10, value: 5 });
  const high = moveCorner(corners([10, 0], [100, 0], [1000, 0]), 1, { frequencyHz: 1e9, value: 5 });
  assert.equal(high[1].frequencyHz, 1000);
});

test('the ends may be dragged outward, but not to 0 Hz', () => {
  assert.equal(moveCorner(given, 3, { frequencyHz: 1e6, value: 0 })[3].frequencyHz, 1e6);
  assert.equal(moveCorner(given, 0, { frequencyHz: -4, value: 0 })[0].frequencyHz, 10);
});

test('taking a corner away leaves the others', () => assert.deepEqual(deleteCorner(given, 1), corners([10, 0], [100, -3], [1000, -3])));

test('sorting keeps the order within a step', () => {
  assert.deepEqual(sortCorners(corners([1000, 1], [100, 5], [100, -5], [10, 2])), corners([10, 2], [100, 5], [100, -5], [1000, 1]));
});

test('corners with a step are in order', () => assert.deepEqual(cornerProblems([...given]), []));

test('each fault is found where it is', () => {
  const places = (pairs, quantity) => cornerProblems(corners(...pairs), quantity).map((p) => `${p.index} ${p.field}`);
  assert.deepEqual(places([[10, 0]]), ['null null']);
  assert.deepEqual(places([[0, 0], [10, 0]]), ['0 frequencyHz']);
  assert.deepEqual(places([[10, 0], [NaN, NaN]]), ['1 frequencyHz', '1 value']);
  assert.deepEqual(places([[100, 0], [10, 0], [200, 0]]), ['1 frequencyHz']);
  assert.deepEqual(places([[10, 0], [100, 0], [100, 1], [100, 2], [200, 0]]), ['3 frequencyHz']);
  assert.deepEqual(places([[10, 0], [10, 5]]), ['null null']);
  assert.deepEqual(places([[10, 0], [20, 10_001]]), ['1 value']);
  assert.deepEqual(places([[10, 0], [20, 10_001]], 'phaseDeg'), []);
  assert.deepEqual(places([[10, 0], [20, 3_601]], 'delaySeconds'), ['1 value']);
});

test('limits that leave room do not cross', () => {
  assert.deepEqual(crossedLimits([limit('upper', [[10, 1], [1000, 1]]), limit('lower', [[10, -1], [1000, 1]])]), []);
});

test('an upper limit under a lower one is found, and the sentence says where', () => {
  const [crossed] = crossedLimits([limit('upper', [[10, 1], [1000, -3]]), limit('lower', [[10, -1], [1000, -1]])]);
  assert.equal(crossed.frequencyHz, 1000);
  assert.match(crossed.sentence, /"upper one" runs under the lower limit "lower one" near 1\u00a0kHz/);
});

test('a crossing between the corners of both is found', () => {
  assert.equal(crossedLimits([limit('upper', [[10, 5], [100, -5], [1000, 5]]), limit('lower', [[20, 0], [500, 0]])])[0].frequencyHz, 100);
});

test('two steps at one frequency that keep the order on both sides do not cross', () => {
  assert.deepEqual(crossedLimits([limit('upper', [[10, 5], [100, 5], [100, -5], [1000, -5]]), limit('lower', [[10, 4], [100, 4], [100, -6], [1000, -6]])]), []);
});

test('limits that share no span, basis, reference or quantity are not compared', () => {
  const upper = limit('upper', [[10, -5], [100, -5]]);
  assert.deepEqual(crossedLimits([upper, limit('lower', [[200, 0], [1000, 0]])]), []);
  assert.deepEqual(crossedLimits([upper, limit('lower', [[10, 0], [100, 0]], { quantity: 'phaseDeg' })]), []);
  assert.deepEqual(crossedLimits([upper, limit('lower', [[10, 0], [100, 0]], { basis: 'golden' })]), []);
  const relative = (side, frequencyHz) => limit(side, side === 'upper' ? [[10, -5], [100, -5]] : [[10, 0], [100, 0]], { basis: 'reference', reference: { kind: 'frequency', frequencyHz } });
  assert.deepEqual(crossedLimits([relative('upper', 1000), relative('lower', 2000)]), []);
  assert.equal(crossedLimits([relative('upper', 1000), relative('lower', 1000)]).length, 1);
});
