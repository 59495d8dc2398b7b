// A run: its curve under its mask, the verdict criterion by criterion, measures on demand, where it comes from, and what was done to it.

import { ask } from '../api.js';
import { badge } from '../parts/badges.js';
import { Page, html, nothing, ownStyles } from '../parts/element.js';
import { say } from '../parts/notice.js';
import { frequency, margin } from '../numbers.js';
import { parseView, printView } from '../plots/plot-view.js';
import { keepInAddress, number, oneOf, printState, readState, text } from '../router.js';
import { may, session } from '../session.js';
import { invalidate, reassign } from './run-acts.js';
import { historyOf, provenanceOf } from './run-provenance.js';
import { criterionColumns, worstFirst } from './run-verdict.js';
import '../parts/busy.js';
import '../parts/data-table.js';
import '../parts/refusal.js';
import '../plots/response-plot.js';
import './run-measures.js';

await ownStyles(import.meta.url);

const points = 2_000;
const shape = { at: number(), basis: oneOf(/** @type {const} */ (['asMeasured', 'minusGolden', 'levelled'])), level: number(), second: oneOf(/** @type {const} */ (['phase', 'delay'])), view: text() };

const standings = /** @type {Record<string, { sign: string, words: string, tone: string }>} */ ({
  counting: { sign: '\u25cf', words: 'counts', tone: '' },
  retest: { sign: '\u21bb', words: 'retest, does not count', tone: 'aside' },
  invalidated: { sign: '\u2300', words: 'invalidated', tone: 'bad' },
  notProduction: { sign: '\u25cb', words: 'no production run', tone: 'aside' },
});

class RunPage extends Page {
  static properties = { run: { state: true }, verdict: { state: true }, upper: { state: true }, lower: { state: true }, refusal: { state: true }, curveRefusal: { state: true }, state: { state: true } };

  constructor() {
    super();
    /** @type {any} */
    this.run = null;
    /** @type {any} */
    this.verdict = null;
    /** @type {any} */
    this.upper = null;
    /** @type {any} */
    this.lower = null;
    /** @type {import('../api.js').Answer | null} */
    this.refusal = null;
    /** @type {import('../api.js').Answer | null} */
    this.curveRefusal = null;
    /** @type {ReturnType<typeof readState<typeof shape>>} */
    this.state = readState(shape, '');
  }

  get at() {
    return `/api/runs/${this.params.id}`;
  }

  /** @param {import('lit').PropertyValues} changed */
  willUpdate(changed) {
    if (changed.has('query')) {
      const { second } = this.state;
      this.state = readState(shape, this.query);
      if (this.run === null)
        void this.load();
      else if (second !== this.state.second)
        void this.loadLower();
    }
  }

  async load() {
    const { signal } = this.leaving;
    const [run, verdict] = await Promise.all([ask(this.at, { signal }), ask(`${this.at}/verdict`, { signal })]);
    this.refusal = [run, verdict].find((answer) => !answer.ok) ?? null;
    if (!run.ok || !verdict.ok)
      return;
    this.run = run.body;
    this.verdict = verdict.body;
    this.entitle(`${run.body.serial}, run`);
    await this.loadCurves();
  }

  async loadCurves() {
    const [upper, lower] = await Promise.all([this.overlay('gain'), this.overlay(this.state.second)]);
    this.curveRefusal = [upper, lower].find((answer) => !answer.ok) ?? null;
    if (!upper.ok || !lower.ok)
      return;
    this.upper = upper.body;
    this.lower = filled(lower.body);
  }

  async loadLower() {
    const { second } = this.state;
    const answer = await this.overlay(second);
    if (second !== this.state.second)
      return;
    this.curveRefusal = answer.ok ? null : answer;
    if (answer.ok)
      this.lower = filled(answer.body);
  }

  /** @param {string} quantity */
  overlay(quantity) {
    return ask(`${this.at}/overlay?quantity=${quantity}&points=${points}`, { signal: this.leaving.signal });
  }

