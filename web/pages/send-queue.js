// Works through items a few at a time. What fails for want of an answer is tried again later, the whole queue with it: a network
// that is gone is gone for all. After some tries it stands still until it is resumed. Pure but for its timer.

/**
 * What became of one item: done, to be tried again, or nothing goes on until somebody does something.
 * @typedef {{ kind: 'done' | 'again' | 'stop', sentence?: string }} Came
 */

/** idle: nothing to do; running; waiting: for the next try; still: until resume(). @typedef {'idle' | 'running' | 'waiting' | 'still'} QueueState */

const firstWaitMs = 1_000;
const longestWaitMs = 30_000;

/** How long to wait before a try. @param {number} tries that have failed in a row */
export function waitMs(tries) {
  return Math.min(longestWaitMs, firstWaitMs * 2 ** Math.max(0, tries - 1));
}

/** @template T */
export class SendQueue {
  /** @type {T[]} */
  #items = [];
  /** @type {Set<T>} */
  #underWay = new Set();
  #failed = 0;
  #held = false;
  #timer = 0;

  /**
   * @param {object} how
   * @param {(item: T) => Promise<Came>} how.work
   * @param {number} how.atOnce
   * @param {() => void} how.changed   called when the state may be another
   * @param {number} [how.mostTries]   failures in a row before it stands still
   * @param {{ set: (act: () => void, ms: number) => number, clear: (timer: number) => void }} [how.timers]
   */
  constructor({ work, atOnce, changed, mostTries = 7, timers = { set: (act, ms) => Number(setTimeout(act, ms)), clear: (timer) => clearTimeout(timer) } }) {
    this.work = work;
    this.atOnce = atOnce;
    this.changed = changed;
    this.mostTries = mostTries;
    this.timers = timers;
    /** Why it waits or stands still. */
    this.sentence = '';
    /** When the next try is due, while it waits: milliseconds from its start. */
    this.nextTryMs = 0;
  }

  /** @returns {QueueState} */
  get state() {
    if (this.#held)
      return 'still';
    if (this.#timer !== 0)
      return 'waiting';
    return this.#items.length + this.#underWay.size === 0 ? 'idle' : 'running';
  }

  get length() {
    return this.#items.length + this.#underWay.size;
  }

  /** @param {readonly T[]} items */
  add(items) {
    this.#items.push(...items);
    this.#go();
  }

  /** Forgets what has not begun. @param {(item: T) => boolean} which @returns {T[]} what was forgotten */
  drop(which) {
    const dropped = this.#items.filter(which);
    this.#items = this.#items.filter((item) => !which(item));
    if (this.length === 0)
      this.#calm();
    this.changed();
    return dropped;
  }

  /** Stands still; what is under way comes to its end. @param {string} [sentence] */
  hold(sentence = '') {
    this.#calm();
    this.#held = true;
    this.sentence = sentence;
    this.changed();
  }

  /** Goes on at once: after standing still, and instead of waiting longer. */
  resume() {
    this.#calm();
    this.#held = false;
    this.#failed = 0;
    this.#go();
  }

  #go() {
    while (!this.#held && this.#timer === 0 && this.#underWay.size < this.atOnce) {
      const item = this.#items.shift();
      if (item === undefined)
        break;
      this.#underWay.add(item);
      void this.#take(item);
    }

    this.changed();
  }

  /** @param {T} item */
  async #take(item) {
    const came = await this.work(item);
    this.#underWay.delete(item);
    if (came.kind !== 'done')
      this.#items.unshift(item);
    if (came.kind === 'stop')
      this.hold(came.sentence);
    else if (came.kind === 'again')
      this.#fail(came.sentence ?? '');
    else
      this.#failed = 0;
    this.#go();
  }

  /** @param {string} sentence */
  #fail(sentence) {
    this.sentence = sentence;
    // Several under way fail together: that is one failure.
    if (this.#held || this.#timer !== 0)
      return;
    this.#failed += 1;
    if (this.#failed >= this.mostTries) {
      this.hold(sentence);
      return;
    }

    this.nextTryMs = waitMs(this.#failed);
    this.#timer = this.timers.set(() => {
      this.#timer = 0;
      this.#go();
    }, this.nextTryMs);
  }

  #calm() {
    if (this.#timer !== 0)
      this.timers.clear(this.#timer);
    this.#timer = 0;
    this.sentence = '';
  }
}
