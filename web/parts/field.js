// A labelled input with hint and problems, bound by ids. It stands in a <form>, whose FormData has its value.
//
//   <rl-field label="Name" name="name" required hint="…" .errors=${errors.name}></rl-field>
//   <rl-field label="Kind" name="kind" .options=${[['transfer', 'Transfer'], ['loop', 'Loop']]} value="loop"></rl-field>
//
// type is any of <input>, "checkbox" too; rows makes it a <textarea>, .options a <select>.

import { ifDefined } from 'lit/directives/if-defined.js';
import { live } from 'lit/directives/live.js';
import { Element, html, nothing, uniqueId } from './element.js';

export class Field extends Element {
  static properties = {
    label: {},
    name: {},
    type: {},
    value: {},
    checked: { type: Boolean },
    hint: {},
    errors: { attribute: false },
    required: { type: Boolean },
    disabled: { type: Boolean },
    optional: { type: Boolean },
    rows: { type: Number },
    options: { attribute: false },
    autocomplete: {},
    inputmode: {},
    placeholder: {},
    list: { attribute: false },
  };

  constructor() {
    super();
    this.label = '';
    this.name = '';
    this.type = 'text';
    this.value = '';
    this.checked = false;
    this.hint = '';
    /** @type {string[] | undefined} */
    this.errors = undefined;
    this.required = false;
    this.disabled = false;
    this.optional = false;
    this.rows = 0;
    /** @type {readonly (readonly [string, string])[] | undefined} */
    this.options = undefined;
    /** @type {string | undefined} */
    this.autocomplete = undefined;
    /** @type {string | undefined} */
    this.inputmode = undefined;
    /** @type {string | undefined} */
    this.placeholder = undefined;
    /** @type {readonly string[] | undefined} what may be typed, offered */
    this.list = undefined;
    this.inputId = uniqueId('field');
  }

  /** The input inside. @returns {HTMLInputElement | HTMLTextAreaElement | HTMLSelectElement | null} */
  get input() {
    return this.querySelector('input, textarea, select');
  }

  focus() {
    this.input?.focus();
  }

  updated() {
    // Once somebody has chosen, the marks on the options move nothing any more.
    const { input } = this;
    if (input instanceof HTMLSelectElement && input.value !== this.value && this.options?.some(([value]) => value === this.value))
      input.value = this.value;
  }

  render() {
    const problems = this.errors ?? [];
    const check = this.type === 'checkbox' || this.type === 'radio';
    const label = html`<label for=${this.inputId}>${this.label}${this.optional ? html` <span class="optional">(may be left out)</span>` : nothing}</label>`;
    return html`
      <div class="field ${check ? 'check' : ''}">
        ${check ? html`${this.control()}${label}` : html`${label}${this.control()}`}
        ${this.hint === '' ? nothing : html`<p class="hint" id="${this.inputId}-hint">${this.hint}</p>`}
        ${problems.length === 0 ? nothing : html`<p class="problem" id="${this.inputId}-problem">${problems.join(' ')}</p>`}
      </div>`;
  }

  control() {
    const described = [this.hint === '' ? '' : `${this.inputId}-hint`, (this.errors ?? []).length === 0 ? '' : `${this.inputId}-problem`].filter((id) => id !== '').join(' ');
    const describedBy = ifDefined(described === '' ? undefined : described);
    const invalid = (this.errors ?? []).length > 0 ? 'true' : 'false';
    if (this.options !== undefined) {
      return html`
        <select id=${this.inputId} name=${this.name} ?required=${this.required} ?disabled=${this.disabled} aria-describedby=${describedBy} aria-invalid=${invalid} @change=${this.keep}>
          ${this.options.map(([value, words]) => html`<option value=${value} ?selected=${value === this.value}>${words}</option>`)}
        </select>`;
    }

    if (this.rows > 0) {
      return html`
        <textarea id=${this.inputId} name=${this.name} rows=${this.rows} ?required=${this.required} ?disabled=${this.disabled} placeholder=${ifDefined(this.placeholder)}
          aria-describedby=${describedBy} aria-invalid=${invalid} .value=${live(this.value)} @input=${this.keep}></textarea>`;
    }

    if (this.type === 'checkbox' || this.type === 'radio') {
      return html`
        <input id=${this.inputId} name=${this.name} type=${this.type} value=${this.value === '' ? 'on' : this.value} .checked=${live(this.checked)} ?disabled=${this.disabled}
          aria-describedby=${describedBy} aria-invalid=${invalid} @change=${this.keepChecked}>`;
    }

    return html`
      <input id=${this.inputId} name=${this.name} type=${this.type} ?required=${this.required} ?disabled=${this.disabled} autocomplete=${/** @type {any} */ (this.autocomplete ?? 'off')}
        inputmode=${/** @type {any} */ (ifDefined(this.inputmode))} placeholder=${ifDefined(this.placeholder)} list=${ifDefined(this.list === undefined ? undefined : `${this.inputId}-list`)}
        aria-describedby=${describedBy} aria-invalid=${invalid} .value=${live(this.value)} @input=${this.keep}>
      ${this.list === undefined ? nothing : html`<datalist id="${this.inputId}-list">${this.list.map((word) => html`<option value=${word}></option>`)}</datalist>`}`;
  }

  /** @param {Event} event */
  keep(event) {
    this.value = /** @type {HTMLInputElement} */ (event.target).value;
  }

  /** @param {Event} event */
  keepChecked(event) {
    this.checked = /** @type {HTMLInputElement} */ (event.target).checked;
  }
}

customElements.define('rl-field', Field);
