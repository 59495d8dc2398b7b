// Ticks of a plot's axes and their texts. Pure.

import { significant, withPrefix } from '../numbers.js';

/** @typedef {{value: number, major: boolean, text: string}} Tick */

const digits = 9;
const textWidthPx = 34;
const leastTextGapPx = 26;

/**
 * Ticks of a logarithmic axis at 1 to 9 times each power of ten; the powers are major. Texts stand at 1, 2 and 5 while a
 * decade has room for them, else at the powers. Where fewer than four ticks are left the steps are straight ones.
 * @param {import('./spans.js').Span} span
 * @param {number} lengthPx of the axis
 * @returns {Tick[]}
 */
export function logTicks(span, lengthPx) {
  const decadePx = lengthPx / Math.log10(span.max / span.min);
  const texts = decadePx * Math.log10(2) >= leastTextGapPx ? [1, 2, 5] : [1];
  const every = Math.max(1, Math.ceil(textWidthPx / decadePx));
  const ticks = [];
  for (let power = Math.floor(Math.log10(span.min)); power <= Math.ceil(Math.log10(span.max)); power++) {
    for (let digit = 1; digit <= 9; digit++) {
      const value = power < 0 ? digit / 10 ** -power : digit * 10 ** power;
      if (value < span.min || value > span.max) continue;
      const worded = texts.includes(digit) && power % every === 0;
      ticks.push({ value, major: digit === 1, text: worded ? prefixed(value) : '' });
    }
  }

  return ticks.length >= 4 ? ticks : straightTicks(span, Math.floor(lengthPx / (2 * textWidthPx)), { prefixed: true });
}

/**
 * Ticks of a straight axis at multiples of 1, 2 or 5 times a power of ten; of an angle at parts of a turn.
 * @param {import('./spans.js').Span} span
 * @param {number} most ticks; at least 2 are aimed at
 * @param {{angle?: boolean, prefixed?: boolean}} [kind]
 * @returns {Tick[]}
 */
export function straightTicks(span, most, kind = {}) {
  const step = stepFor((span.max - span.min) / Math.max(2, most), kind.angle === true);
  const first = Math.ceil(span.min / step - 1e-9);
  const last = Math.floor(span.max / step + 1e-9);
  const ticks = [];
  for (let i = first; i <= last; i++) {
    const value = i === 0 ? 0 : Number((i * step).toPrecision(12));
    ticks.push({ value, major: i === 0, text: kind.prefixed ? prefixed(value) : plain(value) });
  }

  return ticks;
}

/** @param {number} least @param {boolean} angle */
function stepFor(least, angle) {
  if (angle && least > 10) {
    const turn = [15, 30, 45, 90, 180].find((step) => step >= least);
    return turn ?? 360 * Math.ceil(least / 360);
  }

  const power = 10 ** Math.floor(Math.log10(least));
  const factor = [1, 2, 5, 10].find((f) => f * power >= least * (1 - 1e-9)) ?? 10;
  return Number((factor * power).toPrecision(12));
}

/** @param {number} value */
const plain = (value) => significant(value, digits);

/** A value with its SI prefix and no unit, which the axis names: "20 k", "1.5 M", "50". @param {number} value */
export const prefixed = (value) => withPrefix(value, '', digits).trimEnd();
