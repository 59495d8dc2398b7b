import assert from 'node:assert/strict';
import test from 'node:test';
import { evidenceOf, filterOf, filtersOf, fingerprint, fittingUnits, placeOf, pointsFor, runOf, shape, unitOfRun, unnamed } from '../../web/pages/lot-state.js';
import { printState, readState } from '../../web/router.js';

const unit = (serial, outcome, more = {}) => ({
  serial, outcome, runs: 1, retests: 0, invalidated: 0, disposition: null,
  conditions: [{ conditionId: 'c1', runId: outcome === null ? null : `run of ${serial}` }, { conditionId: 'c2', runId: `hot ${serial}` }], ...more,
});

const units = [
  unit('SN1', 'fail'),
  unit('SN2', 'fail', { disposition: { disposition: 'scrap', reason: 'Burnt.' } }),
  unit('SN3', 'inconclusive'),
  unit('SN4', null, { retests: 1 }),
  unit('SN5', 'pass', { invalidated: 2 }),
];

const lot = (changes = {}) => ({
  size: 6, stale: 0, state: 'open', lastRunAt: null, decision: null, blockers: [], conditions: [{ maskRevision: 1 }],
  counts: { units: 5, tested: 4, passed: 1, failed: 2, inconclusive: 1, withdrawn: 1, conceded: 0, retests: 1 },
  firstPass: { tested: 4, passed: 1 }, worst: { criterion: 'passband', frequencyHz: 3200, margin: -0.4, unit: 'dB', outcome: 'fail', serial: 'SN1' }, ...changes,
});

const plain = (words) => words.replaceAll('\u00a0', ' ');
const serials = (filter, find = '') => fittingUnits(units, filter, find).map(({ serial }) => serial);

test('Each filter shows the units of its name, in their order', () => {
  assert.deepEqual(serials('all'), ['SN1', 'SN2', 'SN3', 'SN4', 'SN5']);
  assert.deepEqual(serials('failing'), ['SN1', 'SN2']);
  assert.deepEqual(serials('inconclusive'), ['SN3']);
  assert.deepEqual(serials('untested'), ['SN4']);
  assert.deepEqual(serials('open'), ['SN1', 'SN3', 'SN4']);
  assert.deepEqual(serials('disposed'), ['SN2']);
  assert.deepEqual(serials('retested'), ['SN4', 'SN5']);
  assert.deepEqual(serials('all', ' sn3 '), ['SN3']);
});

test('Filters that fit no unit are left out, but the usual ones and the chosen one stand', () => {
  const passing = [unit('SN1', 'pass')];
  assert.deepEqual(filtersOf({ size: 1, counts: { units: 1 } }, passing, 'all').map(({ filter, count }) => [filter, count]), [['all', 1], ['failing', 0], ['inconclusive', 0], ['untested', 0]]);
  assert.ok(filtersOf(lot(), passing, 'disposed').some(({ filter }) => filter === 'disposed'));
  assert.ok(filtersOf(lot(), units, 'all').some(({ filter }) => filter === 'retested'));
});

test('Units without a name count as untested', () => {
  assert.equal(filtersOf(lot({ size: 9 }), units, 'all').find(({ filter }) => filter === 'untested')?.count, 1 + 4);
});

test('A run leads to its unit in whatever condition, and a unit to its run in one', () => {
  assert.equal(unitOfRun(units, 'hot SN4')?.serial, 'SN4');
  assert.equal(unitOfRun(units, 'of another lot'), null);
  assert.equal(unitOfRun(units, null), null);
  assert.equal(runOf(units[0], 'c1'), 'run of SN1');
  assert.equal(runOf(units[3], 'c1'), null);
  assert.equal(runOf(null, 'c1'), null);
});

