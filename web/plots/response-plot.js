// Gain above phase (or delay) of many runs on one log frequency axis:
//
//   <rl-response-plot .upper=${gain} .lower=${phase} .highlight=${runId} .view=${parseView(query.get('view'))} caption="…"
//     @cursor=${…} @run-hover=${…} @run-pick=${…} @view=${…} @basis=${…}></rl-response-plot>
//
// upper, lower  overlays as GET /api/lots/{id}/overlay answers them, or as trace-set.js makes them of traces; either may be null
// chosen        ids of the runs that get a line and a name of their own; null leaves it to their outcomes
// highlight     id of a run to raise, or null
// basis         asMeasured, minusGolden or levelled; levelHz: where. Give overlays as measured; others are shown as they are
// view          what is in view, as plot-view.js prints and parses it
// cursorHz      where the frequency cursor stands
// handles       places that can be dragged, as [{ panel: 'upper', frequencyHz, value }]: corners of a limit that is edited
// tools         further controls, at the beginning of the row of them
//
// Events: cursor { frequencyHz, golden, runs, read(runIds) } with values and margins there; run-hover { runId } or null;
// run-pick { runId }; view { view, text } once it rests; basis { basis, levelHz }; handle-move { index, frequencyHz, value, done }.

import { frequency } from '../numbers.js';
import { Element, html, nothing, ownStyles, uniqueId } from '../parts/element.js';
import { inside, sliderFrequency, stepped } from './cursor-steps.js';
import { attachGestures, handleUnder, panelAt } from './plot-gestures.js';
import { intentOf } from './plot-keys.js';
import { describe, plotModel } from './plot-model.js';
import { PlotPicture } from './plot-picture.js';
import { cursorOf, toolsOf } from './plot-controls.js';
import { legendOf, moreOf } from './plot-readout.js';
import { changedView, frequencyIn, isWhole, wholeView } from './plot-view.js';
import { ViewKeeper } from './view-keeper.js';
import { cursorSentence, quantityWord, runSentence, typedFrequency } from './plot-words.js';
import { outcomeWord } from './named-runs.js';
import { runBeside, runUnder } from './run-pointing.js';
import { sharedPainter } from './run-painter.js';
import { goldenReadings, runReadings } from './readings.js';
import { logAxis, moved, placeOf, straightAxis, zoomed } from './spans.js';
import { spanOf } from './value-span.js';

/** @typedef {import('./spans.js').Span} Span */
/** @typedef {import('./plot-model.js').PlotModel} PlotModel */
/** @typedef {import('./plot-gestures.js').Place} Place */

// The worker starts while the page still asks for its data.
sharedPainter();
await ownStyles(import.meta.url);

const calmMs = 150;

/** @param {unknown} a @param {unknown} b */
const differ = (a, b) => JSON.stringify(a) !== JSON.stringify(b);

export class ResponsePlot extends Element {
  static properties = {
    upper: { attribute: false }, lower: { attribute: false }, chosen: { attribute: false, hasChanged: differ }, highlight: { attribute: false },
    basis: {}, levelHz: { attribute: false }, view: { attribute: false, noAccessor: true }, cursorHz: { attribute: false }, handles: { attribute: false }, caption: {}, tools: { attribute: false },
    switchedOff: { state: true }, hovered: { state: true }, problems: { state: true }, said: { state: true }, hasPercentiles: { state: true }, open: { state: true },
  };

  /** @type {PlotModel | null} */
  #model = null;
  /** @type {PlotPicture | null} */
  #picture = null;
  /** @type {() => void} */
  #detach = () => {};
  /** @type {Place | null | undefined} */
  #pointed;
  #frame = 0;
  #calm = 0;
  #id = uniqueId('plot');
  #keeper = new ViewKeeper();

