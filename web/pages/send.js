// Sending files: what was dropped or picked is looked at before anything is stored, asked about where it is open, and then sent.

import { all } from '../api.js';
import { confirm, ends, openDialog } from '../parts/dialog.js';
import { Page, html, nothing, ownStyles } from '../parts/element.js';
import { incoming } from '../parts/incoming.js';
import { say } from '../parts/notice.js';
import { several } from '../numbers.js';
import { keepInAddress, oneOf, printState, readState, text } from '../router.js';
import { may, session } from '../session.js';
import { makeLot } from './lots-open.js';
import { keepBench, keptBench } from './send-bench.js';
import { batch } from './send-batch.js';
import { barOf, questionsOf } from './send-bar.js';
import { invitation, noDevice } from './send-empty.js';
import { OpenLots } from './send-lots.js';
import { askColumns, askSameBytes } from './send-questions.js';
import { counted, groupOf, headsOf, isOpen, lacking, placeOf, purposes, repeated, stageOf } from './send-rows.js';
import { fileColumns } from './send-table.js';
import '../parts/busy.js';
import '../parts/data-table.js';
import '../parts/refusal.js';
import './send-look.js';
import './send-make.js';
import './send-place.js';

/** @typedef {import('./send-rows.js').Row} Row */
/** @typedef {import('./send-rows.js').Group} Group */

await ownStyles(import.meta.url);

const pageRows = 50;
const rowsAFrame = 10;
const shape = { device: text(), lot: text(), condition: text(), bench: text(), purpose: oneOf(purposes) };

/** @type {readonly (readonly [Group, string])[]} */
const groupWords = [['all', 'All'], ['asks', 'Need you'], ['refused', 'Refused'], ['reading', 'Being read'], ['placeless', 'Lack a place'], ['ready', 'Ready'], ['underWay', 'Under way'], ['sent', 'Taken']];

class SendPage extends Page {
  static properties = {
    devices: { state: true }, refusal: { state: true }, group: { state: true }, from: { state: true }, drawn: { state: true }, tried: { state: true }, making: { state: true }, limits: { state: true },
  };

  constructor() {
    super();
    /** @type {any[] | null} */
    this.devices = null;
    this.lots = new OpenLots();
    /** @type {import('../api.js').Answer | null} */
    this.refusal = null;
    /** @type {Group} */
    this.group = 'all';
    this.from = 0;
    /** How many rows of a page are drawn by now: they come a few a frame, so that no task is long. */
    this.drawn = rowsAFrame;
    /** Whether somebody tried to send, so that what is missing is marked. */
    this.tried = false;
    /** Whether device, mask and lot are being made from the file. */
    this.making = false;
    /** @type {any[]} */
    this.limits = [];
    /** @type {(() => void) | null} */
    this.updateLook = null;
    this.onBatch = () => {
      this.requestUpdate();
      this.updateLook?.();
      this.watchSending();
    };
    this.onIncoming = () => this.take(incoming.take());
    this.wasSending = batch.sending.length > 0;
  }

  connectedCallback() {
    super.connectedCallback();
    batch.addEventListener('change', this.onBatch);
    incoming.addEventListener('files', this.onIncoming);
    this.placeFromAddress();
    this.onIncoming();
    void this.load();
  }

  disconnectedCallback() {
    super.disconnectedCallback();
    batch.removeEventListener('change', this.onBatch);
    incoming.removeEventListener('files', this.onIncoming);
  }

  placeFromAddress() {
    const given = readState(shape, this.query);
    const named = this.query.has('device') || this.query.has('lot');
    const bench = given.bench || batch.place.bench || keptBench();
    batch.placeAt(named || batch.rows.length === 0
      ? { deviceId: given.device, lotId: given.lot, conditionId: given.condition, purpose: given.purpose, bench }
      : { bench });
  }

  async load() {
    const { signal } = this.leaving;
    const [devices, benches] = await Promise.all([all('/api/devices?limit=200', { signal }), all('/api/benches?limit=500', { signal })]);
    this.refusal = [devices, benches].find((answer) => !answer.ok && answer.code !== 'stopped') ?? null;
    if (!devices.ok || !benches.ok)
      return;
    this.devices = devices.items;
    batch.knowBenches(benches.items);
    this.settlePlace();
    await this.loadLots(batch.place.deviceId);
  }

