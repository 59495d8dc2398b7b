// A lot on one page: what speaks for and against its release, its curves over one another, its units, and the way to sign.

import { all, ask, withQuery } from '../api.js';
import { Page, html, nothing, ownStyles } from '../parts/element.js';
import { say } from '../parts/notice.js';
import { parseView } from '../plots/plot-view.js';
import { keepInAddress, printState, readState } from '../router.js';
import { session } from '../session.js';
import { disposition, invalidation, reopening } from './lot-acts.js';
import { evidence, factsOf, headOf, noLot } from './lot-head.js';
import { plotPanel } from './lot-plot.js';
import { decisionWords, earlierDecisions, signedRecord } from './lot-record.js';
import { signLot } from './lot-sign.js';
import { fingerprint, fittingUnits, panelsOf, pointsFor, runOf, shape, unitOfRun } from './lot-state.js';
import { unitPanel, unitsPanel } from './lot-units.js';
import '../parts/busy.js';
import '../parts/refusal.js';

/** @typedef {import('../api.js').Answer} Answer */
/** @typedef {import('./lot-state.js').LotState} LotState */

await ownStyles(import.meta.url);

const followMs = 12_000;
const followStaleMs = 2_000;
const calmMs = 300;

export class LotPage extends Page {
  static properties = {
    lot: { state: true }, units: { state: true }, device: { state: true }, decisions: { state: true }, overlays: { state: true },
    runs: { state: true }, refusal: { state: true }, plotRefusal: { state: true }, state: { state: true },
  };

  constructor() {
    super();
    /** @type {any} */
    this.lot = null;
    /** @type {any[] | null} */
    this.units = null;
    /** @type {any} */
    this.device = null;
    /** @type {any[]} */
    this.decisions = [];
    /** @type {Readonly<Record<string, any>>} overlays by condition and quantity */
    this.overlays = {};
    /** @type {{ serial: string, items: any[] } | null} all runs of the chosen unit */
    this.runs = null;
    /** @type {Answer | null} */
    this.refusal = null;
    /** @type {Answer | null} */
    this.plotRefusal = null;
    /** @type {LotState} */
    this.state = readState(shape, '');
    this.view = parseView('');
    /** @type {number | null} where the plot's cursor stands: no property, for a page that is drawn with every step of the cursor is slow */
    this.atHz = null;
    this.loads = 0;
    /** @type {string | null} the run of the row under the pointer */
    this.pointedRunId = null;
    this.onVisible = () => this.follow(0);
    this.onResize = () => this.measure();
  }

  connectedCallback() {
    super.connectedCallback();
    document.addEventListener('visibilitychange', this.onVisible);
    addEventListener('resize', this.onResize);
  }

  disconnectedCallback() {
    super.disconnectedCallback();
    document.removeEventListener('visibilitychange', this.onVisible);
    removeEventListener('resize', this.onResize);
    clearTimeout(this.following);
    clearTimeout(this.keeping);
  }

  /** @param {Map<string, unknown>} changed */
  willUpdate(changed) {
    if (changed.has('query')) {
      this.state = readState(shape, this.query);
      this.view = parseView(this.state.view);
      this.atHz = this.state.at;
      if (this.lot !== null)
        void this.loadCurves();
    }

    if (changed.has('params'))
      void this.load();
    if (changed.has('state') || changed.has('units'))
      void this.loadRuns();
  }

  updated() {
    this.measure();
    this.raise();
  }

  /** The page fills the window: what is left under its head is the height of the plot and of the units. */
  measure() {
    const body = /** @type {HTMLElement | null} */ (this.querySelector('.lot-body'));
    body?.style.setProperty('--lot-top', `${Math.round(body.getBoundingClientRect().top + scrollY)}px`);
  }

  // --- reading ---

  get address() {
    return `/api/lots/${this.params.id}`;
  }

  /**
   * Reads the lot anew, and its units and curves where something of it changed; what is shown stays until then.
   * @param {{ anew?: boolean }} [how]   reads all of it whatever changed
   */
  async load({ anew = false } = {}) {
    const load = this.loads += 1;
    const { signal } = this.leaving;
    const lot = await ask(this.address, { signal });
    if (load !== this.loads)
      return;
    this.refusal = lot.ok ? null : lot;
    if (lot.ok && (anew || this.lot === null || this.units === null || fingerprint(lot.body) !== fingerprint(this.lot))) {
      const [units, device, decisions] = await Promise.all([
        all(`${this.address}/units?limit=500`, { signal }),
        ask(`/api/devices/${lot.body.deviceId}`, { signal }),
        all(`${this.address}/decisions`, { signal }),
      ]);
      if (load !== this.loads)
        return;
      this.refusal = [units, decisions].find((answer) => !answer.ok) ?? null;
      if (this.refusal === null)
        this.take(lot.body, units.items, device.ok ? device.body : null, decisions.items);
    }

    this.follow();
  }

