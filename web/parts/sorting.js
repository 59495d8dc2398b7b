// The order of a table's rows. Pure.

/**
 * Rows by a value: numbers by size, texts as people sort them ("SN 9" before "SN 10"), what is absent last in either
 * direction, and equal ones as they were.
 * @template T
 * @param {readonly T[]} rows
 * @param {((row: T) => number | string | null | undefined) | undefined} by   without it the rows stay
 * @param {boolean} [descending]
 * @returns {readonly T[]}
 */
export function sorted(rows, by, descending = false) {
  if (by === undefined)
    return rows;
  const collator = new Intl.Collator('en', { numeric: true });
  const direction = descending ? -1 : 1;
  return rows
    .map((row, at) => ({ row, at, value: by(row) }))
    .sort((a, b) => compare(a.value, b.value, direction, collator) || a.at - b.at)
    .map(({ row }) => row);
}

/** @param {number | string | null | undefined} a @param {number | string | null | undefined} b @param {number} direction @param {Intl.Collator} collator */
function compare(a, b, direction, collator) {
  const aAbsent = a === null || a === undefined;
  const bAbsent = b === null || b === undefined;
  if (aAbsent || bAbsent)
    return Number(aAbsent) - Number(bAbsent);
  return direction * (typeof a === 'number' && typeof b === 'number' ? a - b : collator.compare(String(a), String(b)));
}
