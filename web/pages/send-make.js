// From one file to a device, its mask and its first lot, step by step: each step is an act of its own, and what is done stands.
//   <rl-make-from-file .row=${row} .device=${chosen device, if any} @limits=${limits to draw} @made=${{ device?, lot? }} @leave=${…}></rl-make-from-file>

import { send } from '../api.js';
import { Element, html, nothing } from '../parts/element.js';
import { refused } from '../parts/form-dialog.js';
import { parseNumber } from '../numbers.js';
import { maskAround } from './send-mask.js';
import '../parts/field.js';
import '../parts/refusal.js';

/** @typedef {import('../api.js').Answer} Answer */

const kinds = /** @type {const} */ ([['transfer', 'transfer: a filter, an amplifier, a transducer'], ['loop', 'loop: a servo or a supply']]);

class MakeFromFile extends Element {
  static properties = { row: { attribute: false }, device: { attribute: false }, mask: { state: true }, lot: { state: true }, answer: { state: true }, busy: { state: true }, around: { state: true }, leftDraft: { state: true } };

  constructor() {
    super();
    /** @type {import('./send-rows.js').Row | null} */
    this.row = null;
    /** @type {any} */
    this.device = null;
    /** @type {any} */
    this.mask = null;
    /** @type {any} */
    this.lot = null;
    /** @type {Answer | null} */
    this.answer = null;
    this.busy = false;
    this.leftDraft = false;
    /** @type {ReturnType<typeof maskAround> | null} what the typed distance comes to */
    this.around = null;
  }

  /** The step that is due: 1 device, 2 mask, 3 its release, 4 lot, 5 all done. */
  get step() {
    if (this.device === null)
      return 1;
    const hasMask = this.mask?.state === 'released' || this.leftDraft || this.device.conditions[0].maskRevision !== null;
    if (!hasMask)
      return this.mask === null ? 2 : 3;
    return this.lot === null ? 4 : 5;
  }

  /** @param {import('lit').PropertyValues} changed */
  updated(changed) {
    // The step that has just opened takes the focus, but not when the panel first appears.
    if ((changed.has('device') && changed.get('device') === null) || (changed.has('mask') && changed.get('mask') !== undefined) || (changed.has('lot') && changed.get('lot') !== undefined))
      /** @type {HTMLElement | null} */ (this.querySelector('li[aria-current] input, li[aria-current] select, li[aria-current] button'))?.focus();
    if (this.step === 2 && this.around === null && this.row?.preview?.trace)
      this.lookAround();
  }

  render() {
    const { step } = this;
    return html`
      <section class="panel make" aria-labelledby="make-heading">
        <div class="page-head"><h2 id="make-heading">Make device, mask and lot from this file</h2><button type="button" class="plain" @click=${() => this.tell('leave')}>${step === 5 ? 'Close' : 'Not now'}</button></div>
        <ol class="make-steps">
          ${this.item(1, 'The device', this.device === null ? nothing : html`<a href="/devices/${this.device.id}">${this.device.partNumber} ${this.device.revision}</a>, ${this.device.title}`, () => this.deviceForm())}
          ${this.item(2, 'Its mask', this.maskWords(), () => (step === 3 ? this.releaseForm() : this.maskForm()), step === 2 || step === 3)}
          ${this.item(4, 'Its first lot', this.lot === null ? nothing : html`<a href="/lots/${this.lot.id}">${this.lot.number}</a>`, () => this.lotForm())}
        </ol>
        ${step === 5 ? html`<p role="status">Everything is there. Check the serial number, name the bench, and send the file.</p>` : nothing}
      </section>`;
  }

  /** @param {number} number @param {string} words @param {unknown} done @param {() => unknown} form @param {boolean} [current] */
  item(number, words, done, form, current = this.step === number) {
    return html`<li class=${current ? 'current' : this.step > number ? 'done' : 'later'} aria-current=${current ? 'step' : /** @type {any} */ (nothing)}>
      <h3>${words}${this.step > number && !current ? html` <span class="soft">${done}</span>` : nothing}</h3>
      ${current ? form() : nothing}
    </li>`;
  }

  maskWords() {
    if (this.leftDraft)
      return html`<a href="/masks/${this.mask.id}">a draft</a>, not released: runs are not judged before that`;
    return this.mask !== null ? html`<a href="/masks/${this.mask.id}">revision ${this.mask.revision}</a> is released` : 'is released already';
  }

  get errors() {
    return this.answer?.errors ?? {};
  }

  deviceForm() {
    const { errors } = this;
    return this.form(this.makeDevice, html`
      <rl-field label="Part number" name="partNumber" required .errors=${errors.partNumber}></rl-field>
      <rl-field label="Revision" name="revision" required value="A" .errors=${errors.revision}></rl-field>
      <rl-field label="Title" name="title" required hint="What it is, in a few words." .errors=${errors.title}></rl-field>
      <rl-field label="Kind" name="kind" .options=${kinds} .errors=${errors.kind}></rl-field>
      <rl-field label="Unit of the gain" name="gainUnit" value="V/V" .errors=${errors.gainUnit}></rl-field>`, 'Make the device');
  }

