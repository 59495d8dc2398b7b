// What the list says of a lot, column by column.

import { lotStates } from '../parts/badges.js';
import { html, nothing } from '../parts/element.js';
import { when } from '../parts/when.js';
import { age, count, frequency, margin, percent, several } from '../numbers.js';
import '../parts/badges.js';
import '../parts/units-bar.js';

/** @typedef {import('../parts/data-table.js').Column<any>} Column */

/** Whether nothing is left to test, so that somebody has to decide. @param {any} lot */
export function waits(lot) {
  return lot.counts.tested >= lot.size || !lot.blockers.some((/** @type {{ code: string }} */ blocker) => blocker.code === 'unitsNotPassed');
}

/** @type {Column} */
const lotColumn = { key: 'number', label: 'Lot', head: true, sort: (lot) => lot.number, cell: (lot) => lot.number };

/** @type {Column} */
const deviceColumn = {
  key: 'device',
  label: 'Device',
  sort: (lot) => `${lot.partNumber} ${lot.revision}`,
  cell: (lot) => html`<span class="nowrap">${lot.partNumber} ${lot.revision}</span><br><span class="soft small">${lot.title}</span>`,
};

/** @type {Column} */
const unitsColumn = { key: 'units', label: 'Units', sort: (lot) => lot.counts.passed / lot.size, cell: (lot) => html`<rl-units-bar .size=${lot.size} .counts=${lot.counts}></rl-units-bar>` };

/** @type {Column} */
const firstPassColumn = {
  key: 'firstPass',
  label: 'First pass',
  sort: ({ firstPass }) => (firstPass.tested === 0 ? null : firstPass.passed / firstPass.tested),
  cell: ({ firstPass }) => (firstPass.tested === 0
    ? html`<span class="soft">nothing tested</span>`
    : html`<span class="nowrap">${percent(firstPass.passed, firstPass.tested)}</span><br><span class="soft small nowrap">${count(firstPass.passed)} of ${count(firstPass.tested)}</span>`),
};

/** @type {Column} */
const worstColumn = {
  key: 'worst',
  label: 'Worst margin',
  sort: ({ worst }) => worst?.margin,
  cell: ({ worst }) => {
    if (worst === null)
      return html`<span class="soft">nothing judged</span>`;
    const tone = worst.outcome === 'pass' || worst.outcome === 'conditionalPass' ? '' : worst.outcome === 'inconclusive' ? 'in-doubt' : 'against';
    return html`
      <span class="worst ${tone}">${worst.margin === null ? 'no margin' : margin(worst.margin, worst.unit)}</span><br>
      <span class="soft small">${[worst.criterion, ...(worst.frequencyHz === null ? [] : [frequency(worst.frequencyHz)]), worst.serial].join(' \u00b7 ')}</span>`;
  },
};

/** The columns of open lots. @param {boolean} waiting @returns {readonly Column[]} */
export function openColumns(waiting) {
  return [
    lotColumn,
    deviceColumn,
    unitsColumn,
    firstPassColumn,
    worstColumn,
    waiting
      ? { key: 'age', label: 'Waits', sort: (lot) => ageMs(lot.lastRunAt ?? lot.createdAt), cell: (lot) => html`${when(lot.lastRunAt ?? lot.createdAt)}${opened(lot)}` }
      : { key: 'age', label: 'Last run', sort: (lot) => ageMs(lot.lastRunAt ?? lot.createdAt), cell: (lot) => html`${lot.lastRunAt === null ? html`<span class="soft">none</span>` : when(lot.lastRunAt)}${opened(lot)}` },
    { key: 'blockers', label: 'Stands against approval', cell: blockersOf },
  ];
}

/** @type {readonly Column[]} */
export const decidedColumns = [
  lotColumn,
  deviceColumn,
  unitsColumn,
  firstPassColumn,
  worstColumn,
  { key: 'signed', label: 'Signed', sort: (lot) => ageMs(lot.decision.signedAt), cell: ({ decision }) => html`${when(decision.signedAt)}<br><span class="soft small">${decision.signedBy.name}</span>` },
  { key: 'state', label: 'Decision', sort: (lot) => lotStates[lot.state]?.words, cell: (lot) => html`<rl-lot-state state=${lot.state}></rl-lot-state>` },
];

/** @param {string} time */
function ageMs(time) {
  return Date.now() - Date.parse(time);
}

/** @param {any} lot */
function opened(lot) {
  return html`<br><span class="soft small nowrap">opened ${age(lot.createdAt, Date.now())}${age(lot.createdAt, Date.now()) === 'just now' ? '' : ' ago'}</span>`;
}

/** @param {any} lot */
function blockersOf(lot) {
  if (lot.blockers.length === 0)
    return html`<span class="ready">nothing: it can be approved</span>`;
  return html`<ul class="blockers">${lot.blockers.map((/** @type {any} */ blocker) => html`<li>${shortly(blocker, lot)}</li>`)}</ul>`;
}

/** @param {{ code: string, sentence: string }} blocker @param {any} lot */
function shortly(blocker, lot) {
  const { counts, size } = lot;
  const unreleased = lot.conditions.filter((/** @type {any} */ condition) => condition.maskRevision === null);
  switch (blocker.code) {
    case 'unitsNotPassed': return notPassed(counts, size);
    case 'noReleasedMask': return unreleased.length === lot.conditions.length ? 'no mask is released' : `no mask for ${unreleased.map((/** @type {any} */ condition) => condition.name).join(', ')}`;
    case 'verdictsStale': return `${several(lot.stale, 'verdict')} being evaluated again`;
    case 'concessionNeeded': return `${several(counts.conceded, 'unit')} under concession`;
    case 'moreUnitsThanSize': return `${several(counts.units, 'unit')} for a size of ${count(size)}`;
    case 'needsTwoSigners': return 'the device asks for two signers';
    default: return blocker.sentence;
  }
}

/** @param {{ tested: number, failed: number, inconclusive: number }} counts @param {number} size */
function notPassed(counts, size) {
  const parts = [
    counts.failed > 0 ? `${several(counts.failed, 'unit fails', 'units fail')}` : '',
    counts.inconclusive > 0 ? `${count(counts.inconclusive)} inconclusive` : '',
    size > counts.tested ? `${count(size - counts.tested)} to test` : '',
  ].filter((part) => part !== '');
  return parts.length === 0 ? 'units do not pass yet' : parts.join(', ') || nothing;
}
