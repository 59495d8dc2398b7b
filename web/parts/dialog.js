// A modal dialog on the native <dialog>. It returns a promise of what it is closed with; Escape gives undefined.
//
//   const kind = await openDialog({
//     heading: 'Discard the draft?',
//     content: (dialog) => html`<p>…</p>${ends(html`<button type="button" @click=${() => dialog.close('discard')}>Discard</button>`, dialog)}`,
//   });
//
// The content is a function, called again by dialog.update(); it keeps its state in the caller's variables.

import { render } from 'lit';
import { html, uniqueId } from './element.js';

/**
 * @template T
 * @typedef {{ close: (value?: T) => void, update: () => void, busy: boolean }} Opened
 */

/**
 * @template T
 * @param {object} what
 * @param {string} what.heading
 * @param {(dialog: Opened<T>) => unknown} what.content
 * @param {boolean} [what.wide]
 * @param {() => boolean} [what.mayCancel]   whether Escape closes it; left out, it does while nothing is under way
 * @returns {Promise<T | undefined>}
 */
export function openDialog({ heading, content, wide = false, mayCancel }) {
  const element = document.createElement('dialog');
  const headingId = uniqueId('dialog');
  element.setAttribute('aria-labelledby', headingId);
  element.classList.toggle('wide', wide);
  document.body.append(element);

  /** @type {T | undefined} */
  let result;
  /** @type {Opened<T>} */
  const opened = {
    busy: false,
    close(value) {
      result = value;
      element.close();
    },
    update() {
      render(html`
        <div class="dialog-body">
          <h2 id=${headingId}>${heading}</h2>
          ${content(opened)}
        </div>`, element);
    },
  };
  opened.update();
  element.addEventListener('cancel', (event) => {
    if (event.target === element && (opened.busy || mayCancel?.() === false))
      event.preventDefault();
  });
  const before = /** @type {HTMLElement | null} */ (document.activeElement);
  element.showModal();
  // Fields render a moment later than the dialog opens; the first of them is where one begins, unless the content says where.
  requestAnimationFrame(() => {
    const first = element.querySelector('input:not(:disabled, [type="hidden"]), select:not(:disabled), textarea:not(:disabled)');
    if (first instanceof HTMLElement && element.querySelector('[autofocus]') === null && (document.activeElement === null || !(document.activeElement instanceof HTMLInputElement)))
      first.focus();
  });
  return new Promise((resolve) => {
    element.addEventListener('close', (event) => {
      if (event.target !== element)
        return;
      element.remove();
      before?.focus?.();
      resolve(result);
    });
  });
}

/**
 * The row of buttons at the end: the act, and the way back.
 * @template T
 * @param {unknown} act
 * @param {Opened<T>} dialog
 * @param {string} [back]
 */
export function ends(act, dialog, back = 'Cancel') {
  return html`<div class="dialog-ends"><button type="button" ?disabled=${dialog.busy} @click=${() => dialog.close()}>${back}</button>${act}</div>`;
}

/**
 * A question with one act.
 * @param {{ heading: string, sentence: unknown, act: string, grave?: boolean, back?: string }} what
 * @returns {Promise<boolean>}
 */
export async function confirm({ heading, sentence, act, grave = false, back }) {
  const answer = await openDialog({
    heading,
    content: (dialog) => html`
      <p>${sentence}</p>
      ${ends(html`<button type="button" class=${grave ? 'grave' : 'main'} @click=${() => dialog.close(true)}>${act}</button>`, dialog, back)}`,
  });
  return answer === true;
}
