// A curve at a glance, for a row of a table:
//
//   <rl-mini-plot .trace=${trace} quantity="gain"></rl-mini-plot>
//
// trace     { frequencyHz, gainDb, phaseDeg } as the API answers it; quantity: gain (the default), phase or delay
// width, height in CSS pixels

import { frequency, quantity as worded } from '../numbers.js';
import { Element, html, ownStyles, svg } from '../parts/element.js';
import { miniPath, spansOf } from './mini-path.js';
import { overlayOfTraces, traceSetOf } from './trace-set.js';
import { shortUnit, quantityWord } from './plot-words.js';

await ownStyles(import.meta.url);

const leastLengths = new Map([['gain', 0.5], ['phase', 5], ['delay', 1e-9]]);

export class MiniPlot extends Element {
  static properties = { trace: { attribute: false }, quantity: {}, width: { type: Number }, height: { type: Number } };

  constructor() {
    super();
    /** @type {import('./trace-set.js').Trace | null} */
    this.trace = null;
    /** @type {import('./trace-set.js').Quantity} */
    this.quantity = 'gain';
    this.width = 120;
    this.height = 36;
  }

  render() {
    const drawn = this.trace === null ? null : this.#drawn(this.trace);
    if (drawn === null) return html`<span class="soft" title="There is no ${this.quantity} in this file.">\u2013</span>`;
    const { label, path } = drawn;
    return html`<svg class="mini-plot" role="img" aria-label=${label} width=${this.width} height=${this.height} viewBox="-1 -1 ${this.width + 2} ${this.height + 2}">
      ${svg`<title>${label}</title><rect x="-0.5" y="-0.5" width=${this.width + 1} height=${this.height + 1}></rect><path d=${path}></path>`}</svg>`;
  }

  /** @param {import('./trace-set.js').Trace} trace */
  #drawn(trace) {
    const set = traceSetOf(overlayOfTraces([{ runId: '', serial: '', trace }], this.quantity));
    const values = set.runs[0]?.values;
    const spans = values === undefined ? null : spansOf(set.frequencyHz, values);
    if (values === undefined || spans === null) return null;
    const text = (/** @type {number} */ value) => worded(value, shortUnit(set));
    const label = `${quantityWord(set)} from ${frequency(spans.frequency.min)} to ${frequency(spans.frequency.max)}, between ${text(spans.values.min)} and ${text(spans.values.max)}`;
    return { label, path: miniPath(set.frequencyHz, values, { width: this.width, height: this.height, leastLength: leastLengths.get(this.quantity) }) };
  }
}

customElements.define('rl-mini-plot', MiniPlot);