  /** @param {any} lot @param {any[]} units @param {any} device @param {any[]} decisions */
  take(lot, units, device, decisions) {
    this.entitle(`Lot ${lot.number}`);
    this.lot = lot;
    this.units = units.map((unit, rank) => ({ ...unit, rank }));
    this.device = device;
    this.decisions = decisions;
    this.runs = null;
    void this.loadCurves({ anew: true });
  }

  /** Looks again after a while, sooner while verdicts are pending; never while the page is hidden. @param {number} [afterMs] */
  follow(afterMs = this.lot?.stale > 0 ? followStaleMs : followMs) {
    clearTimeout(this.following);
    if (this.isConnected && document.visibilityState === 'visible' && this.refusal?.status !== 404)
      this.following = setTimeout(() => void this.load(), afterMs);
  }

  /** The condition that is shown. @returns {any} */
  get condition() {
    return this.lot?.conditions.find((/** @type {any} */ condition) => condition.name === this.state.condition) ?? this.lot?.conditions[0] ?? null;
  }

  /** @param {string | null} quantity */
  overlayOf(quantity) {
    return quantity === null ? null : this.overlays[`${this.condition?.id} ${quantity}`] ?? null;
  }

  /** Reads the curves that are shown and not there yet. @param {{ anew?: boolean }} [how] */
  async loadCurves({ anew = false } = {}) {
    const { lot, units, condition } = this;
    const wanted = panelsOf(this.state.show).filter((quantity) => quantity !== null && (anew || this.overlayOf(quantity) === null));
    if (condition === null || units === null || wanted.length === 0)
      return;
    const points = pointsFor(units.filter((unit) => runOf(unit, condition.id) !== null).length);
    const answers = await Promise.all(wanted.map((quantity) => ask(withQuery(`${this.address}/overlay`, { quantity, condition: condition.id, points }), { signal: this.leaving.signal })));
    if (lot !== this.lot)
      return;
    this.plotRefusal = answers.find((answer) => !answer.ok) ?? null;
    const read = answers.flatMap((answer, i) => (answer.ok ? [[`${condition.id} ${wanted[i]}`, answer.body]] : []));
    // What belongs to an earlier state of the lot is let go only now: nothing flickers.
    this.overlays = { ...(anew ? {} : this.overlays), ...Object.fromEntries(read) };
  }

  async loadRuns() {
    const unit = this.chosenUnit;
    if (unit === null || this.runs?.serial === unit.serial || this.readingRunsOf === unit.serial)
      return;
    this.readingRunsOf = unit.serial;
    const answer = await all(withQuery('/api/runs?purpose=production&limit=100', { lot: this.lot.id, serial: unit.serial }), { signal: this.leaving.signal });
    this.readingRunsOf = '';
    if (this.chosenUnit?.serial === unit.serial && answer.ok)
      this.runs = { serial: unit.serial, items: answer.items };
    else if (!answer.ok && answer.code !== 'stopped')
      say(answer.sentence, { bad: true });
  }

  // --- what is chosen ---

  /** @returns {any} */
  get chosenUnit() {
    return this.state.unit === '' ? null : this.units?.find((unit) => unit.serial === this.state.unit) ?? null;
  }

  /** The chosen unit's run in the condition that is shown. */
  get chosenRunId() {
    return runOf(this.chosenUnit, this.condition?.id ?? null);
  }

  /** @param {Partial<LotState>} changes */
  keep(changes) {
    this.state = Object.freeze({ ...this.state, ...changes });
    this.keepSoon();
  }

  keepSoon() {
    clearTimeout(this.keeping);
    this.keeping = setTimeout(() => keepInAddress(printState(shape, { ...this.state, at: this.atHz })), calmMs);
  }

  /** @param {string} serial   '' chooses none */
  chooseUnit(serial) {
    this.keep({ unit: serial });
  }

  /** @param {LotState['units']} filter */
  filterUnits(filter) {
    this.keep({ units: filter, find: '' });
  }

  /** @param {Partial<LotState>} changes */
  showCurves(changes) {
    const anotherGrid = 'condition' in changes;
    if (anotherGrid || 'show' in changes) {
      this.view = parseView('');
      changes = { ...changes, view: '' };
      if (anotherGrid)
        this.atHz = null;
    }

    this.keep(changes);
    void this.loadCurves();
  }

  /** Raises the run of the row under the pointer, else of the chosen unit: by property, so that nothing else is drawn. */
  raise() {
    const plot = /** @type {import('../plots/response-plot.js').ResponsePlot | null} */ (this.querySelector('rl-response-plot'));
    if (plot !== null)
      plot.highlight = this.pointedRunId ?? this.chosenRunId;
  }

  /** @returns {import('../parts/data-table.js').DataTable | null} */
  get table() {
    return this.querySelector('.lot-units rl-data-table');
  }

  // --- events ---

  /** @param {InputEvent} event */
  onFind(event) {
    this.keep({ find: /** @type {HTMLInputElement} */ (event.target).value });
  }

