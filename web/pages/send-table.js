// The columns of the table of files: what a file is, where it belongs, what was read in it, and how it stands.

import { guard } from 'lit/directives/guard.js';
import { badge } from '../parts/badges.js';
import { html, nothing } from '../parts/element.js';
import { dayAndTime, fileSize, frequency, margin, several } from '../numbers.js';
import { lacking, measuredAt, placeOf, serialOf, serialProblem, stageOf, whereOf } from './send-rows.js';
import { foundWords, spanWords } from './send-words.js';
import '../plots/mini-plot.js';

/** @typedef {import('./send-rows.js').Row} Row */
/** @typedef {import('./send-rows.js').Place} Place */
/** @typedef {import('../parts/data-table.js').Column<Row>} Column */

/**
 * What the columns need of their page.
 * @typedef {object} TableOf
 * @property {Place} place
 * @property {ReadonlySet<number>} behind   rows that repeat a serial number
 * @property {(deviceId: string) => any} deviceOf
 * @property {(lotId: string) => any} lotOf
 * @property {(row: Row) => void} look
 * @property {(row: Row, serial: string) => void} typeSerial
 * @property {(row: Row) => void} askColumns
 * @property {(row: Row) => void} askSameBytes
 * @property {(row: Row) => void} sendAgain
 * @property {(row: Row) => void} readAgain
 */

/**
 * A cell is drawn anew only where its row, or what all rows share, is another one.
 * @param {TableOf} page
 * @param {readonly unknown[]} shared
 * @returns {readonly Column[]}
 */
export function fileColumns(page, shared) {
  return columnsOf(page).map((column) => ({ ...column, cell: (row) => guard([row, page.behind.has(row.id), ...shared], () => column.cell(row)) }));
}

/** @param {TableOf} page @returns {readonly Column[]} */
function columnsOf(page) {
  return [
    { key: 'name', label: 'File', head: true, cell: (row) => html`<button type="button" class="plain file-name" title="Look at ${row.name}" @click=${() => page.look(row)}>${row.name}</button><span class="soft small">${fileSize(row.file.size)}</span>` },
    { key: 'serial', label: 'Serial', cell: (row) => serialCell(row, page) },
    { key: 'place', label: 'Lot and condition', cell: (row) => placeCell(row, page) },
    { key: 'measured', label: 'Measured', cell: (row) => measuredCell(row, page) },
    { key: 'found', label: 'Found in it', cell: (row) => foundCell(row) },
    { key: 'curve', label: 'Curve', cell: (row) => (row.preview?.trace ? html`<rl-mini-plot .trace=${row.preview.trace}></rl-mini-plot>` : nothing) },
    { key: 'stage', label: 'State', cell: (row) => stageCell(row, page) },
  ];
}

/** @param {Row} row @param {TableOf} page */
function serialCell(row, page) {
  const serial = serialOf(row);
  if (!maySend(row, page.place))
    return html`<span class=${row.result === null ? 'soft' : ''}>${row.result?.serial ?? serial}</span>`;
  const problem = serialProblem(serial);
  return html`
    <input class="serial" aria-label="Serial number of ${row.name}" autocomplete="off" spellcheck="false" .value=${row.serial ?? row.guess} aria-invalid=${problem === '' ? 'false' : 'true'}
      title=${problem === '' ? nothing : problem} @change=${(/** @type {Event} */ event) => page.typeSerial(row, /** @type {HTMLInputElement} */ (event.target).value)}>
    ${problem === '' ? nothing : html`<span class="problem">${serial === '' ? 'not in the name: type it' : problem}</span>`}
    ${page.behind.has(row.id) ? html`<span class="soft small" title="An earlier file here is for the same unit. Only the first counts; this one is kept as a retest.">second file of the unit: a retest</span>` : nothing}`;
}

/** @param {Row} row @param {Place} place */
function maySend(row, place) {
  return !['unreadable', 'queued', 'sending', 'accepted', 'duplicate'].includes(stageOf(row, place));
}

/** @param {Row} row @param {TableOf} page */
function placeCell(row, page) {
  const place = placeOf(row, page.place);
  const device = page.deviceOf(place.deviceId);
  const condition = device?.conditions.find((/** @type {any} */ one) => one.id === place.conditionId) ?? device?.conditions[0];
  const lot = page.lotOf(place.lotId);
  const missing = lacking(row, page.place);
  const own = Object.keys(row.own).filter((name) => name !== 'measured' && name !== 'measuredAt').length > 0;
  return html`
    <span class=${lot === undefined && missing.lotId !== undefined ? 'soft' : ''}>${lot?.number ?? (place.purpose === 'production' ? 'no lot yet' : place.purpose)}</span>
    ${condition === undefined ? nothing : html`<br><span class="soft small">${condition.name}${place.purpose !== 'production' && lot !== undefined ? `, ${place.purpose}` : ''}</span>`}
    ${own ? html`<br><span class="small">differs for this file</span>` : nothing}`;
}

/** @param {Row} row @param {TableOf} page */
function measuredCell(row, page) {
  const at = measuredAt(row, page.place);
  return at === '' ? html`<span class="soft">when received</span>` : html`<span class="nowrap">${dayAndTime(at)}</span>`;
}

