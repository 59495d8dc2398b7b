// One's own password: changed by choice, or at once where it was given for one time.

import { send } from '../api.js';
import { Page, html, nothing } from '../parts/element.js';
import { say } from '../parts/notice.js';
import { go } from '../router.js';
import { session } from '../session.js';
import '../parts/field.js';

class PasswordPage extends Page {
  static properties = { answer: { state: true }, busy: { state: true } };

  constructor() {
    super();
    /** @type {import('../api.js').Answer | null} */
    this.answer = null;
    this.busy = false;
  }

  render() {
    const due = session.person?.mustChangePassword === true;
    const errors = this.answer?.errors ?? {};
    return html`
      <h1>${due ? 'Choose your own password' : 'Change password'}</h1>
      <section class="panel">
        <p>${due ? 'The password that you signed in with was given for one time.' : 'Your other sessions end within a minute.'} A password has at least 15 characters; a few words make a good one.</p>
        <form class="fields" novalidate @submit=${this.submit}>
          <input type="text" name="username" autocomplete="username" .value=${session.person?.email ?? ''} hidden>
          <rl-field label="Present password" name="current" type="password" autocomplete="current-password" required .errors=${errors.current}></rl-field>
          <rl-field label="New password" name="new" type="password" autocomplete="new-password" required hint="15 to 128 characters, blanks among them." .errors=${errors.new}></rl-field>
          ${this.answer === null || Object.keys(errors).length > 0 ? nothing : html`<p class="problem" role="alert">${this.answer.sentence}</p>`}
          <div><button type="submit" class="main" ?disabled=${this.busy}>Change password</button></div>
        </form>
      </section>`;
  }

  /** @param {SubmitEvent} event */
  async submit(event) {
    event.preventDefault();
    const form = new FormData(/** @type {HTMLFormElement} */ (event.currentTarget));
    this.busy = true;
    const answer = await send('POST', '/api/session/password', { current: form.get('current'), new: form.get('new') });
    this.busy = false;
    this.answer = answer.ok ? null : answer;
    if (!answer.ok)
      return;
    say('Your password is changed.');
    await session.refresh();
    if (location.pathname === '/password')
      await go('/lots');
  }
}

customElements.define('rl-page-password', PasswordPage);
