// Where the runs of a batch belong: device, lot, condition, bench, purpose, time and circumstances, given once for all files.
//   <rl-send-place .place=${batch.place} .devices=${…} .benches=${…} .lots=${…} .lacking=${…} @place=${…} @circumstances=${…} @new-lot=${…}></rl-send-place>

import { Element, html, nothing } from '../parts/element.js';
import { parseNumber } from '../numbers.js';
import { may, session } from '../session.js';
import { purposes } from './send-rows.js';
import '../parts/field.js';

/** @typedef {import('./send-rows.js').Place} Place */

export const purposeWords = /** @type {const} */ ({
  production: 'production',
  golden: 'golden unit',
  through: 'through (bench without unit)',
  check: 'check of the bench',
  study: 'study',
});

/** @type {readonly (readonly [string, string])[]} */
export const purposeOptions = purposes.map((purpose) => [purpose, purposeWords[purpose]]);

/** @type {readonly (readonly [string, string])[]} */
export const measuredOptions = [['received', 'when it is received'], ['file', 'when its file was written'], ['given', 'at a stated time']];

/** @type {readonly (readonly [string, string, string])[]} */
const circumstanceFields = [['temperatureC', 'Temperature', '\u00b0C'], ['driveVrms', 'Drive', 'V'], ['sourceOhm', 'Source', '\u03a9'], ['loadOhm', 'Load', '\u03a9']];

/** @param {readonly any[]} devices @param {string} none @returns {(readonly [string, string])[]} */
export function deviceOptions(devices, none) {
  return [['', none], ...devices.map((device) => /** @type {const} */ ([device.id, `${device.partNumber} ${device.revision}, ${device.title}`]))];
}

/** @param {readonly any[] | undefined} lots @param {string} none @returns {(readonly [string, string])[]} */
export function lotOptions(lots, none) {
  return [['', none], ...(lots ?? []).map((lot) => /** @type {const} */ ([lot.id, `${lot.number}, ${lot.counts.tested} of ${lot.size} tested`]))];
}

class SendPlace extends Element {
  static properties = {
    place: { attribute: false }, devices: { attribute: false }, benches: { attribute: false }, lots: { attribute: false }, lacking: { attribute: false }, problems: { state: true },
  };

  constructor() {
    super();
    /** @type {Place | null} */
    this.place = null;
    /** @type {any[]} */
    this.devices = [];
    /** @type {any[]} */
    this.benches = [];
    /** @type {any[] | undefined} open lots of the device; undefined while they are read */
    this.lots = undefined;
    /** @type {Record<string, string>} what is missing, once somebody tried to send */
    this.lacking = {};
    /** @type {Record<string, string>} */
    this.problems = {};
  }

  render() {
    const { place } = this;
    if (place === null)
      return nothing;
    const device = this.devices.find(({ id }) => id === place.deviceId);
    const isNew = place.bench.trim() !== '' && this.benches.length > 0 && !this.benches.some(({ name }) => name === place.bench.trim());
    return html`
      <form class="send-place" aria-label="Where the runs belong" @change=${this.onChange} @submit=${(/** @type {Event} */ event) => event.preventDefault()}>
        <rl-field class="broad" label="Device" name="deviceId" .options=${deviceOptions(this.devices, 'choose')} .value=${place.deviceId} .errors=${this.errorsOf('deviceId')}></rl-field>
        <div class="with-act">
          <rl-field label="Lot" name="lotId" .options=${lotOptions(this.lots, this.noLot(place))} .value=${place.lotId} ?disabled=${place.deviceId === ''} .errors=${this.errorsOf('lotId')}></rl-field>
          ${device !== undefined && session.holds(may.operate) ? html`<button type="button" @click=${() => this.tell('new-lot')}>Open a lot</button>` : nothing}
        </div>
        <rl-field label="Bench" name="bench" .list=${this.benches.map(({ name }) => name)} .value=${place.bench} hint=${isNew ? 'This name is new: the first run makes the bench.' : ''} .errors=${this.errorsOf('bench')}></rl-field>
        <rl-field label="Purpose" name="purpose" .options=${purposeOptions} .value=${place.purpose}></rl-field>
        ${(device?.conditions.length ?? 0) > 1 ? html`
          <rl-field label="Condition" name="conditionId" .options=${conditionOptions(device)} .value=${place.conditionId}></rl-field>` : nothing}
        <rl-field label="Measured" name="measured" .options=${measuredOptions} .value=${place.measured}></rl-field>
        ${place.measured === 'given' ? html`<rl-field label="Time of measuring" name="measuredAt" type="datetime-local" .value=${place.measuredAt} .errors=${this.errorsOf('measuredAt')}></rl-field>` : nothing}
      </form>
      <details class="send-circumstances">
        <summary>Circumstances</summary>
        <form class="send-place" aria-label="Circumstances of all files" @change=${this.onCircumstances} @submit=${(/** @type {Event} */ event) => event.preventDefault()}>
          ${circumstanceFields.map(([name, label, unit]) => html`<rl-field label="${label}, ${unit}" name=${name} inputmode="decimal" optional .errors=${this.problems[name] === undefined ? undefined : [this.problems[name]]}></rl-field>`)}
          <rl-field class="wide" label="Instruments" name="instruments" optional hint="Parted by commas."></rl-field>
        </form>
      </details>`;
  }

  /** @param {string} field */
  errorsOf(field) {
    return this.lacking[field] === undefined ? undefined : [this.lacking[field]];
  }

  /** @param {Place} place */
  noLot(place) {
    if (place.deviceId === '')
      return 'choose the device first';
    if (this.lots === undefined)
      return 'reading the lots';
    if (this.lots.length === 0)
      return place.purpose === 'production' ? 'no lot is open' : 'none';
    return place.purpose === 'production' ? 'choose' : 'none';
  }

  /** @param {Event} event */
  onChange(event) {
    const input = /** @type {HTMLInputElement} */ (event.target);
    const { name, value } = input;
    this.tell('place', name === 'deviceId' ? { deviceId: value, lotId: '', conditionId: '' } : { [name]: value });
  }

  /** @param {Event} event */
  onCircumstances(event) {
    const form = new FormData(/** @type {HTMLFormElement} */ (event.currentTarget));
    /** @type {Record<string, unknown>} */
    const circumstances = {};
    /** @type {Record<string, string>} */
    const problems = {};
    for (const [name, label] of circumstanceFields) {
      const typed = String(form.get(name) ?? '').trim();
      if (typed === '')
        continue;
      const unit = name === 'driveVrms' ? 'V' : name === 'temperatureC' ? '' : '\u03a9';
      const { value, problem } = parseNumber(typed, unit);
      const least = name === 'temperatureC' ? -273.15 : 0;
      if (value === null)
        problems[name] = problem;
      else if (value < least)
        problems[name] = `${label} is ${least} or more.`;
      else
        circumstances[name] = value;
    }

    const instruments = String(form.get('instruments') ?? '').split(',').map((name) => name.trim()).filter((name) => name !== '');
    if (instruments.length > 0)
      circumstances.instruments = instruments;
    this.problems = problems;
    this.tell('circumstances', circumstances);
  }
}

/** @param {any} device @returns {(readonly [string, string])[]} */
export function conditionOptions(device) {
  return device.conditions.map((/** @type {any} */ condition, /** @type {number} */ i) => [i === 0 ? '' : condition.id, condition.name]);
}

customElements.define('rl-send-place', SendPlace);
