// The path of a small plot: one curve on a log axis, reduced to the least and the greatest value of each column, so that a narrow
// peak is seen in the smallest picture. Pure.

import { logAxis, placeOf, straightAxis } from './spans.js';

/** @typedef {import('./spans.js').Span} Span */

/**
 * The spans of a curve; null where it has no value to show.
 * @param {ArrayLike<number>} frequencyHz ascending @param {ArrayLike<number>} values absent ones are NaN
 * @returns {{frequency: Span, values: Span} | null}
 */
export function spansOf(frequencyHz, values) {
  let min = Infinity;
  let max = -Infinity;
  for (let i = 0; i < values.length; i++) {
    if (!Number.isFinite(values[i])) continue;
    min = Math.min(min, values[i]);
    max = Math.max(max, values[i]);
  }

  if (min > max || frequencyHz.length < 2) return null;
  return { frequency: { min: frequencyHz[0], max: frequencyHz[frequencyHz.length - 1] }, values: { min, max } };
}

/**
 * The path's data, in a box of the given size with y downward; empty where there is nothing to show.
 * @param {ArrayLike<number>} frequencyHz ascending @param {ArrayLike<number>} values absent ones are NaN
 * @param {{width: number, height: number, columns?: number, leastLength?: number}} box `leastLength`: a curve that changes less
 * than this is drawn as flat as it is
 */
export function miniPath(frequencyHz, values, { width, height, columns = 2 * width, leastLength = 1 }) {
  const spans = spansOf(frequencyHz, values);
  if (spans === null) return '';
  const { min, max } = spans.values;
  const middle = (min + max) / 2;
  const length = Math.max(leastLength, max - min);
  const span = { min: middle - length / 2, max: middle + length / 2 };
  /** @type {string[]} */
  const parts = [];
  let pen = 'M';
  const point = (/** @type {number} */ i) => {
    const x = width * placeOf(logAxis, spans.frequency, frequencyHz[i]);
    const y = height * (1 - placeOf(straightAxis, span, values[i]));
    parts.push(`${pen}${Number(x.toFixed(2))} ${Number(y.toFixed(2))}`);
    pen = 'L';
  };

  for (let from = 0; from < frequencyHz.length;) {
    if (!Number.isFinite(values[from])) {
      pen = 'M';
      from++;
      continue;
    }

    const column = columnOf(frequencyHz[from], spans.frequency, columns);
    let to = from + 1;
    while (to < frequencyHz.length && Number.isFinite(values[to]) && columnOf(frequencyHz[to], spans.frequency, columns) === column) to++;
    for (const i of extremes(values, from, to)) point(i);
    from = to;
  }

  return parts.join('');
}

/** @param {number} frequencyHz @param {Span} span @param {number} columns */
const columnOf = (frequencyHz, span, columns) => Math.floor(columns * placeOf(logAxis, span, frequencyHz));

// First, least, greatest and last of a column, once each and in their order.
/** @param {ArrayLike<number>} values @param {number} from @param {number} to */
function extremes(values, from, to) {
  let [least, greatest] = [from, from];
  for (let i = from; i < to; i++) {
    if (values[i] < values[least]) least = i;
    if (values[i] > values[greatest]) greatest = i;
  }

  return [...new Set([from, least, greatest, to - 1])].sort((a, b) => a - b);
}
