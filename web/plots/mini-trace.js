// The outline of a trace for a table's cell: a path on a small surface, against log f. Pure.

import { frequency, quantity } from '../numbers.js';

/** @typedef {{ frequencyHz: number[], gainDb: (number | null)[], phaseDeg: (number | null)[] | null }} MiniTrace */

const edge = 2;

/**
 * The outlines of gain and phase, each on a scale of its own; '' where there is none.
 * @param {MiniTrace} trace
 * @param {number} width
 * @param {number} height
 * @returns {{ gain: string, phase: string, words: string }}
 */
export function miniTrace({ frequencyHz, gainDb, phaseDeg }, width, height) {
  const gains = /** @type {number[]} */ (gainDb.filter((value) => value !== null));
  const span = `from ${frequency(frequencyHz[0])} to ${frequency(frequencyHz[frequencyHz.length - 1])}`;
  const words = gains.length === 0 ? `no level ${span}` : `gain ${quantity(least(gains), 'dB')} to ${quantity(-least(gains.map((value) => -value)), 'dB')} ${span}${phaseDeg === null ? ', no phase' : ''}`;
  return { gain: outline(frequencyHz, gainDb, width, height), phase: phaseDeg === null ? '' : outline(frequencyHz, phaseDeg, width, height), words };
}

/** @param {number[]} frequencyHz @param {(number | null)[]} values @param {number} width @param {number} height */
function outline(frequencyHz, values, width, height) {
  const present = /** @type {number[]} */ (values.filter((value) => value !== null));
  if (present.length === 0)
    return '';
  const low = least(present);
  const high = -least(present.map((value) => -value));
  const decades = Math.log(frequencyHz[frequencyHz.length - 1] / frequencyHz[0]) || 1;
  const x = (/** @type {number} */ i) => edge + (width - 2 * edge) * (Math.log(frequencyHz[i] / frequencyHz[0]) / decades);
  const y = (/** @type {number} */ value) => (high === low ? height / 2 : height - edge - (height - 2 * edge) * ((value - low) / (high - low)));
  let path = '';
  let pen = 'M';
  for (let i = 0; i < values.length; i++) {
    const value = values[i];
    if (value === null) {
      pen = 'M';
      continue;
    }

    path += `${pen}${x(i).toFixed(1)} ${y(value).toFixed(1)}`;
    pen = 'L';
  }

  return path;
}

/** @param {number[]} values */
function least(values) {
  return values.reduce((best, value) => Math.min(best, value), Infinity);
}
