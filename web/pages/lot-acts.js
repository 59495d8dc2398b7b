// What can be done to a unit of a lot, and the reopening of a decided one: dialogs that send, and say what follows.

import { send } from '../api.js';
import { html, nothing } from '../parts/element.js';
import { confirmWithReason, refused } from '../parts/form-dialog.js';
import { moment } from '../parts/when.js';
import { dispositions } from './lot-units.js';
import { decisionWords } from './lot-record.js';
import '../parts/field.js';

/** Causes that are offered; any other may be typed. */
const causes = ['bad contact at the fixture', 'wrong fixture or cable', 'bench not warmed up', 'bench out of calibration', 'wrong drive level', 'wrong unit on the bench', 'disturbance from outside'];

/** @param {any} lot @param {any} unit */
export function disposition(lot, unit) {
  const before = unit.disposition?.disposition ?? null;
  return confirmWithReason({
    heading: `Disposition of unit ${unit.serial}`,
    act: 'Record the disposition',
    sentence: before === null ? `The unit does not pass. Say what becomes of it in lot ${lot.number}.` : `The unit is under ${before}. A new disposition takes its place; the old one stays in the ledger.`,
    fields: ({ errors }) => html`
      <fieldset class="choices">
        <legend>What becomes of it</legend>
        ${Object.entries(dispositions).map(([kind, { words, means }]) => html`
          <label class="choice"><input type="radio" name="disposition" value=${kind} ?checked=${kind === before}><span><strong>${words}</strong><span class="soft small">${means}</span></span></label>`)}
        ${errors.disposition === undefined ? nothing : html`<p class="problem" role="alert">${errors.disposition.join(' ')}</p>`}
      </fieldset>`,
    send: ({ reason, form }) => {
      const kind = form.get('disposition');
      return kind === null ? Promise.resolve(refused({ disposition: 'Choose what becomes of the unit.' }))
        : send('POST', `/api/lots/${lot.id}/units/${unit.unitId}/disposition`, { disposition: kind, reason });
    },
  });
}

/**
 * @param {any} lot @param {any} unit
 * @param {readonly any[]} runs   all runs of the unit in the lot
 * @param {string | null} runId   chosen at first
 */
export function invalidation(lot, unit, runs, runId) {
  const counting = runs.filter((run) => run.standing === 'counting');
  const first = counting.find((run) => run.id === runId) ?? counting[0];
  let chosen = first;
  return confirmWithReason({
    heading: `Invalidate a run of unit ${unit.serial}`,
    act: 'Invalidate the run',
    grave: true,
    sentence: 'A run is invalidated only for a cause that lies in the measurement, not because it fails. The run, its file and its verdict are kept and shown as invalidated. It cannot be undone.',
    fields: ({ errors, update }) => html`
      ${counting.length > 1 ? html`<rl-field label="Run that counts" name="run" .options=${counting.map((run) => [run.id, `${run.condition}, ${run.outcome ?? 'not judged'}, ${run.bench}`])} .value=${first.id}
        @change=${(/** @type {Event} */ event) => { chosen = counting.find((run) => run.id === /** @type {HTMLSelectElement} */ (event.target).value) ?? first; update(); }}></rl-field>`
    : html`<p>The run that counts was measured ${moment(first.measuredAt)} on ${first.bench}.</p>`}
      <p><strong>What counts after it:</strong> ${nextOf(chosen, runs)}</p>
      <rl-field label="Cause" name="cause" required .list=${causes} hint="What was wrong with the measurement, in a few words." .errors=${errors.cause}></rl-field>`,
    send: ({ reason, form }) => {
      const cause = String(form.get('cause') ?? '').trim();
      return cause === '' ? Promise.resolve(refused({ cause: 'Name the cause: without one the run stands.' }))
        : send('POST', `/api/runs/${chosen.id}/invalidation`, { cause, reason });
    },
  });
}

/** Which run counts once this one does not. @param {any} run @param {readonly any[]} runs */
function nextOf(run, runs) {
  const [next] = runs.filter((one) => one.standing === 'retest' && one.conditionId === run.conditionId).sort((a, b) => a.receivedNo - b.receivedNo);
  return next === undefined ? 'no run. The unit is untested until a new one comes.' : html`the retest measured ${moment(next.measuredAt)}: ${next.outcome ?? 'not judged'}.`;
}

/** @param {any} lot */
export function reopening(lot) {
  return confirmWithReason({
    heading: `Reopen lot ${lot.number}`,
    act: 'Sign: reopen the lot',
    grave: true,
    withPassword: true,
    sentence: html`The lot is ${decisionWords(lot.decision.decision)}, signed by ${lot.decision.signedBy.name}. Its signed record is kept for good. From now on the lot follows the masks and golden runs in force, takes new runs, and has to be decided again.`,
    send: ({ reason, password }) => send('POST', `/api/lots/${lot.id}/reopenings`, { reason, password }),
  });
}
