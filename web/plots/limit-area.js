// A limit at a frequency, the margin of a value to it, and the area that it forbids. Pure.

import { indexAtOrUnder } from './curve.js';

/** @typedef {import('./trace-set.js').Limit} Limit */
/** What places values on a plot: pixels of a frequency and of a value, and the panel that they lie in.
 * @typedef {{x: (frequencyHz: number) => number, y: (value: number) => number, left: number, right: number, top: number, bottom: number}} Panel */

/** @param {Limit} limit @param {number} a @param {number} b */
const stricter = (limit, a, b) => (limit.side === 'upper' ? Math.min(a, b) : Math.max(a, b));

/**
 * The limit at a frequency, straight against log f between corners; at a step the stricter value; NaN outside its span.
 * @param {Limit} limit @param {number} atHz
 */
export function limitAt(limit, atHz) {
  const { frequencyHz, values } = limit;
  let found = NaN;
  for (let i = Math.max(0, indexAtOrUnder(frequencyHz, atHz) - 2); i + 1 < frequencyHz.length && frequencyHz[i] <= atHz; i++) {
    if (frequencyHz[i + 1] < atHz) continue;
    const length = Math.log(frequencyHz[i + 1] / frequencyHz[i]);
    const here = length === 0 ? stricter(limit, values[i], values[i + 1])
      : atHz === frequencyHz[i] ? values[i]
      : atHz === frequencyHz[i + 1] ? values[i + 1]
      : values[i] + (values[i + 1] - values[i]) * (Math.log(atHz / frequencyHz[i]) / length);
    if (!Number.isNaN(here)) found = Number.isNaN(found) ? here : stricter(limit, found, here);
  }

  return found;
}

/**
 * The distance of a value to a limit at one frequency, positive inside; NaN where either is absent.
 * @param {Limit} limit @param {number} atHz @param {number} value
 */
export function marginTo(limit, atHz, value) {
  return limit.side === 'upper' ? limitAt(limit, atHz) - value : value - limitAt(limit, atHz);
}

/**
 * The least margin of a value at one frequency, and the limit that it is to; null where no limit stands or the value is absent.
 * @param {Limit[]} limits @param {number} atHz @param {number} value
 * @returns {{margin: number, limit: string} | null}
 */
export function marginAt(limits, atHz, value) {
  let least = null;
  for (const limit of limits) {
    const margin = marginTo(limit, atHz, value);
    if (!Number.isNaN(margin) && (least === null || margin < least.margin)) least = { margin, limit: limit.name };
  }

  return least;
}

/**
 * The line of a limit on a panel: one list of alternating x and y for each stretch without an absent value.
 * @param {Limit} limit @param {Panel} panel
 * @returns {number[][]}
 */
export function limitLines(limit, panel) {
  /** @type {number[][]} */
  const lines = [];
  /** @type {number[]} */
  let line = [];
  for (let i = 0; i <= limit.frequencyHz.length; i++) {
    if (i < limit.frequencyHz.length && Number.isFinite(limit.values[i])) {
      line.push(panel.x(limit.frequencyHz[i]), panel.y(limit.values[i]));
    } else {
      if (line.length >= 4) lines.push(line);
      line = [];
    }
  }

  return lines;
}

/**
 * The forbidden area of a limit: each of its lines closed along the edge of the panel that lies beyond it.
 * @param {Limit} limit @param {Panel} panel
 * @returns {number[][]} polygons of alternating x and y
 */
export function forbiddenAreas(limit, panel) {
  return limitLines(limit, panel).map((line) => {
    const ys = line.filter((_, i) => i % 2 === 1);
    const edge = limit.side === 'upper' ? Math.min(panel.top, ...ys) : Math.max(panel.bottom, ...ys);
    return [...line, line[line.length - 2], edge, line[0], edge];
  });
}

/**
 * Where a limit's name may stand: beside the line, on its forbidden side, inside the panel. Null where the line is not in view.
 * @param {Limit} limit @param {Panel} panel @param {number} widthPx of the text @param {number} heightPx of the text
 * @returns {{x: number, y: number} | null} the middle of the text
 */
export function namePlace(limit, panel, widthPx, heightPx) {
  const lines = limitLines(limit, panel);
  const seen = lines
    .map((line) => ({ line, left: Math.max(panel.left, line[0]), right: Math.min(panel.right, line[line.length - 2]) }))
    .filter(({ left, right }) => right > left)
    .sort((a, b) => (b.right - b.left) - (a.right - a.left))[0];
  if (seen === undefined) return null;
  const away = (limit.side === 'upper' ? -1 : 1) * (heightPx / 2 + 4);
  for (const share of [0.5, 0.25, 0.75, 0.1, 0.9]) {
    const middle = seen.left + share * (seen.right - seen.left);
    const x = Math.min(Math.max(middle, panel.left + widthPx / 2 + 4), panel.right - widthPx / 2 - 4);
    const y = furthest(seen.line, x - widthPx / 2, x + widthPx / 2, limit.side) + away;
    if (y - heightPx / 2 >= panel.top && y + heightPx / 2 <= panel.bottom) return { x, y };
  }

  return null;
}

// The y of a line that lies furthest on the forbidden side between two xs.
/** @param {number[]} line @param {number} left @param {number} right @param {'upper' | 'lower'} side */
function furthest(line, left, right, side) {
  const outer = side === 'upper' ? Math.min : Math.max;
  let found = side === 'upper' ? Infinity : -Infinity;
  for (let i = 0; i + 3 < line.length; i += 2) {
    const [x0, y0, x1, y1] = line.slice(i, i + 4);
    if (x1 < left || x0 > right) continue;
    const at = (/** @type {number} */ x) => (x1 === x0 ? outer(y0, y1) : y0 + ((y1 - y0) * (x - x0)) / (x1 - x0));
    found = outer(found, at(Math.max(left, x0)), at(Math.min(right, x1)));
  }

  return Number.isFinite(found) ? found : line[1];
}
