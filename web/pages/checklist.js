// A manager's checklist: what the lab still needs before a lot can be signed, each step with the way there.

import { all, ask } from '../api.js';
import { Page, html, nothing, ownStyles } from '../parts/element.js';
import { stepsOf, summaryOf } from './checklist-steps.js';
import '../parts/busy.js';
import '../parts/refusal.js';

await ownStyles(import.meta.url);

const signs = { done: '\u2713', open: '\u25cb', note: '!' };
const words = { done: 'done', open: 'open', note: 'of note' };

class ChecklistPage extends Page {
  static properties = { steps: { state: true }, refusal: { state: true } };

  constructor() {
    super();
    /** @type {import('./checklist-steps.js').Step[] | null} */
    this.steps = null;
    /** @type {import('../api.js').Answer | null} */
    this.refusal = null;
  }

  connectedCallback() {
    super.connectedCallback();
    void this.load();
  }

  async load() {
    const { signal } = this.leaving;
    const lists = await Promise.all(['/api/people', '/api/benches', '/api/tokens', '/api/devices', '/api/lots?state=open'].map((at) => all(`${at}${at.includes('?') ? '&' : '?'}limit=200`, { signal })));
    const [people, benches, tokens, devices, lots] = lists.map(({ items }) => items);
    const decided = await ask('/api/lots?state=decided&limit=1', { signal });
    this.refusal = [...lists, decided].find((answer) => !answer.ok) ?? null;
    if (this.refusal !== null)
      return;
    const ids = devices.flatMap((device) => device.conditions).map((condition) => condition.maskId).filter((id) => id !== null);
    const masks = await Promise.all(ids.map((id) => ask(`/api/masks/${id}`, { signal })));
    this.refusal = masks.find((answer) => !answer.ok) ?? null;
    if (this.refusal === null) {
      this.steps = stepsOf({
        people, benches, tokens, devices, lots,
        hasDecided: decided.body.items.length > 0,
        masks: Object.fromEntries(masks.map(({ body }) => [body.id, body])),
      }, Date.now());
    }
  }

  render() {
    return html`
      <div class="page-head"><h1>Checklist</h1></div>
      <rl-refusal .answer=${this.refusal} @again=${this.load}></rl-refusal>
      ${this.steps === null ? (this.refusal === null ? html`<rl-busy label="Looking at the lab"></rl-busy>` : nothing) : html`
        <p class="lead">${summaryOf(this.steps)}</p>
        <ol class="steps panel">
          ${this.steps.map((step) => html`
            <li class=${step.state}>
              <span class="sign" aria-hidden="true">${signs[step.state]}</span>
              <div>
                <h2>${step.title} <span class="unseen">(${words[step.state]})</span></h2>
                <p>${step.sentence}</p>
                ${step.rest === undefined || step.rest.length === 0 ? nothing : html`<ul>${step.rest.map((one) => html`<li>${one}</li>`)}</ul>`}
              </div>
              ${step.way === null ? html`<span></span>` : html`<a class=${step.state === 'open' ? 'button main' : 'button'} href=${step.way.href}>${step.way.words}</a>`}
            </li>`)}
        </ol>`}`;
  }
}

customElements.define('rl-page-checklist', ChecklistPage);
