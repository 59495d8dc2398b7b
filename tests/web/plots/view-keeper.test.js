import assert from 'node:assert/strict';
import { test } from 'node:test';
import { wholeView } from '../../../web/plots/plot-view.js';
import { ViewKeeper } from '../../../web/plots/view-keeper.js';

const at = (min) => ({ ...wholeView, frequency: { min, max: 20_000 } });
const lowest = (keeper) => keeper.view.frequency?.min ?? null;

test('a view that the page gives is taken', () => {
  const keeper = new ViewKeeper();
  assert.ok(keeper.give(at(100)));
  assert.equal(lowest(keeper), 100);
});

test('the same view given again does not undo what the people did meanwhile', () => {
  const keeper = new ViewKeeper();
  keeper.give(at(100));
  keeper.change(at(200));
  assert.ok(!keeper.give(at(100)));
  assert.equal(lowest(keeper), 200);
});

test('a view that comes back late does not undo what came after it', () => {
  const keeper = new ViewKeeper();
  keeper.change(at(200));
  const { view } = keeper.tell();
  keeper.change(at(300));
  keeper.give(view);
  assert.equal(lowest(keeper), 300);
});

test('back and forward through what was looked at', () => {
  const keeper = new ViewKeeper();
  keeper.change(at(200));
  keeper.give(keeper.tell().view);
  assert.ok(keeper.give(wholeView));
  assert.equal(lowest(keeper), null);
  assert.ok(keeper.give(at(200)));
  assert.equal(lowest(keeper), 200);
});

test('what is told is the view and its text', () => {
  const keeper = new ViewKeeper();
  keeper.change(at(50));
  assert.deepEqual(keeper.tell(), { view: at(50), text: '50~20000' });
});
