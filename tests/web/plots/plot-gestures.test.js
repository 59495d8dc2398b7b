import assert from 'node:assert/strict';
import { test } from 'node:test';
import { attachGestures, handleUnder, panelAt } from '../../../web/plots/plot-gestures.js';

// Two panels of 300 by 100 pixels over three decades: a decade is 100 pixels, a decibel one.
const panel = (key, top) => ({
  key, left: 50, right: 350, top, bottom: top + 100,
  frequency: { min: 10, max: 10_000 }, values: { min: -100, max: 0 },
  x: (f) => 50 + 100 * (Math.log10(f) - 1),
  y: (v) => top - v,
});
const panels = [panel('upper', 10), panel('lower', 110)];
const near = (actual, expected) => assert.ok(Math.abs(actual - expected) <= 1e-6 * Math.max(1, Math.abs(expected)), `${actual} is not ${expected}`);

class Surface extends EventTarget {
  focused = false;
  getBoundingClientRect() { return { left: 0, top: 0 }; }
  setPointerCapture() {}
  matches() { return this.focused; }
}

function plot(handles = []) {
  const surface = new Surface();
  const told = [];
  const host = Object.fromEntries(['point', 'pick', 'drawBox', 'change', 'whole', 'dragHandle'].map((name) => [name, (...what) => told.push([name, ...what])]));
  const detach = attachGestures(surface, { ...host, panels: () => panels, grab: (place) => handleUnder(panels, handles, place) });
  const send = (type, x, y, more = {}) => {
    const event = new Event(type, { cancelable: true });
    Object.assign(event, { clientX: x, clientY: y, pointerId: 1, pointerType: 'mouse', button: 0, shiftKey: false, ctrlKey: false, deltaX: 0, deltaY: 0, deltaMode: 0 }, more);
    surface.dispatchEvent(event);
    return event;
  };
  return { surface, send, detach, told, of: (name) => told.filter(([what]) => what === name).map(([, ...rest]) => rest) };
}

function drag(made, from, to, more = {}) {
  made.send('pointerdown', ...from, more);
  made.send('pointermove', (from[0] + to[0]) / 2, (from[1] + to[1]) / 2, more);
  made.send('pointermove', ...to, more);
  made.send('pointerup', ...to, more);
}

test('a pointer that only moves points, and one that leaves points nowhere', () => {
  const made = plot();
  made.send('pointermove', 100, 50);
  made.send('pointerleave', 0, 0);
  assert.deepEqual(made.of('point'), [[{ x: 100, y: 50 }], [null]]);
});

test('a press without a drag picks', () => {
  const made = plot();
  drag(made, [100, 50], [102, 51]);
  assert.deepEqual(made.of('pick'), [[{ x: 102, y: 51 }]]);
  assert.deepEqual(made.of('change'), []);
});

test('a box zooms into what it holds, and it picks nothing', () => {
  const made = plot();
  drag(made, [150, 30], [250, 60]);
  const [[{ frequency, values }]] = made.of('change');
  near(frequency.min, 100);
  near(frequency.max, 1000);
  assert.equal(values[0].key, 'upper');
  near(values[0].span.min, -50);
  near(values[0].span.max, -20);
  assert.deepEqual(made.of('pick'), []);
  assert.equal(made.of('drawBox').at(-1)[0], null);
});

test('a flat box zooms frequencies alone and is drawn over both panels', () => {
  const made = plot();
  drag(made, [250, 150], [150, 152]);
  const [[{ frequency, values }]] = made.of('change');
  near(frequency.min, 100);
  assert.deepEqual(values, []);
  const drawn = made.of('drawBox').map(([box]) => box).filter((box) => box !== null).at(-1);
  assert.deepEqual([drawn.top, drawn.bottom], [10, 210]);
});

test('a thin box zooms values alone, of the panel where it began', () => {
  const made = plot();
  drag(made, [200, 120], [203, 500]);
  const [[{ frequency, values }]] = made.of('change');
  assert.equal(frequency, undefined);
  assert.equal(values[0].key, 'lower');
  near(values[0].span.min, -100);
  near(values[0].span.max, -10);
});

