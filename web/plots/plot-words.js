// What quantities, units and bases are called on a plot. Pure.

import { frequency, margin as withSign, quantity as worded, several } from '../numbers.js';

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
 * The cursor said in words: frequency, the golden run there, and the least margin.
 * @param {number} atHz
 * @param {TraceSet[]} sets
 * @param {(Reading | null)[]} golden
 * @param {({serial: string, margin: number, limit: string} | null)[]} worst one a set
 */
export function cursorSentence(atHz, sets, golden, worst) {
  const goldenWords = golden.flatMap((reading, i) => (reading === null || Number.isNaN(reading.value) ? [] : [valueText(sets[i], reading.value)]));
  const worstWords = worst.flatMap((one, i) => (one === null ? [] : [`least margin ${withSign(one.margin, shortUnit(sets[i]))} of ${one.serial} to ${one.limit}`]));
  return [frequency(atHz), ...(goldenWords.length > 0 ? [`golden run ${goldenWords.join(', ')}`] : []), ...worstWords].join('; ');
}

/** "92 other runs", "all 96 runs". @param {number} background @param {number} count */
export function backgroundWords(background, count) {
  return background === count ? `all ${several(count, 'run')}` : several(background, 'other run');
}