/** @param {Row} row */
function foundCell(row) {
  const { preview } = row;
  if (preview === null)
    return row.problem === '' ? html`<span class="soft">not read yet</span>` : html`<span class="soft">nothing</span>`;
  const remarks = preview.notes.length + (preview.trace?.notes.filter((/** @type {any} */ note) => note.code !== 'reduced').length ?? 0);
  return html`
    <span class="small">${foundWords(preview)}</span>
    ${preview.trace === null ? nothing : html`<br><span class="soft small">${spanWords(preview)}${remarks > 0 ? ', ' : ''}</span>`}
    ${remarks > 0 ? html`<span class="soft small" title=${preview.notes.map((/** @type {any} */ note) => note.message).join('\n')}>${several(remarks, 'note')}${row.columnsFrom === 'bench' ? ', columns as the bench remembers' : row.columnsFrom === 'asked' ? ', columns as chosen' : ''}</span>` : nothing}`;
}

/** @param {Row} row @param {TableOf} page */
function stageCell(row, page) {
  const stage = stageOf(row, page.place);
  switch (stage) {
    case 'reading': return html`<span class="soft">${row.read === 'reading' ? 'being read' : 'waits to be read'}</span>`;
    case 'unreadable': return html`${badge({ sign: '\u2717', words: 'refused', tone: 'bad' })}${issuesOf(row, page)}${row.problem === '' ? nothing : html` <button type="button" class="plain" @click=${() => page.readAgain(row)}>Read it again</button>`}`;
    case 'open': return html`${badge({ sign: '?', words: 'columns open', tone: 'doubt' })}<br><button type="button" @click=${() => page.askColumns(row)}>Say what they are</button>`;
    case 'lacking': return html`${badge({ sign: '\u2026', words: 'lacks something', tone: 'doubt' })}<br><span class="small">${lacking(row, page.place).serial ?? Object.values(lacking(row, page.place))[0]}</span>`;
    case 'placeless': return html`<span class="soft">waits for its place</span>`;
    case 'ready': return html`${badge({ sign: '\u25cb', words: 'ready', tone: '' })}`;
    case 'queued': return html`<span class="soft">waits to be sent</span>`;
    case 'sending': return html`<progress max="1" .value=${row.progress} aria-label="Sending ${row.name}"></progress><span class="soft small">${row.progress >= 1 ? 'being judged' : 'being sent'}</span>`;
    case 'sameBytes': return html`${badge({ sign: '?', words: 'same bytes', tone: 'doubt' })}${issuesOf(row, page)}<button type="button" @click=${() => page.askSameBytes(row)}>Answer</button>`;
    case 'refused': return html`${badge({ sign: '\u2717', words: 'refused', tone: 'bad' })}${issuesOf(row, page)}<button type="button" class="plain" @click=${() => page.sendAgain(row)}>Send again</button>`;
    default: return takenCell(row);
  }
}

/** @param {Row} row */
function takenCell(row) {
  const result = /** @type {import('./send-rows.js').Result} */ (row.result);
  const { worst } = result.verdict ?? { worst: null };
  const retest = result.notes.find((note) => note.code === 'retestDoesNotCount');
  return html`
    ${result.verdict === null ? badge({ sign: '\u2013', words: 'no mask', tone: '' }) : html`<rl-outcome outcome=${result.verdict.outcome}></rl-outcome>`}
    ${result.outcome === 'duplicate' ? badge({ sign: '=', words: 'duplicate', tone: 'aside' }) : nothing}
    ${worst === null ? nothing : html`<br><span class="small" title=${worst.criterion}>${worst.margin === null ? worst.explanation ?? 'no margin' : margin(worst.margin, worst.unit)}${worst.frequencyHz === null ? '' : ` at ${frequency(worst.frequencyHz)}`}</span>`}
    ${result.verdict === null ? html`<br><span class="soft small">No mask is released, so it is not judged.</span>` : nothing}
    ${retest === undefined ? nothing : html`<br><span class="small" title=${retest.message}>a retest: it does not count</span>`}
    ${result.outcome === 'duplicate' ? html`<br><span class="soft small">The same bytes are there already; nothing changed.</span>` : nothing}
    <br><a href="/runs/${result.runId}">See the run</a>`;
}

/** The first of a row's issues, and the way to the others. @param {Row} row @param {TableOf} page */
function issuesOf(row, page) {
  const issues = row.result?.issues ?? row.preview?.issues ?? [];
  const whole = Math.max(issues.length, row.result === null ? row.preview?.issueCount ?? 0 : 0);
  const first = issues[0];
  const said = row.result?.issues.some(({ code }) => code === 'sameFileOtherUnit') ? `${first.message.split('. ')[0]}.` : first === undefined ? row.problem : `${first.line === null ? '' : `${capital(whereOf(first))}: `}${first.message}`;
  return html`<br><span class="small issue">${said}</span>${whole > 1 ? html` <button type="button" class="plain" @click=${() => page.look(row)}>All ${whole}</button>` : nothing} `;
}

/** @param {string} text */
function capital(text) {
  return text[0].toUpperCase() + text.slice(1);
}
