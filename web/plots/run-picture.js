// The picture of the runs in the background: when it has to be drawn again, and where the old one lies meanwhile. Pure.

import { logAxis, placeOf, straightAxis } from './spans.js';

/** @typedef {import('./spans.js').Span} Span */
/** What a picture shows: spans of its axes, and its size in CSS pixels.
 * @typedef {{frequency: Span, values: Span, width: number, height: number}} Scene */
/** @typedef {{x: number, y: number, width: number, height: number}} Box */

/**
 * A text that differs whenever the picture would: by limits of the axes, area, pixel ratio, colours, or the data and what of it
 * is drawn (`version`).
 * @param {Scene} scene @param {number} pixelRatio @param {string} colours @param {string} version
 */
export function pictureKey(scene, pixelRatio, colours, version) {
  const { frequency, values, width, height } = scene;
  return [version, frequency.min, frequency.max, values.min, values.max, width, height, pixelRatio, colours].join(' ');
}

/**
 * Where a picture drawn for one scene lies in an area that now shows another: moved and scaled with the axes.
 * @param {Scene} drawn @param {Scene} now @param {{left: number, top: number}} area
 * @returns {Box}
 */
export function previewBox(drawn, now, area) {
  const left = placeOf(logAxis, now.frequency, drawn.frequency.min);
  const right = placeOf(logAxis, now.frequency, drawn.frequency.max);
  const low = placeOf(straightAxis, now.values, drawn.values.min);
  const high = placeOf(straightAxis, now.values, drawn.values.max);
  return {
    x: area.left + left * now.width,
    y: area.top + (1 - high) * now.height,
    width: (right - left) * now.width,
    height: (high - low) * now.height,
  };
}

/**
 * Where a grid and its values lie in a picture, in device pixels.
 * @param {Scene} scene @param {number} pixelRatio @param {Float64Array} frequencyHz
 * @returns {import('./run-raster.js').Placing & {pixelWidth: number, pixelHeight: number}}
 */
export function placingOf(scene, pixelRatio, frequencyHz) {
  const pixelWidth = Math.max(1, Math.round(scene.width * pixelRatio));
  const pixelHeight = Math.max(1, Math.round(scene.height * pixelRatio));
  const from = Math.log10(scene.frequency.min);
  const perDecade = pixelWidth / (Math.log10(scene.frequency.max) - from);
  const yPerUnit = -pixelHeight / (scene.values.max - scene.values.min);
  return {
    x: Float64Array.from(frequencyHz, (f) => (Math.log10(f) - from) * perDecade),
    yZero: -scene.values.max * yPerUnit,
    yPerUnit,
    pixelWidth,
    pixelHeight,
  };
}
