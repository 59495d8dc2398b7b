import assert from 'node:assert/strict';
import { test } from 'node:test';
import { pictureKey, placingOf, previewBox } from '../../../web/plots/run-picture.js';
import { logAxis, straightAxis, zoomed } from '../../../web/plots/spans.js';

const scene = (more = {}) => ({ frequency: { min: 10, max: 1000 }, values: { min: -60, max: 20 }, width: 400, height: 200, ...more });
const near = (actual, expected) => assert.ok(Math.abs(actual - expected) < 1e-9, `${actual} is not ${expected}`);

test('the key differs with everything that the picture depends on', () => {
  const others = [
    pictureKey(scene(), 1, 'grey', '1'),
    pictureKey(scene({ frequency: { min: 10, max: 999 } }), 1, 'grey', '1'),
    pictureKey(scene({ values: { min: -61, max: 20 } }), 1, 'grey', '1'),
    pictureKey(scene({ width: 401 }), 1, 'grey', '1'),
    pictureKey(scene({ height: 201 }), 1, 'grey', '1'),
    pictureKey(scene(), 2, 'grey', '1'),
    pictureKey(scene(), 1, 'white', '1'),
    pictureKey(scene(), 1, 'grey', '2'),
  ];
  assert.equal(new Set(others).size, others.length);
  assert.equal(pictureKey(scene(), 1, 'grey', '1'), others[0]);
});

test('a picture of the scene in view lies exactly in its area', () => {
  assert.deepEqual(previewBox(scene(), scene(), { left: 30, top: 7 }), { x: 30, y: 7, width: 400, height: 200 });
});

test('an old picture lies where its own frequencies and values now are', () => {
  const now = scene({ frequency: { min: 100, max: 1000 }, values: { min: -20, max: 20 } });
  const box = previewBox(scene(), now, { left: 0, top: 0 });
  near(box.x, -400);
  near(box.x + box.width, 400);
  near(box.y, 0);
  near(box.y + box.height, 400);
});

test('a picture zoomed about a place keeps that place', () => {
  const now = scene({ frequency: zoomed(logAxis, scene().frequency, 0.3, 0.25), values: zoomed(straightAxis, scene().values, 0.5, 0.75) });
  const box = previewBox(scene(), now, { left: 0, top: 0 });
  near(box.x + 0.25 * box.width, 100);
  near(box.y + 0.25 * box.height, 50);
});

test('an area that was made larger scales the old picture with it', () => {
  const box = previewBox(scene(), scene({ width: 800, height: 100 }), { left: 0, top: 0 });
  assert.deepEqual(box, { x: 0, y: 0, width: 800, height: 100 });
});

test('the grid is placed in device pixels from edge to edge', () => {
  const placing = placingOf(scene(), 2, Float64Array.of(10, 100, 1000));
  assert.deepEqual([placing.pixelWidth, placing.pixelHeight], [800, 400]);
  [0, 400, 800].forEach((x, i) => near(placing.x[i], x));
  near(placing.yZero + placing.yPerUnit * 20, 0);
  near(placing.yZero + placing.yPerUnit * -60, 400);
});
