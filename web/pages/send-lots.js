// The open lots of the devices that files may be of: read once a device, and again after files were sent.

import { all } from '../api.js';

export class OpenLots {
  /** @type {ReadonlyMap<string, any[]>} by device */
  #open = new Map();
  /** @type {Map<string, any>} every lot that was open at some time, for its number */
  #seen = new Map();
  /** @type {Set<string>} devices whose lots are being read */
  #asked = new Set();

  /** Another object after every change. */
  get state() {
    return this.#open;
  }

  /** The open lots of a device; undefined before they are read. @param {string} deviceId */
  of(deviceId) {
    return this.#open.get(deviceId);
  }

  /** @param {string} lotId */
  find(lotId) {
    return this.#seen.get(lotId);
  }

  /**
   * Reads the lots of a device; what is known stays until an answer comes. Null where there is nothing to read.
   * @param {string} deviceId
   * @param {{ anew?: boolean, signal?: AbortSignal }} [how]
   */
  async read(deviceId, { anew = false, signal } = {}) {
    if (deviceId === '' || (this.#open.has(deviceId) && !anew) || this.#asked.has(deviceId))
      return null;
    this.#asked.add(deviceId);
    const answer = await all(`/api/lots?state=open&limit=200&device=${encodeURIComponent(deviceId)}`, { signal });
    this.#asked.delete(deviceId);
    if (answer.ok)
      this.know(deviceId, answer.items);
    return answer;
  }

  /** @param {string} deviceId @param {any[]} open */
  know(deviceId, open) {
    this.#open = new Map([...this.#open, [deviceId, open]]);
    for (const lot of open)
      this.#seen.set(lot.id, lot);
  }

  /** A lot that was just opened. @param {any} lot */
  add(lot) {
    this.know(lot.deviceId, [lot, ...this.of(lot.deviceId) ?? []]);
  }
}
