// The view of a plot that both its page and its people change. A page that gives the same view again, or gives back what it was
// told, does not take the plot away from under a pointer. Pure.

import { printView, wholeView } from './plot-view.js';

/** @typedef {import('./plot-view.js').PlotView} PlotView */

export class ViewKeeper {
  /** @type {PlotView} */
  #view = wholeView;
  #given = '';
  /** @type {string | null} */
  #told = null;

  get view() {
    return this.#view;
  }

  /** Takes a view from the page. @param {PlotView} view @returns {boolean} whether it is news */
  give(view) {
    const text = printView(view);
    const isNews = text !== this.#given && text !== this.#told;
    this.#given = text;
    if (isNews) {
      this.#told = null;
      this.#view = view;
    }

    return isNews;
  }

  /** Takes a view from the people at the plot. @param {PlotView} view */
  change(view) {
    this.#view = view;
  }

  /** The view as the page is told it. */
  tell() {
    this.#told = printView(this.#view);
    return { view: this.#view, text: this.#told };
  }
}
