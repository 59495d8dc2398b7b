// Columns and choices of columns in words. Pure.

import { count, frequency, several } from '../numbers.js';

/** @typedef {{ column: number, head: string, quantity: string, unit: string }} FoundColumn */
/** @typedef {{ column: number, quantity: string, unit: string }} ColumnChoice */

/** @type {Readonly<Record<string, string>>} */
const quantities = Object.freeze({
  ignore: 'left aside',
  frequency: 'frequency',
  gainDb: 'gain',
  attenuationDb: 'attenuation',
  magnitude: 'magnitude',
  real: 'real part',
  imaginary: 'imaginary part',
  phase: 'phase',
  inputAmplitude: 'input amplitude',
  outputAmplitude: 'output amplitude',
  inputPhase: 'input phase',
  outputPhase: 'output phase',
});

/** What a column holds: "gain in dB". @param {{ quantity: string, unit: string }} column */
export function holds({ quantity, unit }) {
  const word = quantities[quantity] ?? quantity;
  return unit === '' || quantity === 'ignore' ? word : `${word} in ${unit === 'deg' ? 'degrees' : unit}`;
}

/** How a column is called: by its head, or by its number. @param {number} column @param {readonly FoundColumn[]} found */
export function columnName(column, found) {
  const head = found.find((one) => one.column === column)?.head ?? '';
  return head === '' ? `column ${column}` : `\u201c${head}\u201d`;
}

/**
 * A complete choice, a phrase a column.
 * @param {any} choice   a list of columns, or an object with columns and parameter
 * @param {readonly FoundColumn[]} found
 * @returns {string[]}
 */
export function choiceWords(choice, found) {
  /** @type {ColumnChoice[]} */
  const columns = Array.isArray(choice) ? choice : choice.columns ?? [];
  const parameter = Array.isArray(choice) ? null : choice.parameter ?? null;
  return [...(parameter === null ? [] : [`parameter ${parameter}`]), ...columns.filter(({ quantity }) => quantity !== 'ignore').map((column) => `${columnName(column.column, found)} is ${holds(column)}`)];
}

/** What was found in a file, shortly: "frequency in Hz, gain in dB, phase in degrees". @param {any} preview */
export function foundWords(preview) {
  const used = preview.columns.filter((/** @type {FoundColumn} */ column) => column.quantity !== 'ignore');
  if (used.length > 0)
    return used.map(holds).join(', ');
  return preview.reader === 'touchstone' ? `Touchstone${preview.choices?.parameter ? `, ${preview.choices.parameter}` : ''}` : preview.columns.length === 0 ? 'nothing' : several(preview.columns.length, 'column');
}

/** How far a trace reaches: "801 points, 10 Hz to 100 kHz". @param {any} preview */
export function spanWords(preview) {
  const { trace, points } = preview;
  return trace === null ? '' : `${count(points ?? trace.frequencyHz.length)} points, ${frequency(trace.frequencyHz[0])} to ${frequency(trace.frequencyHz.at(-1))}`;
}
