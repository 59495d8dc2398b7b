// The start page: whether the server is ready, who is signed in, and the lots. It holds no state of its own; it asks again.

import { ask, send } from './api.js';

const part = (id) => document.getElementById(id);
const stateWords = new Map([
  ['open', 'open'],
  ['approved', 'approved'],
  ['approvedWithConcession', 'approved with concession'],
  ['rejected', 'rejected'],
]);
const retryMs = 1500;
let nextLots = null;

function show(section) {
  for (const id of ['signing-in', 'changing', 'lots'])
    part(id).hidden = id !== section;
}

function say(sentence) {
  part('status').textContent = sentence;
}

async function refresh() {
  const about = await ask('/api/about');
  if (!about.ok) {
    say('The server does not answer as it should. Load this page again in a moment.');
    return;
  }

  part('demo').hidden = !about.body.demo;
  part('version').textContent = `Version ${about.body.version}, numbers of engine ${about.body.engine}.`;
  if (!about.body.ready) {
    say('The server is starting. This page goes on by itself.');
    setTimeout(run, retryMs);
    return;
  }

  const session = await ask('/api/session');
  part('person').hidden = !session.ok;
  if (!session.ok) {
    say(session.status === 401 ? 'You are not signed in.' : session.sentence);
    show('signing-in');
    return;
  }

  const { name, roles, mustChangePassword } = session.body;
  part('person-name').textContent = roles.length === 0 ? name : `${name} (${roles.join(', ')})`;
  say(`You are signed in as ${name}.`);
  if (mustChangePassword) {
    show('changing');
    part('current').focus();
    return;
  }

  show('lots');
  part('lots-table').tBodies[0].replaceChildren();
  await moreLots('/api/lots?limit=50');
}

async function moreLots(address) {
  const lots = await ask(address);
  if (!lots.ok) {
    say(lots.sentence);
    return;
  }

  const rows = part('lots-table').tBodies[0];
  for (const lot of lots.body.items)
    rows.append(row(lot));
  nextLots = lots.body.next;
  part('more-lots').hidden = nextLots === null;
  part('lots-table').hidden = rows.rows.length === 0;
  part('no-lots').hidden = rows.rows.length > 0;
}

function row(lot) {
  const line = document.createElement('tr');
  const head = document.createElement('th');
  head.scope = 'row';
  head.textContent = lot.number;
  line.append(head, cell(stateWords.get(lot.state) ?? lot.state));
  for (const number of [lot.size, lot.counts?.tested, lot.counts?.passed, lot.counts?.failed, lot.counts?.inconclusive])
    line.append(cell(number ?? '', 'number'));
  return line;
}

function cell(text, className = '') {
  const made = document.createElement('td');
  made.textContent = String(text);
  made.className = className;
  return made;
}

function onSubmit(form, problem, request) {
  form.addEventListener('submit', async (event) => {
    event.preventDefault();
    const button = form.querySelector('button');
    button.disabled = true;
    problem.textContent = '';
    const answer = await request(Object.fromEntries(new FormData(form)));
    button.disabled = false;
    if (!answer.ok) {
      problem.textContent = answer.sentence;
      return;
    }

    form.reset();
    await run();
  });
}

async function run() {
  try {
    await refresh();
  } catch {
    say('The server cannot be reached. Check that it runs, then load this page again.');
  }
}

onSubmit(part('sign-in'), part('sign-in-problem'), ({ email, password }) => send('POST', '/api/session', { email, password }));
onSubmit(part('change'), part('change-problem'), (form) => send('POST', '/api/session/password', { current: form.current, new: form.new }));
part('sign-out').addEventListener('click', async () => {
  await send('DELETE', '/api/session');
  await run();
});
part('more-lots').addEventListener('click', () => moreLots(`/api/lots?limit=50&cursor=${encodeURIComponent(nextLots)}`));
await run();
