// Percentile curves of many runs. Each frequency is taken by itself: no run need follow such a curve. Pure.

export const usualPercentiles = [5, 25, 50, 75, 95];

/** Percentile curves of fewer runs than this would say little more than the runs themselves. */
export const fewestRuns = 60;

/**
 * A percentile of ascending values, straight between neighbours: p = 0 is the least, p = 100 the greatest (definition 7 of
 * Hyndman and Fan, The American Statistician 50 (1996) 361). NaN of none.
 * @param {ArrayLike<number>} ascending @param {number} count how many of them @param {number} percent
 */
export function percentileOf(ascending, count, percent) {
  if (count === 0) return NaN;
  const at = (percent / 100) * (count - 1);
  const under = Math.floor(at);
  const low = ascending[under];
  return at === under ? low : low + (at - under) * (ascending[under + 1] - low);
}

/**
 * Percentile curves at frequencies from..to-1 of runs on one grid. Absent values are left out; where fewer than
 * `fewest` runs have a value there is no percentile.
 * @param {(Float64Array | Float32Array)[]} curves
 * @param {number[]} percents
 * @param {{from: number, to: number, fewest?: number}} range
 * @returns {Float64Array[]} a curve a percentile, `to - from` long
 */
export function percentileCurves(curves, percents, { from, to, fewest = fewestRuns }) {
  const result = percents.map(() => new Float64Array(to - from).fill(NaN));
  const column = new Float64Array(curves.length);
  for (let i = from; i < to; i++) {
    let count = 0;
    for (const values of curves) {
      if (!Number.isNaN(values[i])) column[count++] = values[i];
    }

    if (count < fewest) continue;
    const ascending = column.subarray(0, count).sort();
    for (let k = 0; k < percents.length; k++) result[k][i - from] = percentileOf(ascending, count, percents[k]);
  }

  return result;
}
