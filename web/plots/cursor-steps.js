// Where the frequency cursor goes: by the points of the grid, and by the places of a slider. Pure.

import { indexAtOrUnder } from './curve.js';
import { logAxis, placeOf, valueAtPlace } from './spans.js';

/** @typedef {import('./spans.js').Span} Span */

/** A slider runs over this many places from end to end. */
export const sliderPlaces = 1000;

/**
 * The point of a grid so many points further; the end of the grid where there are not so many.
 * @param {Float64Array} frequencyHz @param {number} fromHz @param {number} points negative for lower frequencies
 */
export function stepped(frequencyHz, fromHz, points) {
  const under = indexAtOrUnder(frequencyHz, fromHz);
  const between = under < 0 || frequencyHz[under] !== fromHz;
  const to = points > 0 ? under + points : between ? under + 1 + points : under + points;
  return frequencyHz[Math.min(frequencyHz.length - 1, Math.max(0, to))];
}

/** @param {Span} span @param {number} atHz @returns {number} the place of a slider, a whole number */
export function sliderPlace(span, atHz) {
  return Math.round(sliderPlaces * Math.min(1, Math.max(0, placeOf(logAxis, span, atHz))));
}

/**
 * The frequency of a slider's place. Where the slider moved by one place the cursor moves by at least one point of the grid,
 * so that an arrow key always comes to the next one.
 * @param {Span} span @param {number} place @param {number} fromHz where the cursor is @param {Float64Array} frequencyHz
 */
export function sliderFrequency(span, place, fromHz, frequencyHz) {
  const before = sliderPlace(span, fromHz);
  if (Math.abs(place - before) === 1) {
    const nextHz = stepped(frequencyHz, fromHz, place - before);
    if (nextHz >= span.min && nextHz <= span.max) return nextHz;
  }

  return valueAtPlace(logAxis, span, place / sliderPlaces);
}

/**
 * A frequency brought into a span.
 * @param {Span} span @param {number} atHz
 */
export const inside = (span, atHz) => Math.min(span.max, Math.max(span.min, atHz));
