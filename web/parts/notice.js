// Short messages at the edge of the window, read out by screen readers. say() from anywhere:
//   say('The bench was made.');                 goes away by itself
//   say(answer.sentence, { bad: true });        stays until it is closed

import { Element, html } from './element.js';

const shownMs = 8_000;

class Notices extends Element {
  static properties = { notices: { state: true } };

  constructor() {
    super();
    /** @type {{ id: number, sentence: string, bad: boolean }[]} */
    this.notices = [];
    this.last = 0;
  }

  /** @param {string} sentence @param {boolean} bad */
  add(sentence, bad) {
    const id = this.last += 1;
    this.notices = [...this.notices.filter((notice) => notice.sentence !== sentence), { id, sentence, bad }].slice(-4);
    if (!bad)
      setTimeout(() => this.close(id), shownMs);
  }

  /** @param {number} id */
  close(id) {
    if (this.matches(':hover, :focus-within') && this.notices.find((notice) => notice.id === id)?.bad === false)
      setTimeout(() => this.close(id), shownMs);
    else
      this.drop(id);
  }

  /** @param {number} id */
  drop(id) {
    this.notices = this.notices.filter((notice) => notice.id !== id);
  }

  render() {
    return html`
      <div role="status">${this.list(false)}</div>
      <div role="alert">${this.list(true)}</div>`;
  }

  /** @param {boolean} bad */
  list(bad) {
    return this.notices.filter((notice) => notice.bad === bad).map((notice) => html`
      <div class="notice ${bad ? 'bad' : ''}">
        <p>${notice.sentence}</p>
        <button type="button" class="plain" @click=${() => this.drop(notice.id)}>Close</button>
      </div>`);
  }
}

customElements.define('rl-notices', Notices);

/** Tells a sentence. @param {string} sentence @param {{ bad?: boolean }} [how] */
export function say(sentence, { bad = false } = {}) {
  const notices = /** @type {Notices | null} */ (document.querySelector('rl-notices'));
  notices?.add(sentence, bad);
}
