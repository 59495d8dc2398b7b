// The list of runs: looked through by device, lot, unit, bench, time and outcome, and picked from to be compared.

import { all, ask, withQuery } from '../api.js';
import { Page, html, nothing, ownStyles } from '../parts/element.js';
import { several } from '../numbers.js';
import { keepInAddress, list, oneOf, printState, readState, text } from '../router.js';
import { may, session } from '../session.js';
import { runColumns } from './runs-columns.js';
import { purposeOptions } from './send-place.js';
import { purposes } from './send-rows.js';
import { rangeOf } from './runs-range.js';
import '../parts/busy.js';
import '../parts/data-table.js';
import '../parts/field.js';
import '../parts/refusal.js';

await ownStyles(import.meta.url);

const typingMs = 300;
const mostCompared = 50;
const outcomeWords = /** @type {const} */ (['', 'pass', 'conditionalPass', 'conditionalFail', 'fail', 'inconclusive']);
const shape = { device: text(), lot: text(), serial: text(), bench: text(), from: text(), to: text(), outcome: oneOf(outcomeWords), purpose: oneOf(/** @type {const} */ (['', ...purposes])), picked: list() };

/** @type {readonly (readonly [string, string])[]} */
const outcomeOptions = [['', 'all'], ['pass', 'pass'], ['conditionalPass', 'conditional pass'], ['conditionalFail', 'conditional fail'], ['fail', 'fail'], ['inconclusive', 'inconclusive']];

class RunsPage extends Page {
  static properties = { found: { state: true }, devices: { state: true }, benches: { state: true }, refusal: { state: true }, busy: { state: true }, filter: { state: true } };

  constructor() {
    super();
    /** @type {{ items: any[], next: string | null } | null} */
    this.found = null;
    /** @type {any[]} */
    this.devices = [];
    /** @type {any[]} */
    this.benches = [];
    /** @type {import('../api.js').Answer | null} */
    this.refusal = null;
    this.busy = false;
    /** @type {ReturnType<typeof readState<typeof shape>>} */
    this.filter = readState(shape, '');
    this.loads = 0;
  }

  connectedCallback() {
    super.connectedCallback();
    const { signal } = this.leaving;
    void all('/api/devices?limit=200', { signal }).then(({ items }) => { this.devices = items; });
    void all('/api/benches?limit=200', { signal }).then(({ items }) => { this.benches = items; });
  }

  /** @param {import('lit').PropertyValues} changed */
  willUpdate(changed) {
    if (changed.has('query')) {
      this.filter = readState(shape, this.query);
      void this.load();
    }
  }

  get question() {
    const { device, lot, serial, bench, from, to, outcome, purpose } = this.filter;
    return withQuery('/api/runs?limit=50', { device, lot, serial, bench, outcome, purpose, ...rangeOf(from, to) });
  }

  async load() {
    const load = this.loads += 1;
    this.busy = true;
    const answer = await ask(this.question, { signal: this.leaving.signal });
    if (load !== this.loads)
      return;
    this.busy = false;
    this.refusal = answer.ok ? null : answer;
    if (answer.ok)
      this.found = answer.body;
  }

  async more() {
    if (this.found === null)
      return;
    const load = this.loads;
    this.busy = true;
    const answer = await ask(withQuery(this.question, { cursor: this.found.next }), { signal: this.leaving.signal });
    if (load !== this.loads)
      return;
    this.busy = false;
    this.refusal = answer.ok ? null : answer;
    if (answer.ok)
      this.found = { items: [...this.found.items, ...answer.body.items], next: answer.body.next };
  }

  get isFiltered() {
    const { picked, ...rest } = this.filter;
    return Object.values(rest).some((value) => value !== '');
  }

