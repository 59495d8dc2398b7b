// The units of a lot: the table beside the plot, and the unit that is chosen, with all its runs.

import { guard } from 'lit/directives/guard.js';
import { html, nothing } from '../parts/element.js';
import { badge } from '../parts/badges.js';
import { moment } from '../parts/when.js';
import { margin, several } from '../numbers.js';
import { may, session } from '../session.js';
import { filtersOf, fittingUnits, placeOf, unnamed } from './lot-state.js';
import '../parts/badges.js';
import '../parts/data-table.js';
import '../parts/field.js';

/** @typedef {import('./lot.js').LotPage} LotPage */
/** @typedef {import('../parts/data-table.js').Column<any>} Column */

/** @type {Readonly<Record<string, { words: string, sign: string, means: string }>>} */
export const dispositions = {
  rework: { words: 'rework', sign: '\u21bb', means: 'It is mended and tested again. Until then it is withdrawn from the lot.' },
  scrap: { words: 'scrap', sign: '\u2298', means: 'It is withdrawn from the lot for good.' },
  return: { words: 'return', sign: '\u21a9', means: 'It goes back to its supplier, and is withdrawn from the lot.' },
  concession: { words: 'concession', sign: '(\u2713)', means: 'It ships as it is. The lot can then only be approved with concession.' },
};

/** @param {readonly any[]} conditions @returns {readonly Column[]} */
function columnsOf(conditions) {
  const named = new Map(conditions.map((condition) => [condition.id, condition.name]));
  return [
    { key: 'serial', label: 'Unit', head: true, sort: (unit) => unit.serial, cell: (unit) => unit.serial },
    { key: 'outcome', label: 'Outcome', sort: (unit) => unit.outcome ?? 'z', cell: outcomeOf },
    { key: 'margin', label: 'Margin', number: true, sort: (unit) => unit.rank, cell: ({ worst }) => (worst === null ? html`<span class="soft" title="Nothing is judged.">\u2013</span>` : marginOf(worst)) },
    { key: 'criterion', label: 'Worst criterion', cell: (unit) => html`${placeOf(unit.worst)}${conditions.length > 1 && unit.worst !== null ? html` <span class="soft">(${named.get(decidingOf(unit))})</span>` : nothing}${marksOf(unit)}` },
  ];
}

/** The condition that decides how a unit stands. @param {any} unit */
const decidingOf = (unit) => unit.conditions.find((/** @type {any} */ condition) => condition.runId === unit.runId)?.conditionId;

/** @param {{ margin: number | null, unit: string, outcome: string }} worst */
function marginOf(worst) {
  const tone = worst.outcome === 'pass' || worst.outcome === 'conditionalPass' ? '' : worst.outcome === 'inconclusive' ? 'in-doubt' : 'against';
  return html`<span class="worst ${tone}" title=${worst.margin === null ? 'The criterion could not be worked out, so there is no margin.' : nothing}>${worst.margin === null ? '\u2013' : margin(worst.margin, worst.unit)}</span>`;
}

/** @param {any} unit */
function outcomeOf(unit) {
  if (unit.runs === 0 || unit.conditions.every((/** @type {any} */ condition) => condition.runId === null))
    return badge({ sign: '\u25cb', words: 'untested', tone: '' });
  return html`<rl-outcome outcome=${unit.outcome ?? nothing}></rl-outcome>`;
}

/** Disposition, retests and invalidated runs of a unit, as words. @param {any} unit */
function marksOf(unit) {
  const missing = unit.conditions.filter((/** @type {any} */ condition) => condition.runId === null);
  const marks = [
    ...(unit.disposition === null ? [] : [unit.disposition.disposition]),
    ...(missing.length > 0 && missing.length < unit.conditions.length ? [`${missing.map((/** @type {any} */ condition) => condition.name).join(', ')} to test`] : []),
    ...(unit.invalidated > 0 ? [`${several(unit.invalidated, 'run')} invalidated`] : []),
    ...(unit.retests > 0 ? [`${several(unit.retests, 'retest')}`] : []),
  ];
  return marks.length === 0 ? nothing : html` <span class="marks">${marks.join(' \u00b7 ')}${unit.disposition === null ? nothing : html`<span class="print-only">: ${unit.disposition.reason}</span>`}</span>`;
}

