// The two canvases of a response plot: the chart with all that lies in its panels, and over it what moves with the pointer. It
// draws again only what changed: a cursor that moves, or a run that is pointed at, leaves the chart alone.

import { paintCursorLayer } from './cursor-layer.js';
import { valueAt } from './curve.js';
import { limitAt } from './limit-area.js';
import { PlotChart } from './plot-chart.js';
import { clipped, paintFan, paintForbidden, paintLimits, paintName } from './plot-layers.js';
import { rgbOf, themeOf, watchTheme } from './plot-theme.js';
import { axisTitle } from './plot-words.js';
import { RunLayer } from './run-layer.js';
import { sharedPainter } from './run-painter.js';

/** @typedef {import('./plot-chart.js').ChartPanel} ChartPanel */
/** @typedef {import('./plot-model.js').PlotModel} PlotModel */
/** @typedef {import('./plot-model.js').PanelModel} PanelModel */
/** @typedef {import('./spans.js').Span} Span */
/** @typedef {{model: PlotModel, basisHz: number, frequency: Span, values: {[key: string]: Span}, hidden: ReadonlySet<string>, atHz: number, cursorText: string, raised: string | null, handles: import('./cursor-layer.js').Handle[]}} PictureContent */

export class PlotPicture {
  /** @type {PlotChart} */
  #chart;
  /** @type {Map<string, RunLayer>} */
  #layers = new Map();
  /** @type {PictureContent | null} */
  #content = null;
  /** @type {unknown[]} */
  #drawn = [];
  /** @type {import('./cursor-layer.js').DrawnBox | null} */
  #box = null;
  #frame = 0;
  #drawing = 0;
  /** @type {() => void} */
  #unwatch;

