// The files of a batch before and after they are sent: where each belongs, what is missing, what became of it. Pure; a row is
// never changed, it is replaced.

import { several } from '../numbers.js';

/** @typedef {'production' | 'golden' | 'through' | 'check' | 'study'} Purpose */

/**
 * Where runs belong. An empty text is not chosen yet; an empty condition is the device's first.
 * @typedef {object} Place
 * @property {string} deviceId
 * @property {string} lotId
 * @property {string} bench        a name
 * @property {Purpose} purpose
 * @property {string} conditionId
 * @property {'received' | 'file' | 'given'} measured   the time of receipt, the file's own, or measuredAt
 * @property {string} measuredAt   as a datetime-local input has it
 */

/** What a file was read as, as POST /api/runs/preview tells it, its trace without re and im. @typedef {any} Preview */
/** @typedef {{ fileName: string, outcome: 'accepted' | 'duplicate' | 'refused', runId: string | null, serial: string | null, verdict: any, verdictReason: string | null, notes: Said[], issues: Issue[], candidates: any[] }} Result */
/** @typedef {{ code: string, message: string }} Said */
/** @typedef {{ line: number | null, column: number | null, code: string, message: string }} Issue */
/** What becomes of sending a row. @typedef {'no' | 'queued' | 'sending' | 'done'} Sent */

/**
 * @typedef {object} Row
 * @property {number} id
 * @property {File} file
 * @property {string} name
 * @property {string} guess          the serial number that the name gives; '' where it gives none
 * @property {string | null} serial  typed over it
 * @property {Partial<Place>} own    what differs from the batch for this file alone
 * @property {'waiting' | 'reading' | 'read' | 'refused'} read
 * @property {Preview | null} preview
 * @property {string} problem        why it could not be looked at, or why sending it was refused as a whole
 * @property {any} columns           columns chosen, as they are sent
 * @property {'' | 'bench' | 'asked'} columnsFrom
 * @property {boolean} acknowledged  that the same bytes are meant for another unit too
 * @property {Place | null} at       where it was sent for: what the batch says later does not move it
 * @property {Sent} sent
 * @property {number} progress       0 to 1 while it is sent
 * @property {Result | null} result
 */

/** @typedef {'reading' | 'unreadable' | 'open' | 'lacking' | 'placeless' | 'ready' | 'queued' | 'sending' | 'accepted' | 'duplicate' | 'refused' | 'sameBytes'} Stage */

export const purposes = /** @type {const} */ (['production', 'golden', 'through', 'check', 'study']);

const longestSerial = 100;
const sameBytes = 'sameFileOtherUnit';

/** @type {Place} */
export const noPlace = Object.freeze({ deviceId: '', lotId: '', bench: '', purpose: 'production', conditionId: '', measured: 'received', measuredAt: '' });

/** @param {number} id @param {File} file @returns {Row} */
export function rowOf(id, file) {
  return {
    id, file, name: file.name, guess: serialInName(file.name), serial: null, own: {}, read: 'waiting', preview: null, problem: '', columns: null, columnsFrom: '',
    acknowledged: false, at: null, sent: 'no', progress: 0, result: null,
  };
}

/** The serial number in a file's name by the usual rule: what stands before the first underscore, else the name without its ending. @param {string} name */
export function serialInName(name) {
  const cut = name.indexOf('_');
  const dot = name.lastIndexOf('.');
  const serial = (cut >= 0 ? name.slice(0, cut) : dot >= 0 ? name.slice(0, dot) : name).trim();
  return serialProblem(serial) === '' ? serial : '';
}

/** What is wrong with a serial number; '' where nothing is. @param {string} serial */
export function serialProblem(serial) {
  if (serial.trim() === '')
    return 'Give the serial number: the name has none.';
  return serial.trim().length > longestSerial || /[\u0000-\u001f\u007f-\u009f]/.test(serial.trim()) ? 'A serial number has 1 to 100 characters, none of them a control character.' : '';
}

/** @param {Row} row */
export function serialOf(row) {
  return (row.serial ?? row.guess).trim();
}

