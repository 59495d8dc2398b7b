// Pointer and wheel on a plot: pointing, picking, a box to zoom into, dragging with Shift or the middle button, and two fingers.

import { between, carried, logAxis, moved, straightAxis, zoomed } from './spans.js';

/** @typedef {import('./plot-chart.js').ChartPanel} ChartPanel */
/** @typedef {{x: number, y: number}} Place in CSS pixels of the plot */
/** Spans that are to be in view; what is left out stays. @typedef {{frequency?: import('./spans.js').Span, values?: {key: import('./plot-model.js').PanelKey, span: import('./spans.js').Span}[]}} ViewChange */
/** @typedef {object} GestureHost
 * @property {() => ChartPanel[]} panels
 * @property {(place: Place | null) => void} point
 * @property {(place: Place) => void} pick
 * @property {(place: Place) => number} grab the handle under a place; -1 for none
 * @property {(index: number, place: Place, done: boolean) => void} dragHandle
 * @property {(box: import('./cursor-layer.js').DrawnBox | null) => void} drawBox
 * @property {(change: ViewChange) => void} change
 * @property {() => void} whole */

const dragPx = 5;
const leastBoxPx = 12;
const handlePx = 14;
const deltaInLines = 1;

/**
 * The panel at a height; the nearest one beside them.
 * @param {ChartPanel[]} panels @param {number} y
 * @returns {ChartPanel | null}
 */
export function panelAt(panels, y) {
  const off = (/** @type {ChartPanel} */ panel) => Math.max(panel.top - y, y - panel.bottom, 0);
  return panels.reduce((/** @type {ChartPanel | null} */ best, panel) => (best === null || off(panel) < off(best) ? panel : best), null);
}

/**
 * The handle under a place, the nearest where there are several; -1 for none.
 * @param {ChartPanel[]} panels @param {import('./cursor-layer.js').Handle[]} handles @param {Place} place
 */
export function handleUnder(panels, handles, place) {
  let [best, least] = [-1, handlePx];
  handles.forEach((handle, index) => {
    const panel = panels.find(({ key }) => key === handle.panel);
    const off = panel === undefined ? Infinity : Math.hypot(panel.x(handle.frequencyHz) - place.x, panel.y(handle.value) - place.y);
    if (off < least) [best, least] = [index, off];
  });
  return best;
}

/** @param {ChartPanel} panel @param {number} x */
const placeX = (panel, x) => (x - panel.left) / (panel.right - panel.left);
/** @param {ChartPanel} panel @param {number} y */
const placeY = (panel, y) => (panel.bottom - y) / (panel.bottom - panel.top);

/**
 * @param {HTMLElement} surface that takes the pointer @param {GestureHost} host
 * @returns {() => void} takes the gestures away again
 */
