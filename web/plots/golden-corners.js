// A limit made of the golden run: its curve plus or minus a distance, with few corners. It lies on the strict side of that curve
// everywhere, and within the tolerance of it: what it passes, the curve itself would pass. Pure.

import { frequency } from '../numbers.js';

/** @typedef {import('./corner-editing.js').Corner} Corner */
/** @typedef {{side: 'upper' | 'lower', distance: number, tolerance: number, step?: number, fromHz?: number, toHz?: number, most?: number}} GoldenLimitRequest */

/**
 * Corners of the golden run plus `distance` (an upper limit) or minus it (a lower one). Corners stand at frequencies of the
 * golden run. Where more than `most` corners would be needed the tolerance is widened, and the answer says what it became.
 * @param {{frequencyHz: ArrayLike<number>, values: ArrayLike<number>}} golden absent values are NaN
 * @param {GoldenLimitRequest} request `step`: corner values are whole multiples of it, rounded to the strict side
 * @returns {{corners: Corner[], tolerance: number, notes: string[]}}
 */
export function goldenCorners(golden, { side, distance, tolerance, step = 0, fromHz = 0, toHz = Infinity, most = 40 }) {
  const { points, notes } = stretchOf(golden, fromHz, toHz);
  if (points.length < 2) return { corners: [], tolerance, notes: ['The golden run has no two points there to make a limit of.'] };

  // An upper limit seen in a mirror is a lower one: below, stricter is always less.
  const mirror = side === 'upper' ? 1 : -1;
  const exact = points.map(({ x, value }) => ({ x, y: mirror * value + distance }));
  let allowed = Math.max(tolerance, 2 * step);
  let kept = simplified(exact, (allowed - step) / 2);
  while (kept.length > Math.max(2, most)) {
    allowed *= 1.5;
    kept = simplified(exact, (allowed - step) / 2);
  }

  const over = mostOver(exact, kept);
  if (allowed > tolerance) notes.push('The limit is stricter than the golden run\'s curve by more than was asked, to have few corners.');
  const corners = kept.map((i) => ({ frequencyHz: points[i].frequencyHz, value: mirror * roundedDown(exact[i].y - over, step) }));
  return { corners, tolerance: allowed, notes };
}

/**
 * Indices of the points that are kept so that every other lies within a distance, measured in values, of the straight line
 * between its kept neighbours (Douglas and Peucker, The Canadian Cartographer 10 (1973) 112).
 * @param {{x: number, y: number}[]} points @param {number} within
 * @returns {number[]}
 */
export function simplified(points, within) {
  const kept = new Set([0, points.length - 1]);
  const open = [[0, points.length - 1]];
  for (let piece = open.pop(); piece !== undefined; piece = open.pop()) {
    const [from, to] = piece;
    let furthest = -1;
    let distance = within;
    for (let i = from + 1; i < to; i++) {
      const off = Math.abs(points[i].y - onLine(points[from], points[to], points[i].x));
      if (off > distance) {
        distance = off;
        furthest = i;
      }
    }

    if (furthest >= 0) {
      kept.add(furthest);
      open.push([from, furthest], [furthest, to]);
    }
  }

  return [...kept].sort((a, b) => a - b);
}

/** @param {{x: number, y: number}[]} points @param {number[]} kept */
function mostOver(points, kept) {
  let over = 0;
  for (let k = 0; k + 1 < kept.length; k++) {
    for (let i = kept[k] + 1; i < kept[k + 1]; i++) over = Math.max(over, onLine(points[kept[k]], points[kept[k + 1]], points[i].x) - points[i].y);
  }

  return over;
}

/** @param {{x: number, y: number}} a @param {{x: number, y: number}} b @param {number} x */
const onLine = (a, b, x) => a.y + ((b.y - a.y) * (x - a.x)) / (b.x - a.x);

/** @param {number} value @param {number} step */
const roundedDown = (value, step) => (step > 0 ? Number((step * Math.floor(value / step + 1e-9)).toPrecision(12)) : value);

// A limit is one chain, so where the golden run has gaps its longest stretch is taken.
/** @param {{frequencyHz: ArrayLike<number>, values: ArrayLike<number>}} golden @param {number} fromHz @param {number} toHz */
function stretchOf({ frequencyHz, values }, fromHz, toHz) {
  /** @type {{x: number, frequencyHz: number, value: number}[][]} */
  const stretches = [[]];
  for (let i = 0; i < frequencyHz.length; i++) {
    if (frequencyHz[i] < fromHz || frequencyHz[i] > toHz) continue;
    if (Number.isFinite(values[i])) stretches[stretches.length - 1].push({ x: Math.log10(frequencyHz[i]), frequencyHz: frequencyHz[i], value: values[i] });
    else if (stretches[stretches.length - 1].length > 0) stretches.push([]);
  }

  const filled = stretches.filter((stretch) => stretch.length > 1);
  const points = filled.reduce((best, stretch) => (length(stretch) > length(best) ? stretch : best), filled[0] ?? []);
  const notes = filled.length > 1
    ? [`The golden run has gaps. The limit spans ${frequency(points[0].frequencyHz)} to ${frequency(points[points.length - 1].frequencyHz)}, its longest stretch.`]
    : [];
  return { points, notes };
}

/** @param {{x: number}[]} stretch */
const length = (stretch) => stretch[stretch.length - 1].x - stretch[0].x;