  /** @param {CustomEvent<any>} event */
  onPickUnit(event) {
    this.chooseUnit(event.detail.serial === this.state.unit ? '' : event.detail.serial);
  }

  /** @param {CustomEvent<string | null>} event */
  onRowHover(event) {
    const unit = event.detail === null ? null : this.units?.find(({ serial }) => serial === event.detail) ?? null;
    this.pointedRunId = runOf(unit, this.condition?.id ?? null);
    this.raise();
  }

  /** @param {CustomEvent<{ runId: string } | null>} event */
  onRunHover(event) {
    this.table?.point(unitOfRun(this.units ?? [], event.detail?.runId ?? null)?.serial ?? null);
  }

  /** @param {CustomEvent<{ runId: string }>} event */
  async onRunPick(event) {
    const unit = unitOfRun(this.units ?? [], event.detail.runId);
    if (unit === null)
      return;
    const hidden = !fittingUnits([unit], this.state.units, this.state.find).includes(unit);
    this.keep({ unit: unit.serial, ...(hidden ? { units: 'all', find: '' } : {}) });
    await this.updateComplete;
    await this.table?.updateComplete;
    this.table?.point(unit.serial);
  }

  /** @param {CustomEvent<{ frequencyHz: number }>} event */
  onCursor(event) {
    this.atHz = Number(event.detail.frequencyHz.toPrecision(8));
    this.keepSoon();
  }

  /** @param {CustomEvent<{ view: import('../plots/plot-view.js').PlotView, text: string }>} event */
  onView(event) {
    this.view = event.detail.view;
    this.keep({ view: event.detail.text });
  }

  /** @param {CustomEvent<{ basis: LotState['basis'], levelHz: number | null }>} event */
  onBasis(event) {
    this.view = { ...this.view, upper: null, lower: null };
    this.keep({ basis: event.detail.basis, level: event.detail.levelHz });
  }

  // --- acts ---

  async signOff() {
    const { lot } = this;
    const signing = await ask(`${this.address}/signing`);
    if (!signing.ok)
      say(signing.code === 'lotDecided' ? 'Somebody else has decided this lot meanwhile; the page shows it now.' : signing.sentence, { bad: true });
    else if (await signLot(lot, signing.body, session.person?.name ?? '') !== undefined)
      say(`Your signature stands: lot ${lot.number} is decided.`);
    await this.load({ anew: true });
    await this.focusIfLost('.lot-signed');
  }

  async reopen() {
    if (await reopening(this.lot) !== undefined)
      say(`Lot ${this.lot.number} is open again.`);
    await this.load({ anew: true });
    await this.focusIfLost('h1');
  }

  /** @param {any} unit */
  async dispose(unit) {
    const answer = await disposition(this.lot, unit);
    if (answer !== undefined)
      say(`Unit ${unit.serial}: ${answer.body.disposition}.`);
    void this.load({ anew: true });
  }

  /** @param {any} unit */
  async invalidate(unit) {
    const answer = await invalidation(this.lot, unit, this.runs?.items ?? [], this.chosenRunId);
    if (answer !== undefined)
      say(`The run of unit ${unit.serial} is invalidated. It is kept, and does not count.`);
    void this.load({ anew: true });
  }

  /** The button that opened a dialog may be gone after what it did. @param {string} selector */
  async focusIfLost(selector) {
    await this.updateComplete;
    if (document.activeElement === null || document.activeElement === document.body)
      /** @type {HTMLElement | null} */ (this.querySelector(selector))?.focus();
  }

  render() {
    const { lot, units } = this;
    if (this.refusal?.status === 404)
      return noLot();
    if (lot === null || units === null)
      return html`<rl-refusal .answer=${this.refusal} @again=${() => this.load()}></rl-refusal>${this.refusal === null ? html`<rl-busy label="Reading the lot"></rl-busy>` : nothing}`;
    const unit = this.chosenUnit;
    return html`
      ${headOf(this, lot)}
      <rl-refusal .answer=${this.refusal} @again=${() => this.load()}></rl-refusal>
      <div class="panel lot-evidence">
        ${factsOf(lot, this.device)}
        ${lot.decision === null ? evidence(this, lot, units) : signedRecord(lot.decision)}
      </div>
      <div class="lot-body">
        ${plotPanel(this, lot, units)}
        <div class="lot-side">
          ${unitsPanel(this, lot, units)}
          ${unit === null ? nothing : unitPanel(this, lot, unit, this.runs !== null && this.runs.serial === unit.serial ? this.runs.items : null)}
        </div>
      </div>
      ${earlierDecisions(this.decisions)}
      <p class="print-only small">${lot.decision === null ? 'This lot is not decided.' : `This lot is ${decisionWords(lot.decision.decision)}. The signed record is what counts; this sheet is a copy of the page.`}</p>`;
  }
}

customElements.define('rl-page-lot', LotPage);
