// One bench: its settings, the answers that it keeps, its tokens, and its last runs.

import { all, ask, send } from '../api.js';
import { Page, html, nothing } from '../parts/element.js';
import { say } from '../parts/notice.js';
import { Listing } from '../parts/listing.js';
import { moment, when } from '../parts/when.js';
import { parseNumber } from '../numbers.js';
import { beforeLeaving } from '../router.js';
import { confirm } from '../parts/dialog.js';
import { refused } from '../parts/form-dialog.js';
import { may, session } from '../session.js';
import { serialOf } from './bench-serial.js';
import { stateOf } from './tokens-state.js';
import '../parts/badges.js';
import '../parts/busy.js';
import '../parts/data-table.js';
import '../parts/field.js';
import '../parts/refusal.js';

/** @type {readonly import('../parts/data-table.js').Column<any>[]} */
const runColumns = [
  { key: 'serial', label: 'Unit', head: true, cell: (run) => run.serial },
  { key: 'outcome', label: 'Verdict', cell: (run) => (run.purpose === 'production' ? html`<rl-outcome .outcome=${run.outcome}></rl-outcome>` : html`<span class="soft">${run.purpose}</span>`) },
  { key: 'device', label: 'Device', cell: (run) => `${run.partNumber} ${run.revision}` },
  { key: 'condition', label: 'Condition', cell: (run) => run.condition },
  { key: 'lot', label: 'Lot', cell: (run) => (run.lotId === null ? html`<span class="soft">none</span>` : html`<a href="/lots/${run.lotId}">${run.lotNumber}</a>`) },
  { key: 'received', label: 'Received', cell: (run) => when(run.receivedAt, ' ago') },
];

/** @type {readonly import('../parts/data-table.js').Column<any>[]} */
const answerColumns = [
  { key: 'choices', label: 'Columns are', head: true, cell: ({ choices }) => (choices ?? []).map((/** @type {any} */ choice) => `${choice.column}: ${choice.quantity}${choice.unit ? ` in ${choice.unit}` : ''}`).join(', ') },
  { key: 'at', label: 'Answered', cell: (answer) => moment(answer.at) },
  { key: 'by', label: 'By', cell: (answer) => answer.by ?? nothing },
  { key: 'heads', label: 'For files with heads', cell: (answer) => html`<code title=${answer.headsDigest}>${answer.headsDigest.slice(0, 12)}</code>` },
];

class BenchPage extends Page {
  static properties = { bench: { state: true }, tokens: { state: true }, refusal: { state: true }, answer: { state: true }, busy: { state: true }, pattern: { state: true }, tried: { state: true } };

  constructor() {
    super();
    /** @type {any} */
    this.bench = null;
    /** @type {any[]} */
    this.tokens = [];
    /** @type {import('../api.js').Answer | null} */
    this.refusal = null;
    /** @type {import('../api.js').Answer | null} the refusal of a change */
    this.answer = null;
    this.busy = false;
    this.pattern = '';
    this.tried = 'SN0042_hot_2026-11-30.csv';
    this.runs = new Listing(this, () => `/api/runs?bench=${this.params.id}`, { limit: 20 });
  }

  connectedCallback() {
    super.connectedCallback();
    void this.load();
  }

  async load() {
    const { signal } = this.leaving;
    const answer = await ask(`/api/benches/${encodeURIComponent(this.params.id)}`, { signal });
    this.refusal = answer.ok ? null : answer;
    if (!answer.ok)
      return;
    this.take(answer.body);
    this.entitle(`Bench ${answer.body.name}`);
    if (session.holds(may.manage))
      this.tokens = (await all('/api/tokens?limit=200', { signal })).items.filter((token) => token.benchId === this.params.id);
  }

  /** @param {any} bench */
  take(bench) {
    this.bench = bench;
    this.pattern = bench.serialPattern ?? '';
  }

