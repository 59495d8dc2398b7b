// Signing a decision on a lot. The dialog states what will stand in the record, as the server would write it now; the decision
// goes back with a digest of what was shown, so that nobody signs for what came in between.

import { ask, send } from '../api.js';
import { ends, openDialog } from '../parts/dialog.js';
import { html, nothing } from '../parts/element.js';
import { formDialog, refused } from '../parts/form-dialog.js';
import { dayAndTime, several } from '../numbers.js';
import { capital, decisionWords } from './lot-record.js';
import '../parts/field.js';

/** @typedef {import('../api.js').Answer} Answer */

const choices = /** @type {const} */ (['approve', 'approveWithConcession', 'reject']);
/** @typedef {typeof choices[number]} Word */

const acts = { approve: 'Approve', approveWithConcession: 'Approve with concession', reject: 'Reject' };

/**
 * Asks for the decision, and sends it. It resolves to the answer once the lot is decided, and to undefined otherwise.
 * @param {any} lot
 * @param {any} signing   the answer of GET /api/lots/{id}/signing
 * @param {string} name   of the signer
 * @returns {Promise<Answer | undefined>}
 */
export async function signLot(lot, signing, name) {
  if (signing.againstSigner !== null) {
    await openDialog({
      heading: `Lot ${signing.number} is for somebody else to sign`,
      content: (dialog) => html`<p>${signing.againstSigner}</p>${ends(nothing, dialog, 'Close')}`,
    });
    return undefined;
  }

  let shown = signing;
  // An approval that is recommended is chosen at first; a rejection nobody signs without choosing it.
  /** @type {Word | null} */
  let decision = signing.recommendation.decision === 'reject' ? null : signing.recommendation.decision;
  let isDecided = false;
  const chosen = () => (decision === null ? null : choiceIn(shown, decision));
  return formDialog({
    heading: `Sign off lot ${signing.number}`,
    wide: true,
    act: () => (decision === null ? 'Sign' : `Sign: ${acts[decision].toLowerCase()}`),
    grave: false,
    mayAct: () => !isDecided && chosen()?.blockers.length === 0,
    fields: ({ errors, update, close }) => html`
      <div class="sign">
        <div class="sign-what" tabindex="-1" autofocus>${whatIsSigned(shown, lot)}</div>
        <div class="stack">
          <fieldset class="choices">
            <legend>Decision</legend>
            ${choices.map((word) => choiceOf(shown, word, word === decision, () => { decision = word; update(); }))}
          </fieldset>
          <div class="meaning-box" aria-live="polite">
            <p class="small soft">Your signature, ${name}, means:</p>
            ${decision === null ? html`<p>Choose a decision.</p>` : html`<p class="meaning">“${choiceIn(shown, decision).meaning}”</p>`}
          </div>
          <rl-field label="Reason" name="reason" rows="3" ?optional=${decision === 'approve'} ?required=${decision !== 'approve'} hint="It stands in the signed record." .errors=${errors.reason}></rl-field>
          <rl-field label="Your password" name="password" type="password" autocomplete="current-password" required hint="It signs in your name." .errors=${errors.password}></rl-field>
          ${isDecided ? html`<button type="button" @click=${close}>Show the lot as it is now</button>` : nothing}
        </div>
      </div>`,
    send: async (form) => {
      const reason = String(form.get('reason') ?? '').trim();
      const password = String(form.get('password') ?? '');
      /** @type {Record<string, string>} */
      const missing = {};
      if (reason === '' && decision !== 'approve')
        missing.reason = decision === 'reject' ? 'Say why the lot is rejected.' : 'Say why the lot may ship under concession.';
      if (password === '')
        missing.password = 'Give your password: it signs.';
      if (Object.keys(missing).length > 0)
        return refused(missing);
      const answer = await send('POST', `/api/lots/${lot.id}/decisions`, { decision, reason, password, seen: shown.seen });
      if (answer.ok || answer.status !== 409)
        return answer;
      if (answer.code === 'lotDecided') {
        isDecided = true;
        return { ...answer, sentence: await whoDecided(lot.id) };
      }

      // What stands now takes the place of what was shown; what was typed stays.
      const now = await ask(`/api/lots/${lot.id}/signing`);
      if (!now.ok)
        return { ...answer, sentence: `${answer.sentence} What stands now could not be read: ${now.sentence}` };
      shown = now.body;
      return { ...answer, sentence: `${answer.sentence} What stands now is shown above; nothing that you typed is lost.` };
    },
  });
}

