// Shows a refusal of the API where the answer would stand, with the way on: an attempt again, or a link of the page's.
//   <rl-refusal .answer=${answer} @again=${this.load}></rl-refusal>

import { Element, html, nothing } from './element.js';

class Refusal extends Element {
  static properties = { answer: { attribute: false } };

  constructor() {
    super();
    /** @type {import('../api.js').Answer | null} */
    this.answer = null;
  }

  render() {
    if (this.answer === null || this.answer.ok || this.answer.code === 'stopped')
      return nothing;
    const again = this.answer.status === 0 || this.answer.status === 429 || this.answer.status >= 500;
    return html`
      <div class="refusal" role="alert">
        <p>${this.answer.sentence}</p>
        ${again ? html`<div class="row"><button type="button" @click=${() => this.tell('again')}>Try again</button></div>` : nothing}
      </div>`;
  }
}

customElements.define('rl-refusal', Refusal);
