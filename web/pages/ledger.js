// The ledger: everything that mattered, in the order in which it was sealed, with the exact bytes of each entry.

import { withQuery } from '../api.js';
import { Page, html, nothing, ownStyles } from '../parts/element.js';
import { Listing } from '../parts/listing.js';
import { dayAndTime, several } from '../numbers.js';
import { keepInAddress, oneOf, printState, readState, text } from '../router.js';
import { aboutOf, kindGroups, wordsOf } from './ledger-words.js';
import '../parts/busy.js';
import '../parts/field.js';
import '../parts/refusal.js';

await ownStyles(import.meta.url);

const typingMs = 300;
const shape = {
  kind: oneOf(kindGroups.map(([kind]) => kind)),
  search: text(),
  order: oneOf(/** @type {const} */ (['newest', 'oldest'])),
};

class LedgerPage extends Page {
  static properties = { filter: { state: true }, checks: { state: true } };

  constructor() {
    super();
    this.filter = readState(shape, '');
    /** @type {Readonly<Record<number, string>>} what a check of an entry's bytes found, by position */
    this.checks = {};
    this.entries = new Listing(this, () => withQuery('/api/ledger/entries', { order: this.filter.order, kind: this.filter.kind, search: this.filter.search }));
  }

  /** @param {import('lit').PropertyValues} changed */
  willUpdate(changed) {
    if (!changed.has('query'))
      return;
    const filter = readState(shape, this.query);
    const differs = JSON.stringify(filter) !== JSON.stringify(this.filter);
    this.filter = filter;
    this.entries.cursor = filter.order === 'newest' ? 'before' : 'after';
    if (differs)
      void this.entries.load();
  }

  render() {
    const { items, next, busy, refusal, body } = this.entries;
    const filtered = this.filter.kind !== '' || this.filter.search !== '';
    return html`
      <div class="page-head">
        <h1>Ledger</h1>
        ${body === null ? nothing : html`<p class="soft">${several(body.size, 'entry', 'entries')}</p>`}
      </div>
      <p class="lead">Each act and its entry are one transaction. An entry is written once: the database refuses to change or delete it.</p>
      <form class="filters" role="search" aria-label="Ledger" @submit=${(/** @type {Event} */ event) => event.preventDefault()}>
        <rl-field class="wide" label="Search" name="search" type="search" placeholder="name, number, id, reason" .value=${this.filter.search} @input=${this.onTyping}></rl-field>
        <rl-field label="About" name="kind" .options=${kindGroups} .value=${this.filter.kind} @change=${this.onFilter}></rl-field>
        <rl-field label="Order" name="order" .options=${[['newest', 'newest first'], ['oldest', 'oldest first']]} .value=${this.filter.order} @change=${this.onFilter}></rl-field>
      </form>
      <rl-refusal .answer=${refusal} @again=${() => this.entries.load()}></rl-refusal>
      ${items === null ? (busy ? html`<rl-busy label="Reading the ledger"></rl-busy>` : nothing)
        : items.length === 0 ? html`<div class="empty" role="status"><p>${filtered ? 'No entry fits. The search finds text as it was written, capital letters among it.' : 'The ledger has no entry yet.'}</p></div>`
          : html`
          <ol class="ledger panel">${items.map((entry) => this.entry(entry))}</ol>
          ${next === null ? nothing : html`<div><button type="button" ?disabled=${busy} @click=${() => this.entries.more()}>Show more</button></div>`}`}`;
  }

  /** @param {any} shown */
  entry({ position, kind, at, sha256, entry, bytes }) {
    const check = this.checks[position];
    return html`
      <li>
        <details>
          <summary>
            <span class="position">${position}</span>
            <span class="what">${wordsOf(kind)}</span>
            <span class="who">${entry.actor.name}${entry.actor.kind !== 'bench' ? '' : ` (${entry.actor.kind})`}</span>
            <time datetime=${at}>${dayAndTime(at)}</time>
            <span class="about">${aboutOf(entry.subject, entry.detail).filter(({ href }) => href === null).map(({ text: words }) => words).join(', ')}</span>
          </summary>
          <div class="entry-inside">
            <p class="row">${aboutOf(entry.subject).filter(({ href }) => href !== null).map(({ text: words, href }) => html`<a href=${String(href)}>Go to the ${words}</a>`)}</p>
            <pre>${JSON.stringify(entry, null, 2)}</pre>
            <p class="small">SHA-256 of its exact bytes: <code>${sha256}</code></p>
            <p class="row">
              <button type="button" @click=${() => this.check(position, sha256, bytes, entry)}>Check in this browser</button>
              <a class="button" download="entry-${position}.json" href="data:application/json;base64,${bytes}">Save the bytes</a>
              <span role="status">${check ?? nothing}</span>
            </p>
          </div>
        </details>
      </li>`;
  }

  /** Computes the digest here, from the bytes alone, and compares the bytes with what is shown. @param {number} position @param {string} sha256 @param {string} base64 @param {unknown} entry */
  async check(position, sha256, base64, entry) {
    let found;
    if (globalThis.crypto?.subtle === undefined) {
      found = 'The browser computes no digests on a page that came by plain http. Save the bytes and use sha256sum.';
    } else {
      const bytes = Uint8Array.from(atob(base64), (letter) => letter.charCodeAt(0));
      const digest = [...new Uint8Array(await crypto.subtle.digest('SHA-256', bytes))].map((byte) => byte.toString(16).padStart(2, '0')).join('');
      const same = JSON.stringify(JSON.parse(new TextDecoder().decode(bytes))) === JSON.stringify(entry);
      found = digest !== sha256 ? `\u2717 The digest is ${digest}: another one.` : same ? '\u2713 The digest fits, and the bytes say what is shown.' : '\u2717 The digest fits, but the bytes say something else than what is shown.';
    }

    this.checks = { ...this.checks, [position]: found };
  }

  onTyping() {
    clearTimeout(this.typing);
    this.typing = setTimeout(() => this.onFilter(), typingMs);
  }

  onFilter() {
    const given = Object.fromEntries([...new FormData(/** @type {HTMLFormElement} */ (this.querySelector('form.filters')))].map(([name, value]) => [name, String(value).trim()]));
    const query = printState(shape, readState(shape, new URLSearchParams(given)));
    keepInAddress(query);
    this.query = new URLSearchParams(query);
  }
}

customElements.define('rl-page-ledger', LedgerPage);
