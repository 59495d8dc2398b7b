// What part of a plot is in view, and the text of it that stands in an address. Pure.

import { logAxis, sameSpan, straightAxis, within, zoomed } from './spans.js';

/** @typedef {import('./spans.js').Span} Span */
/** Spans in view; null where all is shown. @typedef {{frequency: Span | null, upper: Span | null, lower: Span | null}} PlotView */

/** @type {PlotView} */
export const wholeView = Object.freeze({ frequency: null, upper: null, lower: null });

const digits = 5;

/** @param {PlotView} view */
export const isWhole = (view) => view.frequency === null && view.upper === null && view.lower === null;

const leastShare = 1e-3;
const farthest = 3;

/**
 * The frequencies in view.
 * @param {PlotView} view @param {Span} whole
 */
export function frequencyIn(view, whole) {
  return view.frequency === null ? whole : within(logAxis, view.frequency, whole, leastShare);
}

/**
 * The view with other spans in it, kept to what there is to see: the sweep's frequencies, and values not far beyond the curves'.
 * @param {PlotView} view
 * @param {{frequency: Span, panels: {key: 'upper' | 'lower', span: Span}[]}} whole
 * @param {import('./plot-gestures.js').ViewChange} change
 * @returns {PlotView}
 */
export function changedView(view, whole, { frequency, values = [] }) {
  const changed = { ...view };
  if (frequency) {
    const kept = within(logAxis, frequency, whole.frequency, leastShare);
    changed.frequency = sameSpan(kept, whole.frequency) ? null : kept;
  }

  for (const { key, span } of values) {
    const panel = whole.panels.find((one) => one.key === key);
    if (panel === undefined) continue;
    const kept = within(straightAxis, span, zoomed(straightAxis, panel.span, farthest), leastShare);
    changed[key] = sameSpan(kept, panel.span) ? null : kept;
  }

  return changed;
}

/**
 * A view as text: "20~2000,-6~3," for a span of frequencies and one of the upper panel's values. Empty for the whole view.
 * @param {PlotView} view
 */
export function printView(view) {
  if (isWhole(view)) return '';
  return [view.frequency, view.upper, view.lower].map((span) => (span === null ? '' : printSpan(span))).join(',').replace(/,+$/, '');
}

/**
 * The view of a text; the whole view where it says none.
 * @param {string | null | undefined} text
 * @returns {PlotView}
 */
export function parseView(text) {
  if (!text) return wholeView;
  const parts = text.split(',');
  const spans = [0, 1, 2].map((i) => (parts[i] ? parseSpan(parts[i]) : null));
  const faulty = parts.length > 3 || parts.some((part, i) => part !== '' && spans[i] === null) || (spans[0] !== null && spans[0].min <= 0);
  const [frequency, upper, lower] = spans;
  return faulty ? wholeView : { frequency, upper, lower };
}

// As many decimals as tell the ends of the span apart to one part in a hundred thousand.
/** @param {Span} span */
function printSpan({ min, max }) {
  const lastPlace = Math.floor(Math.log10(max - min)) - digits;
  const text = (/** @type {number} */ value) => {
    const places = value === 0 ? 1 : Math.floor(Math.log10(Math.abs(value))) - lastPlace + 1;
    return String(Number(value.toPrecision(Math.min(17, Math.max(1, places)))));
  };
  return `${text(min)}~${text(max)}`;
}

/** @param {string} text @returns {Span | null} */
function parseSpan(text) {
  const ends = text.split('~');
  if (ends.length !== 2 || ends.some((end) => end.trim() === '')) return null;
  const [min, max] = ends.map(Number);
  return Number.isFinite(min) && Number.isFinite(max) && min < max ? { min, max } : null;
}
