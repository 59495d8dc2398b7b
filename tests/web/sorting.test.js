import assert from 'node:assert/strict';
import test from 'node:test';
import { sorted } from '../../web/parts/sorting.js';

const by = (row) => row.value;
const rows = (...values) => values.map((value, at) => ({ value, at }));
const values = (sortedRows) => sortedRows.map((row) => row.value);

test('Numbers go by size and texts as people sort them', () => {
  assert.deepEqual(values(sorted(rows(10, 9, -1), by)), [-1, 9, 10]);
  assert.deepEqual(values(sorted(rows('SN 10', 'SN 9', 'SN 1'), by)), ['SN 1', 'SN 9', 'SN 10']);
});

test('What is absent comes last in either direction', () => {
  assert.deepEqual(values(sorted(rows(null, 2, undefined, 1), by)), [1, 2, null, undefined]);
  assert.deepEqual(values(sorted(rows(null, 2, undefined, 1), by, true)), [2, 1, null, undefined]);
});

test('Equal rows stay as they were, and nothing is changed in place', () => {
  const given = rows(1, 1, 0);
  assert.deepEqual(sorted(given, by).map((row) => row.at), [2, 0, 1]);
  assert.deepEqual(sorted(given, by, true).map((row) => row.at), [0, 1, 2]);
  assert.deepEqual(values(given), [1, 1, 0]);
  assert.equal(sorted(given, undefined), given);
});