  render() {
    const { filter } = this;
    return html`
      <div class="page-head"><h1>Runs</h1>${session.holds(may.operate) ? html`<a class="button" href="/send">Send files</a>` : nothing}</div>
      <form class="filters" role="search" aria-label="Runs" @submit=${(/** @type {Event} */ event) => { event.preventDefault(); this.onFilter(); }}>
        <rl-field label="Unit" name="serial" type="search" placeholder="whole serial number" .value=${filter.serial} @input=${this.onTyping}></rl-field>
        <rl-field label="Lot" name="lot" type="search" placeholder="lot number" .value=${filter.lot} @input=${this.onTyping}></rl-field>
        <rl-field label="Device" name="device" .options=${optionsOf(this.devices.map((device) => [device.id, `${device.partNumber} ${device.revision}`]), filter.device)} .value=${filter.device} @change=${this.onFilter}></rl-field>
        <rl-field label="Bench" name="bench" .options=${optionsOf(this.benches.map((bench) => [bench.id, bench.name]), filter.bench)} .value=${filter.bench} @change=${this.onFilter}></rl-field>
        <rl-field label="Outcome" name="outcome" .options=${outcomeOptions} .value=${filter.outcome} @change=${this.onFilter}></rl-field>
        <rl-field label="Purpose" name="purpose" .options=${[['', 'all'], ...purposeOptions]} .value=${filter.purpose} @change=${this.onFilter}></rl-field>
        <rl-field label="Measured from" name="from" type="date" .value=${filter.from} @change=${this.onFilter}></rl-field>
        <rl-field label="Measured to" name="to" type="date" .value=${filter.to} @change=${this.onFilter}></rl-field>
      </form>
      <rl-refusal .answer=${this.refusal} @again=${this.load}></rl-refusal>
      ${this.pickedBar()}
      ${this.found === null ? (this.refusal === null ? html`<rl-busy label="Reading the runs"></rl-busy>` : nothing) : this.table(this.found)}`;
  }

  /** @param {{ items: any[], next: string | null }} found */
  table({ items, next }) {
    const picked = new Set(this.filter.picked);
    return html`
      <section class="panel" aria-label="Runs" aria-busy=${this.busy ? 'true' : 'false'}>
        <rl-data-table cards caption="Runs, the newest received first" caption-unseen .columns=${runColumns(picked, (run, isPicked) => this.pick(run.id, isPicked))} .rows=${items} .href=${(/** @type {any} */ run) => `/runs/${run.id}`}
          ?more=${next !== null} ?busy=${this.busy} @more=${this.more} .empty=${this.empty()}></rl-data-table>
      </section>`;
  }

  empty() {
    if (this.isFiltered)
      return html`<div class="empty" role="status"><p>No run fits. A serial number and a lot number are compared whole.</p><button type="button" @click=${this.clear}>Show all runs</button></div>`;
    return html`<div class="empty"><h2>No run is here yet</h2><p>A run is one sweep of one unit. Benches send them, or somebody drops their files here.</p>${session.holds(may.operate) ? html`<a class="button main" href="/send">Send files</a>` : nothing}</div>`;
  }

  pickedBar() {
    const { picked } = this.filter;
    if (picked.length === 0)
      return html`<p class="soft small picked-hint">Pick runs to lay them over each other.</p>`;
    return html`
      <div class="picked" role="status">
        <span>${several(picked.length, 'run is', 'runs are')} picked${picked.length > mostCompared ? `: at most ${mostCompared} can be compared at once` : ''}.</span>
        <button type="button" @click=${() => this.keep({ picked: [] })}>Pick none</button>
        ${picked.length > mostCompared ? nothing : html`<a class="button main" href="/compare?runs=${picked.join(',')}">Compare ${picked.length === 1 ? 'it' : 'them'}</a>`}
      </div>`;
  }

  /** @param {string} id @param {boolean} isPicked */
  pick(id, isPicked) {
    const others = this.filter.picked.filter((one) => one !== id);
    this.keep({ picked: isPicked ? [...others, id] : others });
  }

  onTyping() {
    clearTimeout(this.typing);
    this.typing = setTimeout(() => this.onFilter(), typingMs);
  }

  onFilter() {
    clearTimeout(this.typing);
    const form = new FormData(/** @type {HTMLFormElement} */ (this.querySelector('form.filters')));
    const given = Object.fromEntries([...form].map(([name, value]) => [name, String(value).trim()]));
    const { picked } = this.filter;
    const filter = { ...readState(shape, new URLSearchParams(given)), picked };
    if (JSON.stringify(filter) === JSON.stringify(this.filter))
      return;
    this.keep(filter);
    void this.load();
  }

  clear() {
    this.keep({ ...readState(shape, ''), picked: this.filter.picked });
    void this.load();
  }

  /** @param {Partial<typeof this.filter>} change */
  keep(change) {
    this.filter = Object.freeze({ ...this.filter, ...change });
    keepInAddress(printState(shape, this.filter));
  }
}

/** All of them, and what the address names where it is none of them. @param {string[][]} known @param {string} chosen @returns {(readonly [string, string])[]} */
function optionsOf(known, chosen) {
  const options = known.map(([id, words]) => /** @type {const} */ ([id, words]));
  return [['', 'all'], ...options, ...(chosen !== '' && !options.some(([id]) => id === chosen) ? [/** @type {const} */ ([chosen, chosen])] : [])];
}

customElements.define('rl-page-runs', RunsPage);
