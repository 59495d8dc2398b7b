import assert from 'node:assert/strict';
import test from 'node:test';
import { callOf, callWords, nameOf, outputsOf, unitOf } from '../../../web/pages/measure-words.js';
import { rangeOf } from '../../../web/pages/runs-range.js';

const bandwidth = { name: 'bandwidth', parameters: [{ name: 'dropDb', required: true }], takesReference: true, outputs: [{ name: 'lowerHz', unit: 'Hz' }, { name: 'q', unit: '1' }] };
const peak = { name: 'peak', parameters: [{ name: 'fromHz', required: false }, { name: 'toHz', required: false }], takesReference: false, outputs: [] };
const typed = (fields) => (name) => fields[name] ?? '';

test('Names of the API are words, and one that is not known is taken apart', () => {
  assert.deepEqual(['dropDb', 'q', 'someNewThingHz'].map(nameOf), ['Drop', 'Q', 'Some new thing']);
  assert.deepEqual(['fromHz', 'dropDb', 'phaseDeg', 'delaySeconds', 'apertureRatio'].map(unitOf), ['Hz', 'dB', 'deg', 's', '']);
});

test('A form is a call, with prefixes and commas understood and what is left out left out', () => {
  assert.deepEqual(callOf(bandwidth, typed({ dropDb: '3,01 dB', kind: 'band', 'reference.fromHz': '1k', 'reference.toHz': '2 kHz' })).call,
    { measure: 'bandwidth', parameters: { dropDb: 3.01, reference: { kind: 'band', fromHz: 1_000, toHz: 2_000 } } });
  assert.deepEqual(callOf(bandwidth, typed({ dropDb: '3' })).call.parameters.reference, { kind: 'peak' });
  assert.deepEqual(callOf(peak, typed({ toHz: '1M' })).call.parameters, { toHz: 1e6 });
});

test('What is missing or no number is told at its field', () => {
  const { call, errors } = callOf(bandwidth, typed({ dropDb: '', kind: 'frequency', 'reference.frequencyHz': 'x' }));
  assert.equal(call, null);
  assert.deepEqual(Object.keys(errors), ['dropDb', 'reference.frequencyHz']);
  assert.match(errors.dropDb, /dB/);
});

test('A call is told in words with its units', () => {
  assert.equal(callWords({ measure: 'bandwidth', parameters: { dropDb: 3, reference: { kind: 'frequency', frequencyHz: 1_000 } } }), 'Bandwidth, drop 3.00\u00a0dB, from the level at 1\u00a0kHz');
  assert.equal(callWords({ measure: 'loopMargins', parameters: {} }), 'Loop margins');
});

test('Outputs come in the order of the catalogue, an absent one as a dash', () => {
  assert.deepEqual(outputsOf({ outputs: { q: 0.7, lowerHz: null } }, bandwidth).map(({ name, text }) => [name, text]), [['Lower cutoff', '\u2013'], ['Q', '0.7']]);
  assert.deepEqual(outputsOf({ outputs: { delaySeconds: 1e-6, inverted: true } }, undefined).map(({ text }) => text), ['1\u00a0\u00b5s', 'yes']);
});

test('A range of days holds the whole of its last day', () => {
  const { from, to } = rangeOf('2026-03-01', '2026-03-31');
  assert.equal(new Date(from).getTime(), new Date(2026, 2, 1).getTime());
  assert.equal(new Date(to).getTime(), new Date(2026, 3, 1).getTime());
  assert.deepEqual(rangeOf('', 'yesterday'), {});
});
