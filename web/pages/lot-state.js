// What the page of a lot works out: the state in its address, what speaks for and against release, and which units are shown.
// Pure.

import { count, frequency, margin, percent, several } from '../numbers.js';
import { number, oneOf, text } from '../router.js';

/** What stands in the address of a lot's page. `at` is the cursor, `unit` the serial number that is chosen. */
export const shape = {
  condition: text(),
  show: oneOf(/** @type {const} */ (['gainPhase', 'gainDelay', 'gain', 'phase', 'delay'])),
  basis: oneOf(/** @type {const} */ (['asMeasured', 'minusGolden', 'levelled'])),
  level: number(),
  view: text(),
  at: number(),
  unit: text(),
  units: oneOf(/** @type {const} */ (['all', 'open', 'failing', 'inconclusive', 'untested', 'disposed', 'retested'])),
  find: text(),
};

/** @typedef {ReturnType<typeof import('../router.js').readState<typeof shape>>} LotState */
/** @typedef {LotState['units']} UnitFilter */

/** @type {readonly (readonly [LotState['show'], string])[]} */
export const showOptions = [['gainPhase', 'Gain and phase'], ['gainDelay', 'Gain and group delay'], ['gain', 'Gain'], ['phase', 'Phase'], ['delay', 'Group delay']];

/** @type {Readonly<Record<LotState['show'], readonly [string, string | null]>>} */
const panels = { gainPhase: ['gain', 'phase'], gainDelay: ['gain', 'delay'], gain: ['gain', null], phase: ['phase', null], delay: ['delay', null] };

/** The quantities of the upper and the lower panel. @param {LotState['show']} show */
export const panelsOf = (show) => panels[show];

/**
 * How many points an overlay is asked for: all of an ordinary sweep where the lot is small, so that a reading at the cursor is
 * that of the run; fewer where there are many runs.
 * @param {number} runs
 */
export function pointsFor(runs) {
  return Math.min(4_000, Math.max(800, Math.floor(200_000 / Math.max(1, runs))));
}

const passing = ['pass', 'conditionalPass'];

/** @param {any} unit */
const passes = (unit) => passing.includes(unit.outcome);

/** Whether a run is missing in a condition. @param {any} unit */
const isUntested = (unit) => unit.conditions.some((/** @type {any} */ condition) => condition.runId === null);

/** @type {Readonly<Record<UnitFilter, { words: string, fits: (unit: any) => boolean }>>} */
const filters = {
  all: { words: 'All', fits: () => true },
  open: { words: 'In the way', fits: (unit) => !passes(unit) && unit.disposition === null },
  failing: { words: 'Failing', fits: (unit) => unit.outcome === 'fail' || unit.outcome === 'conditionalFail' },
  inconclusive: { words: 'Inconclusive', fits: (unit) => unit.outcome === 'inconclusive' },
  untested: { words: 'Untested', fits: isUntested },
  disposed: { words: 'With disposition', fits: (unit) => unit.disposition !== null },
  retested: { words: 'Retested', fits: (unit) => unit.retests > 0 || unit.invalidated > 0 },
};

/**
 * The filters of a lot's units with how many fit each; those that always stand there, and those that fit a unit. Units without a
 * name are untested.
 * @param {{ size: number, counts: { units: number } }} lot
 * @param {readonly any[]} units
 * @param {UnitFilter} chosen
 */
export function filtersOf({ size, counts }, units, chosen) {
  const unnamedUnits = Math.max(0, size - counts.units);
  const always = ['all', 'failing', 'inconclusive', 'untested'];
  return /** @type {UnitFilter[]} */ (Object.keys(filters))
    .map((filter) => ({ filter, words: filters[filter].words, count: units.filter(filters[filter].fits).length + (filter === 'untested' ? unnamedUnits : 0) }))
    .filter(({ filter, count: fitting }) => always.includes(filter) || filter === chosen || (fitting > 0 && filter !== 'open'));
}

/**
 * The units that fit a filter and a part of a serial number.
 * @param {readonly any[]} units
 * @param {UnitFilter} filter
 * @param {string} find
 */
export function fittingUnits(units, filter, find) {
  const sought = find.trim().toLowerCase();
  return units.filter((unit) => filters[filter].fits(unit) && (sought === '' || unit.serial.toLowerCase().includes(sought)));
}

/** The run of a unit that counts in a condition, or null. @param {any} unit @param {string | null} conditionId @returns {string | null} */
export function runOf(unit, conditionId) {
  return unit?.conditions.find((/** @type {any} */ condition) => condition.conditionId === conditionId)?.runId ?? null;
}

/** The unit whose counting run this is, in whatever condition. @param {readonly any[]} units @param {string | null} runId */
export function unitOfRun(units, runId) {
  return runId === null ? null : units.find((unit) => unit.conditions.some((/** @type {any} */ condition) => condition.runId === runId)) ?? null;
}