/** @param {string} lotId */
async function whoDecided(lotId) {
  const answer = await ask(`/api/lots/${lotId}`);
  const decision = answer.ok ? answer.body.decision : null;
  const by = decision === null ? '' : ` It is ${decisionWords(decision.decision)}, signed by ${decision.signedBy.name} at ${dayAndTime(decision.signedAt)}.`;
  return `Somebody else has decided this lot meanwhile.${by} Nothing of yours was signed.`;
}

/** @param {any} shown @param {Word} word @returns {{ meaning: string, blockers: { code: string, sentence: string }[] }} */
const choiceIn = (shown, word) => shown.choices.find((/** @type {any} */ choice) => choice.decision === word);

/** @param {any} shown @param {Word} word @param {boolean} isChosen @param {() => void} choose */
function choiceOf(shown, word, isChosen, choose) {
  const { blockers } = choiceIn(shown, word);
  // What stands against an approval is said once.
  const said = word === 'approveWithConcession' ? choiceIn(shown, 'approve').blockers.map(({ code }) => code) : [];
  const told = [...(blockers.some(({ code }) => said.includes(code)) ? ['The same stands against it.'] : []), ...blockers.filter(({ code }) => !said.includes(code)).map(({ sentence }) => sentence)];
  return html`
    <label class="choice ${blockers.length > 0 ? 'off' : ''}">
      <input type="radio" name="decision" value=${word} .checked=${isChosen} ?disabled=${blockers.length > 0 && !isChosen} @change=${choose}>
      <span><strong>${acts[word]}</strong>${shown.recommendation.decision === word ? html` <span class="badge">recommended</span>` : nothing}
        ${told.map((sentence) => html`<span class="soft small">${sentence}</span>`)}</span>
    </label>`;
}

/** @param {any} shown @param {any} lot */
function whatIsSigned(shown, lot) {
  const { counts, dispositions } = shown;
  const withdrawn = dispositions.filter((/** @type {any} */ unit) => unit.disposition !== 'concession');
  const conceded = dispositions.filter((/** @type {any} */ unit) => unit.disposition === 'concession');
  return html`
    <h3>What you sign</h3>
    <dl>
      <dt>Device</dt><dd>${shown.partNumber} ${shown.revision}, ${lot.title}</dd>
      <dt>Lot</dt><dd>${shown.number}, size ${several(shown.size, 'unit')}${shown.ordinal > 1 ? `; decision ${shown.ordinal} on this lot` : ''}</dd>
      <dt>Units</dt><dd>${countsIn(counts, shown.size)}</dd>
      <dt>Runs set aside</dt><dd>${shown.invalidated === 0 && counts.retests === 0 ? 'none' : [shown.invalidated > 0 ? `${shown.invalidated} invalidated` : '', counts.retests > 0 ? `${several(counts.retests, 'retest')} that ${counts.retests === 1 ? 'does' : 'do'} not count` : ''].filter(Boolean).join(', ')}</dd>
      ${shown.conditions.map((/** @type {any} */ condition) => html`
        <dt>Condition ${condition.name}</dt>
        <dd>${condition.maskRevision === null ? 'no released mask' : html`mask revision ${condition.maskRevision} <code title="SHA-256 of the mask revision: ${condition.maskSha256}">${condition.maskSha256.slice(0, 12)}…</code>`}, ${condition.goldenRunId === null ? 'no golden run' : html`golden run of unit ${condition.goldenSerial}`}</dd>`)}
      <dt>Withdrawn</dt><dd>${listOf(withdrawn)}</dd>
      <dt>Under concession</dt><dd>${listOf(conceded)}</dd>
      <dt>Engine</dt><dd>version ${shown.engine}</dd>
      <dt>Rule</dt><dd class="small">${shown.rule.statement}</dd>
      <dt>Recommendation</dt><dd>${shown.recommendation.decision === null ? '' : html`<strong>${capital(acts[/** @type {Word} */ (shown.recommendation.decision)])}.</strong> `}${shown.recommendation.sentence}</dd>
    </dl>`;
}

/** @param {any} counts @param {number} size */
function countsIn(counts, size) {
  return [
    `${counts.tested} of ${size} tested`, `${counts.passed} pass`, `${counts.failed} fail`, `${counts.inconclusive} inconclusive`,
    `${Math.max(0, size - counts.tested)} not fully tested`, `${counts.withdrawn} withdrawn`, `${counts.conceded} under concession`,
  ].join(', ');
}

/** @param {any[]} units */
function listOf(units) {
  return units.length === 0 ? 'none' : html`<ul class="plain">${units.map(({ serial, disposition, reason }) => html`<li><strong>${serial}</strong>${disposition === 'concession' ? '' : `, ${disposition}`}: ${reason}</li>`)}</ul>`;
}