  render() {
    if (this.bench === null)
      return html`<h1>Bench</h1><rl-refusal .answer=${this.refusal} @again=${this.load}></rl-refusal>${this.refusal === null ? html`<rl-busy label="Reading the bench"></rl-busy>` : html`<p><a href="/benches">All benches</a></p>`}`;
    const { bench } = this;
    return html`
      <div class="page-head">
        <h1>${bench.name}</h1>
        <p class="soft">Made ${moment(bench.createdAt)}${bench.lastSeenAt === null ? ', never heard of' : html`, last heard of ${when(bench.lastSeenAt, ' ago')}`}</p>
      </div>
      <div class="two">
        <section class="panel" aria-labelledby="settings"><h2 id="settings">Settings</h2>${session.holds(may.engineer) ? this.form() : this.settings()}</section>
        <div class="stack">
          <section class="panel" aria-labelledby="answers">
            <h2 id="answers">Answers kept</h2>
            <p class="soft">What somebody said of columns that a file left open. The bench applies it to files with the same heads; an answer that is given anew with a file stands in for the old one.</p>
            <rl-data-table cards caption="Answers kept" caption-unseen .columns=${answerColumns} .rows=${bench.columns} .keyOf=${(/** @type {any} */ answer) => answer.headsDigest} .empty=${html`<p class="soft">None yet: nothing was left open.</p>`}></rl-data-table>
          </section>
          ${session.holds(may.manage) ? html`
            <section class="panel" aria-labelledby="tokens">
              <h2 id="tokens">Tokens</h2>
              ${this.tokens.length === 0 ? html`<p class="soft">No token is bound to this bench.</p>` : html`<ul>${this.tokens.map((token) => html`<li>${token.name} <span class="soft">${stateOf(token, Date.now()).words}</span></li>`)}</ul>`}
              <p><a href="/tokens">All tokens</a></p>
            </section>` : nothing}
        </div>
      </div>
      <section class="panel" aria-labelledby="runs">
        <h2 id="runs">Last runs</h2>
        <rl-refusal .answer=${this.runs.refusal} @again=${() => this.runs.load()}></rl-refusal>
        <rl-data-table cards caption="Last runs" caption-unseen .columns=${runColumns} .rows=${this.runs.items ?? []} .href=${(/** @type {any} */ run) => `/runs/${run.id}`}
          ?more=${this.runs.next !== null} ?busy=${this.runs.busy} @more=${() => this.runs.more()} .empty=${this.runs.items === null ? nothing : html`<p class="soft">It has sent no run.</p>`}></rl-data-table>
      </section>`;
  }

  settings() {
    const { bench } = this;
    return html`
      <dl>
        <dt>Finds serial numbers by</dt><dd>${bench.serialPattern === null ? 'the part of the file\u2019s name before the first _' : html`<code>${bench.serialPattern}</code>`}</dd>
        <dt>Noise floor</dt><dd>${bench.noiseFloorDb === null ? 'not stated' : `${bench.noiseFloorDb} dB`}</dd>
        <dt>Remark</dt><dd>${bench.remark ?? 'none'}</dd>
      </dl>
      <p class="soft small">An engineer may change the pattern, a manager all of it.</p>`;
  }

  form() {
    const { bench } = this;
    const manages = session.holds(may.manage);
    const errors = this.answer?.errors ?? {};
    return html`
      <form class="fields" novalidate @submit=${this.submit} @input=${this.onInput}>
        <rl-field label="Pattern that finds the serial number" name="serialPattern" optional .value=${bench.serialPattern ?? ''} .errors=${errors.serialPattern}
          hint="A regular expression on the file's name: its group (?<serial>…), or all that it matches. Without one it is the part before the first _."></rl-field>
        <rl-field label="Try it on a file's name" name="tried" .value=${this.tried} .hint=${serialOf(this.tried, this.pattern)}></rl-field>
        <rl-field label="Noise floor in dB" name="noiseFloorDb" inputmode="text" optional ?disabled=${!manages} .value=${bench.noiseFloorDb === null ? '' : String(bench.noiseFloorDb)} .errors=${errors.noiseFloorDb}
          hint=${manages ? 'Under this level a phase is not believed, and is absent.' : 'A manager may change it.'}></rl-field>
        <rl-field label="Remark" name="remark" rows="3" optional ?disabled=${!manages} .value=${bench.remark ?? ''} .errors=${errors.remark} hint=${manages ? 'Place, instruments, dates of calibration.' : 'A manager may change it.'}></rl-field>
        ${this.answer === null || Object.keys(errors).length > 0 ? nothing : html`<p class="problem" role="alert">${this.answer.sentence}</p>`}
        <div><button type="submit" class="main" ?disabled=${this.busy}>Keep the settings</button></div>
      </form>`;
  }

  /** @param {Event} event */
  onInput(event) {
    const input = /** @type {HTMLInputElement} */ (event.target);
    if (input.name === 'tried') {
      this.tried = input.value;
      return;
    }

    if (input.name === 'serialPattern')
      this.pattern = input.value;
    beforeLeaving(() => confirm({ heading: 'Leave the bench?', sentence: 'The settings that you changed are not kept yet.', act: 'Leave', back: 'Stay' }));
  }

  /** @param {SubmitEvent} event */
  async submit(event) {
    event.preventDefault();
    const form = new FormData(/** @type {HTMLFormElement} */ (event.currentTarget));
    const pattern = String(form.get('serialPattern')).trim();
    /** @type {Record<string, unknown>} */
    const change = { serialPattern: pattern === '' ? null : pattern };
    if (session.holds(may.manage)) {
      const floor = String(form.get('noiseFloorDb')).trim();
      const read = floor === '' ? { value: null, problem: '' } : parseNumber(floor, 'dB');
      if (read.problem !== '') {
        this.answer = refused({ noiseFloorDb: read.problem });
        return;
      }

      const remark = String(form.get('remark')).trim();
      change.noiseFloorDb = read.value;
      change.remark = remark === '' ? null : remark;
    }

    this.busy = true;
    const answer = await send('PATCH', `/api/benches/${encodeURIComponent(this.params.id)}`, change);
    this.busy = false;
    this.answer = answer.ok ? null : answer;
    if (!answer.ok)
      return;
    beforeLeaving(null);
    this.take(answer.body);
    say('The settings are kept.');
  }
}

customElements.define('rl-page-bench', BenchPage);
