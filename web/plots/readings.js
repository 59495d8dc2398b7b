// What stands under the frequency cursor: values, and margins to the limits there. Pure.

import { valueAt } from './curve.js';
import { limitAt, marginAt } from './limit-area.js';

/** @typedef {import('./trace-set.js').TraceSet} TraceSet */
/** A value with its margin to the nearest limit at the frequency; NaN and null where absent.
 * @typedef {{value: number, margin: {margin: number, limit: string} | null}} Reading */
/** One for each panel that has the run. @typedef {{runId: string, serial: string, outcome: string | null, readings: (Reading | null)[]}} RunReading */

/**
 * The readings of some runs, in their order: one a trace set, null where a set does not have the run.
 * @param {TraceSet[]} sets
 * @param {number} atHz
 * @param {string[]} runIds
 * @returns {RunReading[]}
 */
export function runReadings(sets, atHz, runIds) {
  const places = sets.map(placesOf);
  return runIds.flatMap((runId) => {
    const found = sets.map((set, i) => set.runs[places[i].get(runId) ?? -1]);
    const run = found.find((one) => one !== undefined);
    if (run === undefined) return [];
    const readings = sets.map((set, i) => (found[i] === undefined ? null : readingOf(set, found[i].values, atHz)));
    return [{ runId, serial: run.serial, outcome: run.outcome, readings }];
  });
}

/**
 * The golden run's readings: one a trace set, null where it has none.
 * @param {TraceSet[]} sets @param {number} atHz
 * @returns {(Reading | null)[]}
 */
export function goldenReadings(sets, atHz) {
  return sets.map((set) => (set.golden === null ? null : readingOf(set, set.golden.values, atHz)));
}

/**
 * The limits that stand at a frequency.
 * @param {TraceSet} set @param {number} atHz
 * @returns {{name: string, side: 'upper' | 'lower', value: number}[]}
 */
export function limitReadings(set, atHz) {
  return set.limits
    .map((limit) => ({ name: limit.name, side: limit.side, value: limitAt(limit, atHz) }))
    .filter(({ value }) => !Number.isNaN(value));
}

/**
 * How far the runs reach at a frequency, which run has the least margin, and how many have no value there.
 * @param {TraceSet} set @param {number} atHz
 */
export function spreadAt(set, atHz) {
  let least = Infinity;
  let greatest = -Infinity;
  let count = 0;
  /** @type {{serial: string, margin: number, limit: string} | null} */
  let worst = null;
  for (const run of set.runs) {
    const value = valueAt(set.frequencyHz, run.values, atHz);
    if (Number.isNaN(value)) continue;
    count++;
    least = Math.min(least, value);
    greatest = Math.max(greatest, value);
    const found = marginAt(set.limits, atHz, value);
    if (found !== null && (worst === null || found.margin < worst.margin)) worst = { serial: run.serial, ...found };
  }

  return { count, absent: set.runs.length - count, least: count === 0 ? NaN : least, greatest: count === 0 ? NaN : greatest, worst };
}

/** @param {TraceSet} set @param {Float64Array} values @param {number} atHz @returns {Reading} */
function readingOf(set, values, atHz) {
  const value = valueAt(set.frequencyHz, values, atHz);
  return { value, margin: marginAt(set.limits, atHz, value) };
}

/** @type {WeakMap<object, Map<string, number>>} */
const placesOfRuns = new WeakMap();

/** @param {TraceSet} set */
function placesOf(set) {
  let places = placesOfRuns.get(set.runs);
  if (places === undefined) {
    places = new Map(set.runs.map((run, i) => [run.runId, i]));
    placesOfRuns.set(set.runs, places);
  }

  return places;
}
