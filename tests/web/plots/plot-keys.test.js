import assert from 'node:assert/strict';
import { test } from 'node:test';
import { intentOf, moveStep } from '../../../web/plots/plot-keys.js';

const press = (key, more = {}) => intentOf({ key, shiftKey: false, ctrlKey: false, altKey: false, metaKey: false, ...more });

test('arrows move the cursor by points and walk through the runs', () => {
  assert.deepEqual(press('ArrowRight'), { kind: 'cursor', points: 1 });
  assert.deepEqual(press('ArrowUp'), { kind: 'run', step: 1 });
});

test('with Shift arrows move what is in view', () => {
  assert.deepEqual(press('ArrowLeft', { shiftKey: true }), { kind: 'move', frequency: -moveStep, values: 0 });
  assert.deepEqual(press('ArrowDown', { shiftKey: true }), { kind: 'move', frequency: 0, values: -moveStep });
});

test('plus zooms in with and without Shift, and minus undoes it', () => {
  const [plus, equal, minus] = [press('+', { shiftKey: true }), press('='), press('-')];
  assert.deepEqual(plus, equal);
  assert.ok(Math.abs(plus.factor * minus.factor - 1) < 1e-12 && plus.factor < 1);
});

test('keys of the browser and of the page stay theirs', () => {
  for (const more of [{ ctrlKey: true }, { altKey: true }, { metaKey: true }]) assert.equal(press('ArrowLeft', more), null);
  for (const key of ['Tab', 'Escape', ' ', 'a']) assert.equal(press(key), null);
});
