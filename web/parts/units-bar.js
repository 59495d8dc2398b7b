// How the units of a lot stand against its size: a bar, and the same in words beneath it.
//   <rl-units-bar .size=${lot.size} .counts=${lot.counts}></rl-units-bar>

import { Element, html, svg } from './element.js';
import { count } from '../numbers.js';

/** @typedef {{ units: number, tested: number, passed: number, failed: number, inconclusive: number, withdrawn: number, conceded: number, retests: number }} Counts */

/**
 * The counts in words, those that are nought left out.
 * @param {number} size
 * @param {Counts} counts
 */
export function standing(size, counts) {
  const untested = Math.max(0, size - counts.tested);
  const parts = [
    [counts.failed, 'fail'],
    [counts.inconclusive, 'inconclusive'],
    [untested, 'to test'],
    [counts.withdrawn, 'withdrawn'],
    [counts.conceded, 'under concession'],
  ].filter(([number]) => Number(number) > 0).map(([number, words]) => `${count(Number(number))} ${words}`);
  return [`${count(counts.passed)} of ${count(size)} pass`, ...parts];
}

class UnitsBar extends Element {
  static properties = { size: { attribute: false }, counts: { attribute: false } };

  constructor() {
    super();
    this.size = 0;
    /** @type {Counts} */
    this.counts = { units: 0, tested: 0, passed: 0, failed: 0, inconclusive: 0, withdrawn: 0, conceded: 0, retests: 0 };
  }

  render() {
    const { size, counts } = this;
    const whole = Math.max(size, counts.passed + counts.failed + counts.inconclusive, 1);
    let from = 0;
    const pieces = [['good', counts.passed], ['bad', counts.failed], ['doubt', counts.inconclusive]].map(([tone, number]) => {
      const width = Number(number) / whole * 100;
      const piece = svg`<rect class=${tone} x=${from} y="0" width=${width} height="6"></rect>`;
      from += width;
      return piece;
    });
    return html`
      <svg class="units-bar" viewBox="0 0 100 6" preserveAspectRatio="none" aria-hidden="true">${pieces}</svg>
      <span class="units-words">${standing(size, counts).join(', ')}</span>`;
  }
}

customElements.define('rl-units-bar', UnitsBar);
