// The bench that this browser stands at, so that it need not be named again.

const benchKey = 'responseledger-bench';

/** @returns {string} its name; '' where none is kept */
export function keptBench() {
  try {
    return localStorage.getItem(benchKey) ?? '';
  } catch {
    return '';
  }
}

/** @param {string} bench */
export function keepBench(bench) {
  try {
    localStorage.setItem(benchKey, bench);
  } catch {
    // Without storage it is typed again next time.
  }
}
