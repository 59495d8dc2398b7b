// A table of rows. Columns say how a row is shown and, where the head sorts, by what.
//
//   <rl-data-table caption="Benches" cards .columns=${columns} .rows=${rows} .keyOf=${(bench) => bench.id}
//     .href=${(bench) => `/benches/${bench.id}`} ?more=${next !== null} @more=${this.loadMore} .empty=${html`…`}></rl-data-table>
//
// A row with an address is followed by its link, which is the row's head cell, or by a click anywhere on the row that hits
// no other control; instead of .href, .pickable gives the head cell a button and tells "pick" with the row, and "row-hover"
// with its key while the pointer is over it. "cards" turns rows into cards on a narrow screen. point(key) marks a row and
// brings it into view, without drawing the table anew. What the page's templates in .empty and in cells listen to is called
// with the table as "this": give arrow functions there.

import { repeat } from 'lit/directives/repeat.js';
import { Element, html, nothing } from './element.js';
import { several } from '../numbers.js';
import { sorted } from './sorting.js';

/**
 * @template T
 * @typedef {object} Column
 * @property {string} key
 * @property {string} label
 * @property {(row: T) => unknown} cell
 * @property {(row: T) => number | string | null | undefined} [sort]   absent ones come last
 * @property {boolean} [number]   set to the right
 * @property {boolean} [head]     names the row; there is one
 */

export class DataTable extends Element {
  static properties = {
    caption: {},
    captionUnseen: { type: Boolean, attribute: 'caption-unseen' },
    columns: { attribute: false },
    rows: { attribute: false },
    keyOf: { attribute: false },
    href: { attribute: false },
    pickable: { type: Boolean },
    chosen: { attribute: false },
    empty: { attribute: false },
    more: { type: Boolean },
    busy: { type: Boolean },
    sort: {},
    descending: { type: Boolean },
  };

  constructor() {
    super();
    this.caption = '';
    this.captionUnseen = false;
    /** @type {readonly Column<any>[]} */
    this.columns = [];
    /** @type {readonly any[]} */
    this.rows = [];
    /** @type {(row: any) => unknown} */
    this.keyOf = (row) => row.id;
    /** @type {((row: any) => string | null) | null} */
    this.href = null;
    this.pickable = false;
    /** @type {unknown} key of the row that is marked */
    this.chosen = null;
    /** @type {unknown} what stands instead of an empty table */
    this.empty = null;
    this.more = false;
    this.busy = false;
    this.sort = '';
    this.descending = false;
    /** @type {string | null} */
    this.hoveredKey = null;
  }

  render() {
    if (this.rows.length === 0 && !this.more)
      return this.empty ?? nothing;
    return html`
      <div class="scroll" role="region" tabindex="0" aria-label=${this.caption}>
        <table role="table">
          <caption class=${this.captionUnseen ? 'unseen' : ''}>${this.caption}</caption>
          <thead role="rowgroup"><tr role="row">${this.columns.map((column) => this.headCell(column))}</tr></thead>
          <tbody role="rowgroup" @pointerover=${this.pickable ? this.onPointer : nothing} @pointerleave=${this.pickable ? this.onPointer : nothing}>${repeat(sorted(this.rows, this.columns.find((column) => column.key === this.sort)?.sort, this.descending), this.keyOf, (row) => this.row(row))}</tbody>
        </table>
      </div>
      ${this.more ? html`
        <p class="more row">
          <button type="button" ?disabled=${this.busy} @click=${() => this.tell('more')}>Show more</button>
          <span class="soft small">${several(this.rows.length, 'row')} shown${this.sort === '' ? '' : ', sorted among themselves'}.</span>
        </p>` : nothing}`;
  }

  /** @param {Column<any>} column */
  headCell(column) {
    const chosen = column.key === this.sort;
    const side = column.number ? 'number' : '';
    if (column.sort === undefined)
      return html`<th role="columnheader" scope="col" class=${side}>${column.label}</th>`;
    return html`
      <th role="columnheader" scope="col" class=${side} aria-sort=${chosen ? (this.descending ? 'descending' : 'ascending') : 'none'}>
        <button type="button" @click=${() => this.sortBy(column)}>${column.label}<span class="arrow" aria-hidden="true">${chosen ? (this.descending ? '\u2193' : '\u2191') : ''}</span></button>
      </th>`;
  }

  /** @param {any} row */
  row(row) {
    const leads = this.href?.(row) ?? null;
    const marked = this.chosen !== null && this.keyOf(row) === this.chosen;
    return html`
      <tr role="row" data-key=${String(this.keyOf(row))} class="${leads !== null || this.pickable ? 'leads' : ''} ${marked ? 'chosen' : ''}" @click=${(/** @type {MouseEvent} */ event) => this.follow(event)}>
        ${this.columns.map((column) => {
          const shown = column.cell(row);
          if (column.head) {
            return html`<th role="rowheader" scope="row">${leads !== null ? html`<a href=${leads}>${shown}</a>`
              : this.pickable ? html`<button type="button" class="plain" @click=${() => this.tell('pick', row)}>${shown}</button>` : shown}</th>`;
          }

          const isEmpty = shown === nothing || shown === '' || shown === null || shown === undefined;
          return html`<td role="cell" class="${column.number ? 'number' : ''} ${isEmpty ? 'empty-cell' : ''}"><span class="cell-name" aria-hidden="true">${column.label}</span><span>${shown}</span></td>`;
        })}
      </tr>`;
  }

  /** @param {unknown} key   null marks none */
  point(key) {
    this.querySelector('tr[data-pointed]')?.removeAttribute('data-pointed');
    const row = key === null ? null : this.querySelector(`tr[data-key="${CSS.escape(String(key))}"]`);
    row?.setAttribute('data-pointed', '');
    const scroller = this.querySelector('.scroll');
    if (!(row instanceof HTMLElement) || scroller === null)
      return;
    // Only the table scrolls: the page stays where the person looks.
    const [own, frame] = [row.getBoundingClientRect(), scroller.getBoundingClientRect()];
    const headHeight = this.querySelector('thead')?.getBoundingClientRect().height ?? 0;
    scroller.scrollTop += Math.min(0, own.top - frame.top - headHeight) + Math.max(0, own.bottom - frame.bottom);
  }

  /** @param {PointerEvent} event */
  onPointer(event) {
    const row = event.type === 'pointerleave' ? null : /** @type {HTMLElement | null} */ (/** @type {Element} */ (event.target).closest('tr'));
    const key = row?.dataset.key ?? null;
    if (key === this.hoveredKey)
      return;
    this.hoveredKey = key;
    this.tell('row-hover', key);
  }

  /** @param {Column<any>} column */
  sortBy(column) {
    this.descending = this.sort === column.key ? !this.descending : column.number === true;
    this.sort = column.key;
    this.tell('sort', { key: this.sort, descending: this.descending });
  }

  /** @param {MouseEvent} event */
  follow(event) {
    const target = /** @type {Element} */ (event.target);
    if (target.closest('a, button, input, select, label, summary, textarea') !== null || getSelection()?.isCollapsed === false)
      return;
    const way = /** @type {HTMLElement | null | undefined} */ (/** @type {Element} */ (event.currentTarget).querySelector('th a, th button'));
    way?.dispatchEvent(new MouseEvent('click', { bubbles: true, cancelable: true, ctrlKey: event.ctrlKey, metaKey: event.metaKey, shiftKey: event.shiftKey }));
  }
}

customElements.define('rl-data-table', DataTable);