  /**
   * @param {Element} element whose style gives the colours @param {HTMLCanvasElement} canvas @param {HTMLCanvasElement} over
   * @param {() => void} onPercentiles called when there are percentile curves to show
   */
  constructor(element, canvas, over, onPercentiles) {
    this.over = over;
    this.onPercentiles = onPercentiles;
    this.theme = themeOf(element);
    this.colours = [rgbOf(this.theme.run), rgbOf(this.theme.series[1])];
    this.#chart = new PlotChart(canvas, {
      under: (context, panels) => this.#paint(panels, (panel, model, content) => this.#paintUnder(context, panel, model, content)),
      over: (context, panels) => this.#paint(panels, (panel, model, content) => this.#paintOver(context, panel, model, content)),
    }, () => this.#paintCursorSoon());
    this.#unwatch = watchTheme(() => {
      this.theme = themeOf(element);
      this.colours = [rgbOf(this.theme.run), rgbOf(this.theme.series[1])];
      this.#drawn = [];
      if (this.#content) this.show(this.#content);
    });
  }

  /** @param {PictureContent} content */
  show(content) {
    this.#content = content;
    const { model, basisHz, frequency, values, hidden } = content;
    const spans = model.panels.flatMap(({ key }) => [values[key].min, values[key].max]);
    const drawn = [model, frequency.min, frequency.max, hidden, this.theme, ...spans];
    if (drawn.length === this.#drawn.length && drawn.every((one, i) => one === this.#drawn[i])) {
      this.#paintCursorSoon();
      return;
    }

    this.#drawn = drawn;
    for (const panel of model.panels) this.#layerOf(panel.key).take(panel.set.runs, panel.set.frequencyHz, panel.groups);
    for (const [key, layer] of this.#layers) {
      if (!model.panels.some((panel) => panel.key === key)) layer.clear();
    }

    this.#chart.show({
      frequency, theme: this.theme,
      panels: model.panels.map(({ key, set }) => ({
        key, title: axisTitle(set, basisHz), values: values[key], angle: set.quantity === 'phase', prefixed: set.quantity === 'delay',
      })),
      lines: model.panels.flatMap((panel) => this.#linesOf(panel, model, hidden)),
    });
    this.onPercentiles();
  }

  /** @param {import('./cursor-layer.js').DrawnBox | null} box */
  drawBox(box) {
    if (box === this.#box) return;
    this.#box = box;
    this.#paintCursorSoon();
  }

  get panels() {
    return this.#chart.panels;
  }

  get isSharp() {
    return this.#content?.hidden.has('background') === true || [...this.#layers.values()].every((layer) => layer.isSharp);
  }

  get hasPercentiles() {
    return [...this.#layers.values()].some((layer) => layer.percentiles !== null);
  }

  destroy() {
    cancelAnimationFrame(this.#frame);
    cancelAnimationFrame(this.#drawing);
    this.#unwatch();
    for (const layer of this.#layers.values()) layer.clear();
    this.#chart.destroy();
  }

  /** @param {string} key */
  #layerOf(key) {
    let layer = this.#layers.get(key);
    if (layer === undefined) {
      layer = new RunLayer(sharedPainter(), () => this.#drawSoon());
      this.#layers.set(key, layer);
    }

    return layer;
  }

  /** @param {PanelModel} panel @param {PlotModel} model @param {ReadonlySet<string>} hidden */
  #linesOf({ key, set }, model, hidden) {
    const lines = [];
    if (set.golden && !hidden.has('golden')) lines.push(this.#line(key, set, set.golden, this.theme.golden, [], 2.25, 100));
    model.named.forEach(({ run, style }, i) => {
      const found = hidden.has(run.runId) ? undefined : set.runs.find((one) => one.runId === run.runId);
      if (found) lines.push(this.#line(key, set, found, this.theme.series[style.colour], style.dash, 1.75, i));
    });
    return lines;
  }

  /**
   * @param {'upper' | 'lower'} panel @param {PanelModel['set']} set @param {{runId: string, values: Float64Array}} run
   * @param {string} colour @param {number[]} dash @param {number} width @param {number} order
   */
  #line(panel, set, run, colour, dash, width, order) {
    return { panel, runId: run.runId, frequencyHz: set.frequencyHz, values: run.values, colour, dash, width, order };
  }

  /** @param {ChartPanel[]} panels @param {(panel: ChartPanel, model: PanelModel, content: PictureContent) => void} paint */
  #paint(panels, paint) {
    const content = this.#content;
    for (const panel of content ? panels : []) {
      const model = content?.model.panels.find(({ key }) => key === panel.key);
      if (content && model) paint(panel, model, content);
    }
  }

  /** @param {CanvasRenderingContext2D} context @param {ChartPanel} panel @param {PanelModel} model @param {PictureContent} content */
  #paintUnder(context, panel, { key, set }, { hidden }) {
    const layer = this.#layerOf(key);
    const ratio = this.#chart.pixelRatio;
    context.save();
    if (!hidden.has('limits')) clipped(context, panel, () => paintForbidden(context, panel, set.limits, this.theme, ratio));
    if (!hidden.has('background')) this.#showRuns(context, panel, layer, ratio);
    if (layer.isSharp) layer.wantPercentiles();
    const { percentiles } = layer;
    if (percentiles && !hidden.has('percentiles')) clipped(context, panel, () => paintFan(context, panel, set.frequencyHz, percentiles, this.theme));
    context.restore();
  }

  // The picture lies on whole device pixels, or it would be blurred; so it shows what those pixels do.
  /** @param {CanvasRenderingContext2D} context @param {ChartPanel} panel @param {RunLayer} layer @param {number} ratio */
  #showRuns(context, panel, layer, ratio) {
    const whole = (/** @type {number} */ pixels) => Math.round(pixels * ratio) / ratio;
    const [left, right, top, bottom] = [panel.left, panel.right, panel.top, panel.bottom].map(whole);
    layer.show(context, { left, top }, {
      scene: {
        frequency: { min: panel.frequencyAt(left), max: panel.frequencyAt(right) },
        values: { min: panel.valueAt(bottom), max: panel.valueAt(top) },
        width: right - left, height: bottom - top,
      },
      pixelRatio: ratio,
      colours: this.colours,
    });
  }

  /** @param {CanvasRenderingContext2D} context @param {ChartPanel} panel @param {PanelModel} model @param {PictureContent} content */
  #paintOver(context, panel, { key, set }, { hidden, model: { named } }) {
    const { golden, frequencyHz } = set;
    const limits = hidden.has('limits') ? [] : set.limits;
    context.save();
    clipped(context, panel, () => {
      paintLimits(context, panel, limits, this.theme);
      if (!golden || key !== 'upper' || hidden.has('golden')) return;
      const namedIds = named.map(({ run }) => run.runId).filter((runId) => !hidden.has(runId));
      const others = [
        ...limits.map((limit) => (/** @type {number} */ atHz) => limitAt(limit, atHz)),
        ...set.runs.filter(({ runId }) => namedIds.includes(runId)).map(({ values }) => (/** @type {number} */ atHz) => valueAt(frequencyHz, values, atHz)),
      ];
      paintName(context, panel, { frequencyHz, values: golden.values, name: `golden ${golden.serial}`, colour: this.theme.golden }, others, this.theme);
    });
    context.strokeStyle = this.theme.axis;
    context.lineWidth = 1;
    context.strokeRect(Math.round(panel.left) + 0.5, Math.round(panel.top) + 0.5, Math.round(panel.right - panel.left) - 1, Math.round(panel.bottom - panel.top) - 1);
    context.restore();
  }

  // Both panels' pictures tend to come together.
  #drawSoon() {
    if (this.#drawing === 0) {
      this.#drawing = requestAnimationFrame(() => {
        this.#drawing = 0;
        this.#chart.draw();
        this.onPercentiles();
      });
    }
  }

  #paintCursorSoon() {
    if (this.#frame === 0) this.#frame = requestAnimationFrame(() => this.#paintCursor());
  }

  #paintCursor() {
    this.#frame = 0;
    const content = this.#content;
    if (content === null) return;
    const { model, atHz, cursorText, raised, hidden, handles } = content;
    const panels = this.panels;
    const raisedLines = [];
    const dots = [];
    for (const panel of panels) {
      const set = model.panels.find(({ key }) => key === panel.key)?.set;
      if (set === undefined) continue;
      const colourOf = (/** @type {string} */ runId) => {
        const named = model.named.find(({ run }) => run.runId === runId);
        return named ? this.theme.series[named.style.colour] : this.theme.cursor;
      };
      const run = raised === null ? undefined : set.runs.find((one) => one.runId === raised);
      if (run) raisedLines.push({ panel, frequencyHz: set.frequencyHz, values: run.values, name: run.serial, colour: colourOf(run.runId) });
      const marked = [...model.named.map((one) => one.run.runId), ...(raised === null ? [] : [raised])].filter((runId) => !hidden.has(runId));
      for (const { runId, values } of set.runs.filter((one) => marked.includes(one.runId))) dots.push({ panel, value: valueAt(set.frequencyHz, values, atHz), colour: colourOf(runId) });
      if (set.golden && !hidden.has('golden')) dots.push({ panel, value: valueAt(set.frequencyHz, set.golden.values, atHz), colour: this.theme.golden });
    }

    paintCursorLayer(this.over, this.#chart.size, this.#chart.pixelRatio, { panels, atHz, cursorText, raised: raisedLines, dots, handles, box: this.#box, theme: this.theme });
  }
}