  constructor() {
    super();
    /** @type {import('./trace-set.js').Overlay | null} */
    this.upper = null;
    /** @type {import('./trace-set.js').Overlay | null} */
    this.lower = null;
    /** @type {string[] | null} */
    this.chosen = null;
    /** @type {string | null} */
    this.highlight = null;
    /** @type {import('./bases.js').Basis} */
    this.basis = 'asMeasured';
    /** @type {number | null} */
    this.levelHz = null;
    /** @type {number | null} */
    this.cursorHz = null;
    /** @type {import('./cursor-layer.js').Handle[]} */
    this.handles = [];
    this.caption = '';
    /** @type {unknown} */
    this.tools = nothing;
    /** @type {ReadonlySet<string>} what the legend has switched off */
    this.switchedOff = new Set();
    /** @type {string | null} */
    this.hovered = null;
    this.problems = { cursor: '', level: '' };
    this.said = '';
    this.hasPercentiles = false;
    this.open = false;
  }

  /** @returns {import('./plot-view.js').PlotView} */
  get view() {
    return this.#keeper.view;
  }

  set view(view) {
    if (this.#keeper.give(view)) this.requestUpdate('view');
  }

  /** The run that is raised over the others. */
  get raisedRunId() {
    return this.hovered ?? this.highlight;
  }

  /** Whether the background is drawn for what is in view, and not a preview of it. */
  get isSharp() {
    return this.#picture?.isSharp ?? true;
  }

  get levelFrequencyHz() {
    return this.levelHz ?? this.#middleHz;
  }

  get #atHz() {
    return inside(this.#model?.frequency ?? { min: 1, max: 1 }, this.cursorHz ?? this.#middleHz);
  }

  get #middleHz() {
    const gridHz = this.upper?.frequencyHz ?? this.lower?.frequencyHz ?? [];
    return gridHz.length === 0 ? 1 : Math.sqrt(Number(gridHz[0]) * Number(gridHz[gridHz.length - 1]));
  }

  /** What is in view of the frequencies. @returns {Span} */
  get #frequency() {
    return frequencyIn(this.view, this.#model?.frequency ?? { min: 1, max: 10 });
  }

