// Has runs drawn: by a worker where the browser lets a page have one, else on the page itself in slices between its frames.

import { curvesOf, drawPercentiles, drawRuns } from './run-drawing.js';

/** @typedef {import('./run-drawing.js').Curves} Curves */
/** @typedef {import('./run-drawing.js').PictureRequest} PictureRequest */
/** What drawImage takes. @typedef {ImageBitmap | HTMLCanvasElement} Picture */

const longestSliceMs = 8;

/** So few runs are drawn on the page sooner than a worker could answer. */
const fewRuns = 150;

/** The name under which the content security policy lets this module give a worker its address. */
const policyName = 'responseledger';

export class RunPainter {
  /** @type {Worker | null} */
  #worker = null;
  /** @type {Map<number, {runs: {values: Float64Array}[], points: number}>} what was asked to be kept, for the day the worker is lost */
  #sources = new Map();
  /** @type {Map<number, Curves>} without a worker */
  #kept = new Map();
  /** @type {Map<number, (result: unknown) => void>} */
  #waiting = new Map();
  #numbers = 0;
  #ids = 0;

  /** @param {{worker?: boolean}} [options] without a worker all is drawn on the page */
  constructor({ worker = true } = {}) {
    if (worker) this.#worker = startWorker();
    this.#worker?.addEventListener('message', ({ data }) => this.#settle(data.id, data.result));
    this.#worker?.addEventListener('error', () => this.#loseWorker());
  }

  get usesWorker() {
    return this.#worker !== null;
  }

  /**
   * Keeps curves for drawing, until they are forgotten.
   * @param {{values: Float64Array}[]} runs on one grid @param {number} points of the grid
   * @returns {number} the number to draw them by
   */
  keep(runs, points) {
    const number = ++this.#numbers;
    this.#sources.set(number, { runs, points });
    if (this.#worker && runs.length > fewRuns) {
      const curves = curvesOf(runs, points);
      this.#worker.postMessage({ kind: 'keep', number, curves }, [curves.values.buffer]);
    }

    return number;
  }

  /** @param {number} number */
  forget(number) {
    if (this.#isWorkers(number)) this.#worker?.postMessage({ kind: 'forget', number });
    this.#sources.delete(number);
    this.#kept.delete(number);
  }

  /**
   * @param {number} number @param {PictureRequest} request
   * @returns {Promise<Picture | null>} null where the curves were forgotten, or the worker was lost: then asking again helps
   */
  draw(number, request) {
    if (this.#isWorkers(number)) return /** @type {Promise<Picture | null>} */ (this.#ask({ kind: 'draw', number, request }));
    const curves = this.#curves(number);
    return curves ? inSlices(drawRuns(curves, request)).then((pixels) => canvasOf(pixels, request)) : Promise.resolve(null);
  }

  /**
   * @param {number} number @param {number[]} percents
   * @returns {Promise<Float64Array[] | null>}
   */
  percentiles(number, percents) {
    if (this.#isWorkers(number)) return /** @type {Promise<Float64Array[] | null>} */ (this.#ask({ kind: 'percentiles', number, percents }));
    const curves = this.#curves(number);
    return curves ? inSlices(drawPercentiles(curves, percents)) : Promise.resolve(null);
  }

  /** @param {number} number */
  #isWorkers(number) {
    return this.#worker !== null && (this.#sources.get(number)?.runs.length ?? 0) > fewRuns;
  }

  /** @param {number} number */
  #curves(number) {
    const source = this.#sources.get(number);
    if (source && !this.#kept.has(number)) this.#kept.set(number, curvesOf(source.runs, source.points));
    return this.#kept.get(number);
  }

  /** @param {object} order */
  #ask(order) {
    const id = ++this.#ids;
    return new Promise((resolve) => {
      this.#waiting.set(id, resolve);
      this.#worker?.postMessage({ ...order, id });
    });
  }

  /** @param {number} id @param {unknown} result */
  #settle(id, result) {
    this.#waiting.get(id)?.(result);
    this.#waiting.delete(id);
  }

  // Who waits is answered with nothing; whoever asks again is served by the page.
  #loseWorker() {
    this.#worker?.terminate();
    this.#worker = null;
    for (const id of [...this.#waiting.keys()]) this.#settle(id, null);
  }
}

/** @type {RunPainter | null} */
let shared = null;

/** The one painter of a page; its plots share a worker. */
export function sharedPainter() {
  shared ??= new RunPainter();
  return shared;
}

function startWorker() {
  if (typeof Worker === 'undefined' || typeof OffscreenCanvas === 'undefined') return null;
  try {
    const address = new URL('./run.worker.js', import.meta.url).href;
    return new Worker(trusted(address), { type: 'module' });
  } catch {
    return null;
  }
}

// Under a policy that asks for trusted types a worker's address has to be vouched for; this one is a constant of the source.
/** @param {string} address */
function trusted(address) {
  const types = /** @type {{trustedTypes?: {createPolicy: (name: string, rules: object) => {createScriptURL: (address: string) => string}}}} */ (/** @type {unknown} */ (globalThis)).trustedTypes;
  return types === undefined ? address : types.createPolicy(policyName, { createScriptURL: (/** @type {string} */ given) => given }).createScriptURL(address);
}

/**
 * @template T @param {Generator<void, T, void>} steps
 * @returns {Promise<T>}
 */
async function inSlices(steps) {
  let began = performance.now();
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
    if (performance.now() - began >= longestSliceMs) {
      await new Promise((resolve) => setTimeout(resolve));
      began = performance.now();
    }
  }
}

/** @param {Uint8ClampedArray<ArrayBuffer>} pixels @param {PictureRequest} request */
function canvasOf(pixels, { width, height }) {
  const canvas = document.createElement('canvas');
  canvas.width = width;
  canvas.height = height;
  canvas.getContext('2d')?.putImageData(new ImageData(pixels, width, height), 0, 0);
  return canvas;
}
