// The Chart.js chart under a response plot: the shared log frequency axis, one or two stacked panels with straight axes, the
// golden run and the runs with names. What else is in a panel is painted by whoever made the chart, under and over the lines.

import { Chart, LinearScale, LineController, LineElement, LogarithmicScale, PointElement } from 'chart.js';
import { logAxis, straightAxis, valueAtPlace } from './spans.js';
import { logTicks, straightTicks } from './ticks.js';

Chart.register(LineController, LineElement, PointElement, LinearScale, LogarithmicScale);

/** @typedef {import('./limit-area.js').Panel} Panel */
/** @typedef {import('./plot-model.js').PanelKey} PanelKey */
/** @typedef {import('./spans.js').Span} Span */
/** @typedef {import('./plot-theme.js').PlotTheme} PlotTheme */
/** A panel with what its axes show. @typedef {Panel & {key: PanelKey, frequency: Span, values: Span, frequencyAt: (x: number) => number, valueAt: (y: number) => number}} ChartPanel */
/** @typedef {{panel: PanelKey, runId: string, frequencyHz: Float64Array, values: Float64Array, colour: string, dash: number[], width: number, order: number}} ChartLine */
/** @typedef {{panels: {key: PanelKey, title: string, values: Span, angle: boolean, prefixed: boolean}[], frequency: Span, lines: ChartLine[], theme: PlotTheme}} ChartContent */
/** @typedef {{under: (context: CanvasRenderingContext2D, panels: ChartPanel[]) => void, over: (context: CanvasRenderingContext2D, panels: ChartPanel[]) => void}} Painters */

const weights = { upper: 2, lower: 1 };
const axisWidthPx = 62;
const leastTickPx = 26;

export class PlotChart {
  /** @type {Chart<'line', {x: number, y: number}[]>} */
  #chart;
  /** @type {WeakMap<Float64Array, {x: number, y: number}[]>} */
  #points = new WeakMap();
  #layout = '';

  /** @param {HTMLCanvasElement} canvas @param {Painters} painters @param {() => void} onLayout called after each drawing */
  constructor(canvas, painters, onLayout) {
    this.#chart = new Chart(canvas, {
      type: 'line',
      data: { datasets: [] },
      options: {
        animation: false, events: [], responsive: true, maintainAspectRatio: false, parsing: false, normalized: true,
        layout: { padding: { top: 8, right: 12, bottom: 0, left: 0 } },
        elements: { point: { radius: 0, hitRadius: 0, hoverRadius: 0 }, line: { tension: 0, borderJoinStyle: 'round' } },
      },
      plugins: [{
        id: 'panels',
        beforeDatasetsDraw: (chart) => painters.under(chart.ctx, panelsOf(chart)),
        afterDatasetsDraw: (chart) => painters.over(chart.ctx, panelsOf(chart)),
        afterDraw: onLayout,
      }],
    });
  }

  /** @param {ChartContent} content */
  show({ panels, frequency, lines, theme }) {
    const options = /** @type {any} */ (this.#chart.options);
    const layout = JSON.stringify([panels.map(({ key, title, angle, prefixed }) => [key, title, angle, prefixed]), theme]);
    if (layout !== this.#layout) {
      this.#layout = layout;
      // The scale that is listed first lies at the bottom.
      options.scales = Object.fromEntries([['x', frequencyScale(theme)], ...[...panels].reverse().map((panel) => [panel.key, valueScale(panel, theme)])]);
    }

    Object.assign(options.scales.x, { min: frequency.min, max: frequency.max });
    for (const { key, values } of panels) Object.assign(options.scales[key], { min: values.min, max: values.max });
    this.#chart.data.datasets = lines.map((line) => ({
      xAxisID: 'x', yAxisID: line.panel, label: line.runId, data: this.#pointsOf(line),
      borderColor: line.colour, borderDash: line.dash, borderWidth: line.width, order: line.order,
    }));
    this.#chart.update('none');
  }

  /** Draws again what is there. */
  draw() {
    this.#chart.draw();
  }

  /** The panels as they were last laid out. */
  get panels() {
    return panelsOf(this.#chart);
  }

  get pixelRatio() {
    return this.#chart.currentDevicePixelRatio;
  }

  /** @returns {{width: number, height: number}} in CSS pixels */
  get size() {
    return { width: this.#chart.width, height: this.#chart.height };
  }

  destroy() {
    this.#chart.destroy();
  }

  /** @param {ChartLine} line */
  #pointsOf({ frequencyHz, values }) {
    let points = this.#points.get(values);
    if (points === undefined) {
      points = Array.from(frequencyHz, (x, i) => ({ x, y: values[i] }));
      this.#points.set(values, points);
    }

    return points;
  }
}

