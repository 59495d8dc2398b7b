// What stands on the page before there is something to send, or somewhere to send it.

import { html } from '../parts/element.js';
import { may, session } from '../session.js';

/** @param {unknown} picker */
export function invitation(picker) {
  return html`
    <div class="empty drop-place">
      <h2>Drop sweep files here, or anywhere in the app</h2>
      <p>CSV and other delimited text, or Touchstone. Every file is read and shown first, with its curve and what is wrong with it; nothing is stored before you send it.</p>
      <p class="soft">The serial number comes from the file's name, such as <code>SN0042_sweep.csv</code>, and can be typed over.</p>
      ${picker}
    </div>`;
}

/** A lab without a device: the file can be looked at, and made one of. @param {boolean} isReadable   whether a file here can be read @param {() => void} make */
export function noDevice(isReadable, make) {
  return html`
    <div class="empty">
      <h2>No device is described yet</h2>
      <p>The file can be looked at all the same. To keep its run, the lab needs the device that it is of, a mask to judge it by, and a lot.</p>
      ${session.holds(may.engineer)
        ? isReadable ? html`<button type="button" class="main" @click=${make}>Make them from this file</button>` : html`<p class="soft">Once a file here can be read, they can be made from it.</p>`
        : html`<p class="soft">Describing a device is an engineer's work. Ask one, then come back: the files stay in this table while the window is open.</p>`}
    </div>`;
}
