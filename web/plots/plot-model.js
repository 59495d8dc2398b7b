// All that a response plot shows, worked out from what it was given: panels on the chosen basis, the runs with names, the spans.
// Pure; what did not change between two models is the same object in both.

import { onBasis } from './bases.js';
import { backgroundGroups, isOdd, namedRuns } from './named-runs.js';
import { traceSetOf } from './trace-set.js';
import { spanOf } from './value-span.js';

/** @typedef {import('./spans.js').Span} Span */
/** @typedef {import('./trace-set.js').TraceSet} TraceSet */
/** @typedef {import('./trace-set.js').Overlay} Overlay */
/** @typedef {'upper' | 'lower'} PanelKey */
/** @typedef {{key: PanelKey, set: TraceSet, span: Span, groups: Uint8Array}} PanelModel */
/** `notes` tell what could not come along to the basis.
 * @typedef {{panels: PanelModel[], frequency: Span, named: import('./named-runs.js').NamedRun[], notes: string[], count: number, background: number, odd: number}} PlotModel */
/** @typedef {{upper: Overlay | null, lower: Overlay | null, basis: import('./bases.js').Basis, levelHz: number, chosen: string[] | null}} PlotQuestion */

/**
 * @param {PlotQuestion} question
 * @returns {PlotModel | null} null while there is nothing to show
 */
export function plotModel({ upper, lower, basis, levelHz, chosen }) {
  const given = /** @type {[PanelKey, Overlay][]} */ ([['upper', upper], ['lower', lower]].filter(([, overlay]) => overlay && /** @type {Overlay} */ (overlay).frequencyHz.length > 1));
  if (given.length === 0) return null;

  const notes = new Set();
  const shown = given.map(([key, overlay]) => {
    const made = based(traceSetOf(overlay), basis, levelHz);
    made.notes.forEach((note) => notes.add(note));
    return { key, set: made.set };
  });
  const runs = longest(shown.map(({ set }) => set.runs));
  const named = namedRuns(runs, chosen);
  const panels = shown.map(({ key, set }) => ({ key, set, span: spanOf(set), groups: backgroundGroups(set.runs, named) }));
  return {
    panels,
    frequency: {
      min: Math.min(...panels.map(({ set }) => set.frequencyHz[0])),
      max: Math.max(...panels.map(({ set }) => set.frequencyHz[set.frequencyHz.length - 1])),
    },
    named,
    notes: [...notes],
    count: runs.length,
    background: runs.length - named.length,
    odd: runs.filter(isOdd).length,
  };
}

/** @type {WeakMap<object, {basis: string, levelHz: number, golden: unknown, runs: TraceSet['runs']}>} */
const basedRuns = new WeakMap();

// The runs on a basis stay the same object while only limits change.
/** @param {TraceSet} set @param {import('./bases.js').Basis} basis @param {number} levelHz */
function based(set, basis, levelHz) {
  const made = onBasis(set, basis, levelHz);
  if (made.set.runs === set.runs) return made;
  const before = basedRuns.get(set.runs);
  const golden = set.golden?.values;
  const same = before && before.basis === basis && before.golden === golden && (basis !== 'levelled' || before.levelHz === levelHz);
  if (same) return { ...made, set: { ...made.set, runs: before.runs } };
  basedRuns.set(set.runs, { basis, levelHz, golden, runs: made.set.runs });
  return made;
}

/** @template T @param {T[][]} lists */
const longest = (lists) => lists.reduce((best, list) => (list.length > best.length ? list : best));

/**
 * A sentence on what a plot shows, for those who do not see it.
 * @param {PlotModel} model
 * @param {{quantityWord: (set: TraceSet) => string, frequencyText: (frequencyHz: number) => string, outcomeWord: (outcome: string | null) => string}} words
 */
export function describe(model, { quantityWord, frequencyText, outcomeWord }) {
  const { panels, frequency, named, count, odd } = model;
  const what = panels.map(({ set }, i) => (i === 0 ? quantityWord(set) : quantityWord(set).toLowerCase())).join(' and ');
  const golden = panels[0].set.golden;
  const limits = panels.reduce((sum, { set }) => sum + set.limits.length, 0);
  const parts = [
    `${what} of ${count === 1 ? `${panels[0].set.runs[0]?.serial ?? 'one run'}` : `${count} runs`} from ${frequencyText(frequency.min)} to ${frequencyText(frequency.max)}`,
    golden ? `golden run ${golden.serial}` : 'no golden run',
    limits === 0 ? 'no limits' : limits === 1 ? 'one limit' : `${limits} limits`,
  ];
  const told = named.filter(({ run }) => isOdd(run));
  const oddWords = told.map(({ run }) => `${run.serial} ${outcomeWord(run.outcome)}`);
  if (odd > told.length) oddWords.push(`${odd - told.length} more do not pass`);
  return `${parts.join(', ')}.${oddWords.length > 0 ? ` ${oddWords.join(', ')}.` : ''}`;
}
