// What curves are shown against: as measured, less the golden run, or levelled at a frequency. Pure.

import { indexAtOrUnder, valueAt } from './curve.js';

/** @typedef {import('./trace-set.js').TraceSet} TraceSet */
/** @typedef {'asMeasured' | 'minusGolden' | 'levelled'} Basis */

/**
 * The trace set on another basis, with sentences about what could not come along.
 * @param {TraceSet} set as measured; one that the server has made on another basis is left as it is
 * @param {Basis} basis
 * @param {number} levelHz where curves are levelled
 * @returns {{set: TraceSet, notes: string[]}}
 */
export function onBasis(set, basis, levelHz) {
  if (basis === 'asMeasured' || set.basis !== 'asMeasured') return { set, notes: [] };
  return basis === 'levelled' ? levelled(set, levelHz) : minusGolden(set);
}

/**
 * Each curve less the golden run. A phase is unwrapped as that of the ratio, not as a difference of two unwrapped curves.
 * @param {TraceSet} set
 */
export function minusGolden(set) {
  const golden = set.golden;
  if (golden === null) return { set, notes: ['No golden run is set, so the curves are shown as measured.'] };
  const less = (/** @type {Float64Array} */ values) => {
    const difference = values.map((value, i) => value - golden.values[i]);
    return set.quantity === 'phase' ? unwrapped(difference) : difference;
  };
  const limits = set.limits.map((limit) => limitLess(limit, set, golden.values));
  const made = {
    ...set,
    basis: 'minusGolden',
    unit: set.quantity === 'gain' ? 'dB' : set.unit,
    runs: set.runs.map((run) => ({ ...run, values: less(run.values) })),
    golden: { ...golden, values: less(golden.values) },
    limits,
  };
  return { set: made, notes: [] };
}

/**
 * Levels less their own value at one frequency, so that only shapes are compared. Phase and delay do not change with a level.
 * Limits judge curves as measured, and are left out.
 * @param {TraceSet} set @param {number} levelHz
 */
export function levelled(set, levelHz) {
  if (set.quantity !== 'gain') return { set: { ...set, limits: [] }, notes: [] };
  const less = (/** @type {Float64Array} */ values) => {
    const level = valueAt(set.frequencyHz, values, levelHz);
    return values.map((value) => value - level);
  };
  const runs = set.runs.map((run) => ({ ...run, values: less(run.values) }));
  const lost = set.runs.filter((run) => !Number.isFinite(valueAt(set.frequencyHz, run.values, levelHz))).length;
  const notes = [];
  if (set.limits.length > 0) notes.push('Limits are not drawn: they judge curves as measured.');
  if (lost > 0) notes.push(`${lost === 1 ? 'One run has' : `${lost} runs have`} no level at this frequency and cannot be shown.`);
  return {
    set: { ...set, basis: 'levelled', unit: 'dB', runs, golden: set.golden && { ...set.golden, values: less(set.golden.values) }, limits: [] },
    notes,
  };
}

/**
 * Degrees with whole turns added so that no step exceeds half a turn and the first lies in (-180, 180].
 * @param {Float64Array} degrees
 */
export function unwrapped(degrees) {
  const result = new Float64Array(degrees.length);
  let before = 0;
  for (let i = 0; i < degrees.length; i++) {
    result[i] = degrees[i] - 360 * Math.ceil((degrees[i] - before - 180) / 360);
    if (!Number.isNaN(result[i])) before = result[i];
  }

  return result;
}

// Between its corners a limit runs straight and the golden run does not, so the grid's frequencies come in between.
/** @param {import('./trace-set.js').Limit} limit @param {TraceSet} set @param {Float64Array} golden */
function limitLess(limit, set, golden) {
  const frequencyHz = [];
  const values = [];
  for (let i = 0; i < limit.frequencyHz.length; i++) {
    const cornerHz = limit.frequencyHz[i];
    frequencyHz.push(cornerHz);
    values.push(limit.values[i] - valueAt(set.frequencyHz, golden, cornerHz));
    const nextHz = limit.frequencyHz[i + 1];
    for (let k = indexAtOrUnder(set.frequencyHz, cornerHz) + 1; k < set.frequencyHz.length && set.frequencyHz[k] < nextHz; k++) {
      frequencyHz.push(set.frequencyHz[k]);
      const share = Math.log(set.frequencyHz[k] / cornerHz) / Math.log(nextHz / cornerHz);
      values.push(limit.values[i] + (limit.values[i + 1] - limit.values[i]) * share - golden[k]);
    }
  }

  const first = values.find(Number.isFinite) ?? 0;
  const turnsDeg = set.quantity === 'phase' ? 360 * Math.round(first / 360) : 0;
  return { ...limit, frequencyHz: Float64Array.from(frequencyHz), values: Float64Array.from(values, (value) => value - turnsDeg) };
}