  render() {
    if (this.run === null)
      return html`<h1 class="unseen">Run</h1>${this.refusal === null ? html`<rl-busy label="Reading the run"></rl-busy>` : html`<rl-refusal .answer=${this.refusal} @again=${this.load}></rl-refusal><p><a href="/runs">Look through the runs</a></p>`}`;
    return html`
      ${this.head()}
      <div class="run-top">
        <section class="panel" aria-label="Curve">${this.plot()}</section>
        <section class="panel" aria-labelledby="verdict">${this.verdictPanel()}</section>
      </div>
      <div class="run-more">
        <section class="panel" aria-label="Measures">
          <rl-run-measures .runId=${this.run.id} .given=${this.verdict.measures} @at=${(/** @type {CustomEvent} */ event) => this.moveTo(event.detail)}></rl-run-measures>
        </section>
        <div class="stack">
          <section class="panel" aria-labelledby="provenance"><h2 id="provenance">Where it comes from</h2>${provenanceOf(this.run)}</section>
          <section class="panel" aria-labelledby="history"><h2 id="history">What was done to it</h2>${historyOf(this.run)}</section>
        </div>
      </div>`;
  }

  head() {
    const { run } = this;
    const engineer = session.holds(may.engineer);
    const hasPhase = !['level', 'ratio'].includes(run.reading.form);
    return html`
      <div class="page-head">
        <div>
          <h1>${run.serial} <rl-outcome outcome=${this.verdict.outcome}></rl-outcome> ${badge(standings[run.standing] ?? { sign: '?', words: run.standing, tone: '' })}${run.reassigned > 0 ? badge({ sign: '\u2192', words: 'reassigned', tone: 'aside' }) : nothing}</h1>
          <p class="soft"><a href="/devices/${run.deviceId}">${run.partNumber} ${run.revision}</a>, ${run.lotId === null ? 'no lot' : html`lot <a href="/lots/${run.lotId}">${run.lotNumber}</a>`}, condition ${run.condition}</p>
        </div>
        <div class="row">
          <a class="button" href="/compare?runs=${run.id}">Compare</a>
          <a class="button" href="${this.at}/export?format=csv" download>CSV</a>
          ${hasPhase ? html`<a class="button" href="${this.at}/export?format=touchstone" download>Touchstone</a>` : html`<button type="button" disabled title="A Touchstone file holds a phase, and this run has none.">Touchstone</button>`}
          ${engineer ? html`
            <button type="button" @click=${this.reassign}>Reassign</button>
            ${run.invalidation === null ? html`<button type="button" @click=${this.invalidate}>Invalidate</button>` : nothing}` : nothing}
        </div>
      </div>
      ${run.invalidation === null ? nothing : html`<div class="refusal" role="note"><p>This run is invalidated and does not count. Cause: ${run.invalidation.cause}. ${run.invalidation.reason}</p></div>`}`;
  }

  plot() {
    if (this.upper === null)
      return this.curveRefusal === null ? html`<rl-busy label="Reading the curve"></rl-busy>` : html`<rl-refusal .answer=${this.curveRefusal} @again=${this.loadCurves}></rl-refusal>`;
    const { state } = this;
    return html`
      <div class="row run-second" role="group" aria-label="Below the gain">
        ${/** @type {const} */ (['phase', 'delay']).map((second) => html`<button type="button" aria-pressed=${state.second === second ? 'true' : 'false'} @click=${() => this.keep({ second })}>${second === 'phase' ? 'Phase' : 'Group delay'}</button>`)}
        ${this.lower === null && this.curveRefusal === null && ['level', 'ratio'].includes(this.run.reading.form) ? html`<span class="soft small">This run was measured without a phase.</span>` : nothing}
      </div>
      <rl-response-plot .upper=${this.upper} .lower=${this.lower} .chosen=${[this.run.id]} .basis=${state.basis} .levelHz=${state.level} .view=${parseView(state.view)} .cursorHz=${state.at ?? this.verdict.worst?.frequencyHz ?? null}
        caption=${this.caption()}
        @cursor=${(/** @type {CustomEvent} */ event) => this.keep({ at: event.detail.frequencyHz })}
        @view=${(/** @type {CustomEvent} */ event) => this.keep({ view: printView(event.detail.view) })}
        @basis=${(/** @type {CustomEvent} */ event) => this.keep({ basis: event.detail.basis, level: event.detail.levelHz })}></rl-response-plot>
      ${[...new Set([...this.upper.notes, ...(this.lower?.notes ?? [])].map(({ code, message }) => (code === 'noReleasedMask' ? '' : message)))].filter((message) => message !== '').map((message) => html`<p class="soft small">${message}</p>`)}`;
  }

