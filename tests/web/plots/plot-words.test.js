import assert from 'node:assert/strict';
import { test } from 'node:test';
import { axisTitle, backgroundWords, cursorSentence, shortUnit, valueText } from '../../../web/plots/plot-words.js';

const set = (quantity, unit, basis = 'asMeasured') => ({ quantity, unit, basis, frequencyHz: new Float64Array(0), runs: [], golden: null, limits: [] });
const plain = (text) => text.replaceAll('\u00a0', ' ').replaceAll('\u202f', ' ');

test('an axis is titled with quantity, basis and unit', () => {
  assert.equal(axisTitle(set('gain', 'dB re 1 V/Pa'), NaN), 'Gain, dB re 1 V/Pa');
  assert.equal(axisTitle(set('phase', 'deg', 'minusGolden'), NaN), 'Phase less golden, °');
  assert.equal(plain(axisTitle(set('gain', 'dB', 'levelled'), 1000)), 'Gain levelled at 1 kHz, dB');
  assert.equal(axisTitle(set('delay', 's'), NaN), 'Group delay, s');
});

test('beside a number the reference of a level is left out', () => {
  assert.equal(shortUnit(set('gain', 'dB re 1 V/Pa')), 'dB');
  assert.equal(plain(valueText(set('gain', 'dB re 1 V/Pa'), -3.0103)), '\u22123.01 dB');
  assert.equal(plain(valueText(set('delay', 's'), 12.34e-6)), '12.34 µs');
});

test('an absent value is an en dash', () => assert.equal(valueText(set('gain', 'dB'), NaN), '\u2013'));

test('what rounding leaves of a level is zero, and a delay of less than a nanosecond is not', () => {
  assert.equal(plain(valueText(set('gain', 'dB'), -1e-16)), '0.00 dB');
  assert.equal(plain(valueText(set('delay', 's'), 5e-10)), '500 ps');
});

test('the cursor is said with frequency, golden run and least margins', () => {
  const sets = [set('gain', 'dB'), set('phase', 'deg')];
  const golden = [{ value: -3, margin: null }, { value: NaN, margin: null }];
  const worst = [{ serial: 'S4', margin: -0.2, limit: 'Top' }, null];
  assert.equal(plain(cursorSentence(1250, sets, golden, worst)), '1.25 kHz; golden run \u22123.00 dB; least margin \u22120.20 dB of S4 to Top');
  assert.equal(plain(cursorSentence(20, sets, [null, null], [null, null])), '20 Hz');
});

test('the background is said by how many it is', () => {
  assert.equal(plain(backgroundWords(1, 9)), '1 other run');
  assert.equal(plain(backgroundWords(92, 96)), '92 other runs');
  assert.equal(plain(backgroundWords(96, 96)), 'all 96 runs');
});