/** Where a row belongs: the batch's place and what differs for it. A device of its own has no lot and condition of the batch's. @param {Row} row @param {Place} place @returns {Place} */
export function placeOf(row, place) {
  if (row.at !== null)
    return row.at;
  const otherDevice = row.own.deviceId !== undefined && row.own.deviceId !== place.deviceId;
  return { ...place, ...(otherDevice ? { lotId: '', conditionId: '' } : {}), ...row.own };
}

/**
 * What a row still lacks before it can be sent, by field.
 * @param {Row} row
 * @param {Place} place
 * @returns {Record<string, string>}
 */
export function lacking(row, place) {
  const whole = placeOf(row, place);
  /** @type {Record<string, string>} */
  const missing = {};
  const serial = serialProblem(serialOf(row));
  if (serial !== '')
    missing.serial = serial;
  if (whole.deviceId === '')
    missing.deviceId = 'Choose the device.';
  if (whole.lotId === '' && whole.purpose === 'production')
    missing.lotId = 'Choose the lot: a production run belongs to one.';
  if (whole.bench.trim() === '')
    missing.bench = 'Name the bench that measured.';
  if (whole.measured === 'given' && whole.measuredAt === '')
    missing.measuredAt = 'Give the time of measuring.';
  return missing;
}

/** Whether the columns of a row are open. @param {Row} row */
export function isOpen(row) {
  return row.preview !== null && row.preview.trace === null && row.preview.candidates.length > 0 && row.columns === null;
}

/** How a row stands. It is placeless while only the batch's place lacks something, and lacking where the row itself does. @param {Row} row @param {Place} place @returns {Stage} */
export function stageOf(row, place) {
  if (row.sent === 'queued' || row.sent === 'sending')
    return row.sent;
  if (row.result !== null)
    return row.result.outcome === 'refused' && row.result.issues.some(({ code }) => code === sameBytes) ? 'sameBytes' : row.result.outcome;
  if (row.sent === 'done')
    return 'refused';
  if (row.read === 'waiting' || row.read === 'reading')
    return 'reading';
  if (isOpen(row))
    return 'open';
  if (row.read === 'refused' || row.preview?.trace === null)
    return 'unreadable';
  const missing = Object.keys(lacking(row, place));
  return missing.length === 0 ? 'ready' : missing.some((field) => field === 'serial' || field in row.own || row.own.deviceId !== undefined) ? 'lacking' : 'placeless';
}

/** @type {Readonly<Record<Stage, string>>} */
const groups = { reading: 'reading', unreadable: 'refused', open: 'asks', lacking: 'asks', placeless: 'placeless', ready: 'ready', queued: 'underWay', sending: 'underWay', accepted: 'sent', duplicate: 'sent', refused: 'refused', sameBytes: 'asks' };

/** The groups that a batch is looked through by. @typedef {'all' | 'reading' | 'asks' | 'placeless' | 'ready' | 'underWay' | 'sent' | 'refused'} Group */

/** @param {Stage} stage @returns {Group} */
export function groupOf(stage) {
  return /** @type {Group} */ (groups[stage]);
}

/**
 * How many rows there are of each group.
 * @param {readonly Row[]} rows
 * @param {Place} place
 * @returns {Record<Group, number>}
 */
export function counted(rows, place) {
  const counts = { all: rows.length, reading: 0, asks: 0, placeless: 0, ready: 0, underWay: 0, sent: 0, refused: 0 };
  for (const row of rows)
    counts[groupOf(stageOf(row, place))] += 1;
  return counts;
}

/**
 * The rows whose columns are open, together where one answer serves: files with the same heads, or without heads the same choices.
 * @param {readonly Row[]} rows
 * @returns {Row[][]}
 */
export function openGroups(rows) {
  /** @type {Map<string, Row[]>} */
  const found = new Map();
  for (const row of rows.filter((one) => isOpen(one) && one.sent === 'no')) {
    const key = headsOf(row);
    found.set(key, [...found.get(key) ?? [], row]);
  }

  return [...found.values()];
}

/** By what files are alike in their columns. @param {Row} row */
export function headsOf(row) {
  return row.preview?.headsDigest ?? JSON.stringify(row.preview?.candidates ?? []);
}