/** @param {LotPage} page @param {any} lot @param {readonly any[]} units */
export function unitsPanel(page, lot, units) {
  const { state } = page;
  const more = unnamed(lot);
  return html`
    <section class="panel lot-units" aria-labelledby="lot-units">
      <div class="lot-units-head">
        <h2 id="lot-units">Units</h2>
        <input type="search" aria-label="Find a unit by its serial number" placeholder="find a serial number" .value=${state.find} @input=${page.onFind}>
      </div>
      <div class="chips" role="group" aria-label="Which units">
        ${filtersOf(lot, units, state.units).map(({ filter, words, count }) => html`
          <button type="button" aria-pressed=${filter === state.units ? 'true' : 'false'} ?disabled=${count === 0 && filter !== state.units} @click=${() => page.filterUnits(filter)}>${words} <span class="count">${count}</span></button>`)}
      </div>
      <rl-data-table pickable caption="Units of the lot" caption-unseen sort="margin" .columns=${guard([lot], () => columnsOf(lot.conditions))}
        .rows=${guard([units, state.units, state.find], () => fittingUnits(units, state.units, state.find))} .keyOf=${keyOf} .chosen=${state.unit === '' ? null : state.unit}
        .empty=${guard([units, state.units], () => noUnit(page, units))}
        @pick=${page.onPickUnit} @row-hover=${page.onRowHover}></rl-data-table>
      ${more === '' || state.units === 'failing' || state.units === 'inconclusive' ? nothing : html`<p class="small soft">${more}</p>`}
    </section>`;
}

/** @param {LotPage} page @param {readonly any[]} units */
function noUnit(page, units) {
  return units.length === 0 ? html`<p class="soft">No unit is known yet: units come in with their first run.</p>`
    : html`<p class="soft">No unit that is known fits. <button type="button" class="plain link" @click=${() => page.filterUnits('all')}>Show all</button></p>`;
}

/** @param {any} unit */
const keyOf = (unit) => unit.serial;

/**
 * The chosen unit with its runs, those that do not count too, and what can be done.
 * @param {LotPage} page @param {any} lot @param {any} unit @param {readonly any[] | null} runs   null while they are read
 */
export function unitPanel(page, lot, unit, runs) {
  const isOpen = lot.state === 'open';
  const counting = unit.conditions.filter((/** @type {any} */ condition) => condition.runId !== null);
  const passes = unit.outcome === 'pass' || unit.outcome === 'conditionalPass';
  const shownRun = page.chosenRunId ?? counting[0]?.runId ?? null;
  return html`
    <section class="panel lot-unit" aria-labelledby="lot-unit">
      <div class="row apart">
        <h2 id="lot-unit">Unit ${unit.serial}</h2>
        <button type="button" class="plain" @click=${() => page.chooseUnit('')}>Close</button>
      </div>
      ${unit.disposition === null ? nothing : html`<p><span class="badge aside"><span aria-hidden="true">${dispositions[unit.disposition.disposition]?.sign}</span>${unit.disposition.disposition}</span> ${unit.disposition.reason}</p>`}
      ${runs === null ? html`<rl-busy label="Reading the unit's runs"></rl-busy>` : runs.length === 0 ? html`<p class="soft">It has no run in this lot.</p>` : html`<ul class="runs">${runs.map((run) => runLine(run, lot))}</ul>`}
      <div class="row">
        ${shownRun === null ? nothing : html`<a class="button" href="/runs/${shownRun}">Open the run</a>`}
        ${isOpen && !passes && session.holds(may.sign) ? html`<button type="button" @click=${() => page.dispose(unit)}>Disposition…</button>` : nothing}
        ${isOpen && counting.length > 0 && session.holds(may.engineer) ? html`<button type="button" ?disabled=${runs === null} @click=${() => page.invalidate(unit)}>Invalidate a run…</button>` : nothing}
      </div>
    </section>`;
}

/** @param {any} run @param {any} lot */
function runLine(run, lot) {
  return html`
    <li>
      <a href="/runs/${run.id}">${moment(run.measuredAt)}</a>${lot.conditions.length > 1 ? html` ${run.condition}` : nothing}
      ${run.standing === 'invalidated' ? badge({ sign: '\u2298', words: 'invalidated', tone: 'aside' }) : html`<rl-outcome outcome=${run.outcome ?? nothing}></rl-outcome>`}
      <span class="soft">${standingWords(run)}</span>
      ${run.worst === null || run.standing === 'invalidated' ? nothing : html`<span class="soft nowrap">${run.worst.margin === null ? 'no margin' : `${margin(run.worst.margin, run.worst.unit)}`}, ${placeOf(run.worst)}</span>`}
      ${run.invalidation === null ? nothing : html`<span class="cause">${run.invalidation.cause}: ${run.invalidation.reason}</span>`}
    </li>`;
}

/** @param {any} run */
function standingWords(run) {
  switch (run.standing) {
    case 'counting': return `counts, ${run.bench}`;
    case 'retest': return `retest, does not count, ${run.bench}`;
    case 'retestsUsedUp': return `retest beyond the number allowed, does not count, ${run.bench}`;
    default: return `does not count, ${run.bench}`;
  }
}

