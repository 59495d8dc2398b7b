// What a response plot says beside its picture: a legend that shows or hides each line and reads it at the cursor, and the table
// of all values under the cursor.

import { frequency, several } from '../numbers.js';
import { html, nothing, svg } from '../parts/element.js';
import { outcomeWord } from './named-runs.js';
import { backgroundWords, marginText, quantityWord, shortUnit, valueText } from './plot-words.js';
import { goldenReadings, limitReadings, runReadings, spreadAt } from './readings.js';

/** @typedef {import('./response-plot.js').ResponsePlot} ResponsePlot */
/** @typedef {import('./plot-model.js').PlotModel} PlotModel */
/** @typedef {import('./readings.js').Reading} Reading */
/** @typedef {import('./trace-set.js').TraceSet} TraceSet */

/** Above this many runs the table gives the spread instead of each run. */
const mostRows = 120;

/** @param {ResponsePlot} plot @param {PlotModel} model @param {number} atHz */
export function legendOf(plot, model, atHz) {
  const sets = model.panels.map(({ set }) => set);
  const golden = sets.find((set) => set.golden !== null)?.golden;
  const raised = plot.raisedRunId;
  const isNamed = model.named.some(({ run }) => run.runId === raised);
  const limits = sets.reduce((sum, set) => sum + set.limits.length, 0);
  const readings = new Map(runReadings(sets, atHz, model.named.map(({ run }) => run.runId)).map((one) => [one.runId, one.readings]));
  const [extra] = raised === null || isNamed ? [] : runReadings(sets, atHz, [raised]);
  return html`
    <ul class="plot-legend" aria-label="Lines of the plot, read at ${frequency(atHz)}">
      ${golden ? entry(plot, 'golden', swatch('golden', []), html`Golden ${golden.serial}`, sets, goldenReadings(sets, atHz)) : nothing}
      ${model.named.map(({ run, style }) => entry(plot, run.runId, swatch(`series-${style.colour}`, style.dash), nameOf(run), sets, readings.get(run.runId) ?? []))}
      ${extra ? html`<li class="raised"><span class="plot-line">${swatch('raised', [])}<span class="plot-name">${nameOf(extra)}</span></span> ${readingsOf(sets, extra.readings)}</li>`
    : model.background > 0 ? html`<li class="soft"><span class="plot-line">Point at a line to read it.</span></li>` : nothing}
    </ul>
    <ul class="plot-switches" aria-label="Also in the plot">
      ${model.background > 0 ? entry(plot, 'background', swatch('run', []), backgroundWords(model.background, model.count), sets, null) : nothing}
      ${plot.hasPercentiles ? entry(plot, 'percentiles', swatch('fan', [8, 3, 2, 3]), html`Percentiles <span class="soft">5, 25, 50, 75, 95</span>`, sets, null) : nothing}
      ${limits > 0 ? entry(plot, 'limits', swatch('forbidden', []), several(limits, 'limit'), sets, null) : nothing}
    </ul>`;
}

/** @param {{serial: string, outcome: string | null}} run */
function nameOf(run) {
  const word = outcomeWord(run.outcome);
  return html`${run.serial}${word === '' ? nothing : html` <span class="plot-outcome ${run.outcome ?? ''}">${word}</span>`}`;
}

/**
 * @param {ResponsePlot} plot @param {string} key @param {unknown} mark @param {unknown} name @param {TraceSet[]} sets
 * @param {(Reading | null)[] | null} readings
 */
function entry(plot, key, mark, name, sets, readings) {
  const shown = !plot.switchedOff.has(key);
  const isRun = !['golden', 'background', 'percentiles', 'limits'].includes(key);
  const point = (/** @type {string | null} */ runId) => (isRun ? () => plot.hover(runId) : nothing);
  return html`
    <li class=${plot.raisedRunId === key ? 'raised' : ''}>
      <button type="button" aria-pressed=${shown ? 'true' : 'false'} title=${shown ? 'Hide this' : 'Show this'}
        @click=${() => plot.toggle(key)} @pointerenter=${point(key)} @pointerleave=${point(null)}>${mark}<span class="plot-name">${name}</span></button>
      ${readings === null || !shown ? nothing : readingsOf(sets, readings)}
    </li>`;
}

/** @param {TraceSet[]} sets @param {(Reading | null)[]} readings */
function readingsOf(sets, readings) {
  return html`<span class="plot-readings">${sets.map((set, i) => {
    const reading = readings[i] ?? null;
    const margin = reading?.margin ?? null;
    return html`<span class="plot-reading">${valueText(set, reading?.value ?? NaN)}${margin === null ? nothing
      : html` <span class="plot-margin ${margin.margin < 0 ? 'bad' : ''}" title="margin to ${margin.limit}">(${marginText(set, reading)})</span>`}</span>`;
  })}</span>`;
}

