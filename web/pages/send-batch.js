// The batch of files that is being looked at and sent. There is one, and it outlives the page: sending goes on while somebody
// looks at a run, and what was typed is there when they come back. Tells "change", a few times a second at most.

import { ask, send, sendForm } from '../api.js';
import { session } from '../session.js';
import { fieldsOf, headsOf, isOpen, meaningOf, noPlace, openGroups, placeOf, rowOf, stageOf } from './send-rows.js';
import { SendQueue } from './send-queue.js';

/** @typedef {import('./send-rows.js').Row} Row */
/** @typedef {import('./send-rows.js').Place} Place */
/** @typedef {import('./send-queue.js').Came} Came */

const previewsAtOnce = 3;
const sendsAtOnce = 2;
const namesAtOnce = 500;
const calmMs = 150;

class Batch extends EventTarget {
  /** @type {Map<number, Row>} */
  #rows = new Map();
  #lastId = 0;
  /** @type {ReturnType<typeof setTimeout> | undefined} */
  #told;
  #lastTold = -Infinity;
  #whose = '';

  constructor() {
    super();
    /** @type {Place} */
    this.place = noPlace;
    /** @type {Record<string, unknown>} */
    this.circumstances = {};
    /** @type {any[]} benches as the API has them */
    this.benches = [];
    this.previews = new SendQueue({ work: (/** @type {number} */ id) => this.#look(id), atOnce: previewsAtOnce, changed: () => this.#tell() });
    this.sending = new SendQueue({ work: (/** @type {number} */ id) => this.#send(id), atOnce: sendsAtOnce, changed: () => this.#tell() });
    addEventListener('online', () => this.#wake());
    addEventListener('beforeunload', (event) => {
      if (this.isUnsent)
        event.preventDefault();
    });
    session.addEventListener('change', () => {
      const who = session.person?.email ?? '';
      if (who !== '' && this.#whose !== '' && who !== this.#whose)
        this.clear();
      this.#whose = who === '' ? this.#whose : who;
    });
  }

  get rows() {
    return [...this.#rows.values()];
  }

  /** Whether something would be lost with the window. */
  get isUnsent() {
    return this.rows.some((row) => row.result === null && row.sent !== 'done');
  }

  /** Takes files up; one that is here already (name, size and time) is not taken again. @param {readonly File[]} files @returns {number} how many were here already */
  add(files) {
    this.#whose = session.person?.email ?? '';
    const known = new Set(this.rows.map((row) => fingerprint(row.file)));
    const fresh = files.filter((file) => {
      const print = fingerprint(file);
      return !known.has(print) && known.add(print);
    });
    const rows = fresh.map((file) => rowOf(this.#lastId += 1, file));
    for (const row of rows)
      this.#rows.set(row.id, row);
    this.previews.add(rows.map((row) => row.id));
    void this.#nameSerials(rows);
    this.#tell();
    return files.length - fresh.length;
  }

  /** Forgets rows that are not being sent. @param {readonly number[]} ids */
  remove(ids) {
    for (const id of ids) {
      if (this.#rows.get(id)?.sent !== 'sending')
        this.#rows.delete(id);
    }

    this.previews.drop((id) => !this.#rows.has(id));
    this.sending.drop((id) => !this.#rows.has(id));
  }

  clear() {
    this.remove(this.rows.map((row) => row.id));
  }

  /** @param {number} id @param {Partial<Row>} change */
  change(id, change) {
    const row = this.#rows.get(id);
    if (row === undefined)
      return;
    this.#rows.set(id, { ...row, ...change });
    this.#tell();
  }

  /** @param {Partial<Place>} change */
  placeAt(change) {
    const before = this.place;
    this.place = { ...before, ...change };
    if (this.place.bench !== before.bench) {
      void this.#nameSerials(this.rows);
      this.#recallAll();
    }

    this.#tell();
  }

  /** @param {readonly any[]} benches */
  knowBenches(benches) {
    this.benches = [...benches];
    void this.#nameSerials(this.rows);
    this.#recallAll();
  }

  /** The bench of this name, where it is known. @param {string} name */
  benchOf(name) {
    return this.benches.find((bench) => bench.name === name.trim());
  }

  /** Answers the question of columns for all files that are alike, and reads them anew. @param {readonly Row[]} rows @param {any} columns @param {'asked' | 'bench'} from */
  chooseColumns(rows, columns, from) {
    for (const row of rows)
      this.change(row.id, { columns, columnsFrom: from, read: 'waiting' });
    this.previews.add(rows.map((row) => row.id));
  }

  /** Reads again what could not be read for want of an answer, or after its columns were chosen otherwise. @param {Row} row */
  readAgain(row) {
    this.change(row.id, { read: 'waiting', problem: '' });
    this.previews.add([row.id]);
  }

  /** Sends what is ready. @param {(row: Row) => boolean} [which] */
  sendReady(which = (row) => stageOf(row, this.place) === 'ready') {
    const ready = this.rows.filter(which);
    for (const row of ready)
      this.change(row.id, { sent: 'queued', at: placeOf({ ...row, at: null }, this.place), progress: 0, result: null, problem: '' });
    this.sending.add(ready.map((row) => row.id));
  }

  /** Takes what has not begun out of the queue again. */
  stop() {
    for (const id of this.sending.drop(() => true))
      this.change(id, { sent: 'no', at: null });
    this.sending.resume();
  }

  /** Sends again a file that was refused because its bytes stand for another unit: both are meant. @param {readonly number[]} ids */
  acknowledge(ids) {
    for (const id of ids)
      this.change(id, { acknowledged: true });
    this.sendReady((row) => ids.includes(row.id));
  }

  /** @param {number} id @returns {Promise<Came>} */
  async #look(id) {
    const row = this.#rows.get(id);
    if (row === undefined)
      return { kind: 'done' };
    this.change(id, { read: 'reading' });
    const form = new FormData();
    if (row.columns !== null)
      form.append('columns', JSON.stringify(row.columns));
    form.append('file', row.file, row.name);
    const answer = await sendForm('/api/runs/preview', form);
    const meaning = meaningOf(answer);
    if (!answer.ok && (meaning.kind === 'again' || meaning.kind === 'stop')) {
      this.change(id, { read: 'waiting' });
      return { kind: meaning.kind, sentence: meaning.sentence };
    }

    this.change(id, answer.ok ? { read: 'read', preview: slim(answer.body), problem: '' } : { read: 'refused', problem: await unreadable(row.file) ?? answer.sentence });
    this.#recall(id);
    return { kind: 'done' };
  }

  /** @param {number} id @returns {Promise<Came>} */
  async #send(id) {
    const row = this.#rows.get(id);
    if (row === undefined)
      return { kind: 'done' };
    this.change(id, { sent: 'sending', progress: 0 });
    const form = new FormData();
    for (const [name, value] of fieldsOf(row, this.place, this.circumstances))
      form.append(name, value);
    form.append('file', row.file, row.name);
    const meaning = meaningOf(await sendForm('/api/runs', form, { onProgress: (progress) => this.change(id, { progress }) }));
    if (meaning.kind === 'result') {
      this.change(id, { sent: 'done', result: meaning.result, problem: '' });
      this.#learn(row);
      return { kind: 'done' };
    }

    const gone = meaning.kind === 'again' ? await unreadable(row.file) : null;
    if (gone !== null || meaning.kind === 'refused') {
      this.change(id, { sent: 'done', problem: gone ?? meaning.sentence });
      return { kind: 'done' };
    }

    this.change(id, { sent: 'queued', progress: 0 });
    return { kind: meaning.kind, sentence: meaning.sentence };
  }

  /** A bench that a file has just made, or columns that it has just learnt, are known from now on. @param {Row} row */
  #learn(row) {
    const { bench } = placeOf(row, this.place);
    if (this.benchOf(bench) === undefined || row.columnsFrom === 'asked')
      this.#benchesDue ??= setTimeout(() => void this.#askBenches(), 1_000);
  }

  /** @type {ReturnType<typeof setTimeout> | undefined} */
  #benchesDue;

  async #askBenches() {
    this.#benchesDue = undefined;
    const answer = await ask('/api/benches?limit=500');
    if (answer.ok)
      this.benches = answer.body.items;
    this.#tell();
  }

  /** Uses what the bench remembers for files with these heads. @param {number} id */
  #recall(id) {
    const row = this.#rows.get(id);
    if (row === undefined || !isOpen(row) || row.preview.headsDigest === null)
      return;
    const remembered = this.benchOf(row.own.bench ?? this.place.bench)?.columns.find((/** @type {any} */ columns) => columns.headsDigest === row.preview.headsDigest);
    const asked = this.rows.find((other) => other.columnsFrom === 'asked' && headsOf(other) === headsOf(row));
    const columns = asked?.columns ?? remembered?.choices ?? null;
    if (columns !== null)
      this.chooseColumns([row], columns, asked === undefined ? 'bench' : 'asked');
  }

  #recallAll() {
    for (const [row] of openGroups(this.rows).map((group) => group))
      this.rows.filter((one) => headsOf(one) === headsOf(row)).forEach((one) => this.#recall(one.id));
  }

  /** Serial numbers by the bench's own pattern, where it has one. @param {readonly Row[]} rows */
  async #nameSerials(rows) {
    const bench = this.benchOf(this.place.bench);
    const left = rows.filter((row) => row.sent === 'no');
    if (bench?.serialPattern == null) {
      for (const row of left)
        this.change(row.id, { guess: rowOf(row.id, row.file).guess });
      return;
    }

    for (let from = 0; from < left.length; from += namesAtOnce) {
      const some = left.slice(from, from + namesAtOnce);
      const answer = await send('POST', `/api/benches/${bench.id}/serials`, { fileNames: some.map((row) => row.name) });
      if (this.benchOf(this.place.bench)?.id !== bench.id)
        return;
      if (answer.ok)
        some.forEach((row, i) => this.change(row.id, { guess: answer.body.items[i].serial ?? '' }));
    }
  }

  #wake() {
    for (const queue of [this.previews, this.sending]) {
      if (queue.state === 'waiting')
        queue.resume();
    }
  }

  #tell() {
    if (this.#told !== undefined)
      return;
    // At once after a quiet time, so that an act is answered; else after a while, so that 500 files do not redraw 500 times.
    const wait = Math.max(0, this.#lastTold + calmMs - performance.now());
    this.#told = setTimeout(() => {
      this.#told = undefined;
      this.#lastTold = performance.now();
      this.dispatchEvent(new Event('change'));
    }, wait);
  }
}

/** @param {File} file */
function fingerprint(file) {
  return JSON.stringify([file.name, file.size, file.lastModified, file.webkitRelativePath]);
}

/** A preview without what no screen shows. @param {any} preview */
function slim(preview) {
  const { trace } = preview;
  return { ...preview, trace: trace === null ? null : { frequencyHz: trace.frequencyHz, gainDb: trace.gainDb, phaseDeg: trace.phaseDeg, notes: trace.notes } };
}

/** Why a file that was picked cannot be read any more, or null: a request with it fails just as one without a network. @param {File} file */
async function unreadable(file) {
  try {
    await file.slice(0, 1).arrayBuffer();
    return null;
  } catch {
    return 'The file cannot be read any more: it was changed, moved or taken away since it was picked. Pick it again.';
  }
}

export const batch = new Batch();
