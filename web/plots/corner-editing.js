// Changes to the corners of a limit, what is wrong with them, and limits that cross. Nothing given is changed: a change is a new
// list. The rules are those of the server, which has the last word. Pure.

import { frequency, quantity as worded } from '../numbers.js';
import { limitAt } from './limit-area.js';
import { limitOf } from './trace-set.js';

/** @typedef {{frequencyHz: number, value: number}} Corner */
/** @typedef {'gainDb' | 'phaseDeg' | 'delaySeconds'} LimitQuantity */
/** What is wrong, and where: `index` is null for the whole limit. @typedef {{index: number | null, field: 'frequencyHz' | 'value' | null, sentence: string}} CornerProblem */
/** @typedef {{name: string, side: 'upper' | 'lower', quantity: string, basis: string, reference?: object | null, corners: Corner[]}} MaskLimit */

const largest = new Map([['gainDb', 10_000], ['phaseDeg', 360_000], ['delaySeconds', 3_600]]);
const units = new Map([['gainDb', 'dB'], ['phaseDeg', 'deg'], ['delaySeconds', 's']]);

/**
 * The corners with one more, behind those of its frequency.
 * @param {Corner[]} corners ascending @param {Corner} corner
 * @returns {{corners: Corner[], index: number}}
 */
export function insertCorner(corners, corner) {
  const behind = corners.findIndex((c) => c.frequencyHz > corner.frequencyHz);
  const index = behind < 0 ? corners.length : behind;
  return { corners: [...corners.slice(0, index), { ...corner }, ...corners.slice(index)], index };
}

/**
 * The corners with one more on the limit's own line, so that its shape stays; at an end's value outside its span.
 * @param {Corner[]} corners ascending, one or more @param {number} frequencyHz
 */
export function insertOnLine(corners, frequencyHz) {
  const value = limitAt(limitOf({ name: '', side: 'upper', corners }), frequencyHz);
  const end = frequencyHz <= corners[0].frequencyHz ? corners[0] : corners[corners.length - 1];
  return insertCorner(corners, { frequencyHz, value: Number.isNaN(value) ? end.value : value });
}

/**
 * The corners with one moved, as by a drag: it cannot pass its neighbours, and on one of them it makes a step.
 * @param {Corner[]} corners ascending @param {number} index @param {Corner} to
 * @returns {Corner[]}
 */
export function moveCorner(corners, index, to) {
  const leastHz = index > 0 ? corners[index - 1].frequencyHz : 0;
  const mostHz = index + 1 < corners.length ? corners[index + 1].frequencyHz : Infinity;
  const frequencyHz = Math.min(mostHz, Math.max(leastHz, to.frequencyHz));
  const moved = { frequencyHz: frequencyHz > 0 ? frequencyHz : corners[index].frequencyHz, value: to.value };
  return corners.map((corner, i) => (i === index ? moved : corner));
}

/** @param {Corner[]} corners @param {number} index @returns {Corner[]} */
export const deleteCorner = (corners, index) => corners.filter((_, i) => i !== index);

/** The corners by frequency; those of one frequency keep their order, for a step has one. @param {Corner[]} corners @returns {Corner[]} */
export const sortCorners = (corners) => [...corners].sort((a, b) => a.frequencyHz - b.frequencyHz);

/**
 * What is wrong with corners; nothing when a limit may have them.
 * @param {Corner[]} corners @param {LimitQuantity} [quantity]
 * @returns {CornerProblem[]}
 */
