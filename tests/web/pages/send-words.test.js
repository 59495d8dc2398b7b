import assert from 'node:assert/strict';
import test from 'node:test';
import { choiceWords, foundWords, holds, spanWords } from '../../../web/pages/send-words.js';
import { maskAround } from '../../../web/pages/send-mask.js';
import { limitAt } from '../../../web/plots/limit-area.js';
import { limitOf } from '../../../web/plots/trace-set.js';
import { filesOf } from '../../../web/parts/incoming.js';

const columns = [{ column: 1, head: 'f', quantity: 'frequency', unit: 'Hz' }, { column: 2, head: '', quantity: 'gainDb', unit: 'dB' }, { column: 3, head: 'x', quantity: 'ignore', unit: '' }];

test('Columns are told by what they hold', () => {
  assert.deepEqual(columns.map(holds), ['frequency in Hz', 'gain in dB', 'left aside']);
  assert.equal(holds({ quantity: 'phase', unit: 'deg' }), 'phase in degrees');
  assert.equal(foundWords({ columns, reader: 'delimited' }), 'frequency in Hz, gain in dB');
  assert.equal(foundWords({ columns: [], reader: 'touchstone', choices: { parameter: 'S21' } }), 'Touchstone, S21');
});

test('A choice names each column by its head or its number', () => {
  assert.deepEqual(choiceWords(columns, columns), ['\u201cf\u201d is frequency in Hz', 'column 2 is gain in dB']);
  assert.deepEqual(choiceWords({ parameter: 'S31', columns: [] }, []), ['parameter S31']);
});

test('A span is told with the points of the file, not of its picture', () => {
  assert.equal(spanWords({ points: 200_000, trace: { frequencyHz: [10, 1e5] } }), '200\u202f000 points, 10\u00a0Hz to 100\u00a0kHz');
});

test('A first mask holds its run at the distance, and nothing that is further away', () => {
  const frequencyHz = Array.from({ length: 101 }, (_, i) => 10 * 10 ** (i / 25));
  const gainDb = frequencyHz.map((f) => -10 * Math.log10(1 + (f / 1_000) ** 2));
  const { limits, words } = maskAround({ frequencyHz, gainDb }, { distanceDb: 1, fromHz: 10, toHz: 1e5 });
  assert.deepEqual(limits.map(({ side, quantity, basis }) => [side, quantity, basis]), [['upper', 'gainDb', 'absolute'], ['lower', 'gainDb', 'absolute']]);
  assert.ok(limits.every(({ corners }) => corners.length >= 2 && corners.length <= 40));
  assert.match(words, /^\d+.corners above and \d+ below/);
  for (const limit of limits) {
    const sign = limit.side === 'upper' ? 1 : -1;
    frequencyHz.forEach((f, i) => {
      const away = sign * (limitAt(limitOf(limit), f) - gainDb[i]);
      assert.ok(away <= 1 + 1e-9 && away > 0.75, `${limit.side} at ${f}: ${away}`);
    });
  }

  assert.deepEqual(maskAround({ frequencyHz, gainDb }, { distanceDb: 1, fromHz: 2e5, toHz: 3e5 }).limits, []);
});

test('Dropped folders give their files, hidden ones aside, and what cannot be read is counted', async () => {
  const file = (name) => ({ isFile: true, isDirectory: false, file: (done) => done({ name }) });
  const lost = { isFile: true, isDirectory: false, file: (_, failed) => failed(new Error('gone')) };
  const folder = (pieces) => ({ isFile: false, isDirectory: true, createReader: () => ({ readEntries: (done) => done(pieces.shift() ?? []) }) });
  const found = await filesOf([file('a'), folder([[file('b'), lost], [folder([[file('c'), file('.hidden')]])]])]);
  assert.deepEqual([found.files.map(({ name }) => name), found.lost], [['a', 'b', 'c'], 1]);
});
