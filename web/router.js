// Addresses: a table of routes, and the state of a page in its query. Pure but for start(), which listens to the browser.

/**
 * @typedef {object} Route
 * @property {string} pattern   '/lots/{id}': a part in braces takes one segment
 * @property {string} tag       custom element of the page; it gets .params and .query
 * @property {() => Promise<unknown>} load   imports the page's module
 * @property {string} title
 * @property {string[]} [roles] any of them is enough; left out, everybody signed in
 * @property {boolean} [open]   shown without a session
 */

/** @typedef {{ route: Route, params: Readonly<Record<string, string>> }} Match */

/**
 * The first route of the table that fits a path, or null.
 * @param {readonly Route[]} routes
 * @param {string} path
 * @returns {Match | null}
 */
export function matchRoute(routes, path) {
  for (const route of routes) {
    const params = matchPattern(route.pattern, path);
    if (params !== null)
      return { route, params };
  }

  return null;
}

/**
 * The values of a pattern's braces in a path, or null where it does not fit. A slash at the end does not matter.
 * @param {string} pattern
 * @param {string} path
 * @returns {Readonly<Record<string, string>> | null}
 */
export function matchPattern(pattern, path) {
  const wanted = segments(pattern);
  const given = segments(path);
  if (wanted.length !== given.length)
    return null;

  /** @type {Record<string, string>} */
  const params = {};
  for (const [at, part] of wanted.entries()) {
    if (part.startsWith('{')) {
      try {
        params[part.slice(1, -1)] = decodeURIComponent(given[at]);
      } catch {
        return null;
      }
    } else if (part !== given[at]) {
      return null;
    }
  }

  return Object.freeze(params);
}

/** @param {string} path */
function segments(path) {
  return path.split('/').filter((part) => part !== '');
}

/**
 * The address of a pattern with its braces filled, and of a state in its query.
 * @param {string} pattern
 * @param {Record<string, string>} [params]
 * @param {Record<string, string>} [query]
 */
export function address(pattern, params = {}, query = {}) {
  const path = pattern.replace(/\{(\w+)\}/g, (_, name) => {
    if (params[name] === undefined)
      throw new Error(`The address ${pattern} needs ${name}.`);
    return encodeURIComponent(params[name]);
  });
  const search = new URLSearchParams(query).toString();
  return search === '' ? path : `${path}?${search}`;
}

/**
 * What a page keeps in its query: a name, how it is read and printed, and the value that is not printed.
 * @template T
 * @typedef {{ usual: T, parse: (text: string) => T | undefined, print: (value: T) => string }} Kept
 */

/** @param {string} [usual] @returns {Kept<string>} */
export const text = (usual = '') => ({ usual, parse: (given) => given, print: (value) => value });

/** One of some words. @template {string} T @param {readonly T[]} words @param {T} [usual] @returns {Kept<T>} */
export const oneOf = (words, usual = words[0]) => ({ usual, parse: (given) => words.find((word) => word === given), print: (value) => value });

/** A finite number. @param {number | null} [usual] @returns {Kept<number | null>} */
export const number = (usual = null) => ({
  usual,
  parse: (given) => (given.trim() !== '' && Number.isFinite(Number(given)) ? Number(given) : undefined),
  print: (value) => String(value),
});

/** Several words, parted by commas. @param {readonly string[]} [usual] @returns {Kept<readonly string[]>} */
export const list = (usual = []) => ({ usual, parse: (given) => given.split(',').filter((word) => word !== '').map(decodeURIComponent), print: (value) => value.map(encodeURIComponent).join(',') });

/**
 * Reads a page's state out of a query. What is missing or cannot be read has its usual value; strange names are left alone.
 * @template {Record<string, Kept<any>>} S
 * @param {S} shape
 * @param {URLSearchParams | string} query
 * @returns {Readonly<{ [K in keyof S]: S[K]['usual'] }>}
 */
export function readState(shape, query) {
  const given = new URLSearchParams(query);
  const entries = Object.entries(shape).map(([name, kept]) => {
    const word = given.get(name);
    let value;
    try {
      value = word === null ? undefined : kept.parse(word);
    } catch {
      value = undefined;
    }

    return [name, value === undefined ? kept.usual : value];
  });
  return Object.freeze(Object.fromEntries(entries));
}

/**
 * Prints a state as a query; what has its usual value is left out, so that a plain page has a plain address.
 * @template {Record<string, Kept<any>>} S
 * @param {S} shape
 * @param {Partial<{ [K in keyof S]: S[K]['usual'] }>} state
 * @returns {Record<string, string>}
 */
export function printState(shape, state) {
  /** @type {Record<string, string>} */
  const query = {};
  for (const [name, kept] of Object.entries(shape)) {
    const value = state[name];
    if (value !== undefined && value !== null && kept.print(value) !== (kept.usual === null ? null : kept.print(kept.usual)))
      query[name] = kept.print(value);
  }

  return query;
}

/** @type {(() => boolean | Promise<boolean>) | null} */
let guard = null;
/** @type {() => void} */
let arrived = () => {};
let here = '';

/** Asks this before the page is left; false stays. The router forgets it once the page is left. @param {(() => boolean | Promise<boolean>) | null} ask */
export function beforeLeaving(ask) {
  guard = ask;
}

/** Goes to an address of the app. @param {string} to @param {{ replace?: boolean }} [how] */
export async function go(to, { replace = false } = {}) {
  if (pathOf(to) !== pathOf(here) && !(await mayLeave()))
    return;
  history[replace ? 'replaceState' : 'pushState'](null, '', to);
  here = to;
  arrived();
}

/** Puts a page's state into the address without a new entry in the history and without showing the page anew. @param {Record<string, string>} query */
export function keepInAddress(query) {
  const to = address(location.pathname, {}, query);
  history.replaceState(history.state, '', to);
  here = to;
}

/** Listens to links and to the history; calls back on each arrival and once at the start. @param {() => void} onArrival */
export function start(onArrival) {
  arrived = onArrival;
  here = location.pathname + location.search;
  document.addEventListener('click', onClick);
  addEventListener('popstate', async () => {
    const to = location.pathname + location.search;
    if (pathOf(to) !== pathOf(here) && guard !== null) {
      history.pushState(null, '', here);
      if (!(await mayLeave()))
        return;
      history.replaceState(null, '', to);
    }

    here = to;
    arrived();
  });
  addEventListener('beforeunload', (event) => {
    if (guard !== null)
      event.preventDefault();
  });
  arrived();
}

async function mayLeave() {
  if (guard !== null && !(await guard()))
    return false;
  guard = null;
  return true;
}

/** @param {MouseEvent} event */
function onClick(event) {
  if (event.defaultPrevented || event.button !== 0 || event.metaKey || event.ctrlKey || event.shiftKey || event.altKey)
    return;
  const link = /** @type {Element} */ (event.target).closest?.('a[href]');
  if (!(link instanceof HTMLAnchorElement) || link.target !== '' || link.hasAttribute('download') || link.origin !== location.origin)
    return;
  if (/^\/(api|a|health|openapi)(\/|$)/.test(link.pathname) || (link.hash !== '' && link.pathname === location.pathname))
    return;
  event.preventDefault();
  void go(link.pathname + link.search);
}

/** @param {string} to */
function pathOf(to) {
  return to.split('?')[0];
}