test('A lot without a blocker can be approved, with a concession alone only so, and else not or not yet', () => {
  assert.equal(evidenceOf(lot(), units).standing, 'approve');
  assert.equal(evidenceOf(lot({ blockers: [{ code: 'concessionNeeded', sentence: 'One.' }] }), units).standing, 'concession');
  const both = evidenceOf(lot({ blockers: [{ code: 'unitsNotPassed', sentence: 'Two.' }, { code: 'concessionNeeded', sentence: 'One.' }] }), units);
  assert.equal(both.standing, 'testing');
  assert.equal(evidenceOf(lot({ size: 4, blockers: [{ code: 'unitsNotPassed', sentence: 'Two.' }] }), units).standing, 'not');
  assert.deepEqual(both.con.slice(0, 2).map(({ sentence }) => sentence), ['Two.', 'One.']);
});

test('What was invalidated, retested and withdrawn is told even where nothing blocks', () => {
  const { con, pro } = evidenceOf(lot(), units);
  assert.deepEqual(con.map(({ sentence }) => plain(sentence)), ['2 runs were invalidated.', '1 retest does not count.', '16.7 % of the lot is withdrawn.']);
  assert.ok(pro.some(({ sentence }) => plain(sentence) === '1 unit is withdrawn and will not ship: 1 scrap.'));
});

test('A margin speaks for release only where it is one', () => {
  assert.ok(!evidenceOf(lot(), units).pro.some(({ code }) => code === 'margin'));
  const good = evidenceOf(lot({ worst: { criterion: 'passband', frequencyHz: 3200, margin: 0.31, unit: 'dB', outcome: 'pass', serial: 'SN7' } }), []);
  assert.equal(plain(good.pro.find(({ code }) => code === 'margin')?.sentence ?? ''), 'The least margin is +0.31 dB: passband at 3.2 kHz, unit SN7.');
});

test('Verdicts are called current only while none is pending and each condition has a mask', () => {
  const isCurrent = (changes) => evidenceOf(lot(changes), units).pro.some(({ code }) => code === 'current');
  assert.ok(isCurrent({}));
  assert.ok(!isCurrent({ stale: 1 }));
  assert.ok(!isCurrent({ conditions: [{ maskRevision: 1 }, { maskRevision: null }] }));
});

test('A worst criterion says where it lies, if it lies anywhere', () => {
  assert.equal(plain(placeOf({ criterion: 'bandwidth', frequencyHz: null })), 'bandwidth');
  assert.equal(plain(placeOf({ criterion: 'top', frequencyHz: 12_500 })), 'top at 12.5 kHz');
  assert.equal(placeOf({ criterion: 'Gain at 1 kHz', frequencyHz: 1_000 }), 'Gain at 1 kHz');
  assert.equal(placeOf(null), '');
});

test('Small lots are read in full and large ones in fewer points', () => {
  assert.equal(pointsFor(1), 4_000);
  assert.equal(pointsFor(0), 4_000);
  assert.ok(pointsFor(96) >= 1_601);
  assert.equal(pointsFor(1_000), 800);
});

test('Units without a name are told as long as there are some', () => {
  assert.equal(plain(unnamed({ size: 6, counts: { units: 5 } })), "1 more unit of the lot's 6 has no run and no serial number yet.");
  assert.equal(unnamed({ size: 5, counts: { units: 5 } }), '');
});

test('A point about units leads to the filter that shows them', () => {
  assert.equal(filterOf('unitsNotPassed'), 'open');
  assert.equal(filterOf('noReleasedMask'), null);
});

test('The state of the page comes back from its address, and the usual state leaves it plain', () => {
  const state = { condition: 'hot, 2 k\u03a9', show: 'gainDelay', basis: 'levelled', level: 1000, view: '20~2000,-6~3', at: 3162.2777, unit: 'SN 1/2', units: 'failing', find: 'SN' };
  assert.deepEqual({ ...readState(shape, new URLSearchParams(printState(shape, state))) }, state);
  assert.deepEqual(printState(shape, readState(shape, '')), {});
  assert.equal(readState(shape, 'show=all&units=none&at=x').show, 'gainPhase');
});

test('A lot is read anew when its counts, its worst margin or its state change, and not when nothing does', () => {
  assert.equal(fingerprint(lot()), fingerprint(lot()));
  for (const change of [{ stale: 1 }, { state: 'approved' }, { lastRunAt: '2026-12-01T00:00:00Z' }, { counts: {} }, { worst: null }])
    assert.notEqual(fingerprint(lot(change)), fingerprint(lot()));
});
