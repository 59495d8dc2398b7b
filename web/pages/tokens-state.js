// How a bench token stands. Pure.

import { age, day } from '../numbers.js';

const soonMs = 30 * 24 * 60 * 60 * 1_000;

/** @typedef {{ expiresAt: string, revokedAt: string | null }} Token */

/**
 * @param {Token} token
 * @param {number} now
 * @returns {{ state: 'valid' | 'soon' | 'expired' | 'revoked', sign: string, words: string, tone: string }}
 */
export function stateOf(token, now) {
  if (token.revokedAt !== null)
    return { state: 'revoked', sign: '\u2717', words: `revoked ${day(token.revokedAt)}`, tone: '' };
  const left = Date.parse(token.expiresAt) - now;
  if (left <= 0)
    return { state: 'expired', sign: '\u2717', words: `expired ${day(token.expiresAt)}`, tone: 'bad' };
  return left < soonMs
    ? { state: 'soon', sign: '!', words: `expires in ${age(new Date(now - left), now)}`, tone: 'doubt' }
    : { state: 'valid', sign: '\u2713', words: `valid until ${day(token.expiresAt)}`, tone: 'good' };
}
