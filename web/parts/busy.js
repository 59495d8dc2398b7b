// Says that something takes time, after a moment: what comes at once does not flicker.
//   <rl-busy label="Reading the lot"></rl-busy>      without an end in sight
//   <rl-busy label="Sending" .done=${0.4}></rl-busy> 0 to 1

import { Element, html, nothing } from './element.js';

const waitMs = 250;

class Busy extends Element {
  static properties = { label: {}, done: { attribute: false }, shown: { state: true } };

  constructor() {
    super();
    this.label = 'Loading';
    /** @type {number | null} */
    this.done = null;
    this.shown = false;
  }

  connectedCallback() {
    super.connectedCallback();
    this.timer = setTimeout(() => { this.shown = true; }, waitMs);
  }

  disconnectedCallback() {
    super.disconnectedCallback();
    clearTimeout(this.timer);
  }

  render() {
    if (!this.shown)
      return nothing;
    return html`
      <div class="busy" role="status">
        ${this.done === null ? html`<progress aria-label=${this.label}></progress>` : html`<progress aria-label=${this.label} .value=${this.done} max="1"></progress>`}
        <span>${this.label}</span>
      </div>`;
  }
}

customElements.define('rl-busy', Busy);
