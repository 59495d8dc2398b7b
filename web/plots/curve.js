// Values of a curve between its points, where it runs straight against log f. NaN stands for an absent value. Pure.

/** @typedef {Float64Array | number[]} Numbers */

/**
 * The index of the last frequency at or under one; -1 below them all.
 * @param {Numbers} frequencyHz ascending @param {number} atHz
 */
export function indexAtOrUnder(frequencyHz, atHz) {
  let low = 0;
  let high = frequencyHz.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (frequencyHz[middle] <= atHz) low = middle + 1;
    else high = middle;
  }

  return low - 1;
}

/**
 * The index of the frequency that is nearest in log f; -1 where there is none.
 * @param {Numbers} frequencyHz ascending @param {number} atHz
 */
export function nearestIndex(frequencyHz, atHz) {
  const under = indexAtOrUnder(frequencyHz, atHz);
  if (under < 0) return frequencyHz.length === 0 ? -1 : 0;
  if (under === frequencyHz.length - 1) return under;
  return atHz * atHz > frequencyHz[under] * frequencyHz[under + 1] ? under + 1 : under;
}

/**
 * The value of a curve at a frequency: that of a point exactly, between two points straight against log f, and NaN outside
 * the curve's span and on a piece with an absent end.
 * @param {Numbers} frequencyHz ascending @param {Numbers} values @param {number} atHz
 */
export function valueAt(frequencyHz, values, atHz) {
  const under = indexAtOrUnder(frequencyHz, atHz);
  if (under < 0) return NaN;
  if (frequencyHz[under] === atHz) return values[under];
  if (under === frequencyHz.length - 1) return NaN;
  const share = Math.log(atHz / frequencyHz[under]) / Math.log(frequencyHz[under + 1] / frequencyHz[under]);
  return values[under] + (values[under + 1] - values[under]) * share;
}

/**
 * The values of a curve at the frequencies of another grid.
 * @param {Numbers} frequencyHz ascending @param {Numbers} values @param {Numbers} gridHz ascending
 */
export function onGrid(frequencyHz, values, gridHz) {
  const result = new Float64Array(gridHz.length);
  for (let i = 0; i < gridHz.length; i++) result[i] = valueAt(frequencyHz, values, gridHz[i]);
  return result;
}

/**
 * All frequencies of some grids, once each and ascending.
 * @param {Numbers[]} grids
 */
export function unionOf(grids) {
  const first = grids[0] ?? new Float64Array(0);
  if (grids.every((grid) => grid === first || (grid.length === first.length && grid.every((f, i) => f === first[i])))) return Float64Array.from(first);
  const all = new Set(grids.flatMap((grid) => Array.from(grid)));
  return Float64Array.from(all).sort();
}
