// The background's runs in one panel: a picture that is drawn again when it no longer fits, and shown moved and scaled meanwhile.

import { fewestRuns, usualPercentiles } from './percentiles.js';
import { pictureKey, placingOf, previewBox } from './run-picture.js';

/** @typedef {import('./run-picture.js').Scene} Scene */
/** @typedef {import('./run-raster.js').Colour} Colour */
/** What the layer is to show. @typedef {{scene: Scene, pixelRatio: number, colours: Colour[]}} Wish */

const calmMs = 20;

export class RunLayer {
  /** @type {{picture: import('./run-painter.js').Picture, scene: Scene, key: string} | null} */
  #shown = null;
  /** @type {{wish: Wish, key: string} | null} */
  #wanted = null;
  /** @type {{number: number, version: number, runs: object[], frequencyHz: Float64Array} | null} */
  #curves = null;
  /** @type {Uint8Array} */
  #groups = new Uint8Array(0);
  #versions = 0;
  #drawing = false;
  #percentilesAsked = false;
  #timer = 0;
  /** Percentile curves of the runs, in the order of `usualPercentiles`; null while there are none. @type {Float64Array[] | null} */
  percentiles = null;

  /** @param {import('./run-painter.js').RunPainter} painter @param {() => void} onChange called when there is something new to show */
  constructor(painter, onChange) {
    this.painter = painter;
    this.onChange = onChange;
  }

  /** Whether the picture is the one that was wished for. */
  get isSharp() {
    return this.#wanted === null || this.#wanted.key === this.#shown?.key;
  }

  /**
   * Takes other curves, or other groups of them. The same array of runs is taken for the same curves.
   * @param {{values: Float64Array}[]} runs @param {Float64Array} frequencyHz @param {Uint8Array} groups a group a run; 255 is not drawn
   */
  take(runs, frequencyHz, groups) {
    if (this.#curves?.runs !== runs || this.#curves.frequencyHz !== frequencyHz) {
      this.clear();
      if (runs.length === 0 || frequencyHz.length === 0) return;
      this.#curves = { number: this.painter.keep(runs, frequencyHz.length), version: ++this.#versions, runs, frequencyHz };
    } else if (groups.some((group, i) => group !== this.#groups[i])) {
      this.#curves.version = ++this.#versions;
    }

    this.#groups = groups;
  }

  /**
   * Shows the picture in its area, and has a new one drawn where it does not fit.
   * @param {CanvasRenderingContext2D} context in CSS pixels
   * @param {{left: number, top: number}} area
   * @param {Wish} wish
   */
  show(context, area, wish) {
    if (this.#curves === null || this.#groups.every((group) => group === 255)) return;
    this.#want(wish, this.#curves.version);
    if (this.#shown === null) return;

    const box = previewBox(this.#shown.scene, wish.scene, area);
    context.save();
    context.beginPath();
    context.rect(Math.round(area.left), Math.round(area.top), Math.round(wish.scene.width), Math.round(wish.scene.height));
    context.clip();
    context.drawImage(this.#shown.picture, box.x, box.y, box.width, box.height);
    context.restore();
  }

  clear() {
    if (this.#curves) this.painter.forget(this.#curves.number);
    clearTimeout(this.#timer);
    this.#release();
    this.#curves = null;
    this.#wanted = null;
    this.#percentilesAsked = false;
    this.percentiles = null;
  }

  /** @param {Wish} wish @param {number} version */
  #want(wish, version) {
    const key = pictureKey(wish.scene, wish.pixelRatio, wish.colours.join(' '), String(version));
    if (key === this.#wanted?.key) return;
    this.#wanted = { wish, key };
    if (key === this.#shown?.key) return;
    clearTimeout(this.#timer);
    if (this.#shown === null) this.#draw();
    else this.#timer = setTimeout(() => this.#draw(), calmMs);
  }

  async #draw() {
    const curves = this.#curves;
    const wanted = this.#wanted;
    if (this.#drawing || curves === null || wanted === null) return;
    this.#drawing = true;
    const { scene, pixelRatio, colours } = wanted.wish;
    const { pixelWidth: width, pixelHeight: height, ...placing } = placingOf(scene, pixelRatio, curves.frequencyHz);
    const request = { placing, width, height, groups: this.#groups, colours };
    const picture = await this.painter.draw(curves.number, request) ?? await this.painter.draw(curves.number, request);
    this.#drawing = false;
    if (picture !== null && curves === this.#curves) {
      this.#release();
      this.#shown = { picture, scene, key: wanted.key };
      this.onChange();
    }

    if (this.#wanted !== null && this.#wanted.key !== wanted.key) this.#draw();
  }

  /** Has percentile curves worked out, once. They take the worker's time, so the picture goes first. */
  async wantPercentiles() {
    const curves = this.#curves;
    if (curves === null || this.#percentilesAsked || curves.runs.length < fewestRuns) return;
    this.#percentilesAsked = true;
    const found = await this.painter.percentiles(curves.number, usualPercentiles);
    if (curves !== this.#curves || found === null) return;
    this.percentiles = found;
    this.onChange();
  }

  #release() {
    if (this.#shown && 'close' in this.#shown.picture) this.#shown.picture.close();
    this.#shown = null;
  }
}
