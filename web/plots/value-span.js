// The span of values that shows all curves of a trace set. Pure.

/** @typedef {import('./spans.js').Span} Span */

const leastLength = new Map([['gain', 0.02], ['phase', 0.2], ['delay', 1e-12]]);
const edge = 0.06;
const roomForLimits = 0.5;

/**
 * The span that shows every curve. A limit is shown too where that costs no more than half the curves' height on its side;
 * one far away would press the curves flat.
 * @param {import('./trace-set.js').TraceSet} set
 * @param {Span | null} [within] frequencies that are looked at; null for all
 * @returns {Span}
 */
export function spanOf(set, within = null) {
  const curves = { min: Infinity, max: -Infinity };
  const inView = indexRange(set.frequencyHz, within);
  for (const { values } of set.golden ? [...set.runs, set.golden] : set.runs) widen(curves, values, inView);

  const limits = { min: Infinity, max: -Infinity };
  for (const limit of set.limits) widen(limits, limit.values, indexRange(limit.frequencyHz, within));
  if (curves.min > curves.max) Object.assign(curves, limits.min > limits.max ? { min: -1, max: 1 } : limits);

  const least = leastLength.get(set.quantity) ?? 0;
  const length = Math.max(curves.max - curves.min, least);
  let { min, max } = curves;
  if (max - min < least) {
    const middle = (min + max) / 2;
    min = middle - least / 2;
    max = middle + least / 2;
  }

  const room = roomForLimits * length;
  for (const limit of set.limits) {
    const { from, to } = indexRange(limit.frequencyHz, within);
    for (let i = from; i <= to; i++) {
      const value = limit.values[i];
      if (value < min && value >= curves.min - room) min = value;
      if (value > max && value <= curves.max + room) max = value;
    }
  }

  const padding = edge * (max - min);
  return { min: min - padding, max: max + padding };
}

/** @param {Span} span @param {Float64Array} values @param {{from: number, to: number}} range */
function widen(span, values, { from, to }) {
  for (let i = from; i <= to; i++) {
    const value = values[i];
    if (value < span.min && value !== -Infinity) span.min = value;
    if (value > span.max && value !== Infinity) span.max = value;
  }
}

/** @param {Float64Array} frequencyHz @param {Span | null} within */
function indexRange(frequencyHz, within) {
  let from = 0;
  let to = frequencyHz.length - 1;
  if (within !== null) {
    while (from < to && frequencyHz[from] < within.min) from++;
    while (to > from && frequencyHz[to] > within.max) to--;
  }

  return { from, to };
}
