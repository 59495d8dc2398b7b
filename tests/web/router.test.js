import assert from 'node:assert/strict';
import test from 'node:test';
import * as router from '../../web/router.js';

const route = (pattern) => ({ pattern, tag: `x-${pattern}`, load: async () => {}, title: pattern });
const routes = ['/lots', '/lots/new', '/lots/{id}', '/devices/{id}/masks/{mask}'].map(route);

test('The first route that fits wins, and a part in braces takes one segment', () => {
  for (const [path, pattern, params] of [
    ['/lots', '/lots', {}], ['/lots/', '/lots', {}], ['/lots/new', '/lots/new', {}], ['/lots/17', '/lots/{id}', { id: '17' }], ['/devices/a/masks/b%2Fc', '/devices/{id}/masks/{mask}', { id: 'a', mask: 'b/c' }]]) {
    const match = router.matchRoute(routes, path);
    assert.equal(match?.route.pattern, pattern);
    assert.deepEqual({ ...match?.params }, params);
  }
});

test('A path that fits no route has none', () => {
  for (const path of ['/', '/lot', '/lots/1/2', '/Lots', '/lots/%E0%A4%A'])
    assert.equal(router.matchRoute(routes, path), null, path);
});

test('An address fills its braces and refuses to leave one open', () => {
  assert.equal(router.address('/lots/{id}', { id: 'a/b c' }), '/lots/a%2Fb%20c');
  assert.equal(router.address('/lots', {}, { search: 'SN 1' }), '/lots?search=SN+1');
  assert.throws(() => router.address('/lots/{id}'), /needs id/);
});

const shape = {
  quantity: router.oneOf(['gain', 'phase', 'delay']),
  cursorHz: router.number(),
  from: router.number(0),
  search: router.text(),
  runs: router.list(),
};

test('A state that is printed and read is the same state', () => {
  const states = [
    { quantity: 'gain', cursorHz: null, from: 0, search: '', runs: [] },
    { quantity: 'delay', cursorHz: 12_345.678, from: -1e-9, search: 'a&b=c, d', runs: ['x', 'y,z', '%'] },
    { quantity: 'phase', cursorHz: 0, from: 5, search: ' ', runs: ['one'] },
  ];
  for (const state of states) {
    const query = new URLSearchParams(router.printState(shape, state)).toString();
    assert.deepEqual({ ...router.readState(shape, query) }, state);
  }
});

test('The usual state has a plain address', () => {
  assert.deepEqual(router.printState(shape, { quantity: 'gain', cursorHz: null, from: 0, search: '', runs: [] }), {});
});

test('What cannot be read has its usual value, and strange names do no harm', () => {
  const state = router.readState(shape, 'quantity=colour&cursorHz=fast&from=&nothing=1&runs=%25zz');
  assert.deepEqual({ ...state }, { quantity: 'gain', cursorHz: null, from: 0, search: '', runs: [] });
  assert.ok(Object.isFrozen(state));
});