  caption() {
    const { run, upper } = this;
    const mask = upper.condition.maskRevision === null ? 'no mask is released' : `mask revision ${upper.condition.maskRevision}`;
    const golden = upper.golden === null ? 'no golden run is set' : upper.golden.runId === run.id ? 'it is the golden run itself' : `golden run of ${upper.golden.serial}`;
    return `${run.serial} in ${run.condition}: ${mask}, ${golden}.`;
  }

  verdictPanel() {
    const { verdict, run } = this;
    if (verdict.outcome === null) {
      return html`<h2 id="verdict">Verdict</h2><p>There is none: no mask is released for the condition ${run.condition} of ${run.partNumber} ${run.revision}.</p>
        <p>${session.holds(may.engineer) ? html`<a href="/devices/${run.deviceId}">Go to the device</a> to write and release one; the run is judged at once.` : 'An engineer writes and releases masks; the run is judged then.'}</p>`;
    }

    const { worst } = verdict;
    return html`
      <div class="page-head"><h2 id="verdict">Verdict</h2><rl-outcome outcome=${verdict.outcome}></rl-outcome></div>
      ${worst === null ? nothing : html`<p>${worst.outcome === 'pass' ? 'The least margin is' : 'What decides is'} <strong>${worst.criterion}</strong>: ${worst.margin === null ? 'no margin' : margin(worst.margin, worst.unit)}${worst.frequencyHz === null ? '' : html` at <button type="button" class="plain" title="Move the cursor there" @click=${() => this.moveTo(worst.frequencyHz)}>${frequency(worst.frequencyHz, 5)}</button>`}.</p>`}
      <rl-data-table cards caption="Criteria of the mask" caption-unseen .columns=${criterionColumns((atHz) => this.moveTo(atHz))} .rows=${worstFirst(verdict.criteria)} .keyOf=${(/** @type {any} */ criterion) => criterion.name}></rl-data-table>
      <p class="soft small">Mask <a href="/masks/${verdict.maskId}">revision ${verdict.maskRevision}</a>, numbers of engine ${verdict.engine}. ${verdict.pinned ? 'A signed decision rests on this verdict: it does not change any more.' : verdict.stored ? '' : 'It was worked out just now and is about to be kept.'}</p>`;
  }

  /** @param {Partial<typeof this.state>} change */
  keep(change) {
    const { second } = this.state;
    this.state = Object.freeze({ ...this.state, ...change });
    keepInAddress(printState(shape, this.state));
    if (second !== this.state.second)
      void this.loadLower();
  }

  /** Moves the cursor, into view where it is out of it. @param {number} atHz */
  moveTo(atHz) {
    const { frequency: seen } = parseView(this.state.view);
    this.keep({ at: atHz, ...(seen !== null && (atHz < seen.min || atHz > seen.max) ? { view: '' } : {}) });
    const plot = /** @type {HTMLElement | null} */ (this.querySelector('rl-response-plot'));
    const box = plot?.getBoundingClientRect();
    if (plot !== null && box !== undefined && (box.bottom < 80 || box.top > innerHeight - 80))
      plot.scrollIntoView({ block: 'nearest' });
  }

  async invalidate() {
    const run = await invalidate(this.run);
    if (run !== null)
      await this.changed('The run is invalidated.');
  }

  async reassign() {
    const run = await reassign(this.run);
    if (run !== null)
      await this.changed(`The run belongs to ${run.serial} now.`);
  }

  /** @param {string} sentence */
  async changed(sentence) {
    say(sentence);
    await this.load();
  }
}

/** An overlay whose run has the quantity, or null. @param {any} overlay */
function filled(overlay) {
  return overlay.runs[0]?.values.some((/** @type {number | null} */ value) => value !== null) ? overlay : null;
}

customElements.define('rl-page-run', RunPage);
