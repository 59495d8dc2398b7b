// One file looked at closely: its curve, what was settled, what is wrong line by line, and where it belongs if not with the others.
//   <rl-file-look .row=${row} .place=${place} .devices=${…} .lots=${lots of its device} @own=${…} @remove=${…}></rl-file-look>

import { Element, html, nothing } from '../parts/element.js';
import { count, several } from '../numbers.js';
import { overlayOfTraces } from '../plots/trace-set.js';
import { placeOf, serialOf, stageOf, whereOf } from './send-rows.js';
import { columnName, holds, spanWords } from './send-words.js';
import { conditionOptions, deviceOptions, lotOptions, measuredOptions, purposeOptions } from './send-place.js';
import '../parts/field.js';
import '../plots/response-plot.js';

/** @typedef {import('./send-rows.js').Row} Row */
/** @typedef {import('./send-rows.js').Place} Place */

const asTheOthers = 'as the others';

class FileLook extends Element {
  static properties = { row: { attribute: false }, place: { attribute: false }, devices: { attribute: false }, lots: { attribute: false }, limits: { attribute: false } };

  constructor() {
    super();
    /** @type {Row | null} */
    this.row = null;
    /** @type {Place | null} */
    this.place = null;
    /** @type {any[]} */
    this.devices = [];
    /** @type {any[] | undefined} */
    this.lots = undefined;
    /** @type {import('../plots/trace-set.js').GivenLimit[]} limits that are being made of the curve */
    this.limits = [];
    /** @type {{ gain: any, phase: any } | null} */
    this.overlays = null;
  }

  /** @param {import('lit').PropertyValues<this>} changed */
  willUpdate(changed) {
    const before = changed.get('row');
    if (changed.has('limits') || (changed.has('row') && (before?.preview?.trace !== this.row?.preview?.trace || before?.id !== this.row?.id))) {
      const { row } = this;
      const trace = row?.preview?.trace ?? null;
      const run = { runId: `file-${row?.id}`, serial: row === null ? '' : serialOf(row) || row.name, outcome: null, trace };
      this.overlays = trace === null ? null : {
        gain: overlayOfTraces([run], 'gain', { limits: this.limits }),
        phase: trace.phaseDeg === null ? null : overlayOfTraces([run], 'phase'),
      };
    }
  }

  render() {
    const { row, place } = this;
    if (row === null || place === null)
      return nothing;
    const { preview } = row;
    const mayMove = !['queued', 'sending', 'accepted', 'duplicate'].includes(stageOf(row, place));
    return html`
      ${this.overlays === null ? nothing : html`
        <rl-response-plot .upper=${this.overlays.gain} .lower=${this.overlays.phase} caption="${row.name}: ${spanWords(preview)}"></rl-response-plot>`}
      ${this.issues(row)}
      ${preview === null ? nothing : html`
        <div class="look-parts">
          <section aria-label="Columns">${this.columns(preview)}</section>
          <section aria-label="Notes">${this.notes(preview, row)}</section>
        </div>`}
      ${mayMove ? this.ownPlace(row, place) : nothing}
      ${row.sent === 'sending' ? nothing : html`<div><button type="button" @click=${() => this.tell('remove')}>Take this file out</button></div>`}`;
  }

  /** @param {Row} row */
  issues(row) {
    const issues = row.result?.issues ?? row.preview?.issues ?? [];
    if (issues.length === 0)
      return row.problem === '' ? nothing : html`<div class="refusal" role="alert"><p>${row.problem}</p></div>`;
    const whole = row.result === null ? row.preview?.issueCount ?? issues.length : issues.length;
    return html`
      <div class="scroll" role="region" tabindex="0" aria-label="What is wrong">
        <table>
          <caption>${row.name} is refused: ${several(whole, 'thing')} to mend${whole > issues.length ? `, the first ${count(issues.length)} shown` : ''}</caption>
          <thead><tr><th scope="col">Where</th><th scope="col">What is wrong, and how to mend it</th></tr></thead>
          <tbody>${issues.map((/** @type {any} */ issue) => html`<tr><th scope="row" class="nowrap">${whereOf(issue)}</th><td>${issue.message}</td></tr>`)}</tbody>
        </table>
      </div>`;
  }