  /** A device that is not there is not chosen; one alone is. */
  settlePlace() {
    const devices = this.devices ?? [];
    if (batch.place.deviceId !== '' && !devices.some(({ id }) => id === batch.place.deviceId))
      batch.placeAt({ deviceId: '', lotId: '', conditionId: '' });
    if (batch.place.deviceId === '' && devices.length === 1)
      batch.placeAt({ deviceId: devices[0].id });
    const first = this.deviceOf(batch.place.deviceId)?.conditions[0];
    if (first !== undefined && first.id === batch.place.conditionId)
      batch.placeAt({ conditionId: '' });
  }

  /** @param {string} deviceId @param {{ anew?: boolean }} [how] */
  async loadLots(deviceId, { anew = false } = {}) {
    const answer = await this.lots.read(deviceId, { anew, signal: this.leaving.signal });
    if (answer === null)
      return;
    this.requestUpdate();
    if (!answer.ok) {
      this.refusal = answer.code === 'stopped' || anew ? this.refusal : answer;
      return;
    }

    const { lotId } = batch.place;
    if (!anew && deviceId === batch.place.deviceId && lotId !== '' && !answer.items.some(({ id }) => id === lotId)) {
      batch.placeAt({ lotId: '' });
      say('The lot that the address names is not open: it takes no runs. Choose another one, or have it reopened.', { bad: true });
    }
  }

  /** @param {import('lit').PropertyValues} changed */
  willUpdate(changed) {
    if (changed.has('group') || changed.has('from'))
      this.drawn = rowsAFrame;
  }

  updated() {
    if (this.drawn < Math.min(pageRows, batch.rows.length))
      requestAnimationFrame(() => { this.drawn += rowsAFrame; });
  }

  /** @param {readonly File[]} files */
  take(files) {
    if (files.length === 0)
      return;
    const known = batch.add(files);
    if (known > 0)
      say(`${several(known, 'file is', 'files are')} in the table already.`);
  }

  /** @param {string} deviceId */
  deviceOf(deviceId) {
    return this.devices?.find(({ id }) => id === deviceId);
  }

  render() {
    const rows = batch.rows;
    const picker = html`
      <label class="button ${rows.length === 0 ? 'main' : ''} picker">${rows.length === 0 ? 'Pick files' : 'Add files'}<input class="unseen" type="file" multiple @change=${this.onPicked}></label>`;
    return html`
      <div class="page-head"><h1>Send files</h1>${rows.length === 0 ? nothing : html`<div class="row">${picker}<button type="button" @click=${this.clear}>Clear the table</button></div>`}</div>
      <rl-refusal .answer=${this.refusal} @again=${this.load}></rl-refusal>
      ${rows.length === 0 ? invitation(picker) : this.filled(rows)}`;
  }

  /** @param {Row[]} rows */
  filled(rows) {
    if (this.devices === null)
      return this.refusal === null ? html`<rl-busy label="Reading devices and benches"></rl-busy>` : nothing;
    const { place } = batch;
    const counts = counted(rows, place);
    const missing = this.tried ? merged(rows.filter((row) => ['lacking', 'placeless'].includes(stageOf(row, place))).map((row) => lacking({ ...row, own: {} }, place))) : {};
    return html`
      ${this.devices.length === 0 ? this.making ? nothing : noDevice(rows.some((row) => row.preview?.trace), () => { this.making = true; }) : html`
        <section class="panel" aria-label="Where the runs belong">
          <rl-send-place .place=${place} .devices=${this.devices} .benches=${batch.benches} .lots=${this.lots.of(place.deviceId)} .lacking=${missing}
            @place=${this.onPlace} @circumstances=${(/** @type {CustomEvent} */ event) => { batch.circumstances = event.detail; }} @new-lot=${this.openLot}></rl-send-place>
        </section>`}
      ${this.making ? this.maker(rows) : nothing}
      ${barOf(rows, counts, { tried: this.tried, hasDevices: this.devices.length > 0, lotNumber: this.lots.find(place.lotId)?.number ?? '', send: () => this.sendAll() })}
      ${questionsOf(rows, { columns: (row) => this.askColumns(row), sameBytes: (same) => this.askSameBytes(same), again: (some) => this.sendAgain(some) })}
      ${this.table(rows, counts)}
      ${rows.length === 1 && !this.making ? this.closely(rows[0]) : nothing}`;
  }

