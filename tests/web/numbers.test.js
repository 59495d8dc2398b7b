import assert from 'node:assert/strict';
import test from 'node:test';
import * as numbers from '../../web/numbers.js';

const plain = (text) => text.replaceAll('\u00a0', ' ').replaceAll('\u2212', '-').replaceAll('\u202f', ' ');

test('A frequency has the prefix that leaves one to three digits before the point', () => {
  for (const [hz, shown] of [[0, '0 Hz'], [0.5, '500 mHz'], [1, '1 Hz'], [20, '20 Hz'], [999.94, '999.9 Hz'], [999.96, '1 kHz'], [1250, '1.25 kHz'], [12_345_678, '12.35 MHz'], [6e9, '6 GHz']])
    assert.equal(plain(numbers.frequency(hz)), shown);
});

test('Short times have prefixes down to pico', () => {
  for (const [seconds, shown] of [[12.3e-6, '12.3 \u00b5s'], [1.5e-12, '1.5 ps'], [-2e-3, '-2 ms'], [3e-15, '0.003 ps'], [1e15, '1000 Ts']])
    assert.equal(plain(numbers.withPrefix(seconds, 's')), shown);
});

test('What is absent is an en dash everywhere', () => {
  for (const value of [null, undefined, NaN, Infinity]) {
    for (const shown of [numbers.frequency(value), numbers.margin(value, 'dB'), numbers.significant(value), numbers.fixed(value), numbers.quantity(value, 's'), numbers.count(value)])
      assert.equal(shown, '\u2013');
  }

  for (const time of [null, undefined, 'no time'])
    assert.deepEqual([numbers.day(time), numbers.dayAndTime(time), numbers.age(time, 0)], ['\u2013', '\u2013', '\u2013']);
  assert.equal(numbers.percent(0, 0), '\u2013');
});

test('A margin has its sign, and one that is not zero never shows as zero', () => {
  for (const [value, unit, shown] of [
    [0.4212, 'dB', '+0.42 dB'], [-3.0103, 'dB', '-3.01 dB'], [0, 'dB', '0.00 dB'], [-0.0004, 'dB', '-0.0004 dB'], [0.004, 'dB', '+0.004 dB'], [1e-9, 'dB', '+0.000000001 dB'],
    [12.34, 'deg', '+12.3\u00b0'], [-1500, 'Hz', '-1.5 kHz'], [2.5e-6, 's', '+2.5 \u00b5s'], [-0.7071, '1', '-0.7071'], [-20, 'dB/decade', '-20.00 dB/decade']])
    assert.equal(plain(numbers.margin(value, unit)), shown);
});

test('A minus on the screen is a minus and no hyphen', () => {
  assert.equal(numbers.quantity(-3, 'dB'), '\u22123.00\u00a0dB');
});

test('A share says all or nothing only where it is all or nothing', () => {
  for (const [part, whole, shown] of [[24, 24, '100 %'], [21, 24, '87.5 %'], [9_999, 10_000, '99.9 %'], [1, 10_000, '0.1 %'], [0, 24, '0 %']])
    assert.equal(plain(numbers.percent(part, whole)), shown);
});

test('Counts have their thousands apart and words their plural', () => {
  assert.equal(plain(numbers.count(1_234_567)), '1 234 567');
  assert.deepEqual([numbers.several(1, 'unit'), numbers.several(2, 'unit'), numbers.several(0, 'entry', 'entries')].map(plain), ['1 unit', '2 units', '0 entries']);
});

test('An age is said in the largest unit that is not too coarse', () => {
  const now = Date.parse('2026-12-01T12:00:00Z');
  for (const [time, shown] of [
    ['2026-12-01T11:59:30Z', 'just now'], ['2026-12-01T12:00:30Z', 'just now'], ['2026-12-01T11:48:00Z', '12 min'], ['2026-12-01T07:00:00Z', '5 h'], ['2026-11-30T12:00:00Z', '1 day'],
    ['2026-11-11T12:00:00Z', '20 days'], ['2026-10-20T12:00:00Z', '6 weeks'], ['2026-06-01T12:00:00Z', '6 months'], ['2025-06-01T12:00:00Z', '18 months'], ['2020-11-20T00:00:00Z', '6 years']])
    assert.equal(plain(numbers.age(time, now)), shown);
});

test('Times are shown in the zone of the browser', () => {
  const time = new Date(2026, 10, 3, 4, 5);
  assert.equal(numbers.dayAndTime(time.toISOString()), '2026-11-03 04:05');
  assert.equal(numbers.day(time), '2026-11-03');
});

test('A typed number is read with prefix, unit, comma, blanks and either minus', () => {
  for (const [typed, unit, value] of [
    ['12k', 'Hz', 12_000], ['1,5 kHz', 'Hz', 1_500], ['1.1 k', 'Hz', 1_100], ['10 MHz', 'Hz', 10e6], ['10 meg', 'Hz', 10e6], ['3e3', 'Hz', 3_000], ['12500', 'Hz', 12_500], ['1 000', 'Hz', 1_000],
    ['-3.01 dB', 'dB', -3.01], ['\u22123,01', 'dB', -3.01], ['+6', 'dB', 6], ['-180\u00b0', 'deg', -180], ['45 deg', 'deg', 45], ['12.3 us', 's', 12.3e-6], ['12.3\u00b5', 's', 12.3e-6], ['4 \u03bcs', 's', 4e-6],
    ['1.234,5', '', 1_234.5], ['1,234.5', '', 1_234.5], ['1,234,567', '', 1_234_567], ['.5', '', 0.5], ['5.', '', 5], ['0k', 'Hz', 0], ['0.3 m', 's', 3e-4]])
    assert.deepEqual(numbers.parseNumber(typed, unit), { value, problem: '' }, typed);
});

test('A typed text that is no number in this unit is refused with the way to write it', () => {
  for (const [typed, unit] of [['', 'Hz'], ['abc', 'Hz'], ['12 dB', 'Hz'], ['3 kdB', 'dB'], ['1k', ''], ['1.2.3', ''], ['1,23,456', ''], ['--3', 'dB'], ['1e999', ''], ['.', ''], ['12 kV', 'Hz'], ['1,234.567.8', '']]) {
    const read = numbers.parseNumber(typed, unit);
    assert.equal(read.value, null, typed);
    assert.match(read.problem, /^.*\.$/);
  }
});

test('What is shown can be typed again', () => {
  for (const value of [0, 0.5, 1, 20, 999.9, 1_250, 12_340_000, 6e9])
    assert.equal(numbers.parseNumber(numbers.frequency(value), 'Hz').value, value);
  for (const value of [-3.01, 0, 12.5])
    assert.equal(numbers.parseNumber(numbers.margin(value, 'dB'), 'dB').value, value);
});
