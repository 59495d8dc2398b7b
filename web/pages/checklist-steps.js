// What a lab still needs before a lot can be signed, out of what the API says of it. Pure.
//
// A step is done, open, or of note (it works, and somebody should know). Steps stand in the order in which a fresh lab
// takes them; a step that waits for another says so.

import { several } from '../numbers.js';
import { stateOf } from './tokens-state.js';

/**
 * @typedef {object} Lab
 * @property {any[]} people
 * @property {any[]} benches
 * @property {any[]} tokens
 * @property {any[]} devices
 * @property {any[]} lots           open ones
 * @property {boolean} hasDecided   whether any lot was ever decided
 * @property {Readonly<Record<string, any>>} masks   released masks by id
 */

/**
 * @typedef {object} Step
 * @property {string} title
 * @property {'done' | 'open' | 'note'} state
 * @property {string} sentence
 * @property {{ href: string, words: string } | null} way
 * @property {readonly string[]} [rest]   what is missing, one by one
 */

/** @param {Lab} lab @param {number} now @returns {Step[]} */
export function stepsOf(lab, now) {
  return [people(lab), benches(lab), tokens(lab, now), devices(lab), masks(lab), golden(lab), signing(lab), lots(lab)];
}

/** @param {readonly Step[]} steps */
export function summaryOf(steps) {
  const open = steps.filter((step) => step.state === 'open').length;
  return open === 0 ? 'Nothing is missing: a lot can be tested and signed.' : `${several(open, 'step is', 'steps are')} open before every lot can be signed.`;
}

/** @param {any} person @param {readonly string[]} roles */
function holds(person, roles) {
  return !person.disabled && person.roles.some((/** @type {string} */ role) => roles.includes(role));
}

/** @param {Lab} lab @returns {Step} */
function people({ people }) {
  const way = { href: '/people', words: 'People' };
  const title = 'People';
  const tests = people.filter((person) => holds(person, ['operator']));
  const signs = people.filter((person) => holds(person, ['engineer', 'quality']));
  const waiting = people.filter((person) => person.mustChangePassword && !person.disabled).map((person) => `${person.name} has not signed in with the one-time password yet`);
  if (signs.length === 0)
    return { title, state: 'open', sentence: 'A manager can do everything, but a lab signs in the names of those who decide: add somebody with the role engineer or quality.', way };
  if (tests.length === 0)
    return { title, state: 'note', sentence: 'Nobody is an operator. Engineers can send runs too; add operators if others stand at the benches.', way, rest: waiting };
  return { title, state: waiting.length > 0 ? 'note' : 'done', sentence: `${several(tests.length, 'operator')}, and ${several(signs.length, 'person who may', 'people who may')} sign or work on masks.`, way, rest: waiting };
}

/** @param {Lab} lab @returns {Step} */
function benches({ benches }) {
  const way = { href: '/benches', words: 'Benches' };
  return benches.length === 0
    ? { title: 'Benches', state: 'open', sentence: 'Runs name the bench that swept them. Make the benches, with their noise floor and the way that their files are named.', way }
    : { title: 'Benches', state: 'done', sentence: `${several(benches.length, 'bench is', 'benches are')} there.`, way };
}

/** @param {Lab} lab @param {number} now @returns {Step} */
function tokens({ tokens }, now) {
  const way = { href: '/tokens', words: 'Tokens' };
  const states = tokens.map((token) => ({ token, ...stateOf(token, now) }));
  const valid = states.filter(({ state }) => state === 'valid' || state === 'soon');
  const soon = states.filter(({ state }) => state === 'soon' || state === 'expired').map(({ token, words }) => `${token.name} ${words}`);
  if (valid.length === 0)
    return { title: 'Tokens', state: 'note', sentence: 'No token is in force. People send files from the browser without one; a bench that sends by itself needs one.', way, rest: soon };
  return { title: 'Tokens', state: soon.length > 0 ? 'note' : 'done', sentence: `${several(valid.length, 'token is', 'tokens are')} in force.`, way, rest: soon };
}

/** @param {Lab} lab @returns {Step} */
function devices({ devices }) {
  const way = { href: '/devices', words: 'Devices' };
  return devices.length === 0
    ? { title: 'Devices', state: 'open', sentence: 'A lot is a lot of a device. Describe the device: part number, revision, and the sweeps (conditions) that its test needs.', way }
    : { title: 'Devices', state: 'done', sentence: `${several(devices.length, 'device is', 'devices are')} described.`, way };
}

