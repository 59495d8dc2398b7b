// Which curve lies under a pointer. Pure.

import { indexAtOrUnder } from './curve.js';

/** @typedef {import('./limit-area.js').Panel} Panel */
/** @typedef {{runId: string, values: Float64Array}} Curve */

/**
 * The curve that passes nearest to a place, measured in pixels to its line; null where none comes within reach.
 * @param {Curve[]} curves on one grid
 * @param {Float64Array} frequencyHz
 * @param {Panel} panel
 * @param {(x: number) => number} frequencyAt the frequency of a pixel
 * @param {{x: number, y: number}} place @param {number} reach in pixels
 * @returns {{curve: Curve, distance: number} | null}
 */
export function nearestRun(curves, frequencyHz, panel, frequencyAt, place, reach) {
  const from = Math.max(0, indexAtOrUnder(frequencyHz, frequencyAt(place.x - reach)));
  const to = Math.min(frequencyHz.length - 1, indexAtOrUnder(frequencyHz, frequencyAt(place.x + reach)) + 1);
  if (to < from) return null;
  const xs = Array.from({ length: to - from + 1 }, (_, i) => panel.x(frequencyHz[from + i]));
  const yZero = panel.y(0);
  const yPerUnit = panel.y(1) - yZero;
  let best = null;
  let least = reach * reach;
  for (const curve of curves) {
    let squared = Infinity;
    let y0 = yZero + yPerUnit * curve.values[from];
    if (Number.isFinite(y0)) squared = (xs[0] - place.x) ** 2 + (y0 - place.y) ** 2;
    for (let i = 1; i < xs.length; i++) {
      const y1 = yZero + yPerUnit * curve.values[from + i];
      if (Number.isFinite(y0) && Number.isFinite(y1)) squared = Math.min(squared, squaredDistance(place, xs[i - 1], y0, xs[i], y1));
      else if (Number.isFinite(y1)) squared = Math.min(squared, (xs[i] - place.x) ** 2 + (y1 - place.y) ** 2);
      y0 = y1;
    }

    if (squared < least) {
      least = squared;
      best = curve;
    }
  }

  return best === null ? null : { curve: best, distance: Math.sqrt(least) };
}

/**
 * The curve whose value at a frequency is next above or under another's, so that keys can walk through the curves.
 * @param {Curve[]} curves
 * @param {(values: Float64Array) => number} valueOf a curve's value at the frequency
 * @param {string | null} runId the curve to walk from; null begins at the far end
 * @param {1 | -1} step 1 for the next greater value
 * @returns {Curve | null}
 */
export function neighbourRun(curves, valueOf, runId, step) {
  const ordered = curves
    .map((curve, order) => ({ curve, order, value: valueOf(curve.values) }))
    .filter(({ value }) => Number.isFinite(value))
    .sort((a, b) => a.value - b.value || a.order - b.order);
  const at = ordered.findIndex(({ curve }) => curve.runId === runId);
  const next = at < 0 ? (step > 0 ? 0 : ordered.length - 1) : at + step;
  return ordered[next]?.curve ?? null;
}

/** @param {{x: number, y: number}} place @param {number} x0 @param {number} y0 @param {number} x1 @param {number} y1 */
function squaredDistance(place, x0, y0, x1, y1) {
  const [dx, dy] = [x1 - x0, y1 - y0];
  const length = dx * dx + dy * dy;
  const share = length === 0 ? 0 : Math.min(1, Math.max(0, ((place.x - x0) * dx + (place.y - y0) * dy) / length));
  return (x0 + share * dx - place.x) ** 2 + (y0 + share * dy - place.y) ** 2;
}
