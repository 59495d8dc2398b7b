// Lets files be dropped anywhere in the window: a veil says what will happen, and the page that sends gets them. A drop is always
// caught, for a browser would otherwise leave the app and show the file.

import { filesOf, incoming } from './incoming.js';
import { say } from './notice.js';
import { go } from '../router.js';
import { may, session } from '../session.js';

/** Begins to listen. */
export function acceptDrops() {
  const veil = document.createElement('div');
  veil.className = 'drop-veil';
  veil.hidden = true;
  veil.textContent = 'Drop the sweep files to look at them. Nothing is stored yet.';
  document.body.append(veil);
  let depth = 0;
  const show = (/** @type {boolean} */ shown) => {
    depth = shown ? depth : 0;
    veil.hidden = !shown;
  };

  addEventListener('dragenter', (event) => {
    if (!bringsFiles(event))
      return;
    depth += 1;
    show(mayTake());
  });
  addEventListener('dragleave', (event) => {
    if (!bringsFiles(event))
      return;
    depth -= 1;
    if (depth <= 0)
      show(false);
  });
  addEventListener('dragover', (event) => {
    if (!bringsFiles(event))
      return;
    event.preventDefault();
    if (event.dataTransfer !== null)
      event.dataTransfer.dropEffect = mayTake() ? 'copy' : 'none';
  });
  addEventListener('drop', (event) => {
    if (!bringsFiles(event))
      return;
    event.preventDefault();
    show(false);
    if (mayTake())
      void take(event);
    else if (session.person !== null && document.querySelector('dialog[open]') === null)
      say('Sending files is for operators, engineers and quality. Ask a manager for the role.', { bad: true });
  });
}

/** @param {DragEvent} event */
async function take(event) {
  const items = [...event.dataTransfer?.items ?? []].filter((item) => item.kind === 'file');
  const entries = items.map((item) => item.webkitGetAsEntry()).filter((entry) => entry !== null);
  const { files, lost } = entries.length > 0 ? await filesOf(/** @type {any} */ (entries)) : { files: [...event.dataTransfer?.files ?? []], lost: 0 };
  if (lost > 0)
    say(`${lost} of the dropped files cannot be read. Look at their rights, then drop them again.`, { bad: true });
  if (files.length === 0)
    return;
  if (location.pathname !== '/send')
    await go('/send');
  if (location.pathname === '/send')
    incoming.give(files);
}

/** @param {DragEvent} event */
function bringsFiles(event) {
  return event.dataTransfer?.types.includes('Files') === true;
}

function mayTake() {
  return session.person?.mustChangePassword === false && session.holds(may.operate) && document.querySelector('dialog[open]') === null;
}
