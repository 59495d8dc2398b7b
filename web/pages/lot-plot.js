// The curves of a lot's units: which condition and which quantities, and the plot.

import { html, nothing } from '../parts/element.js';
import { panelsOf, runOf, showOptions } from './lot-state.js';
import { may, session } from '../session.js';
import '../parts/busy.js';
import '../parts/refusal.js';
import '../plots/response-plot.js';

/** @typedef {import('./lot.js').LotPage} LotPage */

/** @param {LotPage} page @param {any} lot @param {readonly any[]} units */
export function plotPanel(page, lot, units) {
  return html`
    <section class="panel lot-plot" aria-labelledby="lot-plot">
      <h2 id="lot-plot" class="unseen">Curves</h2>
      ${curvesOf(page, lot, units)}
    </section>`;
}

/** What is shown: of which condition, and which quantities. @param {LotPage} page @param {any} lot */
function chooser(page, lot) {
  const { state, condition } = page;
  return html`
    <div class="lot-chooser">
      ${lot.conditions.length < 2 ? nothing : choice('Condition', condition.name, lot.conditions.map((/** @type {any} */ one) => [one.name, one.name]), (name) => page.showCurves({ condition: name === lot.conditions[0].name ? '' : name }))}
      ${choice('Quantities', state.show, showOptions, (show) => page.showCurves({ show: /** @type {any} */ (show) }))}
    </div>`;
}

/** @param {string} label @param {string} chosen @param {readonly (readonly [string, string])[]} options @param {(value: string) => void} choose */
function choice(label, chosen, options, choose) {
  return html`
    <label class="compact"><span class="unseen">${label}</span>
      <select @change=${(/** @type {Event} */ event) => choose(/** @type {HTMLSelectElement} */ (event.target).value)}>
        ${options.map(([value, words]) => html`<option value=${value} ?selected=${value === chosen}>${words}</option>`)}
      </select></label>`;
}

/** @param {LotPage} page @param {any} lot @param {readonly any[]} units */
function curvesOf(page, lot, units) {
  const { state, condition } = page;
  if (condition === null)
    return html`<p class="soft">The device has no condition.</p>`;
  if (!units.some((unit) => runOf(unit, condition.id) !== null))
    return html`${chooser(page, lot)}${noRun(lot, condition)}`;
  if (page.plotRefusal !== null)
    return html`${chooser(page, lot)}<rl-refusal .answer=${page.plotRefusal} @again=${() => page.loadCurves({ anew: true })}></rl-refusal>`;
  const [upperName, lowerName] = panelsOf(state.show);
  const [first, second] = [page.overlayOf(upperName), page.overlayOf(lowerName)];
  if (first === null || (lowerName !== null && second === null))
    return html`${chooser(page, lot)}<div class="plot-wait"><rl-busy label="Reading the curves"></rl-busy></div>`;
  const [upper, lower] = [first, second].filter((overlay) => overlay !== null && hasValues(overlay));
  const lost = [first, second].filter((overlay) => overlay !== null && !hasValues(overlay)).map((overlay) => overlay.quantity);
  return html`
    ${upper === undefined ? html`${chooser(page, lot)}<p class="soft">The runs are magnitude only: there is no ${lost.join(' and no ')} to show. <button type="button" class="plain link" @click=${() => page.showCurves({ show: 'gain' })}>Show the gain</button></p>` : html`
      <rl-response-plot .upper=${upper} .lower=${lower ?? null} .basis=${state.basis} .levelHz=${state.level} .view=${page.view} .cursorHz=${page.atHz} .tools=${chooser(page, lot)}
        @cursor=${page.onCursor} @run-hover=${page.onRunHover} @run-pick=${page.onRunPick} @view=${page.onView} @basis=${page.onBasis}></rl-response-plot>
      ${lost.length > 0 ? html`<p class="small soft">The runs are magnitude only: there is no ${lost.join(' and no ')} to show.</p>` : nothing}`}
    ${(first.notes ?? []).map((/** @type {any} */ note) => html`<p class="small soft">${note.message}${note.code === 'noReleasedMask' && session.holds(may.engineer) ? html` <a href="/devices/${lot.deviceId}">Go to the device</a>` : nothing}</p>`)}`;
}

/** @type {WeakMap<object, boolean>} */
const known = new WeakMap();

/** @param {any} overlay */
function hasValues(overlay) {
  const before = known.get(overlay);
  if (before !== undefined)
    return before;
  /** @type {boolean} */
  const has = overlay.runs.some((/** @type {any} */ run) => run.values.some((/** @type {number | null} */ value) => value !== null));
  known.set(overlay, has);
  return has;
}

/** @param {any} lot @param {any} condition */
function noRun(lot, condition) {
  return html`
    <div class="empty">
      <p>${lot.conditions.length > 1 ? `No unit has a run in the condition ${condition.name} yet.` : 'No unit has a run yet.'} Curves stand here once sweeps come in.</p>
      ${lot.state === 'open' && session.holds(may.operate) ? html`<a class="button" href="/send?lot=${lot.id}">Send files</a>` : nothing}
    </div>`;
}