/** @param {Lab} lab @returns {Step} */
function masks({ devices }) {
  const way = { href: '/devices', words: 'Devices' };
  const title = 'Released masks';
  if (devices.length === 0)
    return { title, state: 'open', sentence: 'Without a released mask a lot can only be rejected. It needs a device first.', way: null };
  const missing = conditionsOf(devices).filter(({ condition }) => condition.maskId === null);
  return missing.length === 0
    ? { title, state: 'done', sentence: 'Every condition of every device has a released mask.', way }
    : {
      title,
      state: 'open',
      sentence: 'Without a released mask for each of its conditions, a lot can only be rejected.',
      way: missing.length === 1 ? { href: `/devices/${missing[0].device.id}`, words: nameOf(missing[0].device) } : way,
      rest: missing.map(({ device, condition }) => `${nameOf(device)}, condition ${condition.name}: ${condition.draftId === null ? 'no mask' : 'a draft waits for its release'}`),
    };
}

/** @param {Lab} lab @returns {Step} */
function golden({ devices, masks }) {
  const title = 'Golden runs';
  const way = { href: '/devices', words: 'Devices' };
  const needing = conditionsOf(devices).filter(({ condition }) => condition.maskId !== null && (masks[condition.maskId]?.limits ?? []).some((/** @type {any} */ limit) => limit.basis === 'golden'));
  const missing = needing.filter(({ condition }) => condition.golden === null);
  const invalidated = conditionsOf(devices).filter(({ condition }) => condition.golden?.invalidated === true)
    .map(({ device, condition }) => `${nameOf(device)}, condition ${condition.name}: the golden run was invalidated`);
  if (missing.length > 0) {
    return {
      title,
      state: 'open',
      sentence: 'A limit relative to the golden run is inconclusive without one. Send a run with the purpose golden, and set it.',
      way: missing.length === 1 ? { href: `/devices/${missing[0].device.id}`, words: nameOf(missing[0].device) } : way,
      rest: [...missing.map(({ device, condition }) => `${nameOf(device)}, condition ${condition.name}`), ...invalidated],
    };
  }

  if (invalidated.length > 0)
    return { title, state: 'note', sentence: 'Units are compared with a run that was invalidated since.', way, rest: invalidated };
  return needing.length === 0
    ? { title, state: 'done', sentence: 'No released mask compares with a golden run.', way }
    : { title, state: 'done', sentence: 'Every mask that compares with a golden run has one.', way };
}

/** @param {Lab} lab @returns {Step} */
function signing({ people, devices }) {
  const title = 'Who may sign';
  const two = devices.filter((device) => device.signingNeedsTwo);
  if (two.length > 0)
    return { title, state: 'open', sentence: 'These devices ask for two signers, which this version cannot take: their lots cannot be decided.', way: { href: '/devices', words: 'Devices' }, rest: two.map(nameOf) };
  const quality = people.filter((person) => holds(person, ['quality', 'manager']));
  const asking = devices.filter((device) => device.signingNeedsQuality);
  if (asking.length > 0 && !people.some((person) => holds(person, ['quality'])))
    return { title, state: 'note', sentence: 'Some devices are signed by quality alone, and only managers hold that role now.', way: { href: '/people', words: 'People' }, rest: asking.map(nameOf) };
  const signers = people.filter((person) => holds(person, ['engineer', 'quality', 'manager']));
  const others = devices.filter((device) => device.signingExcludesOwnRuns);
  if (others.length > 0 && signers.length < 2)
    return { title, state: 'open', sentence: 'Some devices exclude signers who sent runs of the lot, and only one person may sign at all.', way: { href: '/people', words: 'People' }, rest: others.map(nameOf) };
  return { title, state: 'done', sentence: `${several(signers.length, 'person', 'people')} may sign, ${several(quality.length, 'of them', 'of them')} as quality.`, way: { href: '/people', words: 'People' } };
}

/** @param {Lab} lab @returns {Step} */
function lots({ lots, hasDecided, devices }) {
  const title = 'A lot with runs';
  if (lots.length === 0) {
    return hasDecided
      ? { title, state: 'done', sentence: 'No lot is open; others were decided before.', way: { href: '/lots', words: 'Lots' } }
      : { title, state: 'open', sentence: devices.length === 0 ? 'Open the first lot once a device is described.' : 'Open the first lot, with its number and size.', way: devices.length === 0 ? null : { href: '/lots', words: 'Lots' } };
  }

  const tested = lots.filter((lot) => lot.counts.units > 0 && lot.lastRunAt !== null);
  return tested.length > 0 || hasDecided
    ? { title, state: 'done', sentence: `${several(lots.length, 'lot is', 'lots are')} open, ${tested.length === lots.length ? 'all with runs' : `${tested.length} with runs`}.`, way: { href: '/lots', words: 'Lots' } }
    : { title, state: 'open', sentence: 'A lot is open, but no run has come for it. Send its first sweep.', way: { href: '/send', words: 'Send files' } };
}

/** @param {any[]} devices */
function conditionsOf(devices) {
  return devices.flatMap((device) => device.conditions.map((/** @type {any} */ condition) => ({ device, condition })));
}

/** @param {any} device */
function nameOf(device) {
  return `${device.partNumber} ${device.revision}`;
}
