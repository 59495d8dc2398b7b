// The two questions that a batch may ask: what open columns hold, and whether bytes that stand for another unit are meant.

import { sendForm } from '../api.js';
import { ends, openDialog } from '../parts/dialog.js';
import { html, nothing } from '../parts/element.js';
import { several } from '../numbers.js';
import { serialOf } from './send-rows.js';
import { choiceWords, spanWords } from './send-words.js';
import '../plots/mini-plot.js';

/** @typedef {import('./send-rows.js').Row} Row */

/**
 * Asks what the columns of some files hold that have the same heads. Each candidate can be looked at before it is taken.
 * @param {readonly Row[]} rows
 * @param {string} bench   that will remember the answer; '' while none is named
 * @returns {Promise<any>} the choice, or undefined
 */
export function askColumns(rows, bench) {
  const [row] = rows;
  const { candidates, columns } = row.preview;
  let chosen = -1;
  let problem = '';
  /** @type {Map<number, any>} */
  const looks = new Map();

  const look = async (/** @type {number} */ at, /** @type {() => void} */ update) => {
    const form = new FormData();
    form.append('columns', JSON.stringify(candidates[at]));
    form.append('file', row.file, row.name);
    const answer = await sendForm('/api/runs/preview', form);
    looks.set(at, answer.ok ? answer.body : { trace: null, issues: [{ message: answer.sentence }] });
    update();
  };

  return openDialog({
    heading: 'What do these columns hold?',
    wide: true,
    content: (dialog) => html`
      <p>${row.name}${rows.length > 1 ? ` and ${several(rows.length - 1, 'file')} with the same heads` : ''} can be read in more than one way. ${headWords(columns)}</p>
      <form class="fields" novalidate @submit=${(/** @type {Event} */ event) => {
        event.preventDefault();
        if (chosen >= 0) {
          dialog.close(candidates[chosen]);
          return;
        }

        problem = 'Choose one of them. If none is right, mend the heads in the file, such as frequency_hz, gain_db, phase_deg.';
        dialog.update();
      }}>
        <fieldset class="candidates">
          <legend class="unseen">Ways to read it</legend>
          ${candidates.map((/** @type {any} */ candidate, /** @type {number} */ at) => html`
            <label class="candidate ${at === chosen ? 'chosen' : ''}">
              <input type="radio" name="candidate" .checked=${at === chosen} @change=${() => {
                chosen = at;
                problem = '';
                dialog.update();
                if (!looks.has(at))
                  void look(at, dialog.update);
              }}>
              <span>${choiceWords(candidate, columns).map((words) => html`<span class="piece">${words}</span>`)}</span>
              ${at === chosen ? lookOf(looks.get(at)) : nothing}
            </label>`)}
        </fieldset>
        <p class="soft small">${bench === '' ? 'The bench that you name for these files will remember the answer for files with the same heads.' : `The bench \u201c${bench}\u201d will remember the answer for files with the same heads.`}</p>
        ${problem === '' ? nothing : html`<p class="problem" role="alert">${problem}</p>`}
        ${ends(html`<button type="submit" class="main">Read ${rows.length === 1 ? 'it' : `all ${rows.length}`} so</button>`, dialog)}
      </form>`,
  });
}

/** @param {readonly { column: number, head: string }[]} columns */
function headWords(columns) {
  const heads = columns.map(({ column, head }) => (head === '' ? `column ${column}` : `\u201c${head}\u201d`));
  return columns.some(({ head }) => head !== '') ? `Its heads are ${heads.join(', ')}.` : `It has ${several(columns.length, 'column')} without heads.`;
}

/** @param {any} preview   undefined while it is read */
function lookOf(preview) {
  if (preview === undefined)
    return html`<span class="soft small">being read so</span>`;
  return preview.trace === null
    ? html`<span class="problem">Read so it is refused: ${preview.issues[0]?.message ?? ''}</span>`
    : html`<span class="candidate-look"><rl-mini-plot .trace=${preview.trace}></rl-mini-plot><span class="soft small">${spanWords(preview)}</span></span>`;
}

/**
 * Asks whether files whose bytes stand in the lot for another unit are meant all the same.
 * @param {readonly Row[]} rows
 * @returns {Promise<boolean>}
 */
export async function askSameBytes(rows) {
  const one = rows.length === 1;
  const answer = await openDialog({
    heading: one ? 'The same bytes stand for another unit' : `${rows.length} files hold bytes that stand for other units`,
    content: (dialog) => html`
      <p>${one ? 'This file is' : 'These files are'} byte for byte what was taken for another unit of the lot. Mostly that is a file that was saved twice under two names: then measure the unit and send its own file.</p>
      <ul class="plain-list scrolls">${rows.map((row) => html`<li><strong>${serialOf(row)}</strong> (${row.name}): ${row.result?.issues[0]?.message.split('. ')[0]}.</li>`)}</ul>
      ${ends(html`<button type="button" class="grave" @click=${() => dialog.close(true)}>${one ? 'It is meant' : 'They are meant'}: take ${one ? 'it' : 'them'}</button>`, dialog, one ? 'Leave it out' : 'Leave them out')}`,
  });
  return answer === true;
}
