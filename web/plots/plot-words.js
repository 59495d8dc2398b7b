// What quantities, units and bases are called on a plot. Pure.

import { frequency, margin as withSign, parseNumber, quantity as worded, several } from '../numbers.js';
import { outcomeWord } from './named-runs.js';
import { goldenReadings, runReadings, spreadAt } from './readings.js';

/** @typedef {import('./trace-set.js').TraceSet} TraceSet */
/** @typedef {import('./readings.js').Reading} Reading */

const quantityWords = new Map([['gain', 'Gain'], ['phase', 'Phase'], ['delay', 'Group delay']]);
const unitWords = new Map([['deg', '°']]);

/** @param {TraceSet} set */
export const quantityWord = (set) => quantityWords.get(set.quantity) ?? set.quantity;

/**
 * The title of a value axis: "Gain, dB re 1 V/Pa", "Phase less golden, °".
 * @param {TraceSet} set @param {number} levelHz where curves are levelled
 */
export function axisTitle(set, levelHz) {
  const against = set.basis === 'minusGolden' ? ' less golden' : set.basis === 'levelled' ? ` levelled at ${frequency(levelHz)}` : '';
  return `${quantityWord(set)}${against}, ${unitWords.get(set.unit) ?? set.unit}`;
}

/** The unit of a difference, or beside a number where the axis says the rest: dB of "dB re 1 V/Pa". @param {TraceSet} set */
export const shortUnit = (set) => (set.unit.startsWith('dB') ? 'dB' : set.unit);

/** A value with its unit. What is left of a level or an angle by rounding alone is zero, as in a verdict. @param {TraceSet} set @param {number} value */
export const valueText = (set, value) => worded(set.quantity !== 'delay' && Math.abs(value) < 1e-9 ? 0 : value, shortUnit(set));

/** @param {TraceSet} set @param {Reading | null} reading */
export const marginText = (set, reading) => withSign(reading?.margin?.margin, shortUnit(set));

/**
 * The cursor said in words: frequency, the golden run there, and the least margin of all runs in each set.
 * @param {TraceSet[]} sets @param {number} atHz
 */
export function cursorSentence(sets, atHz) {
  const golden = goldenReadings(sets, atHz).flatMap((reading, i) => (reading === null || Number.isNaN(reading.value) ? [] : [valueText(sets[i], reading.value)]));
  const worst = sets.flatMap((set) => {
    const one = spreadAt(set, atHz).worst;
    return one === null ? [] : [`least margin ${withSign(one.margin, shortUnit(set))} of ${one.serial} to ${one.limit}`];
  });
  return [frequency(atHz), ...(golden.length > 0 ? [`golden run ${golden.join(', ')}`] : []), ...worst].join('; ');
}

/**
 * A run at the cursor said in words; empty for a run that is not there.
 * @param {TraceSet[]} sets @param {number} atHz @param {string} runId
 */
export function runSentence(sets, atHz, runId) {
  const [run] = runReadings(sets, atHz, [runId]);
  if (run === undefined) return '';
  const values = run.readings.flatMap((reading, i) => (reading === null ? [] : [valueText(sets[i], reading.value)]));
  const margins = run.readings.flatMap((reading, i) => (reading?.margin ? [`margin ${marginText(sets[i], reading)} to ${reading.margin.limit}`] : []));
  const name = [run.serial, outcomeWord(run.outcome)].filter((word) => word !== '').join(' ');
  return `${name}; ${[`${frequency(atHz)}: ${values.join(', ')}`, ...margins].join('; ')}`;
}

/**
 * A frequency that was typed, and what is wrong with it.
 * @param {string} typed @param {import('./spans.js').Span} span that it has to lie in
 * @returns {{value: number, problem: ''} | {value: null, problem: string}}
 */
export function typedFrequency(typed, span) {
  const parsed = parseNumber(typed, 'Hz');
  if (parsed.value === null || (parsed.value >= span.min && parsed.value <= span.max)) return parsed;
  return { value: null, problem: `The sweep runs from ${frequency(span.min)} to ${frequency(span.max)}.` };
}

/** "92 other runs", "all 96 runs". @param {number} background @param {number} count */
export function backgroundWords(background, count) {
  return background === count ? `all ${several(count, 'run')}` : several(background, 'other run');
}
