// Above the table of files: how far sending is, what can be done, and the questions that many files share.

import { html, nothing } from '../parts/element.js';
import { several } from '../numbers.js';
import { batch } from './send-batch.js';
import { groupOf, lacking, openGroups, outcomeSentence, stageOf } from './send-rows.js';

/** @typedef {import('./send-rows.js').Row} Row */
/** @typedef {import('./send-rows.js').Group} Group */

/**
 * What can be done now, and how far it is.
 * @param {Row[]} rows
 * @param {Record<Group, number>} counts
 * @param {{ tried: boolean, hasDevices: boolean, lotNumber: string, send: () => void }} page
 */
export function barOf(rows, counts, { tried, hasDevices, lotNumber, send }) {
  const queue = batch.sending;
  const over = counts.sent + rows.filter((row) => ['refused', 'sameBytes'].includes(stageOf(row, batch.place))).length;
  const sendable = counts.ready + counts.placeless;
  if (queue.length > 0) {
    const whole = queue.length + over;
    const part = rows.reduce((sum, row) => sum + (row.sent === 'sending' ? row.progress : 0), over) / whole;
    return html`
      <section class="panel send-bar" aria-label="Sending">
        <div class="grows"><p>${several(queue.length, 'file')} to go. ${outcomeSentence(rows, batch.place)}</p><progress max="1" .value=${part} aria-label="Sent"></progress>${trouble(queue)}</div>
        <button type="button" @click=${() => batch.stop()}>Stop</button>
      </section>`;
  }

  return html`
    <section class="panel send-bar" aria-label="Sending">
      <div class="grows">
        ${over > 0 ? html`<p role="status">${outcomeSentence(rows, batch.place)}</p>` : nothing}
        ${counts.reading > 0 ? html`<p class="soft">${several(counts.reading, 'file is', 'files are')} being read.</p>${trouble(batch.previews)}` : nothing}
        ${counts.placeless > 0 && hasDevices ? html`<p>${several(counts.placeless, 'file lacks', 'files lack')} ${missingWords(rows)}: give it above.</p>` : nothing}
        ${counts.asks > 0 && tried ? html`<p>${several(counts.asks, 'file asks', 'files ask')} you something first; the others can go.</p>` : nothing}
      </div>
      ${over > 0 && batch.place.lotId !== '' ? html`<a class="button" href="/lots/${batch.place.lotId}">Go to lot ${lotNumber}</a>` : nothing}
      ${counts.sent > 0 ? html`<button type="button" @click=${() => batch.remove(batch.rows.filter((row) => groupOf(stageOf(row, batch.place)) === 'sent').map((row) => row.id))}>Clear what is taken</button>` : nothing}
      ${sendable > 0 && hasDevices ? html`<button type="button" class="main" @click=${send}>${counts.ready === 0 ? 'Send' : `Send ${several(counts.ready, 'file')}`}</button>` : nothing}
    </section>`;
}

const placeWords = /** @type {Record<string, string>} */ ({ deviceId: 'the device', lotId: 'the lot', bench: 'the bench', measuredAt: 'the time of measuring' });

/** What the batch's place lacks for its files. @param {Row[]} rows */
function missingWords(rows) {
  const missing = new Set(rows.filter((row) => stageOf(row, batch.place) === 'placeless').flatMap((row) => Object.keys(lacking(row, batch.place))));
  const words = [...missing].map((field) => placeWords[field] ?? field);
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`;
}

/** @param {import('./send-queue.js').SendQueue<number>} queue */
function trouble(queue) {
  if (queue.state === 'still')
    return html`<div class="refusal" role="alert"><p>${queue.sentence} It stands still; nothing is lost, and what was taken is not taken twice.</p><div><button type="button" @click=${() => queue.resume()}>Resume</button></div></div>`;
  if (queue.state === 'waiting')
    return html`<div class="refusal" role="status"><p>${queue.sentence} It tries again within ${several(Math.round(queue.nextTryMs / 1000), 'second')}.</p><div><button type="button" @click=${() => queue.resume()}>Try now</button></div></div>`;
  return nothing;
}

/**
 * What is open for many files at once.
 * @param {Row[]} rows
 * @param {{ columns: (row: Row) => void, sameBytes: (rows: Row[]) => void, again: (rows: Row[]) => void }} answer
 */
export function questionsOf(rows, answer) {
  const groups = openGroups(rows);
  const same = rows.filter((row) => stageOf(row, batch.place) === 'sameBytes');
  const decided = rows.filter((row) => row.result?.issues.some(({ code }) => code === 'lotDecided'));
  return html`
    ${groups.map((group) => html`
      <div class="question" role="status"><p>${group.length === 1 ? `${group[0].name} leaves open what its columns hold.` : `${group.length} files with the same heads leave open what their columns hold.`}</p><button type="button" @click=${() => answer.columns(group[0])}>Say what they are</button></div>`)}
    ${same.length === 0 ? nothing : html`
      <div class="question" role="status"><p>${several(same.length, 'file holds', 'files hold')} bytes that stand in the lot for another unit. Nothing was stored of ${same.length === 1 ? 'it' : 'them'}.</p><button type="button" @click=${() => answer.sameBytes(same)}>Look at ${same.length === 1 ? 'it' : 'them'}</button></div>`}
    ${decided.length === 0 ? nothing : html`
      <div class="question bad" role="alert"><p>${decided[0].result?.issues.find(({ code }) => code === 'lotDecided')?.message ?? ''} ${several(decided.length, 'file was', 'files were')} not taken. Choose another lot above and send ${decided.length === 1 ? 'it' : 'them'} again, or ask quality to reopen the lot.</p>
        <button type="button" @click=${() => answer.again(decided)}>Send ${decided.length === 1 ? 'it' : 'them'} again</button></div>`}`;
}
