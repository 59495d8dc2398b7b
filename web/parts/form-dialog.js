// A dialog with a form that sends. A refusal is shown in the form, at its fields, and the form stays as it was typed.
//
//   const bench = await formDialog({
//     heading: 'New bench', act: 'Make the bench',
//     fields: ({ errors }) => html`<rl-field label="Name" name="name" required .errors=${errors.name}></rl-field>`,
//     send: (form) => send('POST', '/api/benches', { name: form.get('name') }),
//   });
//
// It resolves to the answer once one came that is no refusal, and to undefined when it was cancelled.

import { ends, openDialog } from './dialog.js';
import { html, nothing } from './element.js';
import './field.js';

/** @typedef {import('../api.js').Answer} Answer */
/** @typedef {{ errors: Record<string, string[]>, refusal: Answer | null, update: () => void, close: () => void }} FormState */

/**
 * @param {object} what
 * @param {string} what.heading
 * @param {string | (() => string)} what.act
 * @param {(state: FormState) => unknown} what.fields
 * @param {(form: FormData) => Promise<Answer> | Answer} what.send   may give a refusal of its own: see refused()
 * @param {boolean} [what.grave]
 * @param {boolean} [what.wide]
 * @param {string} [what.back]
 * @param {() => boolean} [what.mayAct]   false keeps the act from being sent
 * @returns {Promise<Answer | undefined>}
 */
export function formDialog({ heading, act, fields, send, grave = false, wide = false, back, mayAct = () => true }) {
  /** @type {FormState} */
  const state = { errors: {}, refusal: null, update: () => {}, close: () => {} };
  return openDialog({
    heading,
    wide,
    content: (dialog) => {
      state.update = dialog.update;
      state.close = () => dialog.close();
      return html`
        <form class="fields" novalidate @submit=${(/** @type {SubmitEvent} */ event) => submit(event, dialog, state, mayAct() ? send : null)}>
          ${fields(state)}
          ${state.refusal === null ? nothing : html`<p class="problem" role="alert">${state.refusal.sentence}</p>`}
          ${ends(html`<button type="submit" class=${grave ? 'grave' : 'main'} ?disabled=${dialog.busy || !mayAct()}>${typeof act === 'string' ? act : act()}</button>`, dialog, back)}
        </form>`;
    },
  });
}

/** A refusal that the page itself gives, by field. @param {Record<string, string>} errors @returns {Answer} */
export function refused(errors) {
  const byField = Object.fromEntries(Object.entries(errors).map(([field, sentence]) => [field, [sentence]]));
  return { ok: false, status: 422, code: 'invalid', sentence: Object.values(errors).join(' '), errors: byField, body: null };
}

/**
 * A form with a reason, for acts that the ledger keeps with one.
 * @param {object} what
 * @param {string} what.heading
 * @param {unknown} what.sentence
 * @param {string} what.act
 * @param {boolean} [what.grave]
 * @param {boolean} [what.withPassword]   whether the person signs
 * @param {(state: FormState) => unknown} [what.fields]   further fields, above the reason
 * @param {(given: { reason: string, password: string, form: FormData }) => Promise<Answer>} what.send
 * @returns {Promise<Answer | undefined>}
 */
export function confirmWithReason({ heading, sentence, act, grave = false, withPassword = false, fields = () => nothing, send }) {
  return formDialog({
    heading,
    act,
    grave,
    fields: (state) => html`
      <p>${sentence}</p>
      ${fields(state)}
      <rl-field label="Reason" name="reason" rows="3" required hint="It stands in the ledger beside what was done." .errors=${state.errors.reason}></rl-field>
      ${withPassword ? html`<rl-field label="Your password" name="password" type="password" autocomplete="current-password" required hint="It signs in your name." .errors=${state.errors.password}></rl-field>` : nothing}`,
    send: (form) => {
      const reason = String(form.get('reason') ?? '').trim();
      const password = String(form.get('password') ?? '');
      /** @type {Record<string, string>} */
      const missing = {};
      if (reason === '')
        missing.reason = 'Give a reason.';
      if (withPassword && password === '')
        missing.password = 'Give your password.';
      return Object.keys(missing).length > 0 ? refused(missing) : send({ reason, password, form });
    },
  });
}

/**
 * @param {SubmitEvent} event
 * @param {import('./dialog.js').Opened<Answer>} dialog
 * @param {FormState} state
 * @param {((form: FormData) => Promise<Answer> | Answer) | null} send
 */
async function submit(event, dialog, state, send) {
  event.preventDefault();
  if (dialog.busy || send === null)
    return;
  const form = /** @type {HTMLFormElement} */ (event.currentTarget);
  dialog.busy = true;
  dialog.update();
  const answer = await send(new FormData(form));
  dialog.busy = false;
  if (answer.ok) {
    dialog.close(answer);
    return;
  }

  state.errors = answer.errors;
  // What stands at a field is not said twice.
  const shown = Object.keys(answer.errors).filter((field) => form.elements.namedItem(field) !== null);
  state.refusal = shown.length > 0 && shown.length === Object.keys(answer.errors).length ? null : answer;
  dialog.update();
  const first = [...form.elements].find((input) => shown.includes(/** @type {HTMLInputElement} */ (input).name));
  if (first instanceof HTMLElement)
    setTimeout(() => first.focus());
}
