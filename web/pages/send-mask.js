// A first mask around the curve of one run: an upper and a lower limit at a distance, with few corners. Pure.

import { quantity, several } from '../numbers.js';
import { goldenCorners } from '../plots/golden-corners.js';

const mostTolerance = 0.1;
const stepDb = 0.001;

/**
 * The limits as POST /api/devices/{id}/masks takes them, and what they are in words; without limits the words say why.
 * @param {{ frequencyHz: number[], gainDb: (number | null)[] }} trace
 * @param {{ distanceDb: number, fromHz: number, toHz: number }} asked
 */
export function maskAround({ frequencyHz, gainDb }, { distanceDb, fromHz, toHz }) {
  const golden = { frequencyHz, values: gainDb.map((value) => value ?? NaN) };
  const made = /** @type {const} */ (['upper', 'lower']).map((side) => ({
    side,
    ...goldenCorners(golden, { side, distance: distanceDb, tolerance: Math.min(mostTolerance, distanceDb / 5), step: stepDb, fromHz, toHz }),
  }));
  const short = made.find(({ corners }) => corners.length < 2);
  if (short !== undefined)
    return { limits: [], words: short.notes[0]?.replace('golden run', 'run') ?? 'The run has no two points there to make a limit of.' };
  const limits = made.map(({ side, corners }) => ({ name: side === 'upper' ? 'Upper limit' : 'Lower limit', quantity: 'gainDb', side, basis: 'absolute', corners }));
  const notes = [...new Set(made.flatMap(({ notes: said }) => said))].map((note) => note.replace('The golden run has', 'The run has').replace('the golden run\'s curve', 'the run\'s curve'));
  const tolerance = Math.max(...made.map((limit) => limit.tolerance));
  return { limits, words: [`${several(made[0].corners.length, 'corner')} above and ${made[1].corners.length} below, within ${quantity(tolerance, 'dB')} of that distance and never wider.`, ...notes].join(' ') };
}
