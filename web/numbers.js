// The one place where numbers become text and typed text becomes numbers. A minus is U+2212, the space before a unit does
// not break, and what is absent is an en dash. Pure; times are shown in the zone of the browser.

export const absent = '\u2013';
const minus = '\u2212';
const space = '\u00a0';

const prefixes = [['p', 1e-12], ['n', 1e-9], ['\u00b5', 1e-6], ['m', 1e-3], ['', 1], ['k', 1e3], ['M', 1e6], ['G', 1e9], ['T', 1e12]];

// Units of the API that take no prefix, as they are shown.
/** @type {Record<string, string>} */
const plainUnits = { dB: 'dB', deg: '\u00b0', 'dB/decade': 'dB/decade', 'dB/octave': 'dB/octave', '1': '', '': '' };

/**
 * A number with so many significant digits, zeros at the end cut.
 * @param {number | null | undefined} value
 * @param {number} [digits]
 */
export function significant(value, digits = 4) {
  return isAbsent(value) ? absent : withMinus(trimmed(value.toPrecision(digits)));
}

/**
 * A number with so many decimals. What is not zero never shows as zero: it gets the decimals that it needs.
 * @param {number | null | undefined} value
 * @param {number} [decimals]
 */
export function fixed(value, decimals = 2) {
  if (isAbsent(value))
    return absent;
  const text = value.toFixed(decimals);
  if (Number(text) !== 0)
    return withMinus(text);
  return value === 0 ? (0).toFixed(decimals) : withMinus(trimmed(value.toPrecision(1)));
}

/**
 * A quantity with an SI prefix: 1.25 kHz, 12.3 µs.
 * @param {number | null | undefined} value
 * @param {string} unit
 * @param {number} [digits]
 */
export function withPrefix(value, unit, digits = 4) {
  if (isAbsent(value))
    return absent;
  const { scale, prefix } = prefixFor(value, digits);
  return `${significant(value / scale, digits)}${space}${prefix}${unit}`;
}

/** A frequency in Hz. @param {number | null | undefined} frequencyHz @param {number} [digits] */
export function frequency(frequencyHz, digits = 4) {
  return withPrefix(frequencyHz, 'Hz', digits);
}

/**
 * A value in a unit of the API: dB, deg, s, Hz, dB/decade or 1.
 * @param {number | null | undefined} value
 * @param {string} unit
 */
export function quantity(value, unit) {
  if (isAbsent(value))
    return absent;
  if (!(unit in plainUnits))
    return withPrefix(value, unit);
  return withPlainUnit(unit === '1' || unit === '' ? significant(value) : fixed(value, unit === 'deg' ? 1 : 2), unit);
}

/**
 * A margin: always with its sign, and never rounded to zero.
 * @param {number | null | undefined} margin
 * @param {string} unit
 */
export function margin(margin, unit) {
  const text = quantity(margin, unit);
  return isAbsent(margin) || margin <= 0 ? text : `+${text}`;
}

/** How many, with thin spaces between thousands. @param {number | null | undefined} count */
export function count(count) {
  return isAbsent(count) ? absent : withMinus(Math.round(count).toString().replace(/\B(?=(\d{3})+$)/g, '\u202f'));
}

/** A share of a whole in per cent; an en dash of nothing. It says 100 % and 0 % only where that is exactly so. @param {number} part @param {number} whole */
export function percent(part, whole) {
  if (!(whole > 0) || isAbsent(part))
    return absent;
  const exact = part / whole * 100;
  const rounded = Math.round(exact * 10) / 10;
  const shown = rounded >= 100 && part < whole ? 99.9 : rounded <= 0 && part > 0 ? 0.1 : rounded;
  return `${trimmed(shown.toFixed(1))}${space}%`;
}

/** Bytes, in steps of 1,000. @param {number | null | undefined} bytes */
export function fileSize(bytes) {
  return isAbsent(bytes) ? absent : bytes < 1_000 ? `${bytes}${space}B` : withPrefix(bytes, 'B', 3);
}

/** A day: 2026-11-30. @param {string | number | Date | null | undefined} time */
export function day(time) {
  const date = dateOf(time);
  return date === null ? absent : `${date.getFullYear()}-${two(date.getMonth() + 1)}-${two(date.getDate())}`;
}

/** A day and a time: 2026-11-30 14:05. @param {string | number | Date | null | undefined} time */
export function dayAndTime(time) {
  const date = dateOf(time);
  return date === null ? absent : `${day(date)} ${two(date.getHours())}:${two(date.getMinutes())}`;
}

/**
 * How long ago: just now, 12 min, 5 h, 3 days, 7 weeks, 5 months, 2 years.
 * @param {string | number | Date | null | undefined} time
 * @param {number} now   milliseconds, as Date.now()
 */
export function age(time, now) {
  const date = dateOf(time);
  if (date === null)
    return absent;
  const minutes = Math.floor((now - date.getTime()) / 60_000);
  if (minutes < 1)
    return 'just now';
  if (minutes < 60)
    return `${minutes}${space}min`;
  const hours = Math.floor(minutes / 60);
  if (hours < 24)
    return `${hours}${space}h`;
  const days = Math.floor(hours / 24);
  if (days < 21)
    return several(days, 'day');
  if (days < 91)
    return several(Math.floor(days / 7), 'week');
  return days < 730 ? several(Math.floor(days / 30.44), 'month') : several(Math.floor(days / 365.25), 'year');
}

/** "1 unit", "3 units". @param {number} number @param {string} one @param {string} [many] */
export function several(number, one, many = `${one}s`) {
  return `${count(number)}${space}${number === 1 ? one : many}`;
}

