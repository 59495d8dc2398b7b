// Who has an account, and with which roles. For managers.

import { send } from '../api.js';
import { badge } from '../parts/badges.js';
import { Page, html, nothing, ownStyles } from '../parts/element.js';
import { formDialog } from '../parts/form-dialog.js';
import { Listing } from '../parts/listing.js';
import { say } from '../parts/notice.js';
import { showSecret } from '../parts/secret.js';
import { moment } from '../parts/when.js';
import { session } from '../session.js';
import '../parts/busy.js';
import '../parts/data-table.js';
import '../parts/field.js';
import '../parts/refusal.js';

await ownStyles(import.meta.url);

/** @type {readonly (readonly [string, string])[]} */
const roles = [
  ['operator', 'opens lots, sends runs'],
  ['engineer', 'also devices, masks, golden unit; invalidates and reassigns runs, dispositions units; signs where the device lets engineers'],
  ['quality', 'opens lots, sends runs, dispositions units, signs, reopens a decided lot'],
  ['manager', 'all of that, and people, benches and tokens'],
  ['auditor', 'reads everything and changes nothing'],
];

/** @param {any} person */
function stateOf(person) {
  if (person.disabled)
    return { sign: '\u2717', words: 'disabled', tone: '' };
  return person.mustChangePassword ? { sign: '\u2026', words: 'one-time password', tone: 'doubt' } : { sign: '\u2713', words: 'may sign in', tone: 'good' };
}

/** @type {readonly import('../parts/data-table.js').Column<any>[]} */
const columns = [
  { key: 'name', label: 'Name', head: true, sort: (person) => person.name, cell: (person) => person.name },
  { key: 'email', label: 'E-mail', sort: (person) => person.email, cell: (person) => person.email },
  { key: 'roles', label: 'Roles', sort: (person) => person.roles.join(' '), cell: (person) => (person.roles.length === 0 ? html`<span class="soft">none: may only read</span>` : person.roles.join(', ')) },
  { key: 'state', label: 'State', sort: (person) => stateOf(person).words, cell: (person) => badge(stateOf(person)) },
  { key: 'made', label: 'Made', sort: (person) => person.createdAt, cell: (person) => moment(person.createdAt) },
];

class PeoplePage extends Page {
  constructor() {
    super();
    this.people = new Listing(this, () => '/api/people', { limit: 200 });
  }

  render() {
    const { items, next, busy, refusal } = this.people;
    return html`
      <div class="page-head">
        <h1>People</h1>
        <button type="button" class="main" @click=${this.add}>Add a person</button>
      </div>
      <rl-refusal .answer=${refusal} @again=${() => this.people.load()}></rl-refusal>
      ${items === null ? (busy ? html`<rl-busy label="Reading the people"></rl-busy>` : nothing) : html`
        <div class="panel">
          <rl-data-table cards caption="People" caption-unseen .columns=${columns} .rows=${items} pickable @pick=${(/** @type {CustomEvent} */ event) => this.change(event.detail)}
            ?more=${next !== null} ?busy=${busy} @more=${() => this.people.more()}></rl-data-table>
        </div>
        <section class="panel" aria-labelledby="roles">
          <h2 id="roles">Who may do what</h2>
          <dl>${roles.map(([role, words]) => html`<dt>${role}</dt><dd>${words}</dd>`)}</dl>
        </section>`}`;
  }

  async add() {
    const made = await formDialog({
      heading: 'Add a person',
      act: 'Add the person',
      fields: ({ errors }) => html`
        <rl-field label="Name" name="name" required hint="As it is printed beside a signature." .errors=${errors.name}></rl-field>
        <rl-field label="E-mail" name="email" type="email" required hint="The person signs in with it; it cannot be changed later." .errors=${errors.email}></rl-field>
        ${roleFields([], errors.roles)}
        <rl-field label="Password" name="password" type="password" autocomplete="new-password" optional hint="Left out, a one-time password is made, which the person changes at the first sign-in." .errors=${errors.password}></rl-field>`,
      send: (form) => {
        const password = String(form.get('password'));
        return send('POST', '/api/people', { name: form.get('name'), email: form.get('email'), roles: form.getAll('role'), ...(password === '' ? {} : { password }) });
      },
    });
    if (made === undefined)
      return;
    this.people.put(made.body);
    await tellPassword(made.body, `${made.body.name} is added.`);
  }

  /** @param {any} person */
  async change(person) {
    const changed = await formDialog({
      heading: person.name,
      act: 'Keep the changes',
      fields: ({ errors }) => html`
        <p class="soft">${person.email}</p>
        <rl-field label="Name" name="name" required .value=${person.name} .errors=${errors.name} hint="Signatures that are given keep the name they were given under."></rl-field>
        ${roleFields(person.roles, errors.roles)}
        <fieldset class="checks">
          <legend>Signing in</legend>
          <rl-field type="checkbox" label="Disabled: may not sign in, whatever the password" name="disabled" ?checked=${person.disabled}></rl-field>
          <rl-field type="checkbox" label="Give a new one-time password" name="reset" hint="For somebody who has forgotten theirs. The old one is worth nothing at once."></rl-field>
        </fieldset>
        <p class="soft small">Sessions of this person follow within a minute.</p>`,
      send: (form) => send('PATCH', `/api/people/${person.id}`, {
        name: form.get('name'),
        roles: form.getAll('role'),
        disabled: form.has('disabled'),
        ...(form.has('reset') ? { resetPassword: true } : {}),
      }),
    });
    if (changed === undefined)
      return;
    const { oneTimePassword, ...shown } = changed.body;
    this.people.put(shown);
    await tellPassword(changed.body, `${shown.name} is changed.`);
    if (shown.email === session.person?.email)
      await session.refresh();
  }
}

/** @param {readonly string[]} held @param {string[] | undefined} errors */
function roleFields(held, errors) {
  return html`
    <fieldset class="checks">
      <legend>Roles</legend>
      ${roles.map(([role, words]) => html`<rl-field type="checkbox" name="role" label=${role} value=${role} hint=${words} ?checked=${held.includes(role)}></rl-field>`)}
      ${errors === undefined ? nothing : html`<p class="problem">${errors.join(' ')}</p>`}
    </fieldset>`;
}

/** @param {any} person @param {string} otherwise */
async function tellPassword(person, otherwise) {
  if (person.oneTimePassword === null || person.oneTimePassword === undefined) {
    say(otherwise);
    return;
  }

  await showSecret({
    heading: `One-time password for ${person.name}`,
    sentence: html`Hand it over by a way that others do not read. At the first sign-in as <strong>${person.email}</strong> a password of the person's own is asked for.`,
    secret: person.oneTimePassword,
  });
}

customElements.define('rl-page-people', PeoplePage);