export function attachGestures(surface, host) {
  /** @type {Map<number, Place>} */
  const pointers = new Map();
  /** @type {{kind: 'box' | 'move' | 'scrub' | 'handle', from: Place, far: boolean, handle: number} | null} */
  let drag = null;

  const placeOfEvent = (/** @type {MouseEvent} */ event) => {
    const box = surface.getBoundingClientRect();
    return { x: event.clientX - box.left, y: event.clientY - box.top };
  };

  const down = (/** @type {PointerEvent} */ event) => {
    if (event.button > 1) return;
    const place = placeOfEvent(event);
    pointers.set(event.pointerId, place);
    surface.setPointerCapture(event.pointerId);
    if (event.button === 1) event.preventDefault();
    const handle = event.button === 0 && !event.shiftKey ? host.grab(place) : -1;
    const kind = handle >= 0 ? 'handle' : event.pointerType === 'touch' ? 'scrub' : event.shiftKey || event.button === 1 ? 'move' : 'box';
    drag = pointers.size > 1 ? null : { kind, from: place, far: false, handle };
    if (pointers.size > 1) host.drawBox(null);
  };

  const move = (/** @type {PointerEvent} */ event) => {
    const place = placeOfEvent(event);
    const before = pointers.get(event.pointerId);
    if (before === undefined) {
      if (event.pointerType !== 'touch') host.point(place);
      return;
    }

    if (pointers.size === 2) carry(event.pointerId, before, place);
    else if (drag !== null) dragged(drag, before, place);
    pointers.set(event.pointerId, place);
  };

  const up = (/** @type {PointerEvent} */ event) => {
    const place = placeOfEvent(event);
    if (!pointers.delete(event.pointerId)) return;
    if (drag !== null && event.type === 'pointerup') {
      if (drag.kind === 'handle' && drag.far) host.dragHandle(drag.handle, place, true);
      else if (drag.kind === 'box' && drag.far) zoomIntoBox(drag.from, place);
      else if (!drag.far) host.pick(place);
    }

    drag = null;
    host.drawBox(null);
  };

  const leave = (/** @type {PointerEvent} */ event) => {
    if (!pointers.has(event.pointerId)) host.point(null);
  };

  /** @param {{kind: string, from: Place, far: boolean, handle: number}} now @param {Place} before @param {Place} place */
  function dragged(now, before, place) {
    now.far ||= Math.hypot(place.x - now.from.x, place.y - now.from.y) > dragPx;
    if (now.kind === 'handle') {
      if (now.far) host.dragHandle(now.handle, place, false);
    } else if (now.kind === 'scrub') host.point(place);
    else if (now.kind === 'box') host.drawBox(now.far ? boxOf(now.from, place) : null);
    else moveBy(before, place);
  }

  /** @param {Place} from @param {Place} to */
  function boxOf(from, to) {
    const panel = panelAt(host.panels(), from.y);
    if (panel === null) return null;
    const panels = host.panels();
    const flat = Math.abs(to.y - from.y) < leastBoxPx;
    const thin = Math.abs(to.x - from.x) < leastBoxPx;
    const clampX = (/** @type {number} */ x) => Math.min(panel.right, Math.max(panel.left, x));
    const clampY = (/** @type {number} */ y) => Math.min(panel.bottom, Math.max(panel.top, y));
    return {
      left: thin ? panel.left : clampX(Math.min(from.x, to.x)),
      right: thin ? panel.right : clampX(Math.max(from.x, to.x)),
      top: flat ? Math.min(...panels.map((p) => p.top)) : clampY(Math.min(from.y, to.y)),
      bottom: flat ? Math.max(...panels.map((p) => p.bottom)) : clampY(Math.max(from.y, to.y)),
    };
  }

  /** @param {Place} from @param {Place} to */
  function zoomIntoBox(from, to) {
    const panel = panelAt(host.panels(), from.y);
    const box = boxOf(from, to);
    if (panel === null || box === null || box.right - box.left < leastBoxPx) return;
    host.change({
      frequency: Math.abs(to.x - from.x) < leastBoxPx ? undefined : between(logAxis, panel.frequency, placeX(panel, box.left), placeX(panel, box.right)),
      values: Math.abs(to.y - from.y) < leastBoxPx ? [] : [{ key: panel.key, span: between(straightAxis, panel.values, placeY(panel, box.top), placeY(panel, box.bottom)) }],
    });
  }

  /** @param {Place} before @param {Place} place */
  function moveBy(before, place) {
    const panel = panelAt(host.panels(), place.y);
    if (panel === null) return;
    host.change({
      frequency: moved(logAxis, panel.frequency, placeX(panel, before.x) - placeX(panel, place.x)),
      values: [{ key: panel.key, span: moved(straightAxis, panel.values, placeY(panel, before.y) - placeY(panel, place.y)) }],
    });
  }

  /** @param {number} id @param {Place} before @param {Place} now */
  function carry(id, before, now) {
    const still = [...pointers].find(([other]) => other !== id)?.[1];
    const panel = still === undefined ? null : panelAt(host.panels(), (still.y + now.y) / 2);
    if (still === undefined || panel === null) return;
    const x = (/** @type {Place} */ place) => placeX(panel, place.x);
    const y = (/** @type {Place} */ place) => placeY(panel, place.y);
    host.change({
      frequency: carried(logAxis, panel.frequency, [x(still), x(before)], [x(still), x(now)]),
      values: [{ key: panel.key, span: carried(straightAxis, panel.values, [y(still), y(before)], [y(still), y(now)]) }],
    });
  }

  // The page keeps its wheel until the plot has the focus; with Ctrl, as trackpads send a pinch, it is meant for the plot anyway.
  const wheel = (/** @type {WheelEvent} */ event) => {
    if (!event.ctrlKey && !surface.matches(':focus, :focus-within')) return;
    const place = placeOfEvent(event);
    const panel = panelAt(host.panels(), place.y);
    if (panel === null) return;
    event.preventDefault();
    const lines = event.deltaMode === deltaInLines ? 16 : 1;
    const amount = Math.max(-100, Math.min(100, (event.deltaY || event.deltaX) * lines));
    const factor = Math.exp(amount * (event.ctrlKey ? 0.01 : 0.0025));
    if (event.shiftKey || event.deltaY === 0) host.change({ frequency: moved(logAxis, panel.frequency, amount * 0.002) });
    else if (place.x < panel.left) host.change({ values: [{ key: panel.key, span: zoomed(straightAxis, panel.values, factor, placeY(panel, place.y)) }] });
    else host.change({ frequency: zoomed(logAxis, panel.frequency, factor, placeX(panel, place.x)) });
  };

  const whole = () => host.whole();
  const listeners = /** @type {[string, EventListener][]} */ (/** @type {unknown} */ ([
    ['pointerdown', down], ['pointermove', move], ['pointerup', up], ['pointercancel', up], ['pointerleave', leave], ['dblclick', whole],
  ]));
  for (const [type, listener] of listeners) surface.addEventListener(type, listener);
  surface.addEventListener('wheel', wheel, { passive: false });
  return () => {
    for (const [type, listener] of listeners) surface.removeEventListener(type, listener);
    surface.removeEventListener('wheel', wheel);
  };
}
