// The worker that draws the background's runs, so that the page stays free meanwhile. It keeps curves under the number that they
// came with until it is told to forget them.

import { drawPercentiles, drawRuns, finish } from './run-drawing.js';

/** @typedef {import('./run-drawing.js').Curves} Curves */
/** @typedef {{kind: 'keep', number: number, curves: Curves}
 *   | {kind: 'forget', number: number}
 *   | {kind: 'draw', id: number, number: number, request: import('./run-drawing.js').PictureRequest}
 *   | {kind: 'percentiles', id: number, number: number, percents: number[]}} Order */

/** @type {Map<number, Curves>} */
const kept = new Map();
const scope = /** @type {DedicatedWorkerGlobalScope} */ (/** @type {unknown} */ (self));

scope.onmessage = ({ data }) => {
  const order = /** @type {Order} */ (data);
  if (order.kind === 'keep') kept.set(order.number, order.curves);
  else if (order.kind === 'forget') kept.delete(order.number);
  else answer(order);
};

/** @param {Extract<Order, {id: number}>} order */
function answer(order) {
  const curves = kept.get(order.number);
  if (curves === undefined) {
    scope.postMessage({ id: order.id, result: null });
  } else if (order.kind === 'percentiles') {
    scope.postMessage({ id: order.id, result: finish(drawPercentiles(curves, order.percents)) });
  } else {
    const { width, height } = order.request;
    const canvas = new OffscreenCanvas(width, height);
    const context = /** @type {OffscreenCanvasRenderingContext2D} */ (canvas.getContext('2d'));
    context.putImageData(new ImageData(finish(drawRuns(curves, order.request)), width, height), 0, 0);
    const picture = canvas.transferToImageBitmap();
    scope.postMessage({ id: order.id, result: picture }, [picture]);
  }
}
