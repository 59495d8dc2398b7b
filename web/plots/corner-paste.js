// Corners out of text that was copied from a spreadsheet: two columns, frequency and value, with tabs, semicolons, commas or
// blanks between them, decimal point or comma, and perhaps a head with units. Pure.

import { parseNumber } from '../numbers.js';
import { sortCorners } from './corner-editing.js';

/** @typedef {import('./corner-editing.js').Corner} Corner */
/** @typedef {{corners: Corner[], problems: {line: number, sentence: string}[], notes: string[]}} PastedCorners */

const frequencyScales = new Map([['mhz', 1e6], ['khz', 1e3], ['ghz', 1e9], ['hz', 1]]);

/**
 * Reads corners. They are to be taken only when there is no problem.
 * @param {string} text
 * @param {string} unit of the values: dB, deg or s
 * @returns {PastedCorners}
 */
export function parseCorners(text, unit) {
  const rows = text.split(/\r\n|\r|\n/).map((content, i) => ({ content: content.trim(), line: i + 1 })).filter(({ content }) => content !== '');
  if (rows.length === 0) return { corners: [], problems: [{ line: 1, sentence: 'There is nothing to paste.' }], notes: [] };

  const split = splitterOf(rows.map(({ content }) => content));
  const head = split(rows[0].content);
  const hasHead = head.length > 0 && head.every((cell) => !/^[+\-\u2212]?[.,]?\d/.test(cell));
  const notes = [];
  const scaleHz = hasHead ? headScale(head[0]) : 1;
  if (scaleHz !== 1) notes.push(`Frequencies are taken as ${head[0]}.`);

  const problems = [];
  /** @type {Corner[]} */
  const corners = [];
  for (const { content, line } of hasHead ? rows.slice(1) : rows) {
    const cells = split(content).filter((cell, i, all) => cell !== '' || i < all.findLastIndex((c) => c !== '') || i < 2);
    if (cells.length !== 2) {
      problems.push({ line, sentence: `Two columns are expected, frequency and value; there ${cells.length === 1 ? 'is one' : `are ${cells.length}`}.` });
      continue;
    }

    const [at, value] = [parseNumber(cells[0], 'Hz'), parseNumber(cells[1], unit)];
    if (at.value === null) problems.push({ line, sentence: `Frequency: ${at.problem}` });
    else if (value.value === null) problems.push({ line, sentence: `Value: ${value.problem}` });
    else corners.push({ frequencyHz: Number((at.value * scaleHz).toPrecision(15)), value: value.value });
  }

  if (corners.length === 0 && problems.length === 0) problems.push({ line: rows[0].line, sentence: 'There is a head and no corner under it.' });
  const ascending = corners.every((corner, i) => i === 0 || corner.frequencyHz >= corners[i - 1].frequencyHz);
  if (!ascending) notes.push('The corners were sorted by frequency.');
  return { corners: sortCorners(corners), problems, notes };
}

/**
 * What divides the cells. A tab or a semicolon does wherever one stands; then a comma is a decimal one. Else blanks do where each
 * line has two parts that way, and else commas.
 * @param {string[]} lines
 * @returns {(line: string) => string[]}
 */
function splitterOf(lines) {
  const by = (/** @type {RegExp | string} */ mark) => (/** @type {string} */ line) => line.split(mark).map((cell) => cell.trim());
  if (lines.some((line) => line.includes('\t'))) return by('\t');
  if (lines.some((line) => line.includes(';'))) return by(';');
  const numbers = lines.filter((line) => /^[+\-\u2212]?[.,]?\d/.test(line));
  const blank = /(?<=\S)\s+(?=[+\-\u2212]?[.,]?\d)/;
  if (numbers.every((line) => line.split(blank).length === 2 && !/,\s/.test(line))) return by(blank);
  return by(',');
}

// "Frequency (kHz)", "f / MHz". In a head "mhz" is megahertz: nobody tabulates a limit in millihertz under such a head.
/** @param {string} cell */
function headScale(cell) {
  const unit = /\b([kmg]?hz)\b/i.exec(cell)?.[1].toLowerCase();
  return unit === undefined ? 1 : frequencyScales.get(unit) ?? 1;
}