/**
 * Serial numbers that several files of the batch are for, in the same lot and condition: all but the first are retests.
 * @param {readonly Row[]} rows
 * @param {Place} place
 * @returns {ReadonlySet<number>} ids of those behind the first
 */
export function repeated(rows, place) {
  const seen = new Set();
  const behind = new Set();
  for (const row of rows) {
    const whole = placeOf(row, place);
    const key = JSON.stringify([serialOf(row), whole.deviceId, whole.lotId, whole.conditionId]);
    if (whole.purpose !== 'production' || serialOf(row) === '')
      continue;
    if (seen.has(key))
      behind.add(row.id);
    seen.add(key);
  }

  return behind;
}

/** The time of measuring as it is sent; '' for the time of receipt. @param {Row} row @param {Place} place */
export function measuredAt(row, place) {
  const whole = placeOf(row, place);
  if (whole.measured === 'file')
    return new Date(row.file.lastModified).toISOString();
  const given = new Date(whole.measuredAt);
  return whole.measured === 'given' && !Number.isNaN(given.getTime()) ? given.toISOString() : '';
}

/**
 * The fields that go with a row's file.
 * @param {Row} row
 * @param {Place} place
 * @param {Record<string, unknown>} [circumstances]
 * @returns {[string, string][]}
 */
export function fieldsOf(row, place, circumstances = {}) {
  const whole = placeOf(row, place);
  /** @type {[string, string][]} */
  const fields = [
    ['device', whole.deviceId], ['lot', whole.lotId], ['bench', whole.bench.trim()], ['serial', serialOf(row)], ['purpose', whole.purpose], ['condition', whole.conditionId],
    ['measuredAt', measuredAt(row, place)], ['columns', row.columns === null ? '' : JSON.stringify(row.columns)],
    ['circumstances', Object.keys(circumstances).length === 0 ? '' : JSON.stringify(circumstances)], ['acknowledge', row.acknowledged ? sameBytes : ''],
  ];
  return fields.filter(([, value]) => value !== '');
}

/**
 * What an answer to sending one file means: a result, a refusal of the request as a whole, again later, or nothing goes on
 * until somebody does something.
 * @param {import('../api.js').Answer} answer
 * @returns {{ kind: 'result', result: Result } | { kind: 'refused' | 'again' | 'stop', sentence: string }}
 */
export function meaningOf(answer) {
  const result = answer.body?.results?.[0];
  if (result !== undefined)
    return { kind: 'result', result };
  const { status, sentence } = answer;
  if (answer.code === 'stopped' || status === 401 || status === 403)
    return { kind: 'stop', sentence: status === 401 ? 'You are not signed in any more.' : sentence };
  return { kind: status === 0 || status === 429 || status >= 500 ? 'again' : 'refused', sentence: answer.ok ? 'The server did not say what became of the file.' : sentence };
}

/** Where an issue stands in its file, in words. @param {Issue} issue */
export function whereOf({ line, column }) {
  return line === null ? 'whole file' : column === null ? `line ${line}` : `line ${line}, column ${column}`;
}

/** What a batch came to, in a sentence. @param {readonly Row[]} rows @param {Place} place */
export function outcomeSentence(rows, place) {
  const stages = rows.map((row) => stageOf(row, place));
  const verdicts = rows.flatMap((row) => (row.result?.outcome === 'accepted' ? [row.result.verdict?.outcome ?? 'none'] : []));
  const number = (/** @type {string} */ stage) => stages.filter((one) => one === stage).length;
  const failing = verdicts.filter((outcome) => outcome === 'fail' || outcome === 'conditionalFail').length;
  const refused = number('refused') + number('unreadable');
  const parts = [
    number('accepted') === 0 ? 'No run taken' : `${several(number('accepted'), 'run')} taken`,
    ...(failing > 0 ? [`${failing} of them ${failing === 1 ? 'fails' : 'fail'}`] : []),
    ...(number('duplicate') > 0 ? [`${number('duplicate')} known already`] : []),
    ...(refused > 0 ? [`${refused} refused`] : []),
    ...(number('sameBytes') > 0 ? [`${number('sameBytes')} to be asked about`] : []),
  ];
  return `${parts.join(', ')}.`;
}
