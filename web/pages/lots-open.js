// Opening a lot: a dialog, and then the lot's page or what the caller does with the lot.

import { send } from '../api.js';
import { html } from '../parts/element.js';
import { formDialog, refused } from '../parts/form-dialog.js';
import { say } from '../parts/notice.js';
import { parseNumber } from '../numbers.js';
import { go } from '../router.js';

/** Opens a lot and goes to it. @param {readonly any[]} devices @param {string} [deviceId]   chosen at first */
export async function openLot(devices, deviceId) {
  const lot = await makeLot(devices, deviceId);
  if (lot !== null)
    await go(`/lots/${lot.id}`);
}

/** Opens a lot; null where nobody did. @param {readonly any[]} devices @param {string} [deviceId]   chosen at first @returns {Promise<any>} */
export async function makeLot(devices, deviceId = devices[0]?.id ?? '') {
  const made = await formDialog({
    heading: 'Open a lot',
    act: 'Open the lot',
    fields: ({ errors }) => html`
      <rl-field label="Device" name="deviceId" .options=${devices.map((device) => [device.id, `${device.partNumber} ${device.revision}, ${device.title}`])} .value=${deviceId} .errors=${errors.deviceId}></rl-field>
      <rl-field label="Lot number" name="number" required .errors=${errors.number}></rl-field>
      <rl-field label="Size" name="size" inputmode="numeric" required hint="How many units the lot has." .errors=${errors.size}></rl-field>
      <rl-field label="Serial numbers" name="serials" rows="4" optional hint="One a line, or parted by commas. Units that are not named here come in with their first run." .errors=${serialErrors(errors)}></rl-field>`,
    send: (form) => {
      const size = parseNumber(String(form.get('size')));
      if (size.value === null || !Number.isInteger(size.value))
        return refused({ size: 'The size is a whole number of units.' });
      const serials = String(form.get('serials')).split(/[\n,;]/).map((serial) => serial.trim()).filter((serial) => serial !== '');
      return send('POST', '/api/lots', { deviceId: form.get('deviceId'), number: form.get('number'), size: size.value, ...(serials.length > 0 ? { serials } : {}) });
    },
  });
  if (made === undefined)
    return null;
  say(`Lot ${made.body.number} is open.`);
  return made.body;
}

/** The problems of single serial numbers stand at the field of all. @param {Record<string, string[]>} errors */
function serialErrors(errors) {
  const found = Object.entries(errors).filter(([field]) => field.startsWith('serials')).flatMap(([, sentences]) => sentences);
  return found.length === 0 ? undefined : [...new Set(found)];
}
