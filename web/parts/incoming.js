// Files that were dropped or picked anywhere, on their way to the page that sends them.

class Incoming extends EventTarget {
  /** @type {File[]} */
  #files = [];

  /** @param {readonly File[]} files */
  give(files) {
    this.#files.push(...files);
    this.dispatchEvent(new Event('files'));
  }

  /** What has come, once. */
  take() {
    const files = this.#files;
    this.#files = [];
    return files;
  }
}

export const incoming = new Incoming();

/** @typedef {{ isFile: boolean, isDirectory: boolean, file?: (done: (file: File) => void, failed: (why: unknown) => void) => void, createReader?: () => { readEntries: (done: (entries: Entry[]) => void, failed: (why: unknown) => void) => void } }} Entry */

/**
 * The files of dropped entries, those in folders with them. What cannot be read is counted.
 * @param {readonly Entry[]} entries
 * @returns {Promise<{ files: File[], lost: number }>}
 */
export async function filesOf(entries) {
  /** @type {File[]} */
  const files = [];
  let lost = 0;
  const open = [...entries];
  for (let entry = open.shift(); entry !== undefined; entry = open.shift()) {
    const one = entry;
    try {
      if (one.isFile)
        files.push(await new Promise((resolve, reject) => { one.file?.(resolve, reject); }));
      else if (one.isDirectory)
        open.push(...await childrenOf(one));
    } catch {
      lost += 1;
    }
  }

  return { files: files.filter((file) => !file.name.startsWith('.')), lost };
}

// A folder is told in pieces, the last of them empty.
/** @param {Entry} folder */
async function childrenOf(folder) {
  const reader = folder.createReader?.();
  /** @type {Entry[]} */
  const children = [];
  for (;;) {
    /** @type {Entry[]} */
    const some = reader === undefined ? [] : await new Promise((resolve, reject) => { reader.readEntries(resolve, reject); });
    if (some.length === 0)
      return children;
    children.push(...some);
  }
}
