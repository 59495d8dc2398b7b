import assert from 'node:assert/strict';
import { afterEach, test } from 'node:test';
import { RunPainter } from '../../../web/plots/run-painter.js';

const runs = (count) => Array.from({ length: count }, (_, i) => ({ values: Float64Array.of(i, 2 * i) }));
const request = { placing: { x: Float64Array.of(0, 1), yZero: 0, yPerUnit: 1 }, width: 2, height: 2, groups: new Uint8Array(200), colours: [] };

class FakeWorker extends EventTarget {
  static made = [];
  sent = [];
  ended = false;
  constructor(address, options) {
    super();
    Object.assign(this, { address, options });
    FakeWorker.made.push(this);
  }

  postMessage(message) { this.sent.push(message); }
  terminate() { this.ended = true; }
  answer(id, result) { this.dispatchEvent(Object.assign(new Event('message'), { data: { id, result } })); }
}

function withWorker() {
  Object.assign(globalThis, { Worker: FakeWorker, OffscreenCanvas: class {} });
  const painter = new RunPainter();
  return { painter, worker: FakeWorker.made.at(-1) };
}

afterEach(() => {
  delete globalThis.Worker;
  delete globalThis.OffscreenCanvas;
});

test('the worker is a module beside this one', () => {
  const { worker, painter } = withWorker();
  assert.match(worker.address, /\/web\/plots\/run\.worker\.js$/);
  assert.equal(worker.options.type, 'module');
  assert.ok(painter.usesWorker);
});

test('many runs are sent once and drawn by their number', async () => {
  const { worker, painter } = withWorker();
  const number = painter.keep(runs(200), 2);
  const drawn = painter.draw(number, request);
  assert.deepEqual(worker.sent.map((m) => m.kind), ['keep', 'draw']);
  assert.equal(worker.sent[0].curves.count, 200);
  worker.answer(worker.sent[1].id, 'a picture');
  assert.equal(await drawn, 'a picture');
  painter.forget(number);
  assert.deepEqual(worker.sent.at(-1), { kind: 'forget', number });
});

test('answers come to who asked, in whatever order', async () => {
  const { worker, painter } = withWorker();
  const number = painter.keep(runs(200), 2);
  const asked = [painter.draw(number, request), painter.percentiles(number, [50])];
  const [first, second] = worker.sent.slice(1).map((m) => m.id);
  worker.answer(second, 'curves');
  worker.answer(first, 'a picture');
  assert.deepEqual(await Promise.all(asked), ['a picture', 'curves']);
});

test('a few runs never go to the worker', async () => {
  const { worker, painter } = withWorker();
  const [median] = await painter.percentiles(painter.keep(runs(101), 2), [50]);
  assert.deepEqual([...median], [50, 100]);
  assert.deepEqual(worker.sent, []);
});

test('when the worker fails, who waits is answered with nothing, and who asks again is served by the page', async () => {
  const { worker, painter } = withWorker();
  const number = painter.keep(runs(201), 2);
  const waiting = painter.percentiles(number, [50]);
  worker.dispatchEvent(new Event('error'));
  assert.equal(await waiting, null);
  assert.ok(worker.ended && !painter.usesWorker);
  assert.deepEqual([...(await painter.percentiles(number, [50]))[0]], [100, 200]);
});

test('a browser that refuses the worker is served by the page', async () => {
  Object.assign(globalThis, { Worker: class { constructor() { throw new TypeError('refused'); } }, OffscreenCanvas: class {} });
  const painter = new RunPainter();
  assert.ok(!painter.usesWorker);
  assert.deepEqual([...(await painter.percentiles(painter.keep(runs(201), 2), [0]))[0]], [0, 0]);
});

test('what was forgotten is not drawn', async () => {
  const painter = new RunPainter({ worker: false });
  const number = painter.keep(runs(70), 2);
  painter.forget(number);
  assert.equal(await painter.draw(number, request), null);
  assert.equal(await painter.percentiles(number, [50]), null);
});
