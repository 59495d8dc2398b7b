// Where a value lies on an axis, and how a span of an axis is zoomed, moved and kept within bounds. Pure.

/** A stretch of an axis; min is below max. @typedef {{min: number, max: number}} Span */
/** How an axis measures: by its values, or by their logarithms. @typedef {{measure: (value: number) => number, value: (measure: number) => number}} Axis */

/** @type {Axis} */
export const logAxis = { measure: Math.log10, value: (measure) => 10 ** measure };

/** @type {Axis} */
export const straightAxis = { measure: (value) => value, value: (measure) => measure };

/**
 * The place of a value: 0 at the span's least, 1 at its greatest; beyond them outside the span.
 * @param {Axis} axis @param {Span} span @param {number} value
 */
export function placeOf(axis, span, value) {
  const from = axis.measure(span.min);
  return (axis.measure(value) - from) / (axis.measure(span.max) - from);
}

/** @param {Axis} axis @param {Span} span @param {number} place */
export function valueAtPlace(axis, span, place) {
  if (place === 0) return span.min;
  if (place === 1) return span.max;
  const from = axis.measure(span.min);
  return axis.value(from + place * (axis.measure(span.max) - from));
}

/**
 * The span made `factor` times as long, with the value at `place` left where it is. A factor under 1 shows more detail.
 * @param {Axis} axis @param {Span} span @param {number} factor @param {number} [place]
 * @returns {Span}
 */
export function zoomed(axis, span, factor, place = 0.5) {
  return { min: valueAtPlace(axis, span, place * (1 - factor)), max: valueAtPlace(axis, span, place + (1 - place) * factor) };
}

/**
 * The span moved by a share of its own length.
 * @param {Axis} axis @param {Span} span @param {number} share
 * @returns {Span}
 */
export function moved(axis, span, share) {
  return { min: valueAtPlace(axis, span, share), max: valueAtPlace(axis, span, 1 + share) };
}

/**
 * The span in which what lay at two places now lies at two others, as two fingers carry it. Where the fingers are, or were,
 * together it is only moved.
 * @param {Axis} axis @param {Span} span @param {[number, number]} before @param {[number, number]} now
 * @returns {Span}
 */
export function carried(axis, span, before, now) {
  const [was, is] = [before[1] - before[0], now[1] - now[0]];
  const factor = Math.abs(was) < 0.02 || Math.abs(is) < 0.02 ? 1 : was / is;
  const from = (before[0] + before[1]) / 2 - (factor * (now[0] + now[1])) / 2;
  return { min: valueAtPlace(axis, span, from), max: valueAtPlace(axis, span, from + factor) };
}

/**
 * The part of a span between two places, in either order.
 * @param {Axis} axis @param {Span} span @param {number} a @param {number} b
 * @returns {Span}
 */
export function between(axis, span, a, b) {
  return { min: valueAtPlace(axis, span, Math.min(a, b)), max: valueAtPlace(axis, span, Math.max(a, b)) };
}

/**
 * The span brought inside bounds: moved in where it fits, cut to the bounds where it does not, and never shorter than
 * `leastShare` of them.
 * @param {Axis} axis @param {Span} span @param {Span} bounds @param {number} [leastShare]
 * @returns {Span}
 */
export function within(axis, span, bounds, leastShare = 1e-4) {
  let from = placeOf(axis, bounds, span.min);
  let to = placeOf(axis, bounds, span.max);
  if (from >= 0 && to <= 1 && to - from >= leastShare) return span;
  if (!(to - from >= leastShare)) {
    const middle = (from + to) / 2;
    from = middle - leastShare / 2;
    to = middle + leastShare / 2;
  }

  if (to - from >= 1) return { ...bounds };
  const inward = from < 0 ? -from : to > 1 ? 1 - to : 0;
  return { min: valueAtPlace(axis, bounds, from + inward), max: valueAtPlace(axis, bounds, to + inward) };
}

/** @param {Span} a @param {Span} b */
export const sameSpan = (a, b) => a.min === b.min && a.max === b.max;