test('with Shift a drag moves what is in view along with the pointer', () => {
  const made = plot();
  drag(made, [150, 50], [250, 50], { shiftKey: true });
  const total = made.of('change').reduce((decades, [{ frequency }]) => decades + Math.log10(frequency.min / 10), 0);
  near(total, -1);
});

test('the wheel is the page\'s until the plot has the focus', () => {
  const made = plot();
  assert.ok(!made.send('wheel', 150, 50, { deltaY: -100 }).defaultPrevented);
  made.surface.focused = true;
  assert.ok(made.send('wheel', 150, 50, { deltaY: -100 }).defaultPrevented);
  const [[{ frequency }]] = made.of('change');
  near((Math.log10(100) - Math.log10(frequency.min)) / Math.log10(frequency.max / frequency.min), 1 / 3);
  assert.ok(frequency.max / frequency.min < 1000);
});

test('over a value axis the wheel zooms its values', () => {
  const made = plot();
  made.surface.focused = true;
  made.send('wheel', 20, 160, { deltaY: 100 });
  const [[{ frequency, values }]] = made.of('change');
  assert.equal(frequency, undefined);
  assert.equal(values[0].key, 'lower');
  assert.ok(values[0].span.max - values[0].span.min > 100);
});

test('one finger carries the cursor, and its tap picks', () => {
  const made = plot();
  drag(made, [100, 50], [200, 50], { pointerType: 'touch' });
  assert.deepEqual(made.of('point').at(-1), [{ x: 200, y: 50 }]);
  assert.deepEqual(made.of('change'), []);
  drag(made, [100, 50], [100, 50], { pointerType: 'touch' });
  assert.equal(made.of('pick').length, 1);
});

test('two fingers that part zoom in, and pick nothing', () => {
  const made = plot();
  const finger = (type, id, x) => made.send(type, x, 50, { pointerId: id, pointerType: 'touch' });
  finger('pointerdown', 1, 150);
  finger('pointerdown', 2, 250);
  finger('pointermove', 2, 350);
  const [[{ frequency }]] = made.of('change');
  near(Math.log10(frequency.max / frequency.min), 1.5);
  finger('pointerup', 1, 150);
  finger('pointerup', 2, 350);
  assert.deepEqual(made.of('pick'), []);
});

test('a handle is dragged and tells when it is let go; a press on it moves nothing', () => {
  const made = plot([{ panel: 'upper', frequencyHz: 100, value: -50 }]);
  drag(made, [152, 62], [200, 80]);
  assert.deepEqual(made.of('dragHandle').at(-1), [0, { x: 200, y: 80 }, true]);
  assert.deepEqual(made.of('change'), []);
  const before = made.of('dragHandle').length;
  drag(made, [152, 62], [153, 62]);
  assert.equal(made.of('dragHandle').length, before);
});

test('a cancelled drag does nothing', () => {
  const made = plot();
  made.send('pointerdown', 150, 30);
  made.send('pointermove', 250, 60);
  made.send('pointercancel', 250, 60);
  assert.deepEqual([...made.of('change'), ...made.of('pick')], []);
});

test('taken away, the gestures are deaf', () => {
  const made = plot();
  made.detach();
  made.send('pointermove', 100, 50);
  made.send('dblclick', 100, 50);
  assert.deepEqual(made.told, []);
});

test('beside the panels the nearest one counts', () => assert.deepEqual([0, 50, 109, 111, 900].map((y) => panelAt(panels, y).key), ['upper', 'upper', 'upper', 'lower', 'lower']));

test('of two handles the nearer is taken, and none out of reach', () => {
  const handles = [{ panel: 'upper', frequencyHz: 100, value: -50 }, { panel: 'upper', frequencyHz: 120, value: -50 }, { panel: 'gone', frequencyHz: 100, value: -50 }];
  assert.equal(handleUnder(panels, handles, { x: 157, y: 60 }), 1);
  assert.equal(handleUnder(panels, handles, { x: 250, y: 60 }), -1);
});
