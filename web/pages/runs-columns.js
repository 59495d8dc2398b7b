// What the list says of a run, column by column.

import { badge } from '../parts/badges.js';
import { html, nothing } from '../parts/element.js';
import { moment } from '../parts/when.js';
import { frequency, margin } from '../numbers.js';
import '../parts/badges.js';

/** @typedef {import('../parts/data-table.js').Column<any>} Column */

/**
 * @param {ReadonlySet<string>} picked   ids
 * @param {(run: any, isPicked: boolean) => void} pick
 * @returns {readonly Column[]}
 */
export function runColumns(picked, pick) {
  return [
    { key: 'pick', label: 'Pick', cell: (run) => html`<input type="checkbox" aria-label="Pick the run of ${run.serial} of ${run.measuredAt.slice(0, 16).replace('T', ' ')}" .checked=${picked.has(run.id)} @change=${(/** @type {Event} */ event) => pick(run, /** @type {HTMLInputElement} */ (event.target).checked)}>` },
    { key: 'serial', label: 'Unit', head: true, sort: (run) => run.serial, cell: (run) => run.serial },
    { key: 'device', label: 'Device', sort: (run) => `${run.partNumber} ${run.revision}`, cell: (run) => html`<span class="nowrap">${run.partNumber} ${run.revision}</span>` },
    { key: 'lot', label: 'Lot', sort: (run) => run.lotNumber, cell: (run) => html`${run.lotNumber ?? html`<span class="soft">none</span>`}<br><span class="soft small">${run.condition}</span>` },
    { key: 'bench', label: 'Bench', sort: (run) => run.bench, cell: (run) => run.bench },
    { key: 'measured', label: 'Measured', sort: (run) => Date.parse(run.measuredAt), cell: (run) => moment(run.measuredAt) },
    { key: 'outcome', label: 'Verdict', sort: (run) => run.outcome, cell: verdictCell },
    { key: 'worst', label: 'Least margin', sort: (run) => run.worst?.margin, cell: worstCell },
    { key: 'standing', label: 'Counts', sort: (run) => run.standing, cell: standingCell },
  ];
}

/** @param {any} run */
function verdictCell(run) {
  if (run.outcome !== null)
    return html`<rl-outcome outcome=${run.outcome}></rl-outcome>`;
  return run.outcomeReason === 'pending' ? badge({ sign: '\u2026', words: 'being judged', tone: '' }) : badge({ sign: '\u2013', words: 'no mask', tone: '' });
}

/** @param {any} run */
function worstCell({ worst, outcome }) {
  if (worst === null)
    return outcome === null ? nothing : html`<span class="soft">\u2013</span>`;
  return html`<span class="nowrap">${worst.margin === null ? 'no margin' : margin(worst.margin, worst.unit)}</span><br><span class="soft small">${worst.criterion}${worst.frequencyHz === null ? '' : `, ${frequency(worst.frequencyHz)}`}</span>`;
}

/** @param {any} run */
function standingCell(run) {
  switch (run.standing) {
    case 'counting': return 'yes';
    case 'retestsUsedUp': return html`<span class="soft" title="The device's number of retests is used up.">retest</span>`;
    case 'retest': return html`<span class="soft" title="An earlier valid run of the unit counts.">retest</span>`;
    case 'invalidated': return html`<span title=${run.invalidation.cause}>invalidated</span>`;
    default: return html`<span class="soft">${run.purpose}</span>`;
  }
}