  /** @param {Row[]} rows */
  maker(rows) {
    const row = rows.find((one) => one.preview?.trace);
    if (row === undefined)
      return nothing;
    return html`
      <div class="make-beside">
        <rl-make-from-file .row=${row} .device=${this.deviceOf(batch.place.deviceId) ?? null} @limits=${(/** @type {CustomEvent} */ event) => { this.limits = event.detail; }} @made=${this.onMade}
          @leave=${() => { this.making = false; this.limits = []; }}></rl-make-from-file>
        <section class="panel" aria-label="The file"><rl-file-look .row=${{ ...row, sent: 'sending' }} .place=${batch.place} .limits=${this.limits}></rl-file-look></section>
      </div>`;
  }

  /** @param {CustomEvent} event */
  async onMade(event) {
    const { device, lot } = event.detail;
    if (device !== undefined) {
      this.devices = [...this.devices ?? [], device];
      this.lots.know(device.id, []);
      batch.placeAt({ deviceId: device.id, lotId: '', conditionId: '' });
    }

    if (lot !== undefined) {
      this.lots.add(lot);
      batch.placeAt({ lotId: lot.id });
    }

    this.keepPlace();
  }

  /** @param {Row[]} rows @param {Record<Group, number>} counts */
  table(rows, counts) {
    const { place } = batch;
    const group = counts[this.group] === 0 ? 'all' : this.group;
    const within = group === 'all' ? rows : rows.filter((row) => groupOf(stageOf(row, place)) === group);
    const from = Math.min(this.from, Math.max(0, Math.floor((within.length - 1) / pageRows) * pageRows));
    const shown = within.slice(from, from + pageRows);
    return html`
      <section class="panel" aria-labelledby="files">
        <div class="page-head">
          <h2 id="files">Files <span class="soft">${rows.length}</span></h2>
          ${rows.length < 2 ? nothing : html`
            <div class="row" role="group" aria-label="Which files are shown">
              ${groupWords.filter(([name]) => name === 'all' || counts[name] > 0).map(([name, words]) => html`
                <button type="button" aria-pressed=${name === group ? 'true' : 'false'} @click=${() => { this.group = name; this.from = 0; }}>${words} ${counts[name]}</button>`)}
            </div>`}
        </div>
        <rl-data-table class="files" cards caption="Files" caption-unseen .columns=${fileColumns(this.tableOf(rows), [place, this.devices, this.lots.state])} .rows=${shown.slice(0, this.drawn)}></rl-data-table>
        ${within.length <= pageRows ? nothing : html`
          <div class="row">
            <button type="button" ?disabled=${from === 0} @click=${() => { this.from = from - pageRows; }}>Files before</button>
            <span>${from + 1} to ${from + shown.length} of ${within.length}</span>
            <button type="button" ?disabled=${from + pageRows >= within.length} @click=${() => { this.from = from + pageRows; }}>Files after</button>
          </div>`}
      </section>`;
  }

  /** @param {Row[]} rows @returns {import('./send-table.js').TableOf} */
  tableOf(rows) {
    return {
      place: batch.place,
      behind: repeated(rows, batch.place),
      deviceOf: (id) => this.deviceOf(id),
      lotOf: (id) => this.lots.find(id),
      look: (row) => this.look(row),
      typeSerial: (row, serial) => batch.change(row.id, { serial: serial.trim() === row.guess ? null : serial.trim() }),
      askColumns: (row) => void this.askColumns(row),
      askSameBytes: (row) => void this.askSameBytes([row]),
      sendAgain: (row) => this.sendAgain([row]),
      readAgain: (row) => batch.readAgain(row),
    };
  }

  /** @param {Row} row */
  closely(row) {
    return row.preview === null ? nothing : html`
      <section class="panel" aria-label=${row.name}>
        ${this.lookAt(row)}
        ${session.holds(may.engineer) && (this.devices ?? []).length > 0 && row.preview.trace !== null && row.result === null ? html`<p class="soft">Is it of a device that the lab does not know? <button type="button" class="plain" @click=${this.makeAnother}>Make device, mask and lot from it</button></p>` : nothing}
      </section>`;
  }

  makeAnother() {
    batch.placeAt({ deviceId: '', lotId: '', conditionId: '' });
    this.making = true;
  }

  /** @param {Row} row @param {() => void} [then] */
  lookAt(row, then = () => {}) {
    const whole = placeOf(row, batch.place);
    return html`<rl-file-look class="stack" .row=${row} .place=${batch.place} .devices=${this.devices ?? []} .lots=${this.lots.of(whole.deviceId)}
      @own=${(/** @type {CustomEvent} */ event) => this.placeOne(row, event.detail)} @remove=${() => { batch.remove([row.id]); then(); }}></rl-file-look>`;
  }

