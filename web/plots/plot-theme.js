// The colours of a plot, out of the custom properties of the page, and a watch on their change.

import { seriesColours } from './named-runs.js';

/** @typedef {{ground: string, grid: string, gridMajor: string, axis: string, ink: string, run: string, golden: string, forbidden: string, cursor: string, series: string[], face: string, textPx: number}} PlotTheme */

const usual = new Map([
  ['--plot-ground', '#ffffff'], ['--plot-grid', '#e2e6e4'], ['--plot-grid-major', '#c3cac7'], ['--plot-axis', '#4d5a5e'],
  ['--plot-run', '#8a979b'], ['--plot-golden', '#1b2224'], ['--plot-forbidden', '#d55e00'], ['--plot-cursor', '#0a5a74'],
  ['--ink', '#1b2224'], ['--face', 'sans-serif'],
]);
const usualSeries = ['#0072b2', '#b3588e', '#00805d', '#3d3d8f', '#7a6a00'];

/** @param {Element} element @returns {PlotTheme} */
export function themeOf(element) {
  const style = getComputedStyle(element);
  const read = (/** @type {string} */ name, /** @type {string} */ otherwise) => style.getPropertyValue(name).trim() || otherwise;
  const named = (/** @type {string} */ name) => read(name, usual.get(name) ?? '#000000');
  return {
    ground: named('--plot-ground'),
    grid: named('--plot-grid'),
    gridMajor: named('--plot-grid-major'),
    axis: named('--plot-axis'),
    ink: named('--ink'),
    run: named('--plot-run'),
    golden: named('--plot-golden'),
    forbidden: named('--plot-forbidden'),
    cursor: named('--plot-cursor'),
    series: seriesColours.map((name, i) => read(name, usualSeries[i])),
    face: named('--face'),
    textPx: 12,
  };
}

/**
 * Calls back when the theme may have changed: the system's preference, or an attribute of the page's root.
 * @param {() => void} onChange
 * @returns {() => void} ends the watch
 */
export function watchTheme(onChange) {
  const dark = matchMedia('(prefers-color-scheme: dark)');
  const observer = new MutationObserver(onChange);
  observer.observe(document.documentElement, { attributes: true, attributeFilter: ['class', 'data-theme', 'style'] });
  dark.addEventListener('change', onChange);
  return () => {
    observer.disconnect();
    dark.removeEventListener('change', onChange);
  };
}

/** @type {CanvasRenderingContext2D | null} */
let reader = null;

/**
 * A colour of a style sheet in red, green and blue.
 * @param {string} colour
 * @returns {import('./run-raster.js').Colour}
 */
export function rgbOf(colour) {
  reader ??= document.createElement('canvas').getContext('2d', { willReadFrequently: true });
  if (reader === null) return [128, 128, 128];
  reader.clearRect(0, 0, 1, 1);
  reader.fillStyle = '#808080';
  reader.fillStyle = colour;
  reader.fillRect(0, 0, 1, 1);
  const [red, green, blue] = reader.getImageData(0, 0, 1, 1).data;
  return [red, green, blue];
}
