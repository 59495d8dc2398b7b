// What a plot draws: curves of one quantity on one frequency grid, with the golden run and the limits. It is made of an
// overlay as the API answers it, or of traces with grids of their own. Absent values are null there and NaN here. Pure.

import { onGrid, unionOf } from './curve.js';

/** @typedef {'gain' | 'phase' | 'delay'} Quantity */
/** @typedef {{runId: string, serial: string, outcome: string | null, values: Float64Array}} RunCurve */
/** @typedef {{runId: string, serial: string, values: Float64Array}} GoldenCurve */
/** A limit in the units of its plot. @typedef {{name: string, side: 'upper' | 'lower', frequencyHz: Float64Array, values: Float64Array}} Limit */
/** @typedef {{quantity: Quantity, basis: string, unit: string, frequencyHz: Float64Array, runs: RunCurve[], golden: GoldenCurve | null, limits: Limit[]}} TraceSet */

/** @typedef {Float64Array | (number | null)[]} GivenNumbers */
/** @typedef {{runId: string, serial: string, outcome?: string | null, values: GivenNumbers}} GivenRun */
/** @typedef {{name: string, side: string, frequencyHz?: GivenNumbers, values?: GivenNumbers, corners?: {frequencyHz: number, value: number}[]}} GivenLimit */
/** @typedef {{quantity: string, basis?: string, unit?: string, frequencyHz: GivenNumbers, runs: GivenRun[], golden?: GivenRun | null, limits?: GivenLimit[]}} Overlay */
/** @typedef {{frequencyHz: number[], gainDb: (number | null)[], phaseDeg?: (number | null)[] | null, delaySeconds?: (number | null)[] | null}} Trace */

const usualUnits = new Map([['gain', 'dB'], ['phase', 'deg'], ['delay', 's']]);

/** @type {WeakMap<object, object>} The numbers made of what was given, so that the same curves stay the same object. */
const made = new WeakMap();

/**
 * @param {GivenNumbers} given
 * @returns {Float64Array}
 */
export function numbersOf(given) {
  if (given instanceof Float64Array) return given;
  const kept = made.get(given);
  if (kept instanceof Float64Array) return kept;
  const numbers = new Float64Array(given.length);
  for (let i = 0; i < given.length; i++) numbers[i] = given[i] ?? NaN;
  made.set(given, numbers);
  return numbers;
}

/**
 * A trace set of an overlay. Curves of the same array of runs are the same object each time: who draws them can tell that
 * nothing of them changed when only limits did.
 * @param {Overlay} overlay
 * @returns {TraceSet}
 */
export function traceSetOf(overlay) {
  const quantity = /** @type {Quantity} */ (overlay.quantity);
  let runs = /** @type {RunCurve[] | undefined} */ (made.get(overlay.runs));
  if (runs === undefined) {
    runs = overlay.runs.map((run) => ({ runId: run.runId, serial: run.serial, outcome: run.outcome ?? null, values: ownNumbers(run.values) }));
    made.set(overlay.runs, runs);
  }

  return {
    quantity,
    basis: overlay.basis ?? 'asMeasured',
    unit: overlay.unit ?? usualUnits.get(quantity) ?? '',
    frequencyHz: numbersOf(overlay.frequencyHz),
    runs,
    golden: overlay.golden ? { runId: overlay.golden.runId, serial: overlay.golden.serial, values: numbersOf(overlay.golden.values) } : null,
    limits: (overlay.limits ?? []).map(limitOf),
  };
}

/**
 * @param {GivenLimit} given
 * @returns {Limit}
 */
export function limitOf(given) {
  return {
    name: given.name,
    side: given.side === 'lower' ? 'lower' : 'upper',
    frequencyHz: given.corners ? Float64Array.from(given.corners, (corner) => corner.frequencyHz) : numbersOf(given.frequencyHz ?? []),
    values: given.corners ? Float64Array.from(given.corners, (corner) => corner.value) : numbersOf(given.values ?? []),
  };
}

/**
 * An overlay of traces, each with a grid of its own, on the union of their grids. A run without the quantity is left out. Phases
 * get the whole turns that bring them nearest to the golden run, or the first one, at their lowest common frequency.
 * @param {{runId: string, serial: string, outcome?: string | null, trace: Trace}[]} runs
 * @param {Quantity} quantity
 * @param {{unit?: string, golden?: {runId: string, serial: string, trace: Trace} | null, limits?: GivenLimit[]}} [more]
 * @returns {Overlay}
 */
export function overlayOfTraces(runs, quantity, more = {}) {
  const golden = more.golden && valuesOf(more.golden.trace, quantity) ? more.golden : null;
  const having = runs.filter((run) => valuesOf(run.trace, quantity) !== null);
  const frequencyHz = unionOf([...having, ...(golden ? [golden] : [])].map((run) => run.trace.frequencyHz));
  const laid = (/** @type {Trace} */ trace) => onGrid(trace.frequencyHz, numbersOf(valuesOf(trace, quantity) ?? []), frequencyHz);
  const goldenValues = golden ? laid(golden.trace) : null;
  const curves = having.map((run) => laid(run.trace));
  const anchor = goldenValues ?? curves[0];
  const turned = quantity === 'phase' ? curves.map((values) => nearestTurns(values, anchor)) : curves;
  return {
    quantity,
    basis: 'asMeasured',
    unit: more.unit,
    frequencyHz,
    runs: having.map((run, i) => ({ runId: run.runId, serial: run.serial, outcome: run.outcome ?? null, values: turned[i] })),
    golden: golden && goldenValues ? { runId: golden.runId, serial: golden.serial, values: goldenValues } : null,
    limits: more.limits ?? [],
  };
}

/** @param {Float64Array} degrees @param {Float64Array} anchor */
function nearestTurns(degrees, anchor) {
  const common = degrees.findIndex((value, i) => Number.isFinite(value) && Number.isFinite(anchor[i]));
  const turnsDeg = common < 0 ? 0 : 360 * Math.round((anchor[common] - degrees[common]) / 360);
  return turnsDeg === 0 ? degrees : degrees.map((value) => value + turnsDeg);
}

/** @param {Trace} trace @param {Quantity} quantity */
function valuesOf(trace, quantity) {
  return (quantity === 'gain' ? trace.gainDb : quantity === 'phase' ? trace.phaseDeg : trace.delaySeconds) ?? null;
}

// A run's values are not kept twice: what was given may be forgotten with the overlay.
/** @param {GivenNumbers} given */
function ownNumbers(given) {
  if (given instanceof Float64Array) return given;
  const numbers = new Float64Array(given.length);
  for (let i = 0; i < given.length; i++) numbers[i] = given[i] ?? NaN;
  return numbers;
}