/**
 * Reads a typed number: "12k", "1,5 kHz", "-3.01 dB", "1 000", "2e-6". A comma alone is a decimal comma; where both
 * stand, the last is the decimal one. The unit may be left out, and a prefix may stand for it; another unit is refused.
 * @param {string} typed
 * @param {string} [unit]   '' takes no unit; dB and deg take no prefix
 * @returns {{ value: number, problem: '' } | { value: null, problem: string }}
 */
export function parseNumber(typed, unit = '') {
  const text = typed.replaceAll(minus, '-').replace(/[\s\u00a0\u202f]+/g, '');
  if (text === '')
    return problem(`Give a number${unit === '' ? '' : ` in ${shownUnit(unit)}`}.`);
  const parts = /^([+-]?[\d.,]+(?:[eE][+-]?\d+)?)(.*)$/.exec(text);
  const value = parts === null ? null : plainNumber(parts[1]);
  if (parts === null || value === null)
    return problem(`"${typed.trim()}" is no number.${example(unit)}`);
  const scale = scaleOf(parts[2], unit);
  if (scale === null)
    return problem(unit === ''
      ? `"${parts[2]}" cannot stand behind this number: it has no unit.`
      : `"${parts[2]}" is not ${shownUnit(unit)}.${example(unit)}`);
  return { value: rescaled(value, scale), problem: '' };
}

/** Whether a value is to be shown as an en dash. @param {number | null | undefined} value @returns {value is null | undefined} */
function isAbsent(value) {
  return value === null || value === undefined || !Number.isFinite(value);
}

/** @param {number} value @param {number} digits */
function prefixFor(value, digits) {
  // Rounded first, so that 999.96 Hz at four digits is 1 kHz.
  const size = Math.abs(Number(value.toPrecision(digits)));
  if (size === 0)
    return { prefix: '', scale: 1 };
  const [prefix, scale] = prefixes.findLast(([, least]) => size >= /** @type {number} */ (least)) ?? prefixes[0];
  return { prefix: String(prefix), scale: Number(scale) };
}

/** @param {string} text */
function trimmed(text) {
  const [digits, exponent] = text.split('e');
  if (exponent !== undefined && Math.abs(Number(exponent)) <= 12)
    return trimmed(Number(text).toFixed(Math.max(0, digits.replace(/^-?\d\.?/, '').length - Number(exponent))));
  const cut = digits.includes('.') ? digits.replace(/\.?0+$/, '') : digits;
  return exponent === undefined ? cut : `${cut}e${exponent}`;
}

/** @param {string} text */
function withMinus(text) {
  return text.replaceAll('-', minus);
}

/** @param {string} number @param {string} unit */
function withPlainUnit(number, unit) {
  const shown = plainUnits[unit];
  return shown === '' ? number : shown === '\u00b0' ? `${number}\u00b0` : `${number}${space}${shown}`;
}

/** @param {number} number */
function two(number) {
  return String(number).padStart(2, '0');
}

/** @param {string | number | Date | null | undefined} time */
function dateOf(time) {
  if (time === null || time === undefined)
    return null;
  const date = time instanceof Date ? time : new Date(time);
  return Number.isNaN(date.getTime()) ? null : date;
}

/** @param {string} sentence @returns {{ value: null, problem: string }} */
function problem(sentence) {
  return { value: null, problem: sentence };
}

/** @param {string} unit */
function example(unit) {
  return unit === 'Hz' ? ' Write it as 12.5k, 12,5 kHz or 12500.' : unit === '' || unit in plainUnits ? ' Write it as 1.5 or 1,5.' : ` Write it as 1.5m, 1,5 m${unit} or 0.0015.`;
}

/** @param {string} unit */
function shownUnit(unit) {
  return unit === 'deg' ? 'degrees' : unit;
}

/** @param {string} text */
function plainNumber(text) {
  const [digits, exponent = ''] = text.split(/[eE]/);
  const decimal = Math.max(digits.lastIndexOf('.'), digits.lastIndexOf(','));
  const mark = digits[decimal];
  const alone = decimal >= 0 && digits.indexOf(mark) === decimal;
  const whole = alone ? digits.slice(0, decimal) : digits;
  if (/[.,]/.test(whole) && !/^[+-]?\d{1,3}(?:([.,])\d{3})(?:\1\d{3})*$/.test(whole))
    return null;
  const value = Number(`${whole.replace(/[.,]/g, '')}${alone ? `.${digits.slice(decimal + 1)}` : ''}${exponent === '' ? '' : `e${exponent}`}`);
  return /\d/.test(digits) && Number.isFinite(value) ? value : null;
}

/** @param {string} suffix @param {string} unit @returns {number | null} */
function scaleOf(suffix, unit) {
  const said = suffix.replace('\u03bc', '\u00b5');
  if (said === '' || said.toLowerCase() === unit.toLowerCase() || (unit === 'deg' && /^(\u00b0|degrees?)$/i.test(said)))
    return 1;
  if (unit in plainUnits)
    return null;
  if (/^meg(a)?$/i.test(said))
    return 1e6;
  const letter = said[0] === 'u' ? '\u00b5' : said[0] === 'K' ? 'k' : said[0];
  const prefix = prefixes.find(([name]) => name === letter && name !== '');
  const rest = said.slice(1).toLowerCase();
  return prefix !== undefined && (rest === '' || rest === unit.toLowerCase()) ? Number(prefix[1]) : null;
}

/** The decimal number that was meant: 1.1 of "1.1k" times 1000 is 1100, not 1100.0000000000002. @param {number} value @param {number} scale */
function rescaled(value, scale) {
  if (scale === 1 || value === 0)
    return value;
  const [digits, exponent] = value.toExponential().split('e');
  return Number(`${digits}e${Number(exponent) + Math.round(Math.log10(scale))}`);
}
