// A session that ended while somebody worked: the dialog asks for the password and the work goes on, nothing typed is lost.

import { ends, openDialog } from './dialog.js';
import { html, nothing } from './element.js';
import { session } from '../session.js';
import './field.js';

/** @type {Promise<boolean> | null} */
let asking = null;

/** Resolves to whether the same person is signed in again. However many requests ask, there is one dialog. @returns {Promise<boolean>} */
export function signInAgain() {
  asking ??= askOnce().finally(() => { asking = null; });
  return asking;
}

async function askOnce() {
  const email = session.person?.email;
  if (email === undefined)
    return false;
  let problem = '';
  const signedIn = await openDialog({
    heading: 'Sign in again',
    content: (dialog) => html`
      <p>Your session has ended. What you have typed is still there.</p>
      <form class="fields" novalidate @submit=${async (/** @type {SubmitEvent} */ event) => {
        event.preventDefault();
        const form = new FormData(/** @type {HTMLFormElement} */ (event.currentTarget));
        dialog.busy = true;
        dialog.update();
        const answer = await session.signInAgain(email, String(form.get('password') ?? ''));
        dialog.busy = false;
        problem = answer.sentence;
        if (answer.ok)
          dialog.close(true);
        else
          dialog.update();
      }}>
        <rl-field label="E-mail" name="username" type="email" autocomplete="username" .value=${email} disabled></rl-field>
        <rl-field label="Password" name="password" type="password" autocomplete="current-password" required></rl-field>
        ${problem === '' ? nothing : html`<p class="problem" role="alert">${problem}</p>`}
        ${ends(html`<button type="submit" class="main" ?disabled=${dialog.busy}>Sign in</button>`, dialog)}
      </form>`,
  });
  return signedIn === true;
}