/** @param {any} chart @returns {ChartPanel[]} */
function panelsOf({ scales: { x, ...others } }) {
  return (/** @type {PanelKey[]} */ (['upper', 'lower'])).filter((key) => others[key] !== undefined).map((key) => {
    const y = others[key];
    const [frequency, values] = [{ min: x.min, max: x.max }, { min: y.min, max: y.max }];
    // Curves are placed point by point, so what does not change is taken out of it.
    const xPerDecade = (x.right - x.left) / Math.log10(frequency.max / frequency.min);
    const xZero = x.left - xPerDecade * Math.log10(frequency.min);
    const yPerUnit = (y.top - y.bottom) / (values.max - values.min);
    const yZero = y.bottom - yPerUnit * values.min;
    return {
      key, frequency, values, left: x.left, right: x.right, top: y.top, bottom: y.bottom,
      x: (frequencyHz) => xZero + xPerDecade * Math.log10(frequencyHz),
      y: (value) => yZero + yPerUnit * value,
      frequencyAt: (pixel) => valueAtPlace(logAxis, frequency, (pixel - x.left) / (x.right - x.left)),
      valueAt: (pixel) => valueAtPlace(straightAxis, values, (y.bottom - pixel) / (y.bottom - y.top)),
    };
  });
}

/** @param {PlotTheme} theme */
function frequencyScale(theme) {
  return {
    type: 'logarithmic',
    ...common(theme),
    title: titleOf('Frequency, Hz', theme),
    afterBuildTicks: (/** @type {any} */ scale) => {
      scale.ticks = logTicks({ min: scale.min, max: scale.max }, scale.chart.width - axisWidthPx - 12);
    },
  };
}

/** @param {{key: PanelKey, title: string, angle: boolean, prefixed: boolean}} panel @param {PlotTheme} theme */
function valueScale({ key, title, angle, prefixed }, theme) {
  return {
    type: 'linear', position: 'left', stack: 'panels', stackWeight: weights[key],
    ...common(theme),
    title: titleOf(title, theme),
    afterFit: (/** @type {any} */ scale) => {
      scale.width = axisWidthPx;
    },
    afterBuildTicks: (/** @type {any} */ scale) => {
      const total = Object.keys(scale.chart.options.scales).length > 2 ? 3 : weights[key];
      const height = ((scale.chart.height - 50) * weights[key]) / total;
      const ticks = straightTicks({ min: scale.min, max: scale.max }, height / leastTickPx, { angle, prefixed });
      // A text at the very edge would run into the neighbouring panel's.
      const room = (7 / height) * (scale.max - scale.min);
      scale.ticks = ticks.map((tick) => (tick.value - scale.min < room || scale.max - tick.value < room ? { ...tick, text: '' } : tick));
    },
  };
}

/** @param {PlotTheme} theme */
function common(theme) {
  return {
    border: { color: theme.axis },
    grid: { color: (/** @type {any} */ context) => (context.tick?.major ? theme.gridMajor : theme.grid), drawTicks: true, tickLength: 4, tickColor: theme.axis },
    ticks: {
      color: theme.axis, autoSkip: false, maxRotation: 0, padding: 3, font: { family: theme.face, size: theme.textPx },
      callback: (/** @type {unknown} */ _, /** @type {number} */ index, /** @type {any[]} */ ticks) => ticks[index].text,
    },
  };
}

/** @param {string} text @param {PlotTheme} theme */
function titleOf(text, theme) {
  return { display: true, text, color: theme.axis, padding: 2, font: { family: theme.face, size: theme.textPx, weight: 600 } };
}