/** A worst criterion in one line: "passband at 3.2 kHz"; one that names its frequency does so once. @param {{ criterion: string, frequencyHz: number | null } | null} worst */
export function placeOf(worst) {
  if (worst === null)
    return '';
  const at = frequency(worst.frequencyHz);
  return worst.frequencyHz === null || worst.criterion.replaceAll(' ', '\u00a0').includes(at) ? worst.criterion : `${worst.criterion} at ${at}`;
}

/** `blocks` stands against an approval; what does not should be known. @typedef {{ sentence: string, code: string, blocks?: boolean }} Point */

/** @typedef {'approve' | 'concession' | 'testing' | 'not'} Standing */

/** @type {Readonly<Record<Standing, string>>} */
const standingWords = { approve: 'Can be approved', concession: 'Can be approved with concession', testing: 'Still being tested', not: 'Cannot be approved' };

/**
 * What speaks for and against the release of an open lot. What speaks against it and blocks it comes first, in the server's words.
 * @param {any} lot
 * @param {readonly any[]} units
 * @returns {{ standing: Standing, words: string, pro: Point[], con: Point[] }}
 */
export function evidenceOf(lot, units) {
  const { counts, size, blockers } = lot;
  const codes = blockers.map((/** @type {Point} */ blocker) => blocker.code);
  const standing = codes.length === 0 ? 'approve' : codes.every((/** @type {string} */ code) => code === 'concessionNeeded') ? 'concession' : counts.tested < size ? 'testing' : 'not';
  return {
    standing,
    words: standingWords[standing],
    pro: proOf(lot, units),
    con: [...blockers.map((/** @type {Point} */ blocker) => ({ ...blocker, blocks: true })), ...doubtsOf(counts, units, size)],
  };
}

/** @param {any} lot @param {readonly any[]} units @returns {Point[]} */
function proOf({ counts, size, worst, stale, firstPass, conditions }, units) {
  const points = [];
  if (counts.passed > 0)
    points.push({ code: 'pass', sentence: counts.passed >= size ? `All ${several(size, 'unit')} pass.` : `${count(counts.passed)} of ${several(size, 'unit')} ${counts.passed === 1 ? 'passes' : 'pass'}.` });
  if (worst !== null && worst.margin !== null && passing.includes(worst.outcome))
    points.push({ code: 'margin', sentence: `The least margin is ${margin(worst.margin, worst.unit)}: ${placeOf(worst)}, unit ${worst.serial}.` });
  if (counts.withdrawn > 0)
    points.push({ code: 'withdrawn', sentence: `${several(counts.withdrawn, 'unit is', 'units are')} withdrawn and will not ship: ${kindsOf(units)}.` });
  if (firstPass.tested > 0 && firstPass.passed === firstPass.tested)
    points.push({ code: 'firstPass', sentence: 'Every tested unit passed at the first try.' });
  if (counts.tested > 0 && stale === 0 && conditions.every((/** @type {any} */ condition) => condition.maskRevision !== null))
    points.push({ code: 'current', sentence: 'Every verdict is on the newest mask and golden run.' });
  return points;
}

/** What blocks nothing and should be known. @param {any} counts @param {readonly any[]} units @param {number} size @returns {Point[]} */
function doubtsOf(counts, units, size) {
  const invalidated = units.reduce((sum, unit) => sum + unit.invalidated, 0);
  const points = [];
  if (invalidated > 0)
    points.push({ code: 'retested', sentence: `${several(invalidated, 'run was', 'runs were')} invalidated.` });
  if (counts.retests > 0)
    points.push({ code: 'retested', sentence: `${several(counts.retests, 'retest does', 'retests do')} not count.` });
  if (counts.withdrawn * 10 > size)
    points.push({ code: 'disposed', sentence: `${percent(counts.withdrawn, size)} of the lot is withdrawn.` });
  return points;
}

/** "2 scrap, 1 rework" @param {readonly any[]} units */
function kindsOf(units) {
  /** @type {Map<string, number>} */
  const kinds = new Map();
  for (const { disposition } of units) {
    if (disposition !== null && disposition.disposition !== 'concession')
      kinds.set(disposition.disposition, (kinds.get(disposition.disposition) ?? 0) + 1);
  }

  return [...kinds].map(([kind, number]) => `${count(number)} ${kind}`).join(', ');
}

/** Which units a point is about: the filter that shows them, or null. @param {string} code @returns {UnitFilter | null} */
export function filterOf(code) {
  switch (code) {
    case 'unitsNotPassed': return 'open';
    case 'concessionNeeded': case 'withdrawn': case 'disposed': return 'disposed';
    case 'retested': return 'retested';
    default: return null;
  }
}

/** Units that the lot has and nobody has named yet, in words; '' where all are. @param {any} lot */
export function unnamed({ size, counts }) {
  return size > counts.units ? `${several(size - counts.units, 'more unit')} of the lot's ${count(size)} ${size - counts.units === 1 ? 'has' : 'have'} no run and no serial number yet.` : '';
}

/** What makes it worth reading units and curves anew. @param {any} lot */
export function fingerprint(lot) {
  const { counts, stale, state, lastRunAt, conditions, decision, blockers } = lot;
  return JSON.stringify([counts, stale, state, lastRunAt, conditions, decision?.id, blockers, lot.worst]);
}
