// What pages and parts are made of: lit elements in the light DOM, so that the global style sheets reach them.

import { LitElement } from 'lit';

export { html, nothing, svg } from 'lit';

export class Element extends LitElement {
  createRenderRoot() {
    return this;
  }

  /** Tells the outside, as a bubbling custom event. @param {string} name @param {unknown} [detail] */
  tell(name, detail) {
    this.dispatchEvent(new CustomEvent(name, { detail, bubbles: true }));
  }
}

/**
 * A page: the router sets params and query, and shows it. A page that loads says so by `title`, which becomes the
 * window's title.
 */
export class Page extends Element {
  /** @type {import('lit').PropertyDeclarations} */
  static properties = {
    params: { attribute: false },
    query: { attribute: false },
  };

  constructor() {
    super();
    /** @type {Readonly<Record<string, string>>} what stands in the braces of the route */
    this.params = {};
    /** @type {URLSearchParams} */
    this.query = new URLSearchParams();
    /** @type {AbortController} ended when the page is left */
    this.leaving = new AbortController();
  }

  connectedCallback() {
    super.connectedCallback();
    this.classList.add('page');
    if (this.leaving.signal.aborted)
      this.leaving = new AbortController();
  }

  disconnectedCallback() {
    super.disconnectedCallback();
    this.leaving.abort();
  }

  /** Says what the window is titled. @param {string} title */
  entitle(title) {
    document.title = `${title} - ResponseLedger`;
  }
}

/**
 * Loads the style sheet that stands beside a module under the same name, once; a module awaits it, so that nothing is
 * shown without its styles.
 * @param {string} moduleAddress   import.meta.url
 * @returns {Promise<void>}
 */
export function ownStyles(moduleAddress) {
  const href = moduleAddress.replace(/\.js$/, '.css');
  const link = document.createElement('link');
  link.rel = 'stylesheet';
  link.href = href;
  return new Promise((resolve) => {
    link.addEventListener('load', () => resolve());
    link.addEventListener('error', () => resolve());
    // Before the print styles, which have the last word.
    document.head.insertBefore(link, document.head.querySelector('link[media="print"]'));
  });
}

let numbered = 0;

/** An id that nothing else on the page has. @param {string} stem */
export function uniqueId(stem) {
  numbered += 1;
  return `${stem}-${numbered}`;
}
