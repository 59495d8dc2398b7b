// What is painted in a panel beside the lines of runs: forbidden areas, the fan of percentiles, limits and names.

import { valueAt } from './curve.js';
import { forbiddenAreas, limitLines, namePlace } from './limit-area.js';

/** @typedef {import('./plot-chart.js').ChartPanel} Panel */
/** @typedef {import('./trace-set.js').Limit} Limit */
/** @typedef {import('./plot-theme.js').PlotTheme} PlotTheme */
/** @typedef {CanvasRenderingContext2D} Context */

const hatchPx = 7;

/**
 * Paints inside the panel's edges only.
 * @param {Context} context @param {Panel} panel @param {() => void} paint
 */
export function clipped(context, panel, paint) {
  context.save();
  context.beginPath();
  context.rect(Math.round(panel.left), Math.round(panel.top), Math.round(panel.right) - Math.round(panel.left), Math.round(panel.bottom) - Math.round(panel.top));
  context.clip();
  paint();
  context.restore();
}

/**
 * The areas that limits forbid: a wash, and a hatching that rises for upper and falls for lower limits.
 * @param {Context} context @param {Panel} panel @param {Limit[]} limits @param {PlotTheme} theme @param {number} pixelRatio
 */
export function paintForbidden(context, panel, limits, theme, pixelRatio) {
  for (const limit of limits) {
    for (const polygon of forbiddenAreas(limit, panel)) {
      trace(context, polygon);
      context.globalAlpha = 0.1;
      context.fillStyle = theme.forbidden;
      context.fill();
      context.globalAlpha = 0.5;
      context.fillStyle = hatching(context, theme.forbidden, limit.side, pixelRatio) ?? theme.forbidden;
      context.fill();
      context.globalAlpha = 1;
    }
  }
}

/**
 * The lines of limits, each with its name on the forbidden side.
 * @param {Context} context @param {Panel} panel @param {Limit[]} limits @param {PlotTheme} theme
 */
export function paintLimits(context, panel, limits, theme) {
  context.font = `600 ${theme.textPx - 1}px ${theme.face}`;
  for (const limit of limits) {
    context.strokeStyle = theme.forbidden;
    context.lineWidth = 1.5;
    context.setLineDash([]);
    for (const line of limitLines(limit, panel)) {
      trace(context, line);
      context.stroke();
    }
  }

  for (const limit of limits) {
    const place = namePlace(limit, panel, context.measureText(limit.name).width, theme.textPx);
    if (place !== null) write(context, limit.name, place.x, place.y, theme.forbidden, theme.ground);
  }
}

/**
 * The fan: outer and inner percentiles as bands, the median as a line of dots and dashes.
 * @param {Context} context @param {Panel} panel @param {Float64Array} frequencyHz @param {Float64Array[]} percentiles five, ascending
 * @param {PlotTheme} theme
 */
export function paintFan(context, panel, frequencyHz, percentiles, theme) {
  const x = Float64Array.from(frequencyHz, panel.x);
  for (const [low, high] of [[0, 4], [1, 3]]) {
    context.beginPath();
    for (const [from, to] of stretches(percentiles[low])) {
      for (let i = from; i < to; i++) context.lineTo(x[i], panel.y(percentiles[high][i]));
      for (let i = to - 1; i >= from; i--) context.lineTo(x[i], panel.y(percentiles[low][i]));
      context.closePath();
    }

    context.globalAlpha = 0.16;
    context.fillStyle = theme.cursor;
    context.fill();
    context.globalAlpha = 1;
  }

  context.strokeStyle = theme.cursor;
  context.lineWidth = 1.25;
  for (const [i, dash] of /** @type {[number, number[]][]} */ ([[0, [2, 2]], [2, [8, 3, 2, 3]], [4, [2, 2]]])) {
    context.setLineDash(dash);
    strokeCurve(context, x, percentiles[i], panel);
  }

  context.setLineDash([]);
}

/**
 * Strokes a curve with the style that the context has.
 * @param {Context} context @param {ArrayLike<number>} x pixels @param {Float64Array} values @param {Panel} panel
 */
