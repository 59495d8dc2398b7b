import assert from 'node:assert/strict';
import test from 'node:test';
import * as rows from '../../../web/pages/send-rows.js';

const trace = { frequencyHz: [10, 100], gainDb: [0, -3], phaseDeg: null, notes: [] };
const read = { read: 'read', preview: { trace, candidates: [], columns: [], notes: [], issues: [], issueCount: 0, headsDigest: 'a' } };
const place = { ...rows.noPlace, deviceId: 'd', lotId: 'l', bench: 'B' };
const row = (id, more = {}) => ({ ...rows.rowOf(id, { name: `S${id}_a.csv`, size: 1, lastModified: Date.UTC(2026, 2, 1, 9, 30) }), ...read, ...more });
const result = (outcome, more = {}) => ({ sent: 'done', result: { outcome, runId: 'r', serial: 'S', verdict: null, notes: [], issues: [], candidates: [], ...more } });

test('A serial number is what stands before the first underscore, else the name without its ending', () => {
  assert.deepEqual(['S1_a.csv', 'S1.csv', 'a.b.csv', 'S1', ' S1 _x', '_x.csv', '.csv', `${'x'.repeat(101)}_1`].map(rows.serialInName), ['S1', 'S1', 'a.b', 'S1', 'S1', '', '', '']);
});

test('What is typed goes before what the name gives, and a blank is told', () => {
  assert.equal(rows.serialOf(row(1)), 'S1');
  assert.equal(rows.serialOf(row(1, { serial: ' T9 ' })), 'T9');
  assert.match(rows.lacking(row(1, { serial: '' }), place).serial, /serial/);
  assert.deepEqual(rows.lacking(row(1), place), {});
});

test('Only a production run needs a lot, and a stated time must be stated', () => {
  assert.deepEqual(Object.keys(rows.lacking(row(1), { ...rows.noPlace })), ['deviceId', 'lotId', 'bench']);
  assert.deepEqual(Object.keys(rows.lacking(row(1), { ...place, lotId: '', purpose: 'study' })), []);
  assert.deepEqual(Object.keys(rows.lacking(row(1), { ...place, measured: 'given' })), ['measuredAt']);
});

test('A file with a device of its own has no lot and no condition of the batch', () => {
  const own = row(1, { own: { deviceId: 'other' } });
  assert.deepEqual([rows.placeOf(own, { ...place, conditionId: 'c' }).lotId, rows.placeOf(own, { ...place, conditionId: 'c' }).conditionId], ['', '']);
  assert.equal(rows.placeOf(row(1, { own: { lotId: 'm' } }), place).lotId, 'm');
  assert.equal(rows.stageOf(own, place), 'lacking');
});

test('What was sent stays where it was sent for, whatever the batch says later', () => {
  const sent = row(1, { at: { ...place, lotId: 'first' }, own: {} });
  assert.equal(Object.fromEntries(rows.fieldsOf(sent, { ...place, lotId: 'second' })).lot, 'first');
});

test('What the batch lacks is not asked of each file', () => {
  assert.equal(rows.stageOf(row(1), rows.noPlace), 'placeless');
  assert.equal(rows.stageOf(row(1, { serial: '' }), rows.noPlace), 'lacking');
  assert.equal(rows.stageOf(row(1, { own: { bench: '' } }), place), 'lacking');
});

test('Each state of a file has its stage', () => {
  const open = row(1, { preview: { ...read.preview, trace: null, candidates: [[]] } });
  const stages = [
    [row(1, { read: 'waiting', preview: null }), 'reading'],
    [row(1, { read: 'refused', preview: null, problem: 'Too large.' }), 'unreadable'],
    [row(1, { preview: { ...read.preview, trace: null } }), 'unreadable'],
    [open, 'open'],
    [row(1), 'ready'],
    [row(1, { sent: 'queued' }), 'queued'],
    [row(1, { sent: 'sending' }), 'sending'],
    [row(1, result('accepted')), 'accepted'],
    [row(1, result('duplicate')), 'duplicate'],
    [row(1, result('refused', { issues: [{ code: 'lotDecided' }] })), 'refused'],
    [row(1, result('refused', { issues: [{ code: 'sameFileOtherUnit' }] })), 'sameBytes'],
    [row(1, { sent: 'done', problem: 'No.' }), 'refused'],
  ];
  assert.deepEqual(stages.map(([one]) => rows.stageOf(one, place)), stages.map(([, stage]) => stage));
  const counts = rows.counted(stages.map(([one]) => one), place);
  assert.deepEqual(counts, { all: 12, reading: 1, asks: 2, placeless: 0, ready: 1, underWay: 2, sent: 2, refused: 4 });
});

