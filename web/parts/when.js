// A time as its age, with the exact time under the pointer and for whoever copies it.

import { html } from './element.js';
import { age, dayAndTime } from '../numbers.js';

/** @param {string | null | undefined} time @param {string} [suffix]   such as " ago" */
export function when(time, suffix = '') {
  return time === null || time === undefined ? '\u2013' : html`<time datetime=${time} title=${dayAndTime(time)} class="nowrap">${age(time, Date.now())}${suffix}</time>`;
}

/** A time written out. @param {string | null | undefined} time */
export function moment(time) {
  return time === null || time === undefined ? '\u2013' : html`<time datetime=${time} class="nowrap">${dayAndTime(time)}</time>`;
}
