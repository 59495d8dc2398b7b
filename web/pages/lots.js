// The start page: which lots wait for a decision, which are being tested, which are decided.

import { all, ask, withQuery } from '../api.js';
import { Page, html, nothing, ownStyles } from '../parts/element.js';
import { keepInAddress, oneOf, printState, readState, text } from '../router.js';
import { may, session } from '../session.js';
import { decidedColumns, openColumns, waits } from './lots-columns.js';
import { openLot } from './lots-open.js';
import '../parts/busy.js';
import '../parts/data-table.js';
import '../parts/field.js';
import '../parts/refusal.js';

await ownStyles(import.meta.url);

const typingMs = 250;
const states = /** @type {const} */ (['', 'open', 'decided', 'approved', 'approvedWithConcession', 'rejected']);
const shape = { search: text(), device: text(), state: oneOf(states) };

/** @type {readonly (readonly [string, string])[]} */
const stateOptions = [
  ['', 'all'], ['open', 'open'], ['decided', 'decided'], ['approved', 'approved'], ['approvedWithConcession', 'approved with concession'], ['rejected', 'rejected'],
];

class LotsPage extends Page {
  static properties = { open: { state: true }, decided: { state: true }, devices: { state: true }, refusal: { state: true }, busy: { state: true }, filter: { state: true } };

  constructor() {
    super();
    /** @type {any[] | null} */
    this.open = null;
    /** @type {{ items: any[], next: string | null } | null} */
    this.decided = null;
    /** @type {any[]} */
    this.devices = [];
    /** @type {import('../api.js').Answer | null} */
    this.refusal = null;
    this.busy = false;
    /** @type {ReturnType<typeof readState<typeof shape>>} */
    this.filter = readState(shape, '');
    this.loads = 0;
    this.onVisible = () => {
      if (document.visibilityState === 'visible')
        void this.load();
    };
  }

  connectedCallback() {
    super.connectedCallback();
    document.addEventListener('visibilitychange', this.onVisible);
    void all('/api/devices?limit=200', { signal: this.leaving.signal }).then(({ items }) => { this.devices = items; });
  }

  disconnectedCallback() {
    super.disconnectedCallback();
    document.removeEventListener('visibilitychange', this.onVisible);
  }

  /** @param {import('lit').PropertyValues} changed */
  willUpdate(changed) {
    if (changed.has('query')) {
      this.filter = readState(shape, this.query);
      void this.load();
    }
  }

  /** Reads both lists anew; what is shown stays until the new ones are there. */
  async load() {
    const load = this.loads += 1;
    const { search, device, state } = this.filter;
    this.busy = true;
    const wantsOpen = state === '' || state === 'open';
    const wantsDecided = state !== 'open';
    const [open, decided] = await Promise.all([
      wantsOpen ? all(withQuery('/api/lots?state=open&limit=100', { search, device }), { most: 500, signal: this.leaving.signal }) : null,
      wantsDecided ? ask(withQuery('/api/lots?limit=25', { search, device, state: state === '' ? 'decided' : state }), { signal: this.leaving.signal }) : null,
    ]);
    if (load !== this.loads)
      return;
    this.busy = false;
    this.refusal = [open, decided].find((answer) => answer?.ok === false) ?? null;
    if (this.refusal !== null)
      return;
    this.open = open?.items ?? [];
    this.decided = decided?.body ?? { items: [], next: null };
  }

  async moreDecided() {
    if (this.decided === null)
      return;
    const { search, device, state } = this.filter;
    const answer = await ask(withQuery('/api/lots?limit=50', { search, device, state: state === '' ? 'decided' : state, cursor: this.decided.next }));
    this.refusal = answer.ok ? null : answer;
    if (answer.ok)
      this.decided = { items: [...this.decided.items, ...answer.body.items], next: answer.body.next };
  }

  render() {
    const operates = session.holds(may.operate);
    return html`
      <div class="page-head">
        <h1>Lots</h1>
        ${operates && this.devices.length > 0 ? html`
          <div class="row">
            <button type="button" @click=${() => openLot(this.devices)}>Open a lot</button>
            <a class="button main" href="/send">Send files</a>
          </div>` : nothing}
      </div>
      ${this.isBare ? nothing : this.filters()}
      <rl-refusal .answer=${this.refusal} @again=${this.load}></rl-refusal>
      ${this.open === null || this.decided === null ? (this.refusal === null ? html`<rl-busy label="Reading the lots"></rl-busy>` : nothing) : this.lists(this.open, this.decided)}`;
  }

  get isFiltered() {
    return this.filter.search !== '' || this.filter.device !== '' || this.filter.state !== '';
  }

  /** A lab without a lot. */
  get isBare() {
    return !this.isFiltered && this.open?.length === 0 && this.decided?.items.length === 0;
  }

