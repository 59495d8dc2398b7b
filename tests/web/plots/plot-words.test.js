import assert from 'node:assert/strict';
import { test } from 'node:test';
import { axisTitle, backgroundWords, cursorSentence, runSentence, shortUnit, typedFrequency, valueText } from '../../../web/plots/plot-words.js';

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

const gain = {
  ...set('gain', 'dB'),
  frequencyHz: Float64Array.of(100, 1000),
  runs: [{ runId: 'a', serial: 'S4', outcome: 'fail', values: Float64Array.of(0.5, 2) }, { runId: 'b', serial: 'S5', outcome: null, values: Float64Array.of(0, NaN) }],
  golden: { runId: 'g', serial: 'G', values: Float64Array.of(0, -3) },
  limits: [{ name: 'Top', side: 'upper', frequencyHz: Float64Array.of(500, 1000), values: Float64Array.of(1.8, 1.8) }],
};

test('the cursor is said with frequency, golden run and least margin', () => {
  assert.equal(plain(cursorSentence([gain], 1000)), '1 kHz; golden run \u22123.00 dB; least margin \u22120.20 dB of S4 to Top');
  assert.equal(plain(cursorSentence([gain], 100)), '100 Hz; golden run 0.00 dB');
  assert.equal(plain(cursorSentence([{ ...gain, golden: null }], 100)), '100 Hz');
});

test('a run is said with outcome, value and margin', () => {
  assert.equal(plain(runSentence([gain], 1000, 'a')), 'S4 fails; 1 kHz: 2.00 dB; margin \u22120.20 dB to Top');
  assert.equal(plain(runSentence([gain], 1000, 'b')), 'S5; 1 kHz: \u2013');
  assert.equal(runSentence([gain], 1000, 'gone'), '');
});

test('a typed frequency is taken inside the sweep, and refused with the sweep named outside it', () => {
  const sweep = { min: 20, max: 20_000 };
  assert.deepEqual(typedFrequency('1,5k', sweep), { value: 1500, problem: '' });
  assert.equal(plain(typedFrequency('5 MHz', sweep).problem), 'The sweep runs from 20 Hz to 20 kHz.');
  assert.equal(typedFrequency('5 MHz', sweep).value, null);
  assert.notEqual(typedFrequency('x', sweep).problem, '');
});

test('the background is said by how many it is', () => {
  assert.equal(plain(backgroundWords(1, 9)), '1 other run');
  assert.equal(plain(backgroundWords(92, 96)), '92 other runs');
  assert.equal(plain(backgroundWords(96, 96)), 'all 96 runs');
});