  /** @param {any} preview */
  columns(preview) {
    if (preview.columns.length === 0)
      return html`<h3>Columns</h3><p class="soft">${preview.reader === 'touchstone' ? 'A Touchstone file: its option line says what stands where.' : 'None was found.'}</p>`;
    return html`
      <h3>Columns</h3>
      <table>
        <thead><tr><th scope="col">Column</th><th scope="col">Taken for</th></tr></thead>
        <tbody>${preview.columns.map((/** @type {any} */ column) => html`<tr><td>${columnName(column.column, preview.columns)}</td><td class=${column.quantity === 'ignore' ? 'soft' : ''}>${holds(column)}</td></tr>`)}</tbody>
      </table>`;
  }

  /** @param {any} preview @param {Row} row */
  notes(preview, row) {
    const notes = [...row.result?.notes ?? preview.notes, ...preview.trace?.notes.filter((/** @type {any} */ note) => note.code !== 'reduced') ?? []];
    return html`<h3>Notes of the reader</h3>${notes.length === 0 ? html`<p class="soft">None: the file says everything itself.</p>` : html`<ul class="plain-list">${notes.map((/** @type {any} */ note) => html`<li>${note.message}</li>`)}</ul>`}`;
  }

  /** @param {Row} row @param {Place} place */
  ownPlace(row, place) {
    const whole = placeOf(row, place);
    const device = this.devices.find(({ id }) => id === whole.deviceId);
    const { own } = row;
    return html`
      <details class="own-place" ?open=${Object.keys(own).length > 0}>
        <summary>Where this file belongs, if not with the others</summary>
        <form class="send-place" @change=${this.onOwn} @submit=${(/** @type {Event} */ event) => event.preventDefault()}>
          <rl-field label="Device" name="deviceId" .options=${deviceOptions(this.devices, asTheOthers)} .value=${own.deviceId ?? ''}></rl-field>
          <rl-field label="Lot" name="lotId" .options=${lotOptions(this.lots, own.deviceId === undefined ? asTheOthers : 'choose')} .value=${own.lotId ?? ''}></rl-field>
          <rl-field label="Purpose" name="purpose" .options=${[['', asTheOthers], ...purposeOptions]} .value=${own.purpose ?? ''}></rl-field>
          ${(device?.conditions.length ?? 0) > 1 ? html`<rl-field label="Condition" name="conditionId" .options=${[['', own.deviceId === undefined ? asTheOthers : device.conditions[0].name], ...conditionOptions(device).map(([id, name], i) => [id === '' ? device.conditions[i].id : id, name])]} .value=${own.conditionId ?? ''}></rl-field>` : nothing}
          <rl-field label="Bench" name="bench" placeholder=${asTheOthers} .value=${own.bench ?? ''}></rl-field>
          <rl-field label="Measured" name="measured" .options=${[['', asTheOthers], ...measuredOptions]} .value=${own.measured ?? ''}></rl-field>
          ${own.measured === 'given' ? html`<rl-field label="Time of measuring" name="measuredAt" type="datetime-local" .value=${own.measuredAt ?? ''}></rl-field>` : nothing}
        </form>
      </details>`;
  }

  /** @param {Event} event */
  onOwn(event) {
    const { name, value } = /** @type {HTMLInputElement} */ (event.target);
    const own = /** @type {Record<string, string>} */ ({ ...this.row?.own });
    if (value === '')
      delete own[name];
    else
      own[name] = value;
    if (name === 'deviceId') {
      delete own.lotId;
      delete own.conditionId;
    }

    this.tell('own', own);
  }
}

customElements.define('rl-file-look', FileLook);
