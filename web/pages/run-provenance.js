// Where a run comes from: its files, bench, people and circumstances, how it was read, whether it counts, and what was done to it.

import { html, nothing } from '../parts/element.js';
import { moment } from '../parts/when.js';
import { count, fileSize, frequency, quantity } from '../numbers.js';
import { purposeWords } from './send-place.js';
import { choiceWords } from './send-words.js';

const forms = /** @type {Record<string, string>} */ ({
  realImaginary: 'real and imaginary part', levelPhase: 'level and phase', ratioPhase: 'ratio and phase', level: 'level alone', ratio: 'ratio alone',
});

const circumstances = /** @type {Record<string, readonly [string, string]>} */ ({
  temperatureC: ['Temperature', '\u00b0C'], driveVrms: ['Drive', 'V'], sourceOhm: ['Source', '\u03a9'], loadOhm: ['Load', '\u03a9'],
});

/** Whether a run counts, and why not. @param {any} run */
export function standingWords(run) {
  switch (run.standing) {
    case 'counting': return 'It counts: it is the first valid run of its unit in this condition.';
    case 'retestsUsedUp': return 'It does not count: the number of retests that the device lets come to count is used up. The unit needs a disposition.';
    case 'retest': return 'It does not count: an earlier valid run of the unit in this condition does. It can come to count only after an engineer has invalidated that one.';
    case 'invalidated': return `It does not count: it is invalidated. Cause: ${run.invalidation.cause}.`;
    default: return `It does not count for a lot: its purpose is ${purposeWords[/** @type {keyof typeof purposeWords} */ (run.purpose)] ?? run.purpose}.`;
  }
}

/** @param {any} run */
export function provenanceOf(run) {
  const { reading } = run;
  return html`
    <dl class="provenance">
      <dt>Standing</dt><dd>${standingWords(run)}</dd>
      <dt>Measured</dt><dd>${moment(run.measuredAt)}</dd>
      <dt>Received</dt><dd>${moment(run.receivedAt)}, number ${count(run.receivedNo)}${run.receivedBy === null ? '' : `, from ${run.receivedBy}`}</dd>
      <dt>Bench</dt><dd><a href="/benches/${run.benchId}">${run.bench}</a></dd>
      <dt>Purpose</dt><dd>${purposeWords[/** @type {keyof typeof purposeWords} */ (run.purpose)] ?? run.purpose}</dd>
      <dt>Circumstances</dt><dd>${circumstancesOf(run.circumstances)}</dd>
      <dt>${run.files.length === 1 ? 'File' : 'Files'}</dt><dd>${run.files.map((/** @type {any} */ file, /** @type {number} */ i) => html`<p class="run-file"><a href="/api/runs/${run.id}/file${i === 0 ? '' : `?index=${i}`}" download>${file.name}</a>, ${fileSize(file.size)}<br><span class="soft small">SHA-256 <code>${file.sha256}</code></span></p>`)}</dd>
      <dt>Read as</dt><dd>reading ${reading.number} by the ${reading.reader === 'touchstone' ? 'Touchstone' : 'delimited text'} reader, version ${reading.readerVersion}: ${forms[reading.form] ?? reading.form}, ${count(reading.points)} points from ${frequency(reading.fromHz)} to ${frequency(reading.toHz)}</dd>
      ${reading.columns === null ? nothing : html`<dt>Columns</dt><dd>${choiceWords(reading.columns, []).join('; ')}</dd>`}
      <dt>Notes of the reader</dt><dd>${reading.notes.length === 0 ? html`<span class="soft">none</span>` : html`<ul class="plain-list">${reading.notes.map((/** @type {any} */ note) => html`<li>${note.message}</li>`)}</ul>`}</dd>
    </dl>`;
}

/** @param {any} given */
function circumstancesOf(given) {
  if (given === null || Object.keys(given).length === 0)
    return html`<span class="soft">none were stated</span>`;
  const parts = Object.entries(circumstances).flatMap(([name, [label, unit]]) => (given[name] === undefined ? [] : [`${label.toLowerCase()} ${unit === '\u00b0C' ? `${given[name]}\u00a0\u00b0C` : quantity(given[name], unit)}`]));
  const instruments = (given.instruments ?? []).map((/** @type {any} */ one) => (typeof one === 'string' ? one : Object.values(one).join(' ')));
  return [...parts, ...(instruments.length > 0 ? [`instruments ${instruments.join(', ')}`] : [])].join(', ');
}

/** What was done to a run since it was received, the oldest first; nothing where nothing was. @param {any} run */
export function historyOf(run) {
  const moves = run.reassignments ?? [];
  if (moves.length === 0 && run.invalidation === null)
    return html`<p class="soft">Nothing was changed since it was received.</p>`;
  const first = run.firstPlace;
  return html`
    <ol class="history">
      <li>${moment(run.receivedAt)}: received for ${placeWords(first)}${run.receivedBy === null ? '' : `, from ${run.receivedBy}`}.</li>
      ${moves.map((/** @type {any} */ move) => html`<li>${moment(move.at)}: reassigned to ${placeWords(move)} by ${move.by ?? 'somebody'}.<br><span class="soft">${move.reason}</span></li>`)}
      ${run.invalidation === null ? nothing : html`<li>${moment(run.invalidation.at)}: invalidated by ${run.invalidation.by ?? 'somebody'}. Cause: ${run.invalidation.cause}.<br><span class="soft">${run.invalidation.reason}</span></li>`}
    </ol>`;
}

/** @param {{ serial: string, lot: string | null, condition: string }} place */
function placeWords({ serial, lot, condition }) {
  return `unit ${serial}, ${lot === null ? 'no lot' : `lot ${lot}`}, condition ${condition}`;
}
