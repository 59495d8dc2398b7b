// What a key asks of a plot. Pure.

/** @typedef {{kind: 'cursor', points: number} | {kind: 'cursorEnd', end: 'min' | 'max'} | {kind: 'run', step: 1 | -1} | {kind: 'pick'}
 *   | {kind: 'zoom', factor: number} | {kind: 'move', frequency: number, values: number} | {kind: 'whole'}} PlotIntent */

/** One press zooms by this factor, and moves by this share of what is in view. */
export const zoomStep = 0.7;
export const moveStep = 0.2;

/** @type {Map<string, PlotIntent>} */
const plain = new Map(/** @type {[string, PlotIntent][]} */ ([
  ['ArrowLeft', { kind: 'cursor', points: -1 }],
  ['ArrowRight', { kind: 'cursor', points: 1 }],
  ['PageDown', { kind: 'cursor', points: -10 }],
  ['PageUp', { kind: 'cursor', points: 10 }],
  ['Home', { kind: 'cursorEnd', end: 'min' }],
  ['End', { kind: 'cursorEnd', end: 'max' }],
  ['ArrowUp', { kind: 'run', step: 1 }],
  ['ArrowDown', { kind: 'run', step: -1 }],
  ['Enter', { kind: 'pick' }],
  ['-', { kind: 'zoom', factor: 1 / zoomStep }],
  ['_', { kind: 'zoom', factor: 1 / zoomStep }],
  ['+', { kind: 'zoom', factor: zoomStep }],
  ['=', { kind: 'zoom', factor: zoomStep }],
  ['0', { kind: 'whole' }],
]));

/** @type {Map<string, PlotIntent>} */
const shifted = new Map(/** @type {[string, PlotIntent][]} */ ([
  ['ArrowLeft', { kind: 'move', frequency: -moveStep, values: 0 }],
  ['ArrowRight', { kind: 'move', frequency: moveStep, values: 0 }],
  ['ArrowUp', { kind: 'move', frequency: 0, values: moveStep }],
  ['ArrowDown', { kind: 'move', frequency: 0, values: -moveStep }],
]));

/**
 * @param {{key: string, shiftKey: boolean, ctrlKey: boolean, altKey: boolean, metaKey: boolean}} event
 * @returns {PlotIntent | null} null for a key that is not the plot's
 */
export function intentOf({ key, shiftKey, ctrlKey, altKey, metaKey }) {
  if (ctrlKey || altKey || metaKey) return null;
  return (shiftKey ? shifted.get(key) : undefined) ?? (shiftKey && key.startsWith('Arrow') ? null : plain.get(key) ?? null);
}
