// The controls of a response plot: what curves are shown against, zooming, and the frequency cursor.

import { frequency } from '../numbers.js';
import { html, nothing } from '../parts/element.js';
import { live } from 'lit/directives/live.js';
import { sliderPlace, sliderPlaces } from './cursor-steps.js';

/** @typedef {import('./response-plot.js').ResponsePlot} ResponsePlot */

const bases = /** @type {const} */ ([['asMeasured', 'As measured'], ['minusGolden', 'Less golden'], ['levelled', 'Levelled']]);

/** @param {ResponsePlot} plot @param {{id: string, hasGolden: boolean, isWhole: boolean}} state */
export function toolsOf(plot, { id, hasGolden, isWhole }) {
  return html`
    <div class="plot-tools">
      ${plot.tools}
      <fieldset class="plot-bases">
        <legend class="unseen">Curves are shown</legend>
        ${bases.map(([basis, words]) => html`
          <label class=${basis === 'minusGolden' && !hasGolden ? 'off' : ''} title=${basis === 'minusGolden' && !hasGolden ? 'No golden run is set.' : nothing}>
            <input type="radio" name="${id}-basis" .checked=${live(plot.basis === basis)} ?disabled=${basis === 'minusGolden' && !hasGolden}
              @change=${() => plot.chooseBasis(basis)}><span>${words}</span></label>`)}
      </fieldset>
      ${plot.basis === 'levelled' ? numberEntry({
        id: `${id}-level`, label: 'at', value: plot.levelFrequencyHz, problem: plot.problems.level, onValue: (typed) => plot.typeLevel(typed),
      }) : nothing}
      <div class="plot-zoom" role="group" aria-label="What is in view">
        ${zoomButton('Zoom in', '+', () => plot.zoomBy(0.7))}
        ${zoomButton('Zoom out', '\u2212', () => plot.zoomBy(1 / 0.7), isWhole)}
        ${zoomButton('Lower frequencies', '\u2190', () => plot.moveBy(-0.2, 0), isWhole)}
        ${zoomButton('Higher frequencies', '\u2192', () => plot.moveBy(0.2, 0), isWhole)}
        ${zoomButton('Fit the values in view', 'Fit', () => plot.fitValues())}
        ${zoomButton('Show the whole sweep', 'Whole', () => plot.showWhole(), isWhole)}
      </div>
    </div>`;
}

/** @param {string} label @param {string} text @param {() => void} act @param {boolean} [disabled] */
function zoomButton(label, text, act, disabled = false) {
  return html`<button type="button" aria-label=${label} title=${label} ?disabled=${disabled} @click=${act}>${text}</button>`;
}

/** @param {ResponsePlot} plot @param {{id: string, span: import('./spans.js').Span, atHz: number, sentence: string}} state */
export function cursorOf(plot, { id, span, atHz, sentence }) {
  return html`
    <div class="plot-cursor">
      <label class="plot-slider" for="${id}-slider">Cursor</label>
      <input id="${id}-slider" type="range" min="0" max=${sliderPlaces} step="1" .value=${live(String(sliderPlace(span, atHz)))}
        aria-valuetext=${sentence} @input=${(/** @type {Event} */ event) => plot.slideTo(Number(/** @type {HTMLInputElement} */ (event.target).value))}>
      ${numberEntry({ id: `${id}-frequency`, label: 'at', value: atHz, problem: plot.problems.cursor, onValue: (typed) => plot.typeCursor(typed) })}
    </div>`;
}

/** @param {{id: string, label: string, value: number, problem: string, onValue: (typed: string) => number | null}} entry `onValue` gives back what it took, or null */
function numberEntry({ id, label, value, problem, onValue }) {
  const active = document.activeElement;
  const shown = active instanceof HTMLInputElement && active.id === id ? active.value : frequency(value, 5);
  return html`
    <span class="plot-entry">
      <label for=${id}>${label}<span class="unseen"> frequency</span></label>
      <input id=${id} type="text" inputmode="decimal" autocomplete="off" spellcheck="false"
        .value=${live(shown)}
        aria-invalid=${problem === '' ? 'false' : 'true'} aria-describedby=${problem === '' ? nothing : `${id}-problem`}
        @focus=${(/** @type {Event} */ event) => /** @type {HTMLInputElement} */ (event.target).select()}
        @change=${(/** @type {Event} */ event) => {
          const input = /** @type {HTMLInputElement} */ (event.target);
          const taken = onValue(input.value);
          if (taken !== null) input.value = frequency(taken, 5);
        }}>
      ${problem === '' ? nothing : html`<span class="problem" id="${id}-problem" role="alert">${problem}</span>`}
    </span>`;
}
