// The signed decision of a lot, and the decisions before it with what undid them.

import { html, nothing } from '../parts/element.js';
import { moment } from '../parts/when.js';
import { lotStates } from '../parts/badges.js';

/** What a decision of the API makes of a lot. @type {Readonly<Record<string, string>>} */
const stateAfter = { approve: 'approved', approveWithConcession: 'approvedWithConcession', reject: 'rejected' };

/** A decision as a word: "approved". @param {string} decision */
export const decisionWords = (decision) => lotStates[stateAfter[decision]]?.words ?? decision;

/** The decision in force, in the head of the page. @param {any} decision   of the lot, or whole */
export function signedRecord(decision) {
  const state = stateAfter[decision.decision];
  const { tone, sign, words } = lotStates[state] ?? { tone: '', sign: '', words: decision.decision };
  return html`
    <section class="lot-signed ${tone}" tabindex="-1" aria-label="The signed decision">
      <p class="verdict-word"><span aria-hidden="true">${sign}</span> ${capital(words)} by ${decision.signedBy.name}, ${moment(decision.signedAt)}</p>
      <p class="meaning">“${decision.meaning}”</p>
      ${decision.reason === '' ? nothing : html`<p><strong>Reason:</strong> ${decision.reason}</p>`}
      <p class="small soft">${decision.signedBy.email}; decision ${decision.ordinal} on this lot; ${recordLink(decision)}.</p>
    </section>`;
}

/** @param {any} decision */
function recordLink(decision) {
  return html`<a href="/api/decisions/${decision.id}/record" download="decision-${decision.id}.json">the signed record</a>, SHA-256 <code class="digest">${decision.sha256}</code>`;
}

/**
 * Decisions that a reopening undid, the newest first.
 * @param {readonly any[]} decisions
 */
export function earlierDecisions(decisions) {
  const undone = decisions.filter((decision) => decision.reopening !== null);
  return undone.length === 0 ? nothing : html`
    <section class="panel lot-earlier" aria-labelledby="lot-earlier">
      <h2 id="lot-earlier">Earlier decisions</h2>
      <ol reversed>
        ${undone.map((decision) => html`
          <li value=${decision.ordinal}>
            <p><strong>${capital(decisionWords(decision.decision))}</strong> by ${decision.signedBy.name}, ${moment(decision.signedAt)}${decision.reason === '' ? '.' : html`: ${decision.reason}`}</p>
            <p><strong>Reopened</strong> by ${decision.reopening.by ?? 'somebody who is no longer here'}, ${moment(decision.reopening.at)}: ${decision.reopening.reason}</p>
            <p class="small soft">The record is kept: ${recordLink(decision)}.</p>
          </li>`)}
      </ol>
    </section>`;
}

/** @param {string} words */
export const capital = (words) => words.charAt(0).toUpperCase() + words.slice(1);