export function strokeCurve(context, x, values, panel) {
  context.beginPath();
  let before = false;
  for (let i = 0; i < x.length; i++) {
    const there = Number.isFinite(values[i]);
    if (there && before) context.lineTo(x[i], panel.y(values[i]));
    else if (there) context.moveTo(x[i], panel.y(values[i]));
    before = there;
  }

  context.stroke();
}

/**
 * A curve's name beside its line, where it is in view and, if there is such a place, no other line runs through the name.
 * @param {Context} context @param {Panel} panel @param {{frequencyHz: Float64Array, values: Float64Array, name: string, colour: string}} curve
 * @param {((frequencyHz: number) => number)[]} others values of the other lines @param {PlotTheme} theme
 */
export function paintName(context, panel, { frequencyHz, values, name, colour }, others, theme) {
  context.font = `600 ${theme.textPx}px ${theme.face}`;
  const half = context.measureText(name).width / 2 + 6;
  const tall = theme.textPx / 2 + 2;
  const curve = (/** @type {number} */ x) => panel.y(valueAt(frequencyHz, values, panel.frequencyAt(x)));
  const lines = others.map((valueOf) => (/** @type {number} */ x) => panel.y(valueOf(panel.frequencyAt(x))));
  const inside = (/** @type {number} */ y) => y - tall > panel.top && y + tall < panel.bottom;
  const clear = (/** @type {number} */ x, /** @type {number} */ y, /** @type {((x: number) => number)[]} */ of) => inside(y)
    && of.every((line) => [x - half, x, x + half].every((at) => !(Math.abs(line(at) - y) < tall)));
  const places = [];
  for (let share = 0.05; share < 1; share += 0.09) {
    const x = Math.min(panel.right - half, Math.max(panel.left + half, panel.left + share * (panel.right - panel.left)));
    for (const off of [-1, 1, -2.2, 2.2]) places.push({ x, y: curve(x) + off * theme.textPx });
  }

  const place = places.find(({ x, y }) => clear(x, y, [curve, ...lines])) ?? places.find(({ x, y }) => clear(x, y, [curve])) ?? places.find(({ y }) => inside(y));
  if (place) write(context, name, place.x, place.y, colour, theme.ground);
}

/** @param {Context} context @param {string} text @param {number} x @param {number} y @param {string} colour @param {string} ground */
export function write(context, text, x, y, colour, ground) {
  context.textAlign = 'center';
  context.textBaseline = 'middle';
  context.lineJoin = 'round';
  context.setLineDash([]);
  context.strokeStyle = ground;
  context.lineWidth = 4;
  context.strokeText(text, x, y);
  context.fillStyle = colour;
  context.fillText(text, x, y);
}

/** @param {Float64Array} values @returns {[number, number][]} stretches from..to-1 without an absent value */
function stretches(values) {
  /** @type {[number, number][]} */
  const found = [];
  let from = -1;
  for (let i = 0; i <= values.length; i++) {
    const there = i < values.length && Number.isFinite(values[i]);
    if (there && from < 0) from = i;
    if (!there && from >= 0) {
      found.push([from, i]);
      from = -1;
    }
  }

  return found;
}

/** @param {Context} context @param {number[]} points of alternating x and y */
function trace(context, points) {
  context.beginPath();
  for (let i = 0; i < points.length; i += 2) context.lineTo(points[i], points[i + 1]);
}

/** @type {Map<string, CanvasPattern | null>} */
const hatchings = new Map();

/** @param {Context} context @param {string} colour @param {'upper' | 'lower'} side @param {number} pixelRatio */
function hatching(context, colour, side, pixelRatio) {
  const key = `${colour} ${side} ${pixelRatio}`;
  if (!hatchings.has(key)) {
    const tile = document.createElement('canvas');
    const size = Math.round(hatchPx * pixelRatio);
    tile.width = tile.height = size;
    const pen = /** @type {Context} */ (tile.getContext('2d'));
    pen.strokeStyle = colour;
    pen.lineWidth = pixelRatio;
    const [from, to] = side === 'upper' ? [size, 0] : [0, size];
    for (const shift of [-size, 0, size]) {
      pen.moveTo(shift, from);
      pen.lineTo(shift + size, to);
    }

    pen.stroke();
    const pattern = context.createPattern(tile, 'repeat');
    pattern?.setTransform(new DOMMatrix().scale(hatchPx / size));
    hatchings.set(key, pattern);
  }

  return hatchings.get(key);
}