export function cornerProblems(corners, quantity = 'gainDb') {
  if (corners.length < 2) return [{ index: null, field: null, sentence: 'A limit needs two corners or more.' }];

  /** @type {CornerProblem[]} */
  const problems = [];
  const most = largest.get(quantity) ?? Infinity;
  corners.forEach(({ frequencyHz, value }, index) => {
    const before = corners[index - 1]?.frequencyHz;
    const sentence = !(Number.isFinite(frequencyHz) && frequencyHz > 0) ? 'Give a frequency above 0 Hz.'
      : frequencyHz < before ? `Corners ascend: ${frequency(frequencyHz, 6)} comes after ${frequency(before, 6)}. Sort them, or mend the frequency.`
      : frequencyHz === before && frequencyHz === corners[index - 2]?.frequencyHz ? `More than two corners stand at ${frequency(frequencyHz, 6)}; a step is a pair.`
      : '';
    if (sentence !== '') problems.push({ index, field: 'frequencyHz', sentence });
    if (!Number.isFinite(value)) problems.push({ index, field: 'value', sentence: 'Give a value; a limit ends at its last corner.' });
    else if (Math.abs(value) > most) problems.push({ index, field: 'value', sentence: `${worded(value, units.get(quantity) ?? '')} is very far off. Is it in the right unit?` });
  });
  if (problems.length === 0 && corners[0].frequencyHz === corners[corners.length - 1].frequencyHz)
    problems.push({ index: null, field: null, sentence: 'A limit spans two different frequencies or more.' });
  return problems;
}

/**
 * Upper limits that run under a lower one of the same quantity, basis and reference: no run could meet both.
 * @param {MaskLimit[]} limits each without problems
 * @returns {{upper: MaskLimit, lower: MaskLimit, frequencyHz: number, sentence: string}[]}
 */
export function crossedLimits(limits) {
  const uppers = limits.filter((limit) => limit.side === 'upper');
  const lowers = limits.filter((limit) => limit.side === 'lower');
  return uppers.flatMap((upper) => lowers.flatMap((lower) => {
    const frequencyHz = comparable(upper, lower) ? crossingHz(upper.corners, lower.corners) : null;
    const sentence = `The upper limit "${upper.name}" runs under the lower limit "${lower.name}" near ${frequency(frequencyHz)}. No run could meet both.`;
    return frequencyHz === null ? [] : [{ upper, lower, frequencyHz, sentence }];
  }));
}

/** @param {MaskLimit} a @param {MaskLimit} b */
function comparable(a, b) {
  const reference = (/** @type {MaskLimit} */ limit) => JSON.stringify(Object.entries(limit.reference ?? {}).filter(([, value]) => value !== null && value !== undefined).sort());
  return a.quantity === b.quantity && a.basis === b.basis && reference(a) === reference(b);
}

// Between neighbouring corners of either both run straight, so upper is under lower somewhere only if it is at an end of such a
// stretch, taken from inside it: at a step the values of the other side do not count.
/** @param {Corner[]} upper @param {Corner[]} lower */
function crossingHz(upper, lower) {
  const fromHz = Math.max(upper[0].frequencyHz, lower[0].frequencyHz);
  const toHz = Math.min(upper[upper.length - 1].frequencyHz, lower[lower.length - 1].frequencyHz);
  if (fromHz >= toHz) return null;
  const edges = [...new Set([fromHz, toHz, ...[...upper, ...lower].map((c) => c.frequencyHz).filter((f) => f > fromHz && f < toHz)])].sort((a, b) => a - b);
  for (let i = 0; i + 1 < edges.length; i++) {
    for (const atHz of [edges[i], edges[i + 1]]) {
      const above = onStretch(upper, edges[i], atHz);
      const below = onStretch(lower, edges[i], atHz);
      if (above - below < -1e-12 * (Math.abs(above) + Math.abs(below))) return atHz;
    }
  }

  return null;
}

/** @param {Corner[]} corners @param {number} stretchHz where the stretch begins @param {number} atHz */
function onStretch(corners, stretchHz, atHz) {
  const i = corners.findLastIndex((c, k) => c.frequencyHz <= stretchHz && k + 1 < corners.length && corners[k + 1].frequencyHz > stretchHz);
  const [a, b] = [corners[i], corners[i + 1]];
  if (atHz === a.frequencyHz) return a.value;
  if (atHz === b.frequencyHz) return b.value;
  return a.value + ((b.value - a.value) * Math.log(atHz / a.frequencyHz)) / Math.log(b.frequencyHz / a.frequencyHz);
}
