import assert from 'node:assert/strict';
import test, { afterEach, beforeEach } from 'node:test';
import * as api from '../../web/api.js';

let asked;
let answers;
const fetched = globalThis.fetch;

beforeEach(() => {
  asked = [];
  answers = [];
  globalThis.fetch = async (at, options) => {
    asked.push({ at, ...options });
    const next = answers.shift();
    if (next instanceof Error)
      throw next;
    return new Response(next.body === undefined ? null : JSON.stringify(next.body), { status: next.status, headers: next.headers ?? {} });
  };
});

afterEach(() => {
  globalThis.fetch = fetched;
  api.onSignedOut(async () => false);
});

test('An answer carries its body and its ETag', async () => {
  answers = [{ status: 200, body: { id: 1 }, headers: { ETag: '"7"' } }];
  const answer = await api.ask('/api/masks/1');
  assert.deepEqual([answer.ok, answer.body, answer.etag, answer.sentence], [true, { id: 1 }, '"7"', '']);
});

test('A request that changes something carries the header, JSON and If-Match', async () => {
  answers = [{ status: 204 }];
  const answer = await api.send('PUT', '/api/masks/1', { title: 'a' }, { etag: '"7"' });
  assert.ok(answer.ok);
  assert.equal(asked[0].headers['X-ResponseLedger'], '1');
  assert.equal(asked[0].headers['If-Match'], '"7"');
  assert.equal(asked[0].body, '{"title":"a"}');
});

test('Errors by field are told by field, and once as a sentence', async () => {
  answers = [{ status: 422, body: { code: 'invalid', detail: 'Some fields cannot stand.', errors: { name: ['Give a name.'], 'limits[0].name': ['Give a name.', 'At most 100 characters.'] } } }];
  const answer = await api.send('POST', '/api/benches', {});
  assert.deepEqual([answer.ok, answer.status, answer.code], [false, 422, 'invalid']);
  assert.deepEqual(answer.errors, { name: ['Give a name.'], 'limits[0].name': ['Give a name.', 'At most 100 characters.'] });
  assert.equal(answer.sentence, 'Give a name. At most 100 characters.');
});

test('A refusal without fields is told by its detail, with its code and body', async () => {
  answers = [{ status: 409, body: { code: 'unitsNotPassed', detail: '2 of 24 units do not pass.' } }];
  const answer = await api.send('POST', '/api/lots/1/decisions', {});
  assert.deepEqual([answer.code, answer.sentence, answer.errors], ['unitsNotPassed', '2 of 24 units do not pass.', {}]);
  assert.equal(answer.body.code, 'unitsNotPassed');
});

test('Each kind of trouble has a sentence of its own', () => {
  const said = [[401, ''], [403, ''], [404, ''], [429, ''], [500, ''], [502, '<html>'], [400, '<html>'], [418, '{}']].map(([status, text]) => api.understand(status, text).sentence);
  assert.ok(said.every((sentence) => /^[A-Z].*\.$/.test(sentence)));
  assert.equal(new Set(said).size, said.length - 1);
});

test('A server that is gone is a refusal with status 0 and no exception', async () => {
  answers = [new TypeError('fetch failed')];
  const answer = await api.ask('/api/lots');
  assert.deepEqual([answer.ok, answer.status, answer.code], [false, 0, 'unreachable']);
});

test('An ended session is asked for, and the request sent again', async () => {
  answers = [{ status: 401, body: {} }, { status: 201, body: { id: 5 } }];
  api.onSignedOut(async () => true);
  const answer = await api.send('POST', '/api/benches', { name: 'typed' });
  assert.deepEqual([answer.status, asked.length, asked[1].body], [201, 2, '{"name":"typed"}']);
});

test('Nobody is asked to sign in by the sign-in itself, and not twice by one request', async () => {
  let times = 0;
  api.onSignedOut(async () => { times += 1; return times === 1; });
  answers = [{ status: 401, body: {} }];
  assert.equal((await api.send('POST', '/api/session', {})).status, 401);
  assert.equal(times, 0);
  answers = [{ status: 401, body: {} }, { status: 401, body: {} }];
  assert.equal((await api.ask('/api/lots')).status, 401);
  assert.equal(times, 1);
});

test('A list is followed from cursor to cursor to its end', async () => {
  answers = [{ status: 200, body: { items: [1, 2], next: 'a b' } }, { status: 200, body: { items: [3], next: null } }];
  const answer = await api.all('/api/lots?limit=2');
  assert.deepEqual(answer.items, [1, 2, 3]);
  assert.deepEqual(asked.map((one) => one.at), ['/api/lots?limit=2', '/api/lots?limit=2&cursor=a+b']);
});

test('A list that breaks in the middle gives what came and the refusal', async () => {
  answers = [{ status: 200, body: { items: [1], next: 'x' } }, { status: 500, body: {} }];
  const answer = await api.all('/api/lots');
  assert.deepEqual([answer.ok, answer.items], [false, [1]]);
});

test('A query leaves out what is not given', () => {
  assert.equal(api.withQuery('/api/lots?limit=5', { state: '', device: null, search: 'a b', cursor: undefined }), '/api/lots?limit=5&search=a+b');
  assert.equal(api.withQuery('/api/lots', {}), '/api/lots');
});

class UploadStub extends EventTarget {
  static last;
  upload = new EventTarget();
  headers = {};
  status = 0;
  responseText = '';
  aborted = false;

  constructor() {
    super();
    UploadStub.last = this;
  }

  open(method, at) {
    Object.assign(this, { method, at });
  }

  setRequestHeader(name, value) {
    this.headers[name] = value;
  }

  send(form) {
    this.form = form;
  }

  abort() {
    this.aborted = true;
    this.dispatchEvent(new Event('abort'));
  }

  answer(status, body) {
    Object.assign(this, { status, responseText: JSON.stringify(body) });
    this.dispatchEvent(new Event('load'));
  }
}

test('A form tells how far it is, and its answer is understood like any other', async () => {
  globalThis.XMLHttpRequest = UploadStub;
  const parts = [];
  const form = new FormData();
  const sending = api.sendForm('/api/runs', form, { onProgress: (part) => parts.push(part) });
  const request = UploadStub.last;
  assert.deepEqual([request.method, request.at, request.headers['X-ResponseLedger'], request.form], ['POST', '/api/runs', '1', form]);
  for (const [loaded, lengthComputable] of [[25, true], [50, false], [100, true]])
    request.upload.dispatchEvent(Object.assign(new Event('progress'), { loaded, total: 100, lengthComputable }));
  request.answer(422, { code: 'nothingTaken', detail: 'No file was taken.', results: [{ outcome: 'refused' }] });
  const answer = await sending;
  assert.deepEqual([parts, answer.ok, answer.code, answer.body.results.length], [[0.25, 1], false, 'nothingTaken', 1]);
});

test('A form that is stopped or meets no server is a refusal', async () => {
  globalThis.XMLHttpRequest = UploadStub;
  const stop = new AbortController();
  const stopped = api.sendForm('/api/runs', new FormData(), { signal: stop.signal });
  stop.abort();
  assert.equal((await stopped).code, 'stopped');
  assert.ok(UploadStub.last.aborted);
  assert.equal((await api.sendForm('/api/runs', new FormData(), { signal: stop.signal })).code, 'stopped');
  assert.equal(UploadStub.last.form, undefined);
  const broken = api.sendForm('/api/runs', new FormData());
  UploadStub.last.dispatchEvent(new Event('error'));
  assert.equal((await broken).code, 'unreachable');
});