test('Open files are asked about once for the same heads, and apart without', () => {
  const preview = (headsDigest, candidates) => ({ ...read.preview, trace: null, headsDigest, candidates });
  const open = [row(1, { preview: preview('a', [[1]]) }), row(2, { preview: preview('b', [[1]]) }), row(3, { preview: preview('a', [[2]]) }), row(4, { preview: preview(null, [[1]]) }), row(5, { preview: preview(null, [[1]]) })];
  assert.deepEqual(rows.openGroups(open).map((group) => group.map(({ id }) => id)), [[1, 3], [2], [4, 5]]);
  assert.deepEqual(rows.openGroups([row(1, { preview: preview('a', [[1]]), columns: [] })]), []);
});

test('Behind the first file of a unit in a lot and condition stand retests', () => {
  const some = [row(1), row(2, { serial: 'S1' }), row(3, { serial: 'S1', own: { conditionId: 'hot' } }), row(4, { serial: 'S1', own: { purpose: 'study' } }), row(5)];
  assert.deepEqual([...rows.repeated(some, place)], [2]);
});

test('Only what is said is sent, and the file\'s own time as it was written', () => {
  assert.deepEqual(rows.fieldsOf(row(1), place), [['device', 'd'], ['lot', 'l'], ['bench', 'B'], ['serial', 'S1'], ['purpose', 'production']]);
  const all = Object.fromEntries(rows.fieldsOf(row(1, { columns: [{ column: 1 }], acknowledged: true }), { ...place, conditionId: 'c', measured: 'file' }, { loadOhm: 50 }));
  assert.deepEqual([all.measuredAt, all.columns, all.acknowledge, all.condition, all.circumstances], ['2026-03-01T09:30:00.000Z', '[{"column":1}]', 'sameFileOtherUnit', 'c', '{"loadOhm":50}']);
});

test('An answer is a result, a refusal, a reason to try again, or a reason to stand still', () => {
  const answer = (status, body = null, code = '') => ({ ok: status < 300 && status > 0, status, code, sentence: 'Said.', errors: {}, body });
  assert.equal(rows.meaningOf(answer(201, { results: [{ outcome: 'accepted' }] })).kind, 'result');
  assert.equal(rows.meaningOf(answer(422, { results: [{ outcome: 'refused' }] })).result.outcome, 'refused');
  assert.deepEqual([0, 429, 500, 503].map((status) => rows.meaningOf(answer(status)).kind), ['again', 'again', 'again', 'again']);
  assert.deepEqual([401, 403].map((status) => rows.meaningOf(answer(status))), [{ kind: 'stop', sentence: 'You are not signed in any more.' }, { kind: 'stop', sentence: 'Said.' }]);
  assert.equal(rows.meaningOf(answer(0, null, 'stopped')).kind, 'stop');
  assert.deepEqual([413, 422].map((status) => rows.meaningOf(answer(status))), [{ kind: 'refused', sentence: 'Said.' }, { kind: 'refused', sentence: 'Said.' }]);
});

test('Where an issue stands is told as exactly as it is known', () => {
  assert.deepEqual([{ line: null, column: null }, { line: 3, column: null }, { line: 3, column: 2 }].map(rows.whereOf), ['whole file', 'line 3', 'line 3, column 2']);
});

test('A batch is summed up by what became of its files', () => {
  const some = [row(1, result('accepted', { verdict: { outcome: 'pass' } })), row(2, result('accepted', { verdict: { outcome: 'fail' } })), row(3, result('duplicate')), row(4, result('refused'))];
  assert.equal(rows.outcomeSentence(some, place), '2\u00a0runs taken, 1 of them fails, 1 known already, 1 refused.');
});