  filters() {
    return html`
      <form class="filters" role="search" aria-label="Lots" @submit=${(/** @type {Event} */ event) => event.preventDefault()}>
        <rl-field class="wide" label="Search" name="search" type="search" placeholder="lot, part or serial number" .value=${this.filter.search} @input=${this.onTyping}></rl-field>
        <rl-field label="Device" name="device" .options=${this.deviceOptions()} .value=${this.filter.device} @change=${this.onFilter}></rl-field>
        <rl-field label="State" name="state" .options=${stateOptions} .value=${this.filter.state} @change=${this.onFilter}></rl-field>
      </form>`;
  }

  /** @returns {(readonly [string, string])[]} */
  deviceOptions() {
    const known = this.devices.map((device) => /** @type {const} */ ([device.id, `${device.partNumber} ${device.revision}`]));
    const strange = this.filter.device !== '' && !known.some(([id]) => id === this.filter.device);
    return [['', 'all'], ...known, ...(strange ? [/** @type {const} */ ([this.filter.device, this.filter.device])] : [])];
  }

  /**
   * @param {any[]} open
   * @param {{ items: any[], next: string | null }} decided
   */
  lists(open, decided) {
    if (this.isBare)
      return this.nextStep();
    const waiting = open.filter(waits);
    const testing = open.filter((lot) => !waits(lot));
    const found = waiting.length + testing.length + decided.items.length > 0;
    return html`
      ${found ? nothing : html`<div class="empty" role="status"><p>No lot fits. The search looks in lot and part numbers, and for a whole serial number.</p><button type="button" @click=${this.clear}>Show all lots</button></div>`}
      ${waiting.length === 0 && (this.isFiltered || !found) ? nothing : html`
        <section class="panel" aria-labelledby="waiting">
          <h2 id="waiting">Wait for a decision <span class="soft">${waiting.length}</span></h2>
          <rl-data-table cards caption="Lots that wait for a decision" caption-unseen .columns=${openColumns(true)} .rows=${waiting} .href=${addressOf} sort="age" descending
            .empty=${html`<p class="soft">No lot waits: every tested lot is decided.</p>`}></rl-data-table>
        </section>`}
      ${testing.length === 0 ? nothing : html`
        <section class="panel" aria-labelledby="testing">
          <h2 id="testing">Being tested <span class="soft">${testing.length}</span></h2>
          <rl-data-table cards caption="Lots that are being tested" caption-unseen .columns=${openColumns(false)} .rows=${testing} .href=${addressOf}></rl-data-table>
        </section>`}
      ${decided.items.length === 0 ? nothing : html`
        <section class="panel" aria-labelledby="decided">
          <h2 id="decided">Decided</h2>
          <rl-data-table cards caption="Lots that are decided" caption-unseen .columns=${decidedColumns} .rows=${decided.items} .href=${addressOf} ?more=${decided.next !== null} @more=${this.moreDecided}></rl-data-table>
        </section>`}`;
  }

  nextStep() {
    if (this.devices.length === 0) {
      return session.holds(may.engineer)
        ? html`<div class="empty"><h2>Nothing is here yet</h2><p>A lot is a lot of a device. Describe the device first: its part number, the sweeps that it needs, and the mask that its units must meet. A sweep file that you have can be looked at before that.</p><div class="row"><a class="button main" href="/devices">Describe a device</a><a class="button" href="/send">Look at a file</a></div>${this.checklist()}</div>`
        : html`<div class="empty"><h2>Nothing is here yet</h2><p>A lot is a lot of a device, and no device is described. That is an engineer's work${session.holds(may.operate) ? '; until then you can look at a sweep file' : ''}.</p>${session.holds(may.operate) ? html`<a class="button" href="/send">Look at a file</a>` : nothing}</div>`;
    }

    return session.holds(may.operate)
      ? html`<div class="empty"><h2>No lot is open</h2><p>Open a lot with its number and size; then benches can send its sweeps.</p><button type="button" class="main" @click=${() => openLot(this.devices)}>Open the first lot</button>${this.checklist()}</div>`
      : html`<div class="empty"><h2>No lot is open</h2><p>An operator opens a lot, and benches send its sweeps. It will stand here.</p></div>`;
  }

  checklist() {
    return session.holds(may.manage) ? html`<p>The <a href="/checklist">checklist</a> says what else a lot needs before somebody can sign it.</p>` : nothing;
  }

  onTyping() {
    clearTimeout(this.typing);
    this.typing = setTimeout(() => this.onFilter(), typingMs);
  }

  onFilter() {
    const form = new FormData(/** @type {HTMLFormElement} */ (this.querySelector('form.filters')));
    const given = Object.fromEntries([...form].map(([name, value]) => [name, String(value).trim()]));
    const filter = readState(shape, new URLSearchParams(given));
    if (JSON.stringify(filter) === JSON.stringify(this.filter))
      return;
    this.filter = filter;
    keepInAddress(printState(shape, filter));
    void this.load();
  }

  clear() {
    this.filter = readState(shape, '');
    keepInAddress({});
    void this.load();
  }
}

/** @param {any} lot */
function addressOf(lot) {
  return `/lots/${lot.id}`;
}

customElements.define('rl-page-lots', LotsPage);
