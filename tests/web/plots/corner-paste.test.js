import assert from 'node:assert/strict';
import { test } from 'node:test';
import { parseCorners } from '../../../web/plots/corner-paste.js';

const pairs = (text, unit = 'dB') => {
  const { corners, problems } = parseCorners(text, unit);
  assert.deepEqual(problems, []);
  return corners.map((c) => [c.frequencyHz, c.value]);
};
const expected = [[20, 1.5], [1000, 1.5], [20_000, -3.25]];

test('the same table is read with tabs, semicolons, commas and blanks, with point and comma', () => {
  const tables = [
    '20\t1.5\r\n1000\t1.5\r\n20000\t-3.25\r\n',
    '20\t1,5\n1000\t1,5\n20000\t-3,25',
    '20;1,5\n1000;1,5\n20000;-3,25',
    '20; 1.5\n1000; 1.5\n20000; -3.25\n\n',
    '20,1.5\n1000,1.5\n20000,-3.25',
    '20, 1.5\n1000, 1.5\n20000, -3.25',
    '20 1.5\n1000   1.5\n 20000 -3.25',
    '20 1,5\n1000 1,5\n20000 -3,25',
    '20 Hz\t1.5 dB\n1 kHz\t1.5 dB\n20k\t\u22123.25 dB',
  ];
  for (const table of tables) assert.deepEqual(pairs(table), expected, table);
});

test('a head gives the unit of the frequencies', () => {
  assert.deepEqual(pairs('Frequency (kHz)\tLimit (dB)\n0,02\t1,5\n1\t1,5\n20\t-3,25'), expected);
  assert.deepEqual(pairs('Frequenz [Hz];Grenze\n20;1,5\n1000;1,5\n20000;-3,25'), expected);
  assert.deepEqual(pairs('f,limit\n20,1.5\n1000,1.5\n20000,-3.25'), expected);
  assert.match(parseCorners('f / MHz\tdB\n1\t0\n2\t0', 'dB').notes[0], /MHz/);
});

test('seconds may have prefixes', () => assert.deepEqual(pairs('100\t20 µs\n1000\t1,5m', 's'), [[100, 20e-6], [1000, 1.5e-3]]));

test('thousands are not decimals', () => assert.deepEqual(pairs('1.000,5;1,25\n20.000,0;2'), [[1000.5, 1.25], [20_000, 2]]));

test('empty cells at the end of a row do not count', () => assert.deepEqual(pairs('20\t1.5\t\t\n1000\t1.5\t\t\n20000\t-3.25'), expected));

test('corners are sorted, a step keeps its order, and it is said', () => {
  const { corners, notes } = parseCorners('1000\t1\n100\t5\n100\t-5', 'dB');
  assert.deepEqual(corners.map((c) => c.value), [5, -5, 1]);
  assert.match(notes.join(' '), /sorted/);
  assert.deepEqual(parseCorners('10\t1\n100\t5', 'dB').notes, []);
});

test('a faulty line is named by its number in the text', () => {
  const problems = (text) => parseCorners(text, 'dB').problems;
  assert.equal(problems('f\tdB\n\n20\t1\n30\tx')[0].line, 4);
  assert.match(problems('20\t1\n30\tx')[0].sentence, /Value: "x" is no number/);
  assert.match(problems('20\t1\t3\n30\t1\t2')[0].sentence, /there are 3/);
  assert.match(problems('20\t1\n30')[0].sentence, /Two columns/);
  assert.match(problems('20\t\n30\t1')[0].sentence, /there is one/);
  assert.match(problems('\t5\n30\t1')[0].sentence, /there is one/);
  assert.match(problems('20 V\t1\n30\t1')[0].sentence, /Frequency/);
});

test('nothing at all, or a head alone, is told', () => {
  assert.match(parseCorners(' \n ', 'dB').problems[0].sentence, /nothing to paste/);
  assert.match(parseCorners('Hz\tdB', 'dB').problems[0].sentence, /no corner/);
});
