// A verdict criterion by criterion: how it came out, its margin, and where that lies.

import { outcomes } from '../parts/badges.js';
import { html, nothing } from '../parts/element.js';
import { frequency, margin } from '../numbers.js';

/** @typedef {import('../parts/data-table.js').Column<any>} Column */

// The worst first.
const order = ['fail', 'inconclusive', 'conditionalFail', 'conditionalPass', 'pass'];

/** @param {(frequencyHz: number) => void} moveTo   moves the cursor @returns {readonly Column[]} */
export function criterionColumns(moveTo) {
  return [
    {
      key: 'name', label: 'Criterion', head: true, sort: (criterion) => criterion.name,
      cell: (criterion) => html`${criterion.name}${criterion.explanation ? html`<br><span class="small soft">${criterion.explanation}</span>` : nothing}${(criterion.notes ?? []).map((/** @type {any} */ note) => html`<br><span class="small soft">${note.message}</span>`)}`,
    },
    { key: 'outcome', label: 'Outcome', sort: (criterion) => order.indexOf(criterion.outcome), cell: (criterion) => html`<rl-outcome outcome=${criterion.outcome}></rl-outcome>` },
    { key: 'margin', label: 'Margin', number: true, sort: (criterion) => criterion.margin, cell: (criterion) => html`<span class="nowrap ${tone(criterion)}">${margin(criterion.margin, criterion.unit)}</span>` },
    {
      key: 'where', label: 'Where', number: true, sort: (criterion) => criterion.frequencyHz,
      cell: (criterion) => (criterion.frequencyHz === null ? nothing : html`<button type="button" class="plain nowrap" title="Move the cursor there" @click=${() => moveTo(criterion.frequencyHz)}>${frequency(criterion.frequencyHz, 5)}</button>`),
    },
  ];
}

/** @param {any} criterion */
function tone(criterion) {
  const { tone: word } = outcomes[criterion.outcome] ?? { tone: '' };
  return word === 'bad' ? 'against' : word === 'doubt' ? 'in-doubt' : '';
}

/** The criteria, the worst first. @param {readonly any[]} criteria */
export function worstFirst(criteria) {
  return [...criteria].sort((a, b) => order.indexOf(a.outcome) - order.indexOf(b.outcome) || (a.margin ?? Infinity) - (b.margin ?? Infinity));
}
