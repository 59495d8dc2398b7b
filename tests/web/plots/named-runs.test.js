import assert from 'node:assert/strict';
import { test } from 'node:test';
import { backgroundGroups, mostNamed, namedRuns, outcomeWord, styleOf } from '../../../web/plots/named-runs.js';

const run = (i, outcome = 'pass') => ({ runId: `r${i}`, serial: `S${i}`, outcome });
const lot = (count, odd = {}) => Array.from({ length: count }, (_, i) => run(i, odd[i] ?? 'pass'));
const ids = (named) => named.map((n) => n.run.runId);

test('a few runs all have names', () => assert.equal(namedRuns(lot(mostNamed)).length, mostNamed));

test('of many runs those that do not pass have names, the gravest first', () => {
  assert.deepEqual(ids(namedRuns(lot(50, { 7: 'inconclusive', 20: 'fail', 31: 'conditionalFail', 44: 'fail', 45: 'conditionalPass' }))), ['r20', 'r44', 'r31', 'r7']);
});

test('never more have names than can be told apart', () => {
  const all = Object.fromEntries(Array.from({ length: 50 }, (_, i) => [i, 'fail']));
  assert.equal(namedRuns(lot(50, all)).length, mostNamed);
});

test('a choice goes before outcomes, in its own order', () => {
  assert.deepEqual(ids(namedRuns(lot(50, { 3: 'fail' }), ['r9', 'gone', 'r2'])), ['r9', 'r2']);
  assert.deepEqual(namedRuns(lot(50, { 3: 'fail' }), []), []);
});

test('no two named runs look the same, and neighbours differ in colour and dash', () => {
  const looks = Array.from({ length: 20 }, (_, i) => JSON.stringify(styleOf(i)));
  assert.equal(new Set(looks).size, 20);
  for (let i = 1; i < mostNamed; i++) {
    assert.notEqual(styleOf(i).colour, styleOf(i - 1).colour);
    assert.notDeepEqual(styleOf(i).dash, styleOf(i - 1).dash);
  }
});

test('a run is in the background once, and odd ones lie over plain ones', () => {
  const all = Object.fromEntries(Array.from({ length: 10 }, (_, i) => [i, 'fail']));
  const runs = lot(30, all);
  const groups = [...backgroundGroups(runs, namedRuns(runs))];
  assert.deepEqual([groups.filter((g) => g === 255).length, groups.filter((g) => g === 1).length, groups.filter((g) => g === 0).length], [8, 2, 20]);
});

test('a run that is not judged has no word', () => {
  assert.equal(outcomeWord(null), '');
  assert.equal(outcomeWord('fail'), 'fails');
});
