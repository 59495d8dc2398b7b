// Who is signed in, and which roles they hold.

import { ask, send } from './api.js';

/**
 * @typedef {object} Person
 * @property {string} email
 * @property {string} name
 * @property {string[]} roles   granted and held with them
 * @property {boolean} mustChangePassword
 */

/** Sets of roles as the API's policies have them. */
export const may = Object.freeze({
  operate: ['operator', 'engineer', 'quality', 'manager'],
  engineer: ['engineer', 'manager'],
  sign: ['engineer', 'quality', 'manager'],
  quality: ['quality', 'manager'],
  manage: ['manager'],
});

class Session extends EventTarget {
  /** @type {Person | null} */
  person = null;

  /** Asks the server who is signed in. @returns {Promise<import('./api.js').Answer>} */
  async refresh() {
    const answer = await ask('/api/session');
    if (answer.ok || answer.status === 401)
      this.#set(answer.ok ? answer.body : null);
    return answer;
  }

  /** @param {string} email @param {string} password @returns {Promise<import('./api.js').Answer>} */
  async signIn(email, password) {
    const answer = await send('POST', '/api/session', { email, password });
    return answer.ok ? this.refresh() : answer;
  }

  /** Signs the same person in again, without a change that would show the page anew. @param {string} email @param {string} password @returns {Promise<import('./api.js').Answer>} */
  signInAgain(email, password) {
    return send('POST', '/api/session', { email, password });
  }

  async signOut() {
    const answer = await send('DELETE', '/api/session');
    if (answer.ok || answer.status === 401)
      this.#set(null);
    return answer;
  }

  /** Whether the person holds any of these roles. @param {readonly string[] | undefined} roles */
  holds(roles) {
    return roles === undefined || roles.some((role) => this.person?.roles.includes(role) === true);
  }

  /** @param {Person | null} person */
  #set(person) {
    this.person = person;
    this.dispatchEvent(new Event('change'));
  }
}

export const session = new Session();
