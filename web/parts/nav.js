// The bar at the top: where one can go, who is signed in, the theme.

import { Element, html, nothing } from './element.js';
import { may, session } from '../session.js';

/** @type {readonly { href: string, words: string, roles?: readonly string[] }[]} */
const work = [
  { href: '/lots', words: 'Lots' },
  { href: '/send', words: 'Send files', roles: may.operate },
  { href: '/runs', words: 'Runs' },
];

/** @type {typeof work} */
const lab = [
  { href: '/benches', words: 'Benches' },
  { href: '/people', words: 'People', roles: may.manage },
  { href: '/tokens', words: 'Tokens', roles: may.manage },
  { href: '/ledger', words: 'Ledger' },
  { href: '/checklist', words: 'Checklist', roles: may.manage },
];

const themes = [['auto', 'System'], ['light', 'Light'], ['dark', 'Dark']];

class Nav extends Element {
  static properties = { path: {}, placesOpen: { state: true }, personOpen: { state: true }, theme: { state: true } };

  constructor() {
    super();
    this.path = '';
    this.placesOpen = false;
    this.personOpen = false;
    this.theme = document.documentElement.dataset.themeChoice ?? 'auto';
    this.onSession = () => this.requestUpdate();
    /** @param {Event} event */
    this.onOutside = (event) => {
      if (this.personOpen && !this.querySelector('.menu')?.contains(/** @type {Node} */ (event.target)))
        this.personOpen = false;
    };
  }

  connectedCallback() {
    super.connectedCallback();
    session.addEventListener('change', this.onSession);
    document.addEventListener('pointerdown', this.onOutside);
    document.addEventListener('focusin', this.onOutside);
  }

  disconnectedCallback() {
    super.disconnectedCallback();
    session.removeEventListener('change', this.onSession);
    document.removeEventListener('pointerdown', this.onOutside);
    document.removeEventListener('focusin', this.onOutside);
  }

  render() {
    const person = session.person;
    const shown = person !== null && !person.mustChangePassword;
    return html`
      <header class="nav">
        <a class="brand" href="/lots"><img src=${new URL('../mark.svg', import.meta.url).href} alt="">ResponseLedger</a>
        ${shown ? html`
          <button type="button" class="menu-button" aria-expanded=${this.placesOpen ? 'true' : 'false'} aria-controls="places" @click=${() => { this.placesOpen = !this.placesOpen; }}>Menu</button>
          <nav id="places" class="places ${this.placesOpen ? 'open' : ''}" aria-label="Pages" @click=${() => { this.placesOpen = false; }}>
            <ul>${this.links(work)}</ul>
            <span class="split"></span>
            <ul>${this.links(lab)}</ul>
          </nav>` : nothing}
        <div class="person">
          <div class="menu" @keydown=${this.onKey}>
            <button type="button" class="plain" aria-expanded=${this.personOpen ? 'true' : 'false'} aria-controls="person-menu" @click=${() => { this.personOpen = !this.personOpen; }}>
              ${person === null ? 'Theme' : html`<span class="name">${person.name}</span><span aria-hidden="true">${initials(person.name)}</span>`}
            </button>
            <div class="menu-list" id="person-menu" ?hidden=${!this.personOpen}>${this.menu()}</div>
          </div>
        </div>
      </header>`;
  }

  /** @param {typeof work} places */
  links(places) {
    return places.filter((place) => session.holds(place.roles)).map((place) => html`
      <li><a href=${place.href} aria-current=${this.path === place.href ? 'page' : this.path.startsWith(`${place.href}/`) ? 'true' : /** @type {any} */ (nothing)}>${place.words}</a></li>`);
  }

  menu() {
    const person = session.person;
    return html`
      ${person === null ? nothing : html`<p><strong>${person.name}</strong><br><span class="soft small">${person.email}<br>${person.roles.length === 0 ? 'no role: may only read' : person.roles.join(', ')}</span></p>`}
      <div role="group" aria-label="Theme" class="choice">
        ${themes.map(([value, words]) => html`<button type="button" aria-pressed=${this.theme === value ? 'true' : 'false'} @click=${() => this.choose(value)}>${words}</button>`)}
      </div>
      ${person === null ? nothing : html`
        <a class="button" href="/password" @click=${() => { this.personOpen = false; }}>Change password</a>
        <button type="button" @click=${() => { this.personOpen = false; this.tell('sign-out'); }}>Sign out</button>`}`;
  }

  /** @param {string} theme */
  choose(theme) {
    this.theme = theme;
    dispatchEvent(new CustomEvent('responseledger-theme', { detail: theme }));
  }

  /** @param {KeyboardEvent} event */
  onKey(event) {
    if (event.key === 'Escape' && this.personOpen) {
      this.personOpen = false;
      /** @type {HTMLElement | null} */ (this.querySelector('.menu > button'))?.focus();
    }
  }
}

/** @param {string} name */
function initials(name) {
  return name.split(/\s+/).filter((word) => word !== '').slice(0, 2).map((word) => word[0].toUpperCase()).join('');
}

customElements.define('rl-nav', Nav);
