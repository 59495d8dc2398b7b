// Shows a secret that is told once: a one-time password, a token. Escape does not close it.

import { openDialog } from './dialog.js';
import { html, nothing } from './element.js';

/** @param {{ heading: string, sentence: unknown, secret: string, after?: unknown }} what */
export async function showSecret({ heading, sentence, secret, after = nothing }) {
  let copied = '';
  await openDialog({
    heading,
    mayCancel: () => false,
    content: (dialog) => html`
      <p>${sentence}</p>
      <div class="secret">
        <code>${secret}</code>
        <div class="row">
          <button type="button" @click=${async () => {
            copied = await copy(secret) ? 'Copied.' : 'This browser does not let the page copy. Select the text and copy it.';
            dialog.update();
          }}>Copy</button>
          <span role="status" class="soft small">${copied}</span>
        </div>
      </div>
      ${after}
      <p class="soft small">It is shown this once and kept nowhere.</p>
      <div class="dialog-ends"><button type="button" class="main" @click=${() => dialog.close()}>I have it</button></div>`,
  });
}

/** @param {string} text */
async function copy(text) {
  try {
    await navigator.clipboard.writeText(text);
    return true;
  } catch {
    return false;
  }
}
