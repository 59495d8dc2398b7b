// A row of tabs (WAI-ARIA pattern, the arrow keys choose at once). The page shows the panel:
//   <rl-tabs label="Views" .tabs=${[['gain', 'Gain'], ['phase', 'Phase']]} chosen="gain" panel="view" @choose=${…}></rl-tabs>
//   <div id="view" role="tabpanel" aria-labelledby="view-tab-gain" tabindex="0">…</div>

import { Element, html } from './element.js';

class Tabs extends Element {
  static properties = { label: {}, tabs: { attribute: false }, chosen: {}, panel: {} };

  constructor() {
    super();
    this.label = '';
    /** @type {readonly (readonly [string, string])[]} */
    this.tabs = [];
    this.chosen = '';
    this.panel = '';
  }

  render() {
    return html`
      <div class="tabs" role="tablist" aria-label=${this.label} @keydown=${this.onKey}>
        ${this.tabs.map(([id, words]) => html`
          <button type="button" role="tab" id="${this.panel}-tab-${id}" aria-controls=${this.panel} aria-selected=${id === this.chosen ? 'true' : 'false'}
            tabindex=${id === this.chosen ? 0 : -1} @click=${() => this.choose(id)}>${words}</button>`)}
      </div>`;
  }

  /** @param {string} id */
  choose(id) {
    if (id === this.chosen)
      return;
    this.chosen = id;
    this.tell('choose', id);
  }

  /** @param {KeyboardEvent} event */
  async onKey(event) {
    const at = this.tabs.findIndex(([id]) => id === this.chosen);
    const last = this.tabs.length - 1;
    /** @type {Record<string, number>} */
    const next = { ArrowLeft: at === 0 ? last : at - 1, ArrowRight: at === last ? 0 : at + 1, Home: 0, End: last };
    if (!(event.key in next))
      return;
    event.preventDefault();
    this.choose(this.tabs[next[event.key]][0]);
    await this.updateComplete;
    /** @type {HTMLElement | null} */ (this.querySelector('[aria-selected="true"]'))?.focus();
  }
}

customElements.define('rl-tabs', Tabs);
