// Which run is pointed at: by a pointer in a panel, or by keys that walk through the runs at the cursor. Pure.

import { valueAt } from './curve.js';
import { nearestRun, neighbourRun } from './nearest-run.js';
import { panelAt } from './plot-gestures.js';

/** @typedef {import('./plot-model.js').PlotModel} PlotModel */

const reachPx = 9;

/**
 * The id of the run under a place; null where none comes within reach.
 * @param {PlotModel} model @param {ReadonlySet<string>} switchedOff what the legend has switched off
 * @param {import('./plot-chart.js').ChartPanel[]} panels @param {{x: number, y: number}} place
 */
export function runUnder(model, switchedOff, panels, place) {
  const laid = panelAt(panels, place.y);
  const panel = model.panels.find(({ key }) => key === laid?.key);
  if (laid === null || panel === undefined || place.x < laid.left || place.x > laid.right) return null;
  return nearestRun(shownRuns(panel, switchedOff), panel.set.frequencyHz, laid, laid.frequencyAt, place, reachPx)?.curve.runId ?? null;
}

/**
 * The id of the run whose value is next above or under another's at a frequency; null where there is none.
 * @param {PlotModel} model @param {ReadonlySet<string>} switchedOff @param {number} atHz
 * @param {string | null} fromId @param {1 | -1} step
 */
export function runBeside(model, switchedOff, atHz, fromId, step) {
  const [panel] = model.panels;
  const valueOf = (/** @type {Float64Array} */ values) => valueAt(panel.set.frequencyHz, values, atHz);
  return neighbourRun(shownRuns(panel, switchedOff), valueOf, fromId, step)?.runId ?? null;
}

/** @param {import('./plot-model.js').PanelModel} panel @param {ReadonlySet<string>} switchedOff */
function shownRuns({ set, groups }, switchedOff) {
  return set.runs.filter((run, i) => !switchedOff.has(groups[i] === 255 ? run.runId : 'background'));
}
