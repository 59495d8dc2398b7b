// Which runs get a line, a colour and a name of their own; the rest lie in the background. Pure.

/** @typedef {{runId: string, serial: string, outcome: string | null}} Run */
/** How a run is drawn: an index into the theme's series colours, and a dash pattern in CSS pixels. @typedef {{colour: number, dash: number[]}} LineStyle */
/** @typedef {{run: Run, style: LineStyle}} NamedRun */

/** More lines than these cannot be told apart. */
export const mostNamed = 8;

/** The theme's colours for runs. That of forbidden areas is not among them. */
export const seriesColours = ['--series-1', '--series-4', '--series-3', '--series-6', '--series-5'];

const dashes = [[], [7, 3], [2, 3], [10, 3, 2, 3]];

const outcomeWords = new Map([
  ['fail', 'fails'],
  ['conditionalFail', 'conditional fail'],
  ['inconclusive', 'inconclusive'],
  ['conditionalPass', 'conditional pass'],
  ['pass', 'passes'],
]);

const gravity = ['fail', 'conditionalFail', 'inconclusive'];

/** Whether a run is one that a decision would stumble over. @param {Run} run */
export const isOdd = (run) => run.outcome !== null && gravity.includes(run.outcome);

/** What an outcome is called beside a name; empty for a run without one. @param {string | null} outcome */
export const outcomeWord = (outcome) => (outcome === null ? '' : outcomeWords.get(outcome) ?? outcome);

/**
 * The runs with names: those chosen, or all where there are few, or else the ones that do not pass, the gravest first and
 * otherwise in their order.
 * @param {Run[]} runs
 * @param {string[] | null} chosen ids; null leaves the choice to the outcomes
 * @returns {NamedRun[]}
 */
export function namedRuns(runs, chosen = null) {
  return chooseRuns(runs, chosen).slice(0, mostNamed).map((run, i) => ({ run, style: styleOf(i) }));
}

/** @param {Run[]} runs @param {string[] | null} chosen */
function chooseRuns(runs, chosen) {
  if (chosen !== null) return chosen.map((runId) => runs.find((run) => run.runId === runId)).filter((run) => run !== undefined);
  if (runs.length <= mostNamed) return runs;
  return gravity.flatMap((outcome) => runs.filter((run) => run.outcome === outcome));
}

/** No two of the first twenty look the same, and neighbours differ in colour and in dash. @param {number} index @returns {LineStyle} */
export function styleOf(index) {
  return { colour: index % seriesColours.length, dash: dashes[index % dashes.length] };
}

/**
 * The background in the order of painting: passing runs, and over them the odd ones that got no name.
 * @template {Run} T
 * @param {T[]} runs @param {NamedRun[]} named
 * @returns {Uint8Array} a group a run: 0 plain, 1 odd, 255 not in the background
 */
export function backgroundGroups(runs, named) {
  const names = new Set(named.map(({ run }) => run.runId));
  return Uint8Array.from(runs, (run) => (names.has(run.runId) ? 255 : isOdd(run) ? 1 : 0));
}
