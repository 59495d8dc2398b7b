// Tokens by which benches send without a person. For managers.

import { all, send } from '../api.js';
import { badge } from '../parts/badges.js';
import { Page, html, nothing } from '../parts/element.js';
import { confirm } from '../parts/dialog.js';
import { formDialog, refused } from '../parts/form-dialog.js';
import { Listing } from '../parts/listing.js';
import { say } from '../parts/notice.js';
import { showSecret } from '../parts/secret.js';
import { moment } from '../parts/when.js';
import { parseNumber } from '../numbers.js';
import { stateOf } from './tokens-state.js';
import '../parts/busy.js';
import '../parts/data-table.js';
import '../parts/field.js';
import '../parts/refusal.js';

const usualDays = '365';

/** @type {Readonly<Record<string, string>>} */
const scopeWords = { runs: 'send runs', read: 'read' };

class TokensPage extends Page {
  static properties = { benches: { state: true } };

  constructor() {
    super();
    /** @type {any[]} */
    this.benches = [];
    this.tokens = new Listing(this, () => '/api/tokens', { limit: 200 });
    /** @type {readonly import('../parts/data-table.js').Column<any>[]} */
    this.columns = [
      { key: 'name', label: 'Token', head: true, sort: (token) => token.name, cell: (token) => html`${token.name}<br><code class="soft small">${token.prefix}\u2026</code>` },
      { key: 'scopes', label: 'May', cell: (token) => token.scopes.map((/** @type {string} */ scope) => scopeWords[scope] ?? scope).join(' and ') },
      { key: 'bench', label: 'Bench', sort: (token) => token.bench, cell: (token) => (token.benchId === null ? html`<span class="soft">the first that it sends for</span>` : html`<a href="/benches/${token.benchId}">${token.bench}</a>`) },
      { key: 'state', label: 'State', sort: (token) => token.expiresAt, cell: (token) => badge(stateOf(token, Date.now())) },
      { key: 'made', label: 'Made', sort: (token) => token.createdAt, cell: (token) => moment(token.createdAt) },
      { key: 'revoke', label: 'End it', cell: (token) => (token.revokedAt === null && Date.parse(token.expiresAt) > Date.now() ? html`<button type="button" @click=${() => this.revoke(token)}>Revoke<span class="unseen"> ${token.name}</span></button>` : nothing) },
    ];
  }

  connectedCallback() {
    super.connectedCallback();
    void all('/api/benches?limit=200', { signal: this.leaving.signal }).then(({ items }) => { this.benches = items; });
  }

  render() {
    const { items, next, busy, refusal } = this.tokens;
    return html`
      <div class="page-head">
        <h1>Tokens</h1>
        ${items !== null && items.length > 0 ? html`<button type="button" class="main" @click=${this.make}>New token</button>` : nothing}
      </div>
      <p class="lead">A bench without a browser signs in with a token. What it sends stands in the ledger under the token's name.</p>
      <rl-refusal .answer=${refusal} @again=${() => this.tokens.load()}></rl-refusal>
      ${items === null ? (busy ? html`<rl-busy label="Reading the tokens"></rl-busy>` : nothing) : html`
        <div class=${items.length === 0 ? '' : 'panel'}>
          <rl-data-table cards caption="Tokens" caption-unseen .columns=${this.columns} .rows=${items} ?more=${next !== null} ?busy=${busy} @more=${() => this.tokens.more()}
            .empty=${html`<div class="empty"><h2>There is no token</h2><p>People send files from the browser without one. A bench that sends by itself, with a script or the bench's client, needs one.</p><button type="button" class="main" @click=${() => this.make()}>Make a token</button></div>`}></rl-data-table>
        </div>`}`;
  }

  async make() {
    const made = await formDialog({
      heading: 'New token',
      act: 'Make the token',
      fields: ({ errors }) => html`
        <rl-field label="Name" name="name" required hint="Where it is used: it stands in the ledger beside what the token did." .errors=${errors.name}></rl-field>
        <fieldset class="checks">
          <legend>It may</legend>
          <rl-field type="checkbox" name="scope" value="runs" label="send runs" checked></rl-field>
          <rl-field type="checkbox" name="scope" value="read" label="read lots, runs and masks"></rl-field>
          ${errors.scopes === undefined ? nothing : html`<p class="problem">${errors.scopes.join(' ')}</p>`}
        </fieldset>
        <rl-field label="Bench" name="bench" .options=${[['', 'the first that it sends for'], ...this.benches.map((bench) => [bench.id, bench.name])]} .errors=${errors.bench} hint="A token sends for one bench alone."></rl-field>
        <rl-field label="Lives for, in days" name="days" inputmode="numeric" .value=${usualDays} .errors=${errors.expiresInDays} hint="1 to 730 days."></rl-field>`,
      send: (form) => {
        const days = parseNumber(String(form.get('days')));
        if (days.value === null || !Number.isInteger(days.value))
          return refused({ expiresInDays: 'Give a whole number of days.' });
        if (!form.has('scope'))
          return refused({ scopes: 'Say what the token may do.' });
        return send('POST', '/api/tokens', {
          name: form.get('name'),
          scopes: form.getAll('scope'),
          expiresInDays: days.value,
          ...(form.get('bench') === '' ? {} : { bench: form.get('bench') }),
        });
      },
    });
    if (made === undefined)
      return;
    const { token, ...shown } = made.body;
    this.tokens.put({ ...shown, revokedAt: null });
    await showSecret({
      heading: `The token ${shown.name}`,
      sentence: 'Give it to the bench now. Whoever has it can send under its name; if it is lost, revoke it and make another.',
      secret: token,
      after: html`<p class="soft small">The bench's client takes it from the environment:</p><pre>RESPONSELEDGER_TOKEN=${'\u2026'}</pre>`,
    });
  }

  /** @param {any} token */
  async revoke(token) {
    const sure = await confirm({
      heading: `Revoke ${token.name}?`,
      sentence: 'It ends at once and for good. A bench that still uses it is refused, and keeps its files until it has another.',
      act: 'Revoke the token',
      grave: true,
    });
    if (!sure)
      return;
    const answer = await send('DELETE', `/api/tokens/${token.id}`);
    if (!answer.ok) {
      say(answer.sentence, { bad: true });
      return;
    }

    say(`The token ${token.name} is revoked.`);
    await this.tokens.load();
  }
}

customElements.define('rl-page-tokens', TokensPage);