/** @param {string} kind @param {number[]} dash */
function swatch(kind, dash) {
  const line = svg`<line x1="0" y1="6" x2="30" y2="6" stroke-dasharray=${dash.join(' ') || 'none'}></line>`;
  const area = svg`<rect x="0" y="0" width="30" height="12"></rect>`;
  const slant = svg`<path d="M2 12 14 0M12 12 24 0M22 12 34 0"></path>`;
  return html`<svg class="plot-swatch ${kind}" width="30" height="12" viewBox="0 0 30 12" aria-hidden="true">${kind === 'forbidden' ? [area, slant] : kind === 'fan' ? [area, line] : line}</svg>`;
}

/**
 * What opens when it is asked for: the table under the cursor, and the keys.
 * @param {ResponsePlot} plot @param {PlotModel} model @param {{id: string, atHz: number, open: boolean}} state
 */
export function moreOf(plot, model, { id, atHz, open }) {
  return html`
    <div class="plot-more">
      <details class="plot-values" @toggle=${(/** @type {Event} */ event) => { plot.open = /** @type {HTMLDetailsElement} */ (event.target).open; }}>
        <summary>All values at ${frequency(atHz)}</summary>
        ${open ? tableOf(model, atHz, plot.raisedRunId) : nothing}
      </details>
      <details class="plot-help">
        <summary>Keys and pointer</summary>
        <p id="${id}-keys">With the plot in focus: left and right move the cursor, up and down walk through the runs, Enter picks one. Plus and minus zoom, Shift with an arrow moves the view, 0 shows the whole sweep. With a pointer: drag a box to zoom, Shift and drag to move, turn the wheel to zoom once the plot has the focus, double-click for the whole sweep. Two fingers zoom and move.</p>
      </details>
    </div>`;
}

/**
 * The table of all that stands under the cursor.
 * @param {PlotModel} model @param {number} atHz @param {string | null} raised
 */
function tableOf(model, atHz, raised) {
  const sets = model.panels.map(({ set }) => set);
  const all = model.count <= mostRows ? [...new Set([...model.named.map(({ run }) => run.runId), ...sets.flatMap((set) => set.runs.map((run) => run.runId))])]
    : [...new Set([...model.named.map(({ run }) => run.runId), ...(raised === null ? [] : [raised])])];
  const golden = goldenReadings(sets, atHz);
  const goldenSerial = sets.find((set) => set.golden !== null)?.golden?.serial;
  return html`
    <div class="scroll" tabindex="0" role="region" aria-label="Values under the cursor">
      <table>
        <caption>Values at ${frequency(atHz, 6)}</caption>
        <thead>
          <tr><th scope="col">Run</th><th scope="col">Outcome</th>${sets.map((set) => html`<th scope="col" class="number">${quantityWord(set)}, ${shortUnit(set) === 'deg' ? '°' : shortUnit(set)}</th><th scope="col" class="number">Margin there</th><th scope="col">to</th>`)}</tr>
        </thead>
        <tbody>
          ${goldenSerial === undefined ? nothing : row(`Golden ${goldenSerial}`, '', sets, golden)}
          ${runReadings(sets, atHz, all).map((run) => row(run.serial, outcomeWord(run.outcome), sets, run.readings))}
          ${model.count > mostRows ? spreadRows(sets, atHz) : nothing}
        </tbody>
      </table>
    </div>
    ${sets.map((set) => html`<p class="soft">${limitsSentence(set, atHz)}</p>`)}`;
}

/** @param {string} name @param {string} outcome @param {TraceSet[]} sets @param {(Reading | null)[]} readings */
function row(name, outcome, sets, readings) {
  return html`<tr><th scope="row">${name}</th><td>${outcome}</td>${sets.map((set, i) => html`
    <td class="number">${valueText(set, readings[i]?.value ?? NaN)}</td><td class="number">${marginText(set, readings[i])}</td><td>${readings[i]?.margin?.limit ?? ''}</td>`)}</tr>`;
}

/** @param {TraceSet[]} sets @param {number} atHz */
function spreadRows(sets, atHz) {
  const spreads = sets.map((set) => spreadAt(set, atHz));
  const cells = (/** @type {(spread: ReturnType<typeof spreadAt>) => number} */ pick) => sets.map((set, i) => html`<td class="number">${valueText(set, pick(spreads[i]))}</td><td></td><td></td>`);
  return html`
    <tr><th scope="row">Least of all</th><td></td>${cells((spread) => spread.least)}</tr>
    <tr><th scope="row">Greatest of all</th><td></td>${cells((spread) => spread.greatest)}</tr>
    <tr><th scope="row">Least margin of all</th><td></td>${sets.map((set, i) => html`<td class="number">${spreads[i].worst?.serial ?? ''}</td>
      <td class="number">${marginText(set, { value: NaN, margin: spreads[i].worst })}</td><td>${spreads[i].worst?.limit ?? ''}</td>`)}</tr>`;
}

/** @param {TraceSet} set @param {number} atHz */
function limitsSentence(set, atHz) {
  const limits = limitReadings(set, atHz);
  const word = quantityWord(set);
  if (limits.length === 0) return `${word}: no limit stands at this frequency.`;
  return `${word}: ${limits.map(({ name, side, value }) => `${name} (${side}) ${valueText(set, value)}`).join(', ')}.`;
}