  disconnectedCallback() {
    super.disconnectedCallback();
    cancelAnimationFrame(this.#frame);
    clearTimeout(this.#calm);
    this.#dropPicture();
  }

  connectedCallback() {
    super.connectedCallback();
    this.requestUpdate();
  }

  /** @param {Map<string, unknown>} changed */
  willUpdate(changed) {
    const fresh = this.#model === null || ['upper', 'lower', 'basis', 'chosen'].some((name) => changed.has(name));
    if (fresh || (this.basis === 'levelled' && changed.has('levelHz'))) {
      this.#model = plotModel({ upper: this.upper, lower: this.lower, basis: this.basis, levelHz: this.basis === 'levelled' ? this.levelFrequencyHz : NaN, chosen: this.chosen });
    }
  }

  render() {
    const model = this.#model;
    if (model === null) return html`<p class="soft">There is no curve to show.</p>`;
    const description = describe(model, { quantityWord, frequencyText: frequency, outcomeWord });
    const sets = model.panels.map(({ set }) => set);
    return html`
      <figure class="plot">
        <figcaption>${this.caption || description}</figcaption>
        ${toolsOf(this, { id: this.#id, hasGolden: sets.some((set) => set.golden !== null), isWhole: isWhole(this.view) })}
        <div class="plot-surface" role="group" tabindex="0" aria-label="Plot" aria-describedby="${this.#id}-keys" @keydown=${this.onKey}>
          <div class="plot-frame"><canvas role="img" aria-label=${description}></canvas></div>
          <canvas class="plot-over" aria-hidden="true"></canvas>
        </div>
        ${cursorOf(this, { id: this.#id, span: this.#frequency, atHz: this.#atHz, sentence: cursorSentence(sets, this.#atHz) })}
        ${legendOf(this, model, this.#atHz)}
        ${model.notes.map((note) => html`<p class="plot-note">${note}</p>`)}
        ${moreOf(this, model, { id: this.#id, atHz: this.#atHz, open: this.open })}
        <p class="unseen" role="status">${this.said}</p>
      </figure>`;
  }

  updated() {
    const model = this.#model;
    if (model === null) return this.#dropPicture();
    if (this.#picture === null) this.#makePicture();
    this.#picture?.show({
      model, basisHz: this.levelFrequencyHz, frequency: this.#frequency, hidden: this.switchedOff,
      values: Object.fromEntries(model.panels.map((panel) => [panel.key, this.#valuesOf(panel)])),
      atHz: this.#atHz, cursorText: frequency(this.#atHz), raised: this.raisedRunId, handles: this.handles,
    });
  }

  /** @param {import('./bases.js').Basis} basis */
  chooseBasis(basis) {
    if (basis === 'levelled') this.levelHz ??= this.#atHz;
    this.basis = basis;
    this.#look({ ...this.view, upper: null, lower: null });
    this.tell('basis', { basis, levelHz: basis === 'levelled' ? this.levelFrequencyHz : null });
  }

  /** Zooms about the cursor, or about the middle where the cursor is out of view. @param {number} factor */
  zoomBy(factor) {
    const place = placeOf(logAxis, this.#frequency, this.#atHz);
    this.changeView({ frequency: zoomed(logAxis, this.#frequency, factor, place >= 0 && place <= 1 ? place : 0.5) });
  }

  /** @param {number} frequencyShare @param {number} valueShare of what is in view */
  moveBy(frequencyShare, valueShare) {
    this.changeView({
      frequency: frequencyShare === 0 ? undefined : moved(logAxis, this.#frequency, frequencyShare),
      values: valueShare === 0 ? [] : (this.#model?.panels ?? []).map((panel) => ({ key: panel.key, span: moved(straightAxis, this.#valuesOf(panel), valueShare) })),
    });
  }

  fitValues() {
    this.changeView({ values: (this.#model?.panels ?? []).map(({ key, set }) => ({ key, span: spanOf(set, this.#frequency) })) });
  }

  showWhole() {
    this.#look(wholeView);
    this.#tellView();
  }

  /** @param {import('./plot-gestures.js').ViewChange} change */
  changeView(change) {
    if (this.#model === null) return;
    this.#look(changedView(this.view, this.#model, change));
    this.#tellView();
  }

  /** @param {string} key a run's id, or golden, background, percentiles, limits */
  toggle(key) {
    const hidden = new Set(this.switchedOff);
    if (!hidden.delete(key)) hidden.add(key);
    this.switchedOff = hidden;
  }

  /** @param {string | null} runId */
  hover(runId) {
    if (runId === this.hovered) return;
    this.hovered = runId;
    this.tell('run-hover', runId === null ? null : { runId });
  }

  /** @param {number} place */
  slideTo(place) {
    this.#moveCursor(sliderFrequency(this.#frequency, place, this.#atHz, this.#gridHz));
  }

  /** @param {string} typed @returns {number | null} the frequency, or null where it was refused */
  typeCursor(typed) {
    const atHz = this.#typedFrequency(typed, 'cursor');
    if (atHz === null) return null;
    if (atHz < this.#frequency.min || atHz > this.#frequency.max) this.showWhole();
    this.#moveCursor(atHz);
    return atHz;
  }

  /** @param {string} typed @returns {number | null} */
  typeLevel(typed) {
    const atHz = this.#typedFrequency(typed, 'level');
    if (atHz === null) return null;
    this.levelHz = atHz;
    this.tell('basis', { basis: this.basis, levelHz: atHz });
    return atHz;
  }

  /** @param {KeyboardEvent} event */
  onKey(event) {
    const intent = intentOf(event);
    if (intent === null || event.target !== event.currentTarget) return;
    event.preventDefault();
    if (intent.kind === 'cursor') this.#moveCursor(inside(this.#frequency, stepped(this.#gridHz, this.#atHz, intent.points)));
    else if (intent.kind === 'cursorEnd') this.#moveCursor(this.#frequency[intent.end]);
    else if (intent.kind === 'run') this.#walk(intent.step);
    else if (intent.kind === 'pick') this.#pickRaised();
    else if (intent.kind === 'zoom') this.zoomBy(intent.factor);
    else if (intent.kind === 'move') this.moveBy(intent.frequency, intent.values);
    else this.showWhole();
    if (intent.kind === 'cursor' || intent.kind === 'cursorEnd' || intent.kind === 'run') this.#say();
  }

  get #gridHz() {
    return this.#model?.panels[0].set.frequencyHz ?? new Float64Array(0);
  }

  /** @param {import('./plot-model.js').PanelModel} panel @returns {Span} */
  #valuesOf({ key, span }) {
    return this.view[key] ?? span;
  }

  /** @param {string} typed @param {'cursor' | 'level'} field */
  #typedFrequency(typed, field) {
    const { value, problem } = typedFrequency(typed, this.#model?.frequency ?? { min: 0, max: Infinity });
    this.problems = { ...this.problems, [field]: problem };
    return value;
  }

  /** @param {number} atHz */
  #moveCursor(atHz) {
    if (atHz === this.cursorHz || this.#model === null) return;
    this.cursorHz = atHz;
    if (this.problems.cursor !== '') this.problems = { ...this.problems, cursor: '' };
    const sets = this.#model.panels.map(({ set }) => set);
    const read = (/** @type {string[]} */ runIds) => runReadings(sets, atHz, runIds);
    this.tell('cursor', { frequencyHz: atHz, golden: goldenReadings(sets, atHz), runs: read(this.#model.named.map(({ run }) => run.runId)), read });
  }

  /** @param {1 | -1} step */
  #walk(step) {
    const next = this.#model && runBeside(this.#model, this.switchedOff, this.#atHz, this.raisedRunId, step);
    if (next !== null) this.hover(next);
  }

  #pickRaised() {
    if (this.raisedRunId !== null) this.tell('run-pick', { runId: this.raisedRunId });
  }

  /** @param {Place | null} place */
  #point(place) {
    this.#pointed = place;
    if (this.#frame === 0) this.#frame = requestAnimationFrame(() => this.#follow());
  }

  #follow() {
    this.#frame = 0;
    const place = this.#pointed;
    if (place === undefined || this.#model === null) return;
    const panels = this.#picture?.panels ?? [];
    this.hover(place === null ? null : runUnder(this.#model, this.switchedOff, panels, place));
    const panel = place && panelAt(panels, place.y);
    if (place && panel && place.x >= panel.left && place.x <= panel.right) this.#moveCursor(inside(this.#frequency, panel.frequencyAt(place.x)));
  }

  #say() {
    const sets = this.#model?.panels.map(({ set }) => set) ?? [];
    this.said = this.raisedRunId === null ? cursorSentence(sets, this.#atHz) : runSentence(sets, this.#atHz, this.raisedRunId);
  }

  /** @param {import('./plot-view.js').PlotView} view */
  #look(view) {
    this.#keeper.change(view);
    this.requestUpdate('view');
  }

  #tellView() {
    clearTimeout(this.#calm);
    this.#calm = setTimeout(() => this.tell('view', this.#keeper.tell()), calmMs);
  }

  #makePicture() {
    const surface = this.querySelector('.plot-surface');
    const [canvas, over] = this.querySelectorAll('canvas');
    if (!(surface instanceof HTMLElement)) return;
    this.#picture = new PlotPicture(this, canvas, over, () => {
      this.hasPercentiles = this.#picture?.hasPercentiles ?? false;
    });
    this.#detach = attachGestures(surface, {
      panels: () => this.#picture?.panels ?? [],
      point: (place) => this.#point(place),
      pick: (place) => {
        this.#pointed = place;
        this.#follow();
        this.#pickRaised();
      },
      grab: (place) => handleUnder(this.#picture?.panels ?? [], this.handles, place),
      dragHandle: (index, place, done) => this.#dragHandle(index, place, done),
      drawBox: (box) => this.#picture?.drawBox(box),
      change: (change) => this.changeView(change),
      whole: () => this.showWhole(),
    });
  }

  /** @param {number} index @param {Place} place @param {boolean} done */
  #dragHandle(index, place, done) {
    const panel = this.#picture?.panels.find(({ key }) => key === this.handles[index]?.panel);
    if (panel) this.tell('handle-move', { index, frequencyHz: panel.frequencyAt(place.x), value: panel.valueAt(place.y), done });
  }

  #dropPicture() {
    this.#detach();
    this.#detach = () => {};
    this.#picture?.destroy();
    this.#picture = null;
  }
}

customElements.define('rl-response-plot', ResponsePlot);
