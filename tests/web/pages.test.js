import assert from 'node:assert/strict';
import { readFileSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import test from 'node:test';
import { fileURLToPath } from 'node:url';
import { serialOf } from '../../web/pages/bench-serial.js';
import { stepsOf, summaryOf } from '../../web/pages/checklist-steps.js';
import { aboutOf, kindGroups, kindWords, wordsOf } from '../../web/pages/ledger-words.js';
import { stateOf } from '../../web/pages/tokens-state.js';

const now = Date.parse('2026-12-01T12:00:00Z');

test('A bench without a pattern takes the part before the first underscore, else the stem', () => {
  assert.equal(serialOf('SN0042_hot_1.csv', ''), 'It finds the serial number SN0042.');
  assert.equal(serialOf('SN0042.v2.csv', ''), 'It finds the serial number SN0042.v2.');
  assert.equal(serialOf('_x.csv', ''), 'It finds nothing in this name.');
});

test('A pattern finds its group, else all that it matches, else nothing', () => {
  assert.equal(serialOf('lot7-SN12.csv', 'SN(?<serial>\\d+)'), 'It finds the serial number 12.');
  assert.equal(serialOf('lot7-SN12.csv', 'SN\\d+'), 'It finds the serial number SN12.');
  assert.match(serialOf('other.csv', 'SN\\d+'), /finds nothing/);
  assert.match(serialOf('other.csv', '('), /cannot try/);
});

test('A token is valid, soon expires, is expired, or is revoked whatever its date', () => {
  const token = (expiresAt, revokedAt = null) => ({ expiresAt, revokedAt });
  assert.deepEqual(
    [token('2027-12-01T12:00:00Z'), token('2026-12-11T12:00:00Z'), token('2026-11-30T12:00:00Z'), token('2027-12-01T12:00:00Z', '2026-11-01T00:00:00Z')].map((one) => stateOf(one, now).state),
    ['valid', 'soon', 'expired', 'revoked']);
  assert.equal(stateOf(token('2026-12-11T12:00:00Z'), now).words.replaceAll('\u00a0', ' '), 'expires in 10 days');
});

test('An entry is about names, numbers and the pages of its ids', () => {
  assert.deepEqual(aboutOf({ lotId: 'a', number: '17', benchId: null, unitId: 'u', serialNumber: 'SN 1' }), [
    { text: 'number 17', href: null }, { text: 'serial number SN 1', href: null }, { text: 'lot', href: '/lots/a' }]);
  assert.deepEqual(aboutOf({ lotId: 'a' }, { decision: 'approve', reason: 'All pass', sha256: 'x', old: { a: 1 } }).map(({ text }) => text), ['decision approve', 'reason All pass', 'lot']);
  assert.equal(wordsOf('run.received'), 'Run received');
  assert.equal(wordsOf('new.kind'), 'new.kind');
});

test('Every kind that has words has a group to be filtered by', () => {
  const groups = kindGroups.map(([group]) => group);
  assert.deepEqual(Object.keys(kindWords).map((kind) => kind.split('.')[0]).filter((group) => !groups.includes(group)), []);
});

test('Every kind of entry that the server writes has words', () => {
  const source = fileURLToPath(new URL('../../src/', import.meta.url));
  const written = readdirSync(source, { recursive: true }).filter((file) => file.endsWith('.cs') && !/(^|[\\/])(bin|obj)[\\/]/.test(file))
    .flatMap((file) => [...readFileSync(join(source, file), 'utf8').matchAll(/(?:\.Record\(|RecordFor\(|const string \w*Kind =)\s*"([a-z]+\.[a-zA-Z]+)"/g)].map(([, kind]) => kind));
  assert.ok(written.length >= 20, `only ${written.length} kinds were found`);
  assert.deepEqual(written.filter((kind) => !(kind in kindWords)), []);
});

const person = (roles, more = {}) => ({ name: roles.join(), roles, disabled: false, mustChangePassword: false, ...more });
const device = (conditions, more = {}) => ({ id: 'd', partNumber: 'AAF', revision: 'B', conditions, signingNeedsQuality: false, signingNeedsTwo: false, signingExcludesOwnRuns: false, ...more });
const condition = (more = {}) => ({ name: 'standard', maskId: 'm', draftId: null, golden: null, ...more });
const bare = { people: [person(['manager'])], benches: [], tokens: [], devices: [], lots: [], hasDecided: false, masks: {} };
const ready = {
  people: [person(['manager']), person(['operator']), person(['engineer']), person(['quality'])],
  benches: [{}],
  tokens: [{ name: 't', expiresAt: '2027-12-01T12:00:00Z', revokedAt: null }],
  devices: [device([condition({ golden: { invalidated: false } })])],
  lots: [{ counts: { units: 3 }, lastRunAt: '2026-12-01T11:00:00Z' }],
  hasDecided: false,
  masks: { m: { id: 'm', limits: [{ basis: 'golden' }] } },
};
const stateIn = (lab, title) => stepsOf(lab, now).find((step) => step.title === title).state;

test('A fresh lab has everything before it, in order', () => {
  const steps = stepsOf(bare, now);
  assert.deepEqual(steps.filter((step) => step.state === 'open').map((step) => step.title), ['People', 'Benches', 'Devices', 'Released masks', 'A lot with runs']);
  assert.match(summaryOf(steps), /^5\u00a0steps are open/);
});

test('A lab that has everything has nothing open', () => {
  const steps = stepsOf(ready, now);
  assert.deepEqual(steps.filter((step) => step.state !== 'done'), []);
  assert.match(summaryOf(steps), /^Nothing is missing/);
});

test('What is missing opens its own step', () => {
  for (const [title, change] of [
    ['People', { people: [person(['manager']), person(['engineer'], { disabled: true })] }],
    ['Released masks', { devices: [device([condition(), condition({ name: 'hot', maskId: null, draftId: 'x' })])] }],
    ['Golden runs', { devices: [device([condition()])] }],
    ['Who may sign', { devices: [device([condition({ golden: { invalidated: false } })], { signingNeedsTwo: true })] }],
    ['Who may sign', { people: [person(['manager']), person(['operator'])], devices: [device([], { signingExcludesOwnRuns: true })] }],
    ['A lot with runs', { lots: [{ counts: { units: 3 }, lastRunAt: null }] }],
    ['A lot with runs', { lots: [] }]])
    assert.equal(stateIn({ ...ready, ...change }, title), 'open', title);
});

test('What works and deserves a look is of note', () => {
  for (const [title, change] of [
    ['People', { people: [...ready.people, person(['operator'], { mustChangePassword: true })] }],
    ['Tokens', { tokens: [] }],
    ['Tokens', { tokens: [...ready.tokens, { name: 'old', expiresAt: '2026-12-05T12:00:00Z', revokedAt: null }] }],
    ['Golden runs', { devices: [device([condition({ golden: { invalidated: true } })])] }],
    ['Who may sign', { people: [person(['manager']), person(['operator']), person(['engineer'])], devices: [device([], { signingNeedsQuality: true })] }]])
    assert.equal(stateIn({ ...ready, ...change }, title), 'note', title);
});

test('A step that waits for another shows no way yet, and one that is done keeps its way', () => {
  const [masks] = stepsOf(bare, now).filter((step) => step.title === 'Released masks');
  assert.equal(masks.way, null);
  assert.ok(stepsOf(ready, now).every((step) => step.way !== null));
});
