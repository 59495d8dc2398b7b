// The head of a lot's page: what the lot is, how it stands, and what speaks for and against its release.

import { html, nothing } from '../parts/element.js';
import { when } from '../parts/when.js';
import { age, count, percent, several } from '../numbers.js';
import { may, session } from '../session.js';
import { evidenceOf, filterOf } from './lot-state.js';
import '../parts/badges.js';
import '../parts/units-bar.js';

/** @typedef {import('./lot.js').LotPage} LotPage */

/** @param {LotPage} page @param {any} lot */
export function headOf(page, lot) {
  const opened = age(lot.createdAt, Date.now());
  return html`
    <div class="page-head">
      <div class="lot-name">
        <h1 tabindex="-1">Lot ${lot.number}</h1>
        <rl-lot-state state=${lot.state}></rl-lot-state>
        <p class="soft"><a href="/devices/${lot.deviceId}">${lot.partNumber} ${lot.revision}</a>, ${lot.title}. ${several(lot.size, 'unit')}, opened ${opened}${opened === 'just now' ? '' : ' ago'}${lot.lastRunAt === null ? nothing : html`, last run ${when(lot.lastRunAt, age(lot.lastRunAt, Date.now()) === 'just now' ? '' : ' ago')}`}.</p>
      </div>
      <div class="row">
        ${lot.state === 'open' && session.holds(may.operate) ? html`<a class="button" href="/send?lot=${lot.id}">Send files</a>` : nothing}
        ${lot.state === 'open' && session.holds(may.sign) ? html`<button type="button" class="main" @click=${page.signOff}>Sign off…</button>` : nothing}
        ${lot.state !== 'open' && session.holds(may.quality) ? html`<button type="button" @click=${page.reopen}>Reopen…</button>` : nothing}
      </div>
    </div>`;
}

/** How the units stand, and what the lot is judged by. @param {any} lot @param {any} device */
export function factsOf(lot, device) {
  const { firstPass, counts } = lot;
  return html`
    <section class="lot-facts" aria-label="How the units stand">
      <rl-units-bar .size=${lot.size} .counts=${counts}></rl-units-bar>
      <p class="small">${firstPass.tested === 0 ? 'Nothing is fully tested yet.'
    : html`First pass ${percent(firstPass.passed, firstPass.tested)} (${count(firstPass.passed)} of ${count(firstPass.tested)}), now ${percent(counts.passed, counts.tested)}.`}</p>
      <ul class="plain small">
        ${lot.conditions.map((/** @type {any} */ condition) => html`<li><strong>${condition.name}</strong>: ${basisOf(condition, device)}</li>`)}
      </ul>
    </section>`;
}

/** @param {any} condition @param {any} device */
function basisOf(condition, device) {
  const known = device?.conditions.find((/** @type {any} */ one) => one.id === condition.id);
  const golden = condition.goldenRunId === null ? 'no golden run'
    : html`golden <a href="/runs/${condition.goldenRunId}">${known?.golden?.runId === condition.goldenRunId ? known.golden.serial : 'pinned'}</a>`;
  const mask = condition.maskRevision === null ? html`<span class="problem">no mask is released</span>`
    : known?.maskRevision === condition.maskRevision ? html`<a href="/masks/${known.maskId}">mask revision ${condition.maskRevision}</a>` : `mask revision ${condition.maskRevision}`;
  return html`${mask}, ${golden}`;
}

/** @param {LotPage} page @param {any} lot @param {readonly any[]} units */
export function evidence(page, lot, units) {
  const { standing, words, pro, con } = evidenceOf(lot, units);
  const tone = { approve: 'good', concession: 'doubt', testing: '', not: 'bad' }[standing];
  return html`
    <section class="lot-standing ${tone}" aria-label="Recommendation">
      <p class="verdict-word">${words}</p>
      <p class="small soft">${session.holds(may.sign) ? nextStep(standing, lot) : 'An engineer or the role quality signs.'}</p>
    </section>
    <section class="lot-pro" aria-labelledby="lot-pro">
      <h2 id="lot-pro">For release</h2>
      ${pro.length === 0 ? html`<p class="small soft">Nothing yet.</p>` : points(page, pro, 'good', () => '\u2713')}
    </section>
    <section class="lot-con" aria-labelledby="lot-con">
      <h2 id="lot-con">Against release</h2>
      ${con.length === 0 ? html`<p class="small soft">Nothing.</p>` : points(page, con, 'bad', ({ blocks }) => (blocks ? '\u2717' : '!'))}
    </section>`;
}

/** @param {import('./lot-state.js').Standing} standing @param {any} lot */
function nextStep(standing, { stale }) {
  if (standing === 'approve')
    return 'Look the evidence through, then sign.';
  if (standing === 'concession')
    return 'Sign it as an approval with concession, and say why.';
  if (stale > 0)
    return 'Verdicts are being evaluated again. This page follows.';
  return standing === 'testing' ? 'Send what is to test; then decide.' : 'Give each unit that does not pass a disposition, or reject the lot.';
}

/** @param {LotPage} page @param {readonly import('./lot-state.js').Point[]} given @param {string} tone @param {(point: import('./lot-state.js').Point) => string} signOf */
function points(page, given, tone, signOf) {
  return html`
    <ul class="points ${tone}">
      ${given.map((point) => {
        const { sentence } = point;
        const filter = filterOf(point.code);
        const sign = signOf(point);
        return html`<li class=${sign === '!' ? 'known' : ''}><span class="sign" aria-hidden="true">${sign}</span><span>${sentence}${filter === null ? nothing
          : html` <button type="button" class="plain link" @click=${() => page.filterUnits(filter)}>Show ${filter === 'open' ? 'them' : 'these units'}</button>`}</span></li>`;
      })}
    </ul>`;
}

/** Where there is no lot under the address. */
export const noLot = () => html`<div class="empty"><h1>There is no such lot</h1><p>The address may be mistyped, or the lot stands in another store.</p><a class="button main" href="/lots">Go to the lots</a></div>`;
