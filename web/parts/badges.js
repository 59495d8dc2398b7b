// Words with a sign and a colour: never colour alone.
//   <rl-outcome outcome="pass"></rl-outcome>      of a verdict; without an outcome: not judged yet
//   <rl-lot-state state="open"></rl-lot-state>

import { Element, html } from './element.js';

/** @type {Readonly<Record<string, { sign: string, words: string, tone: string }>>} */
export const outcomes = Object.freeze({
  pass: { sign: '\u2713', words: 'pass', tone: 'good' },
  conditionalPass: { sign: '(\u2713)', words: 'conditional pass', tone: 'good' },
  conditionalFail: { sign: '(\u2717)', words: 'conditional fail', tone: 'bad' },
  fail: { sign: '\u2717', words: 'fail', tone: 'bad' },
  inconclusive: { sign: '?', words: 'inconclusive', tone: 'doubt' },
});

const notJudged = { sign: '\u2026', words: 'not judged', tone: '' };

/** @type {Readonly<Record<string, { sign: string, words: string, tone: string }>>} */
export const lotStates = Object.freeze({
  open: { sign: '\u25cb', words: 'open', tone: '' },
  approved: { sign: '\u2713', words: 'approved', tone: 'good' },
  approvedWithConcession: { sign: '(\u2713)', words: 'approved with concession', tone: 'doubt' },
  rejected: { sign: '\u2717', words: 'rejected', tone: 'bad' },
});

/** A badge of one's own. @param {{ sign: string, words: string, tone: string }} what */
export function badge({ sign, words, tone }) {
  return html`<span class="badge ${tone}"><span aria-hidden="true">${sign}</span>${words}</span>`;
}

class Outcome extends Element {
  static properties = { outcome: {} };

  constructor() {
    super();
    /** @type {string | null} */
    this.outcome = null;
  }

  render() {
    return badge(outcomes[this.outcome ?? ''] ?? notJudged);
  }
}

class LotState extends Element {
  static properties = { state: {} };

  constructor() {
    super();
    this.state = 'open';
  }

  render() {
    return badge(lotStates[this.state] ?? { sign: '?', words: this.state, tone: '' });
  }
}

customElements.define('rl-outcome', Outcome);
customElements.define('rl-lot-state', LotState);
