// The one module that talks to the API. Nothing here throws for an answer: it is { ok: true, status, body, etag } or a
// refusal { ok: false, status, code, sentence, errors, body }, with a sentence that can be shown as it stands.

/**
 * @typedef {object} Answer
 * @property {boolean} ok
 * @property {number} status      0 where no answer came
 * @property {any} body           JSON, or null
 * @property {string} [etag]
 * @property {string} code        stable word of a refusal; '' of an answer
 * @property {string} sentence    what to show of a refusal; '' of an answer
 * @property {Record<string, string[]>} errors   sentences by field
 */

const header = { 'X-ResponseLedger': '1' };

/** @type {() => Promise<boolean>} */
let askToSignIn = async () => false;

/** Sets what is done when the session has ended: it resolves to true once somebody is signed in again. @param {() => Promise<boolean>} ask */
export function onSignedOut(ask) {
  askToSignIn = ask;
}

/** GET. @param {string} at @param {{ signal?: AbortSignal }} [how] @returns {Promise<Answer>} */
export function ask(at, { signal } = {}) {
  return withSession(at, () => answerOf(fetch(at, { headers: { Accept: 'application/json' }, signal })));
}

/**
 * A request that changes something.
 * @param {'POST'|'PUT'|'PATCH'|'DELETE'} method
 * @param {string} at
 * @param {unknown} [body]      sent as JSON
 * @param {{ etag?: string, signal?: AbortSignal }} [how]   etag goes as If-Match
 * @returns {Promise<Answer>}
 */
export function send(method, at, body, { etag, signal } = {}) {
  const headers = {
    ...header,
    Accept: 'application/json',
    ...(body === undefined ? {} : { 'Content-Type': 'application/json' }),
    ...(etag === undefined ? {} : { 'If-Match': etag }),
  };
  return withSession(at, () => answerOf(fetch(at, { method, headers, body: body === undefined ? null : JSON.stringify(body), signal })));
}

/**
 * Sends a form with files, and tells how far it is. fetch cannot tell, so this is an XMLHttpRequest.
 * @param {string} at
 * @param {FormData} form
 * @param {{ onProgress?: (part: number) => void, signal?: AbortSignal }} [how]   part is 0 to 1
 * @returns {Promise<Answer>}
 */
export function sendForm(at, form, { onProgress, signal } = {}) {
  return withSession(at, () => new Promise((resolve) => {
    const request = new XMLHttpRequest();
    request.open('POST', at);
    request.setRequestHeader('X-ResponseLedger', '1');
    request.setRequestHeader('Accept', 'application/json');
    request.upload.addEventListener('progress', (event) => {
      if (event.lengthComputable)
        onProgress?.(event.loaded / event.total);
    });
    request.addEventListener('load', () => resolve(understand(request.status, request.responseText)));
    request.addEventListener('error', () => resolve(unreachable()));
    request.addEventListener('abort', () => resolve(stopped()));
    signal?.addEventListener('abort', () => request.abort());
    if (signal?.aborted === true)
      resolve(stopped());
    else
      request.send(form);
  }));
}

/**
 * Goes through the pages of a list: yields each answer, the refusal last.
 * @param {string} at           with its query, without a cursor
 * @param {{ signal?: AbortSignal }} [how]
 * @returns {AsyncGenerator<Answer, void, undefined>}
 */
export async function* pages(at, how) {
  let cursor = null;
  do {
    const answer = await ask(cursor === null ? at : withQuery(at, { cursor }), how);
    yield answer;
    cursor = answer.ok ? answer.body.next : null;
  } while (cursor !== null);
}

/**
 * All items of a list, or the refusal that came instead.
 * @param {string} at
 * @param {{ most?: number, signal?: AbortSignal }} [how]
 * @returns {Promise<Answer & { items: any[] }>}
 */
export async function all(at, { most = 5_000, signal } = {}) {
  /** @type {any[]} */
  const items = [];
  let last = unreachable();
  for await (const answer of pages(at, { signal })) {
    last = answer;
    if (answer.ok)
      items.push(...answer.body.items);
    if (items.length >= most)
      break;
  }

  return { ...last, items };
}

/**
 * An address with more in its query. What is null, undefined or '' is left out.
 * @param {string} at
 * @param {Record<string, string | number | boolean | null | undefined>} query
 */
export function withQuery(at, query) {
  const [path, before = ''] = at.split('?');
  const all = new URLSearchParams(before);
  for (const [name, value] of Object.entries(query)) {
    if (value !== null && value !== undefined && value !== '')
      all.set(name, String(value));
  }

  const search = all.toString();
  return search === '' ? path : `${path}?${search}`;
}

/** What an answer's status and text say. @param {number} status @param {string} text @param {string} [etag] @returns {Answer} */
export function understand(status, text, etag) {
  let body = null;
  try {
    body = text === '' ? null : JSON.parse(text);
  } catch {
    return refusal(status, 'unreadable', status >= 500 ? failed : 'The server gave an answer that cannot be read. Load the page again; if it stays so, tell whoever runs the server.');
  }

  if (status >= 200 && status < 300)
    return { ok: true, status, body, code: '', sentence: '', errors: {}, ...(etag === undefined ? {} : { etag }) };
  return refusal(status, body?.code ?? '', sentenceOf(status, body), errorsOf(body), body);
}

const failed = 'The server failed. Nothing of this request was kept; try it again in a moment.';

/** @param {number} status @param {any} body */
function sentenceOf(status, body) {
  const byField = [...new Set(Object.values(errorsOf(body)).flat())];
  if (byField.length > 0)
    return byField.join(' ');
  if (typeof body?.detail === 'string' && body.detail !== '')
    return body.detail;
  switch (status) {
    case 401: return 'You are not signed in.';
    case 403: return 'Your roles do not reach for this. Ask somebody who holds the role, or a manager.';
    case 404: return 'There is nothing here. It may have been named wrongly.';
    case 429: return 'That was too often in a short time. Wait a minute, then try again.';
    default: return status >= 500 ? failed : 'The server refused, and did not say why.';
  }
}

/** @param {any} body @returns {Record<string, string[]>} */
function errorsOf(body) {
  const errors = body?.errors;
  if (errors === null || typeof errors !== 'object' || Array.isArray(errors))
    return {};
  return Object.fromEntries(Object.entries(errors).map(([field, said]) => [field, (Array.isArray(said) ? said : [said]).map(String)]));
}

/** @param {number} status @param {string} code @param {string} sentence @param {Record<string, string[]>} [errors] @param {any} [body] @returns {Answer} */
function refusal(status, code, sentence, errors = {}, body = null) {
  return { ok: false, status, code, sentence, errors, body };
}

function unreachable() {
  return refusal(0, 'unreachable', 'The server cannot be reached. Check the network and that it runs, then try again: nothing that you typed is lost.');
}

function stopped() {
  return refusal(0, 'stopped', 'Stopped.');
}

/** @param {Promise<Response>} asking @returns {Promise<Answer>} */
async function answerOf(asking) {
  try {
    const response = await asking;
    return understand(response.status, await response.text(), response.headers.get('ETag') ?? undefined);
  } catch (failure) {
    return failure instanceof DOMException && failure.name === 'AbortError' ? stopped() : unreachable();
  }
}

/** Sends again once the person has signed in again; signing in itself is never asked for by its own refusal. @param {string} at @param {() => Promise<Answer>} request */
async function withSession(at, request) {
  const answer = await request();
  const aboutSession = at.startsWith('/api/session') && at !== '/api/session/password';
  return answer.status === 401 && !aboutSession && await askToSignIn() ? request() : answer;
}