  maskForm() {
    const { errors } = this;
    const hz = this.row?.preview?.trace?.frequencyHz ?? [];
    return html`
      <p>An upper and a lower limit around this curve are a first mask. Its corners can be changed before it is released, and every later revision too.</p>
      ${this.form(this.makeMask, html`
        <rl-field label="Distance, dB" name="distance" inputmode="decimal" required value="1" hint="So much may a unit differ from this curve, up and down." .errors=${errors.distance} @input=${this.lookAround}></rl-field>
        <rl-field label="From" name="from" value=${hz.length === 0 ? '' : `${Number(hz[0].toPrecision(12))} Hz`} .errors=${errors.from} @input=${this.lookAround}></rl-field>
        <rl-field label="To" name="to" value=${hz.length === 0 ? '' : `${Number(hz[hz.length - 1].toPrecision(12))} Hz`} .errors=${errors.to} @input=${this.lookAround}></rl-field>
        ${this.around === null || this.around.limits.length === 0 ? nothing : html`<p class="soft small wide" role="status">${this.around.words}</p>`}`, 'Make the draft')}`;
  }

  releaseForm() {
    return html`
      <p>The <a href="/masks/${this.mask.id}">draft</a> is kept. Released, it judges every run, and it can then be followed only by a new revision.</p>
      ${this.form(this.release, html`<rl-field class="wide" label="Reason" name="reason" required value="First mask, made of ${this.row?.name ?? 'a file'}." hint="It stands in the ledger." .errors=${this.errors.reason}></rl-field>`, 'Release the mask',
        html`<button type="button" @click=${() => { this.leftDraft = true; this.answer = null; this.tell('limits', []); }}>Leave it a draft</button>`)}`;
  }

  lotForm() {
    const { errors } = this;
    return this.form(this.makeLot, html`
      <rl-field label="Lot number" name="number" required .errors=${errors.number}></rl-field>
      <rl-field label="Size" name="size" inputmode="numeric" required hint="How many units the lot has." .errors=${errors.size}></rl-field>`, 'Open the lot');
  }

  /**
   * @param {(form: FormData) => Promise<Answer> | Answer} make
   * @param {unknown} fields
   * @param {string} act
   * @param {unknown} [other]
   */
  form(make, fields, act, other = nothing) {
    const shown = Object.keys(this.errors);
    return html`
      <form class="send-place" novalidate @submit=${async (/** @type {SubmitEvent} */ event) => {
        event.preventDefault();
        if (this.busy)
          return;
        const form = /** @type {HTMLFormElement} */ (event.currentTarget);
        this.busy = true;
        const answer = await make.call(this, new FormData(form));
        this.busy = false;
        this.answer = answer.ok ? null : answer;
        const first = answer.ok ? null : form.elements.namedItem(Object.keys(answer.errors)[0] ?? '');
        if (first instanceof HTMLElement)
          setTimeout(() => first.focus());
      }}>
        ${fields}
        ${this.answer === null || shown.length > 0 ? nothing : html`<p class="problem wide" role="alert">${this.answer.sentence}</p>`}
        <div class="row wide"><button type="submit" class="main" ?disabled=${this.busy}>${act}</button>${other}</div>
      </form>`;
  }

  /** @param {FormData} form */
  async makeDevice(form) {
    const answer = await send('POST', '/api/devices', Object.fromEntries(form));
    if (answer.ok)
      this.tell('made', { device: answer.body });
    return answer;
  }

  lookAround() {
    this.answer = null;
    const form = this.querySelector('li.current form');
    const trace = this.row?.preview?.trace;
    if (!(form instanceof HTMLFormElement) || !trace)
      return;
    const asked = readDistance(new FormData(form));
    this.around = asked.ok ? maskAround(trace, asked.body) : { limits: [], words: '' };
    this.tell('limits', this.around.limits);
  }

  /** @param {FormData} form */
  async makeMask(form) {
    const asked = readDistance(form);
    if (!asked.ok)
      return asked;
    const { limits, words } = maskAround(this.row?.preview.trace, asked.body);
    if (limits.length === 0)
      return refused({ from: words });
    const answer = await send('POST', `/api/devices/${this.device.id}/masks`, { title: `Around ${this.row?.name ?? 'a run'}`.slice(0, 100), limits, requirements: [] });
    if (answer.ok)
      this.mask = answer.body;
    return answer;
  }

  /** @param {FormData} form */
  async release(form) {
    const answer = await send('POST', `/api/masks/${this.mask.id}/release`, { reason: form.get('reason') });
    if (answer.ok) {
      this.mask = answer.body;
      this.tell('limits', []);
    }

    return answer;
  }

  /** @param {FormData} form */
  async makeLot(form) {
    const size = parseNumber(String(form.get('size')));
    if (size.value === null || !Number.isInteger(size.value))
      return refused({ size: 'The size is a whole number of units.' });
    const answer = await send('POST', '/api/lots', { deviceId: this.device.id, number: form.get('number'), size: size.value });
    if (answer.ok) {
      this.lot = answer.body;
      this.tell('made', { lot: answer.body });
    }

    return answer;
  }
}

/** @param {FormData} form @returns {Answer} whose body is { distanceDb, fromHz, toHz } */
function readDistance(form) {
  const distance = parseNumber(String(form.get('distance')), 'dB');
  const from = parseNumber(String(form.get('from')), 'Hz');
  const to = parseNumber(String(form.get('to')), 'Hz');
  /** @type {Record<string, string>} */
  const errors = {};
  if (distance.value === null)
    errors.distance = distance.problem;
  else if (distance.value <= 0)
    errors.distance = 'The distance is more than 0 dB.';
  if (from.value === null)
    errors.from = from.problem;
  if (to.value === null)
    errors.to = to.problem;
  else if (from.value !== null && to.value <= from.value)
    errors.to = 'The end lies above the beginning.';
  return Object.keys(errors).length > 0 ? refused(errors) : { ...refused({}), ok: true, body: { distanceDb: distance.value, fromHz: from.value, toHz: to.value } };
}

customElements.define('rl-make-from-file', MakeFromFile);
