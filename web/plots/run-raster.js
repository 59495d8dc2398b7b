// Draws many thin curves into a picture by counting, for each pixel, how many of them cross it. Stroking a thousand paths on a
// canvas costs several times as much, and lets one line alone fade or a thousand run into one colour; here a lone line stays
// visible and a dense place grows darker. Pure, so that it runs in a worker, on the page and in a test.

const lineWidthPx = 1;
const darkest = 0.92;

/** How the pixels of a picture are worked out: how much each is covered, column by column.
 * @typedef {{width: number, height: number, cover: Float32Array}} Density */
/** Where a grid and its values lie: the pixel of each frequency, and `yZero + yPerUnit * value`.
 * @typedef {{x: Float32Array | Float64Array, yZero: number, yPerUnit: number}} Placing */
/** @typedef {[number, number, number]} Colour red, green and blue from 0 to 255 */

/**
 * @param {number} width @param {number} height in device pixels
 * @returns {Density}
 */
export function emptyDensity(width, height) {
  return { width, height, cover: new Float32Array(width * height) };
}

/**
 * Adds one curve, straight between its points; none where a value is absent.
 * @param {Density} density
 * @param {Placing} placing
 * @param {Float32Array | Float64Array} values
 * @param {number} start of the curve's values in `values`; as many as the grid has
 */
export function addCurve(density, placing, values, start = 0) {
  const { width } = density;
  const { x, yZero, yPerUnit } = placing;
  let column = -1;
  let low = 0;
  let high = 0;
  let lone = true;
  const last = x.length - 1;
  for (let i = 0; i < last; i++) {
    const x0 = x[i];
    const x1 = x[i + 1];
    const y0 = yZero + yPerUnit * values[start + i];
    const y1 = yZero + yPerUnit * values[start + i + 1];
    if (!Number.isFinite(y0 + y1)) {
      if (column >= 0) addColumn(density, column, low, high);
      else if (lone && Number.isFinite(y0)) addPoint(density, x0, y0);
      column = -1;
      lone = true;
      continue;
    }

    lone = false;
    if (x1 < 0 || x0 >= width) continue;
    const slope = x1 > x0 ? (y1 - y0) / (x1 - x0) : 0;
    const to = Math.min(x1, width);
    let at = Math.floor(Math.max(x0, 0));
    if (at !== column) {
      if (column >= 0) addColumn(density, column, low, high);
      column = at;
      low = high = x0 < 0 ? y0 - x0 * slope : y0;
    }

    for (; at + 1 < to; at++) {
      const edge = y0 + (at + 1 - x0) * slope;
      addColumn(density, at, Math.min(low, edge), Math.max(high, edge));
      column = at + 1;
      low = high = edge;
    }

    const end = to === x1 ? y1 : y0 + (to - x0) * slope;
    if (end < low) low = end;
    if (end > high) high = end;
  }

  if (column >= 0) addColumn(density, column, low, high);
  else if (lone && last >= 0) addPoint(density, x[last], yZero + yPerUnit * values[start + last]);
}

/** @param {Density} density @param {number} x @param {number} y */
function addPoint(density, x, y) {
  if (x >= 0 && x < density.width && Number.isFinite(y)) addColumn(density, Math.floor(x), y - 0.5, y + 0.5);
}

// A line that climbs h pixels within a column covers sqrt(1 + h²) line widths of it, spread over h + 1 rows.
/** @param {Density} density @param {number} column @param {number} low @param {number} high */
function addColumn(density, column, low, high) {
  const { height, cover } = density;
  const climb = high - low;
  const from = Math.max(0, low - lineWidthPx / 2);
  const to = Math.min(height, high + lineWidthPx / 2);
  if (!(from < to)) return;
  const strength = climb > 50 ? 1 : (lineWidthPx * Math.sqrt(1 + climb * climb)) / (climb + lineWidthPx);
  const base = column * height;
  const first = Math.floor(from);
  const end = Math.floor(to);
  if (first === end) {
    cover[base + first] += strength * (to - from);
    return;
  }

  cover[base + first] += strength * (first + 1 - from);
  for (let row = first + 1; row < end; row++) cover[base + row] += strength;
  if (end < height) cover[base + end] += strength * (to - end);
}

/**
 * How opaque a pixel is that `cover` of `count` lines cross: a lone line stands out by itself, more of them darken it ever
 * more slowly.
 * @param {number} cover @param {number} count
 */
export function opacityOf(cover, count) {
  const lone = Math.min(0.85, Math.max(0.3, 0.9 - 0.2 * Math.log10(Math.max(1, count))));
  if (cover <= 1) return lone * cover;
  return Math.min(darkest, lone + ((darkest - lone) * Math.log(cover)) / Math.log(Math.max(2, count)));
}

/**
 * Lays groups of curves over each other, the last on top.
 * @param {{density: Density, colour: Colour, count: number}[]} groups of one size
 * @param {Uint8ClampedArray} pixels red, green, blue and opacity of each, row by row; written
 */
export function paint(groups, pixels) {
  if (groups.length === 0) return;
  const { width, height } = groups[0].density;
  for (const { density, colour, count } of groups) {
    const steps = opacitySteps(count);
    const { cover } = density;
    for (let row = 0; row < height; row++) {
      let to = row * width * 4;
      for (let from = row; from < cover.length; from += height, to += 4) {
        const covered = cover[from];
        if (covered === 0) continue;
        const over = steps[Math.min(steps.length - 1, Math.round(covered * stepsPerLine))];
        const under = (pixels[to + 3] / 255) * (1 - over);
        const both = over + under;
        if (both <= 0) continue;
        pixels[to] = (colour[0] * over + pixels[to] * under) / both;
        pixels[to + 1] = (colour[1] * over + pixels[to + 1] * under) / both;
        pixels[to + 2] = (colour[2] * over + pixels[to + 2] * under) / both;
        pixels[to + 3] = both * 255;
      }
    }
  }
}

const stepsPerLine = 16;

/** @param {number} count */
function opacitySteps(count) {
  const steps = new Float32Array(Math.min(4096, Math.max(2, count)) * stepsPerLine + 1);
  for (let i = 0; i < steps.length; i++) steps[i] = opacityOf(i / stepsPerLine, count);
  return steps;
}
