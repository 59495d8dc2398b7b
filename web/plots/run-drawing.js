// Draws the background's runs, and their percentile curves, in steps that a caller may take a pause after. Pure: a worker takes
// the steps at once, a page without one takes them between frames.

import { percentileCurves } from './percentiles.js';
import { addCurve, emptyDensity, paint } from './run-raster.js';

/** Curves of one grid in one piece of memory; absent values are NaN. @typedef {{count: number, points: number, values: Float32Array}} Curves */
/** `groups` says for each run which of the colours it has; 255 leaves it out.
 * @typedef {{placing: import('./run-raster.js').Placing, width: number, height: number, groups: Uint8Array, colours: import('./run-raster.js').Colour[]}} PictureRequest */

const runsInOneStep = 100;
const frequenciesInOneStep = 50;

/**
 * @param {{values: Float64Array}[]} runs @param {number} points
 * @returns {Curves}
 */
export function curvesOf(runs, points) {
  const values = new Float32Array(runs.length * points);
  runs.forEach((run, i) => values.set(run.values, i * points));
  return { count: runs.length, points, values };
}

/**
 * @param {Curves} curves @param {PictureRequest} request
 * @returns {Generator<void, Uint8ClampedArray<ArrayBuffer>, void>} red, green, blue and opacity, row by row
 */
export function* drawRuns(curves, { placing, width, height, groups, colours }) {
  const pixels = new Uint8ClampedArray(width * height * 4);
  for (let group = 0; group < colours.length; group++) {
    let count = 0;
    let sinceStep = 0;
    const density = emptyDensity(width, height);
    for (let run = 0; run < curves.count; run++) {
      if (groups[run] !== group) continue;
      addCurve(density, placing, curves.values, run * curves.points);
      count++;
      if (++sinceStep === runsInOneStep) {
        sinceStep = 0;
        yield;
      }
    }

    if (count > 0) paint([{ density, colour: colours[group], count }], pixels);
    yield;
  }

  return pixels;
}

/**
 * @param {Curves} curves @param {number[]} percents
 * @returns {Generator<void, Float64Array[], void>} a curve a percentile
 */
export function* drawPercentiles(curves, percents) {
  const runs = Array.from({ length: curves.count }, (_, i) => curves.values.subarray(i * curves.points, (i + 1) * curves.points));
  const result = percents.map(() => new Float64Array(curves.points));
  for (let from = 0; from < curves.points; from += frequenciesInOneStep) {
    const to = Math.min(curves.points, from + frequenciesInOneStep);
    percentileCurves(runs, percents, { from, to }).forEach((part, i) => result[i].set(part, from));
    yield;
  }

  return result;
}

/** Takes all steps at once. @template T @param {Generator<void, T, void>} steps @returns {T} */
export function finish(steps) {
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
  }
}
