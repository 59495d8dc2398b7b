// The ledger's kinds in words, and what an entry is about. Pure.

/** @type {Readonly<Record<string, string>>} */
export const kindWords = Object.freeze({
  'basis.made': 'Basis of verdicts made',
  'bench.changed': 'Bench changed',
  'bench.columnsRemembered': 'Answer about columns kept',
  'bench.created': 'Bench made',
  'condition.added': 'Condition added',
  'demo.filled': 'Demo lab filled',
  'device.changed': 'Device changed',
  'device.created': 'Device described',
  'golden.set': 'Golden run set',
  'lot.created': 'Lot opened',
  'lot.decided': 'Lot decided',
  'lot.reopened': 'Lot reopened',
  'mask.draftChanged': 'Draft of a mask changed',
  'mask.draftDiscarded': 'Draft of a mask discarded',
  'mask.drafted': 'Mask drafted',
  'mask.released': 'Mask released',
  'person.changed': 'Person changed',
  'person.created': 'Person added',
  'run.invalidated': 'Run invalidated',
  'run.reassigned': 'Run reassigned',
  'run.received': 'Run received',
  'token.bound': 'Token bound to a bench',
  'token.created': 'Token made',
  'token.revoked': 'Token revoked',
  'unit.dispositioned': 'Disposition of a unit',
  'verdicts.reevaluated': 'Verdicts evaluated again',
});

/** The groups by which the ledger can be filtered: the part of a kind before its point. @type {readonly (readonly [string, string])[]} */
export const kindGroups = [
  ['', 'everything'], ['lot', 'lots'], ['run', 'runs'], ['unit', 'dispositions'], ['verdicts', 'evaluations'], ['mask', 'masks'], ['golden', 'golden runs'], ['device', 'devices'], ['condition', 'conditions'],
  ['basis', 'bases of verdicts'], ['bench', 'benches'], ['token', 'tokens'], ['person', 'people'], ['demo', 'the demo lab'],
];

/** Ids of a subject that have a page of their own. @type {Readonly<Record<string, string>>} */
const pageOf = { lotId: '/lots/', runId: '/runs/', deviceId: '/devices/', maskId: '/masks/', benchId: '/benches/' };

/** @param {string} kind */
export function wordsOf(kind) {
  return kindWords[kind] ?? kind;
}

/** Members of an entry's detail that say in a few words what happened. */
const telling = ['name', 'number', 'title', 'revision', 'decision', 'disposition', 'cause', 'outcome', 'reason'];

/**
 * What an entry is about: names and numbers as they stand, and links for ids that have a page.
 * @param {Record<string, unknown>} subject
 * @param {Record<string, unknown>} [detail]
 * @returns {{ text: string, href: string | null }[]}
 */
export function aboutOf(subject, detail = {}) {
  const told = telling.filter((name) => !(name in subject)).map((name) => /** @type {const} */ ([name, detail[name]]));
  const named = [...Object.entries(subject), ...told]
    .filter(([name, value]) => value !== null && value !== undefined && !/Id$/.test(name) && typeof value !== 'object')
    .map(([name, value]) => ({ text: `${spoken(name)} ${String(value)}`, href: null }));
  const linked = Object.entries(subject).filter(([name, value]) => name in pageOf && typeof value === 'string').map(([name, value]) => ({ text: spoken(name.replace(/Id$/, '')), href: `${pageOf[name]}${value}` }));
  return [...named, ...linked];
}

/** The words of a camelCase name. @param {string} name */
function spoken(name) {
  return name.replace(/([a-z])([A-Z])/g, '$1 $2').toLowerCase();
}
