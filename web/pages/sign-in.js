// Signing in. It stands in for whatever page was asked for, and that page follows.

import { Page, html, nothing, ownStyles } from '../parts/element.js';
import { session } from '../session.js';
import '../parts/field.js';

await ownStyles(import.meta.url);

class SignInPage extends Page {
  static properties = { answer: { state: true }, busy: { state: true } };

  constructor() {
    super();
    /** @type {import('../api.js').Answer | null} */
    this.answer = null;
    this.busy = false;
  }

  firstUpdated() {
    /** @type {HTMLElement | null} */ (this.querySelector('rl-field'))?.focus();
  }

  render() {
    const errors = this.answer?.errors ?? {};
    return html`
      <div class="entry">
        <div>
          <h1>From sweep files to a signed lot</h1>
          <p class="lead">Benches send gain and phase over frequency. Each unit is judged against the released mask, and a lot is approved or rejected with a signature that names its evidence.</p>
        </div>
        <section class="panel" aria-labelledby="sign-in-head">
          <h2 id="sign-in-head">Sign in</h2>
          <form class="fields" novalidate @submit=${this.submit}>
            <rl-field label="E-mail" name="email" type="email" autocomplete="username" required .errors=${errors.email}></rl-field>
            <rl-field label="Password" name="password" type="password" autocomplete="current-password" required .errors=${errors.password}></rl-field>
            ${this.answer === null || Object.keys(errors).length > 0 ? nothing : html`<p class="problem" role="alert">${this.answer.sentence}</p>`}
            <div><button type="submit" class="main" ?disabled=${this.busy}>Sign in</button></div>
          </form>
          <p class="soft small">No account, or a forgotten password: ask a manager of the lab. On a new server the first password stands on its console.</p>
        </section>
      </div>`;
  }

  /** @param {SubmitEvent} event */
  async submit(event) {
    event.preventDefault();
    const form = new FormData(/** @type {HTMLFormElement} */ (event.currentTarget));
    this.busy = true;
    const answer = await session.signIn(String(form.get('email')), String(form.get('password')));
    this.busy = false;
    this.answer = answer.ok ? null : answer;
    if (!answer.ok)
      /** @type {HTMLElement | null} */ (this.querySelector('rl-field[name="password"]'))?.focus();
  }
}

customElements.define('rl-page-sign-in', SignInPage);
