// Measures of a run on demand: choose one, give its parameters, and its outputs stand in the table.
//   <rl-run-measures .runId=${id} .given=${measures that the verdict has already, by requirement} @at=${frequency to look at}></rl-run-measures>

import { ask, send } from '../api.js';
import { Element, html, nothing } from '../parts/element.js';
import { formDialog, refused } from '../parts/form-dialog.js';
import { callOf, callWords, nameOf, outputsOf, unitOf } from './measure-words.js';
import '../parts/data-table.js';
import '../parts/field.js';
import '../parts/refusal.js';

/** @typedef {import('./measure-words.js').Measure} Measure */
/** @typedef {import('./measure-words.js').MeasureCall} MeasureCall */
/** @typedef {{ key: string, title: string, result: any, call: MeasureCall | null }} Shown */

const references = /** @type {const} */ ([['peak', 'the peak'], ['frequency', 'the level at a frequency'], ['band', 'the mean over a band']]);

class RunMeasures extends Element {
  static properties = { runId: {}, given: { attribute: false }, measures: { state: true }, asked: { state: true }, refusal: { state: true } };

  constructor() {
    super();
    this.runId = '';
    /** @type {Record<string, any>} results by the name of the requirement */
    this.given = {};
    /** @type {Measure[]} */
    this.measures = [];
    /** @type {Shown[]} */
    this.asked = [];
    /** @type {import('../api.js').Answer | null} */
    this.refusal = null;
  }

  connectedCallback() {
    super.connectedCallback();
    void this.load();
  }

  async load() {
    const answer = await ask('/api/measures');
    this.refusal = answer.ok ? null : answer;
    this.measures = answer.ok ? answer.body.items : this.measures;
  }

  render() {
    const shown = [...Object.entries(this.given).map(([title, result]) => ({ key: `given ${title}`, title, result, call: null })), ...this.asked];
    const rows = shown.flatMap((one) => outputsOf(one.result, this.measures.find(({ name }) => name === one.result.measure)).map((output, i, all) => ({ ...output, key: `${one.key} ${output.name}`, one, isFirst: i === 0, count: all.length })));
    return html`
      <div class="page-head"><h2>Measures</h2><button type="button" ?disabled=${this.measures.length === 0} @click=${this.choose}>Measure something</button></div>
      <rl-refusal .answer=${this.refusal} @again=${this.load}></rl-refusal>
      ${rows.length === 0 ? html`<p class="soft">The mask asks for no measure. Any of them can be asked for here; nothing is stored by it.</p>` : html`
        <div class="scroll" role="region" tabindex="0" aria-label="Measures">
          <table class="measures">
            <thead><tr><th scope="col">Measure</th><th scope="col">Output</th><th scope="col" class="number">Value</th></tr></thead>
            <tbody>${rows.map((row) => html`
              <tr class=${row.isFirst ? 'first' : ''}>
                ${row.isFirst ? html`<th scope="rowgroup" rowspan=${row.count}>${this.titleOf(row.one)}</th>` : nothing}
                <td>${row.name}</td>
                <td class="number nowrap">${row.unit === 'Hz' && row.value !== null ? html`<button type="button" class="plain" title="Move the cursor there" @click=${() => this.tell('at', row.value)}>${row.text}</button>` : row.value === null ? html`<span title=${row.one.result.explanation ?? ''}>${row.text}</span>` : row.text}</td>
              </tr>`)}</tbody>
          </table>
        </div>`}`;
  }

  /** @param {Shown} shown */
  titleOf({ key, title, result, call }) {
    const crossovers = [...(result.gainCrossovers?.length > 1 ? [`${result.gainCrossovers.length} gain crossovers`] : []), ...(result.phaseCrossovers?.length > 1 ? [`${result.phaseCrossovers.length} phase crossovers`] : [])];
    return html`
      <span>${title}</span>
      ${call === null && nameOf(result.measure) !== title ? html`<br><span class="soft small">${nameOf(result.measure)}, asked for by the mask</span>` : nothing}
      ${result.explanation === undefined ? nothing : html`<br><span class="small soft">${result.explanation}</span>`}
      ${(result.notes ?? []).map((/** @type {any} */ note) => html`<br><span class="small soft">${note.message}</span>`)}
      ${crossovers.length === 0 ? nothing : html`<br><span class="small soft">${crossovers.join(', ')}; the least margin stands here</span>`}
      ${call === null ? nothing : html`<br><button type="button" class="plain small" @click=${() => { this.asked = this.asked.filter((one) => one.key !== key); }}>Take it away</button>`}`;
  }

  async choose() {
    let chosen = this.measures[0];
    let kind = 'peak';
    /** @type {MeasureCall | null} */
    let call = null;
    const answer = await formDialog({
      heading: 'Measure something',
      act: 'Measure',
      fields: ({ errors, update }) => html`
        <rl-field label="Measure" name="measure" .options=${this.measures.map(({ name }) => [name, nameOf(name)])} .value=${chosen.name} @change=${(/** @type {Event} */ event) => {
          chosen = this.measures.find(({ name }) => name === /** @type {HTMLSelectElement} */ (event.target).value) ?? chosen;
          update();
        }}></rl-field>
        ${chosen.parameters.map((parameter) => html`
          <rl-field label=${withUnit(parameter.name)} name=${parameter.name} inputmode="decimal" ?required=${parameter.required} ?optional=${!parameter.required} hint=${hintOf(parameter.name)} .errors=${errorsAt(errors, parameter.name)}></rl-field>`)}
        ${chosen.takesReference ? html`
          <rl-field label="Reference" name="kind" .options=${references} .value=${kind} @change=${(/** @type {Event} */ event) => {
            kind = /** @type {HTMLSelectElement} */ (event.target).value;
            update();
          }}></rl-field>
          ${(kind === 'frequency' ? ['frequencyHz'] : kind === 'band' ? ['fromHz', 'toHz'] : []).map((name) => html`<rl-field label="Reference, ${nameOf(name).toLowerCase()}, Hz" name="reference.${name}" inputmode="decimal" required .errors=${errorsAt(errors, `reference.${name}`)}></rl-field>`)}` : nothing}`,
      send: async (form) => {
        const asked = callOf(chosen, (name) => String(form.get(name) ?? ''));
        if (asked.call === null)
          return refused(asked.errors);
        call = asked.call;
        return send('POST', `/api/runs/${this.runId}/measures`, { measures: [asked.call] });
      },
    });
    const given = /** @type {MeasureCall | null} */ (call);
    if (answer === undefined || given === null)
      return;
    const shown = { key: JSON.stringify(given), title: callWords(given), result: answer.body.results[0], call: given };
    this.asked = [...this.asked.filter(({ key }) => key !== shown.key), shown];
  }
}

/** @param {string} name */
function withUnit(name) {
  const unit = unitOf(name);
  return unit === '' ? nameOf(name) : `${nameOf(name)}, ${unit === 'deg' ? '\u00b0' : unit}`;
}

/** @param {string} name */
function hintOf(name) {
  return name === 'criticalPhaseDeg' ? '\u2212180 or 0. Left out, it is the device\u2019s.' : name === 'apertureRatio' ? 'Left out, the delay is that at the points.' : '';
}

/** The errors of a field; those of the server say where by a path. @param {Record<string, string[]>} errors @param {string} name */
function errorsAt(errors, name) {
  const path = Object.keys(errors).find((field) => field === name || field.endsWith(`parameters.${name}`));
  return path === undefined ? undefined : errors[path];
}

customElements.define('rl-run-measures', RunMeasures);
