// What serial number a bench would find in a file's name. Pure. The server has the last word: its regular expressions are
// those of .NET, which agree with the browser's in all that a file's name needs.

/**
 * A sentence that says what would be found.
 * @param {string} fileName
 * @param {string} pattern   '' for the usual rule
 */
export function serialOf(fileName, pattern) {
  const name = fileName.trim();
  if (name === '')
    return 'Type the name of a file.';
  if (pattern.trim() === '')
    return found(usual(name));
  let match;
  try {
    match = new RegExp(pattern).exec(name);
  } catch {
    return 'The browser cannot try this pattern. Keep it, and the server says whether it can be used.';
  }

  return match === null ? 'It finds nothing in this name: a file of this name would be refused until a serial number is given.' : found(match.groups?.serial ?? match[0]);
}

/** @param {string} name */
function usual(name) {
  const underscore = name.indexOf('_');
  if (underscore >= 0)
    return name.slice(0, underscore);
  const dot = name.lastIndexOf('.');
  return dot > 0 ? name.slice(0, dot) : name;
}

/** @param {string} serial */
function found(serial) {
  return serial.trim() === '' ? 'It finds nothing in this name.' : `It finds the serial number ${serial.trim()}.`;
}
