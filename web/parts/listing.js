// A list of the API that a page shows and goes on with: a lit controller.
//   this.benches = new Listing(this, () => '/api/benches');   loads when the page is shown
//   this.benches.items (null at first), .next, .busy, .refusal, .load(), .more(), .put(item)

import { ask, withQuery } from '../api.js';

/** @typedef {import('lit').ReactiveControllerHost & { leaving: AbortController }} Host */

export class Listing {
  /**
   * @param {Host} host
   * @param {() => string} address   with its query
   * @param {{ limit?: number, cursor?: string }} [how]   cursor is the name under which next goes back
   */
  constructor(host, address, { limit = 50, cursor = 'cursor' } = {}) {
    this.host = host;
    this.address = address;
    this.limit = limit;
    this.cursor = cursor;
    /** @type {any[] | null} */
    this.items = null;
    /** @type {string | number | null} */
    this.next = null;
    /** @type {any} the last answer's body, for what stands beside the items */
    this.body = null;
    this.busy = false;
    /** @type {import('../api.js').Answer | null} */
    this.refusal = null;
    this.loads = 0;
    host.addController(this);
  }

  hostConnected() {
    void this.load();
  }

  /** Reads from the beginning; what is shown stays until the answer is there. */
  load() {
    return this.read(null);
  }

  /** Reads the next page behind what is shown. */
  more() {
    return this.read(this.next);
  }

  /** Puts an item at its place, or at the end. @param {{ id: string }} item @param {{ first?: boolean }} [how] */
  put(item, { first = false } = {}) {
    const items = this.items ?? [];
    const known = items.some((one) => one.id === item.id);
    this.items = known ? items.map((one) => (one.id === item.id ? item : one)) : first ? [item, ...items] : [...items, item];
    this.host.requestUpdate();
  }

  /** @param {string | number | null} after */
  async read(after) {
    const load = this.loads += 1;
    this.busy = true;
    this.host.requestUpdate();
    const answer = await ask(withQuery(this.address(), { limit: this.limit, ...(after === null ? {} : { [this.cursor]: after }) }), { signal: this.host.leaving.signal });
    if (load !== this.loads)
      return;
    this.busy = false;
    this.refusal = answer.ok ? null : answer;
    if (answer.ok) {
      this.items = after === null ? answer.body.items : [...(this.items ?? []), ...answer.body.items];
      this.next = answer.body.next;
      this.body = answer.body;
    }

    this.host.requestUpdate();
  }
}
