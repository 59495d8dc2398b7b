// Days that were chosen as a range of times. Pure but for the browser's zone, in which a day begins.

/**
 * From the beginning of the first day to the end of the last, as the API takes them; a day that is none is left out.
 * @param {string} from   2026-11-30, or ''
 * @param {string} to     included
 * @returns {{ from?: string, to?: string }}
 */
export function rangeOf(from, to) {
  const first = beginningOf(from, 0);
  const behind = beginningOf(to, 1);
  return { ...(first === null ? {} : { from: first }), ...(behind === null ? {} : { to: behind }) };
}

/** @param {string} day @param {number} later   days */
function beginningOf(day, later) {
  const found = /^(\d{4})-(\d{2})-(\d{2})$/.exec(day);
  if (found === null)
    return null;
  const date = new Date(Number(found[1]), Number(found[2]) - 1, Number(found[3]) + later);
  return Number.isNaN(date.getTime()) ? null : date.toISOString();
}
