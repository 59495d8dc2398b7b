import assert from 'node:assert/strict';
import { test } from 'node:test';
import { RunLayer } from '../../../web/plots/run-layer.js';

const gridHz = Float64Array.of(10, 100, 1000);
const runs = (count) => Array.from({ length: count }, (_, i) => ({ values: Float64Array.of(i, i, i) }));
const plain = (count) => new Uint8Array(count);
const wish = (more = {}) => ({ scene: { frequency: { min: 10, max: 1000 }, values: { min: -10, max: 10 }, width: 100, height: 50, ...more }, pixelRatio: 1, colours: [[1, 2, 3]] });
const area = { left: 0, top: 0 };
const calm = () => new Promise((resolve) => { setTimeout(resolve, 60); });

class Painter {
  kept = new Map();
  asked = [];
  percentilesAsked = 0;
  #numbers = 0;
  keep(given) { this.kept.set(++this.#numbers, given); return this.#numbers; }
  forget(number) { this.kept.delete(number); }
  draw(number, request) { return new Promise((resolve) => { this.asked.push({ number, request, resolve }); }); }
  percentiles() { this.percentilesAsked++; return Promise.resolve([Float64Array.of(1)]); }
  answer(picture = { close: () => {} }) { this.asked.at(-1).resolve(picture); return calm(); }
}

function layer(count = 3) {
  const painter = new Painter();
  const told = { changes: 0 };
  const made = new RunLayer(painter, () => { told.changes++; });
  const pasted = [];
  const context = { save() {}, restore() {}, beginPath() {}, rect() {}, clip() {}, drawImage: (picture, ...box) => pasted.push({ picture, box }) };
  const given = runs(count);
  made.take(given, gridHz, plain(count));
  return { painter, told, layer: made, given, pasted, show: (more) => made.show(context, area, wish(more)) };
}

test('the first picture is asked for at once, and shown when it comes', async () => {
  const { painter, told, pasted, show, layer: made } = layer();
  show();
  assert.equal(painter.asked.length, 1);
  assert.deepEqual([pasted.length, made.isSharp], [0, false]);
  await painter.answer();
  assert.equal(told.changes, 1);
  show();
  assert.deepEqual(pasted[0].box, [0, 0, 100, 50]);
  assert.ok(made.isSharp);
  assert.equal(painter.asked.length, 1);
});

test('while another view is drawn the old picture is shown where it belongs', async () => {
  const { painter, pasted, show, layer: made } = layer();
  show();
  await painter.answer();
  show({ frequency: { min: 100, max: 1000 } });
  assert.deepEqual(pasted.at(-1).box, [-100, 0, 200, 50]);
  assert.ok(!made.isSharp);
  await calm();
  assert.equal(painter.asked.length, 2);
});

test('of many views in a row only the last is drawn', async () => {
  const { painter, show, layer: made } = layer();
  show();
  await painter.answer();
  for (let min = 11; min < 30; min++) show({ frequency: { min, max: 1000 } });
  await calm();
  assert.equal(painter.asked.length, 2);
  await painter.answer();
  assert.ok(made.isSharp);
});

test('a view that came while one was drawn is drawn after it', async () => {
  const { painter, show, layer: made } = layer();
  show();
  show({ width: 300 });
  assert.equal(painter.asked.length, 1);
  await painter.answer();
  assert.equal(painter.asked.length, 2);
  assert.equal(painter.asked[1].request.width, 300);
  await painter.answer();
  assert.ok(made.isSharp);
});

test('the same runs are not sent again, other runs are, and the old ones forgotten', () => {
  const { painter, layer: made, given } = layer();
  made.take(given, gridHz, plain(3));
  assert.equal(painter.kept.size, 1);
  made.take(runs(3), gridHz, plain(3));
  assert.deepEqual([...painter.kept.keys()], [2]);
  made.clear();
  assert.equal(painter.kept.size, 0);
});

test('other groups of the same runs are drawn again without sending them', async () => {
  const { painter, layer: made, given, show } = layer();
  show();
  await painter.answer();
  made.take(given, gridHz, Uint8Array.of(0, 255, 0));
  show();
  await calm();
  assert.equal(painter.asked.length, 2);
  assert.deepEqual([...painter.asked[1].request.groups], [0, 255, 0]);
  assert.equal(painter.kept.size, 1);
});

test('a picture that comes after its runs are gone is not shown', async () => {
  const { painter, layer: made, told, show } = layer();
  show();
  made.take(runs(2), gridHz, plain(2));
  await painter.answer();
  assert.equal(told.changes, 0);
});

test('when the worker is lost the picture is asked for once more', async () => {
  const { painter, show, told } = layer();
  show();
  await painter.answer(null);
  assert.equal(painter.asked.length, 2);
  await painter.answer();
  assert.equal(told.changes, 1);
});

test('nothing is asked for where no run is in the background', () => {
  const { painter, layer: made, given, show } = layer();
  made.take(given, gridHz, new Uint8Array(3).fill(255));
  show();
  assert.equal(painter.asked.length, 0);
  assert.ok(made.isSharp);
});

test('percentiles come from sixty runs on, are asked for once, and anew for other runs', async () => {
  const [few, many] = [layer(59), layer(60)];
  for (const { layer: made } of [few, many]) {
    made.wantPercentiles();
    made.wantPercentiles();
  }

  await calm();
  assert.deepEqual([few.painter.percentilesAsked, few.layer.percentiles], [0, null]);
  assert.deepEqual([many.painter.percentilesAsked, many.layer.percentiles.length], [1, 1]);
  many.layer.take(runs(70), gridHz, plain(70));
  assert.equal(many.layer.percentiles, null);
  many.layer.wantPercentiles();
  assert.equal(many.painter.percentilesAsked, 2);
});