  /** @param {Row} row @param {Row['own']} own */
  placeOne(row, own) {
    batch.change(row.id, { own });
    void this.loadLots(placeOf({ ...row, own }, batch.place).deviceId);
  }

  /** @param {Row} row */
  look(row) {
    void this.loadLots(placeOf(row, batch.place).deviceId);
    void openDialog({
      heading: row.name,
      wide: true,
      content: (dialog) => {
        this.updateLook = dialog.update;
        const now = batch.rows.find(({ id }) => id === row.id);
        return html`${now === undefined ? nothing : this.lookAt(now, () => dialog.close())}${ends(nothing, dialog, 'Close')}`;
      },
    }).then(() => { this.updateLook = null; });
  }

  /** @param {Row} row */
  async askColumns(row) {
    const alike = batch.rows.filter((one) => isOpen(one) && headsOf(one) === headsOf(row));
    const choice = await askColumns(alike, batch.place.bench.trim());
    if (choice !== undefined)
      batch.chooseColumns(batch.rows.filter((one) => one.preview !== null && isOpen(one) && headsOf(one) === headsOf(row)), choice, 'asked');
  }

  /** @param {Row[]} rows */
  async askSameBytes(rows) {
    if (await askSameBytes(rows))
      batch.acknowledge(rows.map((row) => row.id));
  }

  /** @param {Row[]} rows */
  sendAgain(rows) {
    for (const row of rows)
      batch.change(row.id, { sent: 'no', at: null, result: null, problem: '' });
    const ids = rows.map((row) => row.id);
    this.sendAll((/** @type {Row} */ row) => ids.includes(row.id));
  }

  /** @param {unknown} [which] */
  sendAll(which) {
    this.tried = true;
    const wanted = typeof which === 'function' ? /** @type {(row: Row) => boolean} */ (which) : () => true;
    const ready = batch.rows.filter((row) => wanted(row) && stageOf(row, batch.place) === 'ready');
    if (ready.length === 0) {
      void this.updateComplete.then(() => setTimeout(() => /** @type {HTMLElement | null} */ (this.querySelector('[aria-invalid="true"]'))?.focus(), 50));
      return;
    }

    keepBench(batch.place.bench);
    const ids = new Set(ready.map((row) => row.id));
    batch.sendReady((row) => ids.has(row.id));
  }

  /** Counts the lots anew once nothing is under way any more. */
  watchSending() {
    const isSending = batch.sending.length > 0;
    if (this.wasSending && !isSending)
      void this.loadLots(batch.place.deviceId, { anew: true });

    this.wasSending = isSending;
  }

  /** @param {Event} event */
  onPicked(event) {
    const input = /** @type {HTMLInputElement} */ (event.target);
    this.take([...input.files ?? []]);
    input.value = '';
  }

  /** @param {CustomEvent} event */
  onPlace(event) {
    batch.placeAt(event.detail);
    this.keepPlace();
    void this.loadLots(batch.place.deviceId);
  }

  keepPlace() {
    const { deviceId, lotId, conditionId, bench, purpose } = batch.place;
    keepInAddress(printState(shape, { device: deviceId, lot: lotId, condition: conditionId, bench, purpose }));
  }

  async openLot() {
    const device = this.deviceOf(batch.place.deviceId);
    const lot = await makeLot(this.devices ?? [], device?.id);
    if (lot === null)
      return;
    this.lots.add(lot);
    batch.placeAt({ deviceId: lot.deviceId, lotId: lot.id, ...(lot.deviceId === device?.id ? {} : { conditionId: '' }) });
    this.keepPlace();
  }

  async clear() {
    const unsent = batch.rows.filter((row) => row.result === null && row.sent !== 'done').length;
    if (unsent > 0 && !await confirm({ heading: 'Clear the table?', sentence: `${several(unsent, 'file')} of it ${unsent === 1 ? 'is' : 'are'} not sent. The files themselves stay where they are.`, act: 'Clear it', grave: true }))
      return;
    batch.stop();
    batch.clear();
    this.tried = false;
    this.making = false;
  }
}

/** The first sentence of each field among some rows. @param {Record<string, string>[]} all */
function merged(all) {
  return Object.assign({}, ...all);
}

customElements.define('rl-page-send', SendPage);
