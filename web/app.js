// The start: waits for the server, asks who is signed in, and shows the page of the address.

import { ask, onSignedOut } from './api.js';
import { render } from 'lit';
import { html } from './parts/element.js';
import { acceptDrops } from './parts/file-drop.js';
import { signInAgain } from './parts/sign-in-again.js';
import { say } from './parts/notice.js';
import { go, matchRoute, start } from './router.js';
import { routes } from './routes.js';
import { session } from './session.js';
import './parts/nav.js';
import './parts/busy.js';
import './parts/refusal.js';

const retryMs = 1_500;
const main = /** @type {HTMLElement} */ (document.querySelector('#main'));
const nav = /** @type {HTMLElement & { path: string }} */ (document.querySelector('rl-nav'));

/** What is shown now, so that an arrival at the same page keeps it. */
let shown = { tag: '', path: '' };
let arrivals = 0;

async function begin() {
  for (;;) {
    const [about, answer] = await Promise.all([ask('/api/about'), session.refresh()]);
    if (about.ok)
      tellAbout(about.body);
    if (answer.ok || answer.status === 401)
      break;
    wait(about.ok && !about.body.ready ? 'The server is starting. This page goes on by itself.' : answer.sentence);
    await new Promise((resolve) => setTimeout(resolve, retryMs));
  }

  onSignedOut(signInAgain);
  session.addEventListener('change', () => void arrive(true));
  acceptDrops();
  nav.addEventListener('sign-out', () => void signOut());
  main.replaceChildren();
  start(() => void arrive(false));
}

/** @param {boolean} anew   whether the page is made anew although the address is the same */
async function arrive(anew) {
  const arrival = arrivals += 1;
  const { pathname, search } = location;
  if (pathname === '/') {
    void go('/lots', { replace: true });
    return;
  }

  nav.path = pathname;
  const found = matchRoute(routes, pathname);
  if (session.person === null)
    return show('rl-page-sign-in', () => import('./pages/sign-in.js'), 'Sign in', arrival, { pathname, anew });
  if (session.person.mustChangePassword)
    return show('rl-page-password', () => import('./pages/password.js'), 'Choose your own password', arrival, { pathname, anew });
  if (found === null)
    return tell('There is no such page.', html`<p>The address leads nowhere. <a href="/lots">Go to the lots</a>.</p>`);
  if (!session.holds(found.route.roles)) {
    return tell(found.route.title, html`<p>This page is for ${words(found.route.roles ?? [])}. Ask a manager for the role, or <a href="/lots">go to the lots</a>.</p>`);
  }

  return show(found.route.tag, found.route.load, found.route.title, arrival, { pathname, search, params: found.params, anew });
}

/**
 * @param {string} tag
 * @param {() => Promise<unknown>} load
 * @param {string} title
 * @param {number} arrival
 * @param {{ pathname: string, search?: string, params?: Readonly<Record<string, string>>, anew: boolean }} at
 */
async function show(tag, load, title, arrival, { pathname, search = '', params = {}, anew }) {
  const path = `${tag}${pathname}`;
  try {
    if (customElements.get(tag) === undefined)
      await load();
  } catch {
    tell('The page could not be loaded.', html`<p>The server cannot be reached, or runs a newer version. <a href=${location.href} target="_self">Load it again</a>.</p>`);
    return;
  }

  if (arrival !== arrivals)
    return;
  const query = new URLSearchParams(search);
  const present = /** @type {(HTMLElement & { query: URLSearchParams }) | null} */ (main.firstElementChild);
  if (!anew && shown.path === path && present?.localName === tag) {
    present.query = query;
    return;
  }

  const first = shown.tag === '';
  shown = { tag, path };
  document.title = `${title} - ResponseLedger`;
  const page = Object.assign(document.createElement(tag), { params, query });
  main.replaceChildren(page);
  if (!first) {
    scrollTo(0, 0);
    main.focus();
  }
}

/** @param {string} heading @param {unknown} content */
function tell(heading, content) {
  shown = { tag: 'told', path: '' };
  document.title = `${heading} - ResponseLedger`;
  const place = document.createElement('section');
  place.className = 'page';
  render(html`<h1>${heading}</h1>${content}`, place);
  main.replaceChildren(place);
}

/** @param {string} sentence */
function wait(sentence) {
  const place = document.createElement('div');
  render(html`<rl-busy .label=${sentence}></rl-busy>`, place);
  main.replaceChildren(place);
}

async function signOut() {
  const answer = await session.signOut();
  if (!answer.ok && answer.status !== 401)
    say(answer.sentence, { bad: true });
  else
    await go('/lots');
}

/** @param {{ version: string, engine: number, demo: boolean }} about */
function tellAbout({ version, engine, demo }) {
  /** @type {HTMLElement} */ (document.querySelector('#demo')).hidden = !demo;
  /** @type {HTMLElement} */ (document.querySelector('#version')).textContent = `Version ${version}, numbers of engine ${engine}.`;
}

/** @param {readonly string[]} roles */
function words(roles) {
  return roles.length === 1 ? `people with the role ${roles[0]}` : `people with one of the roles ${roles.join(', ')}`;
}

await begin();
