// What an engineer may do to a run: find it invalid with its cause, or say where it belongs in truth. Both keep everything.

import { all, ask, send } from '../api.js';
import { html, nothing } from '../parts/element.js';
import { confirmWithReason, refused } from '../parts/form-dialog.js';
import { conditionOptions } from './send-place.js';

// Causes that benches know; any other may be typed.
const causes = ['loose contact', 'wrong fixture', 'wrong setting of the bench', 'bench out of calibration', 'overload', 'disturbance from outside', 'wrong unit measured'];

/** @param {any} run @returns {Promise<any>} the run after it, or null */
export async function invalidate(run) {
  const answer = await confirmWithReason({
    heading: `Invalidate the run of ${run.serial}`,
    sentence: html`The run stays, with all that was measured, and shows everywhere as invalidated. ${run.standing === 'counting' ? 'The next valid run of the unit in this condition counts in its place, where the device still allows one.' : 'It does not count now either.'} This cannot be taken back.`,
    act: 'Invalidate it',
    grave: true,
    fields: ({ errors }) => html`<rl-field label="Assignable cause" name="cause" required .list=${causes} hint="What went wrong with the measurement, in a few words. A unit that merely fails is no cause." .errors=${errors.cause}></rl-field>`,
    send: async ({ reason, form }) => {
      const cause = String(form.get('cause') ?? '').trim();
      return cause === '' ? refused({ cause: 'Give the cause.' }) : send('POST', `/api/runs/${run.id}/invalidation`, { cause, reason });
    },
  });
  return answer?.body ?? null;
}

/** @param {any} run @returns {Promise<any>} the run after it, or null */
export async function reassign(run) {
  const [device, lots] = await Promise.all([ask(`/api/devices/${run.deviceId}`), all(`/api/lots?state=open&limit=200&device=${run.deviceId}`)]);
  const conditions = device.ok ? device.body.conditions : [];
  const open = lots.items.filter((lot) => lot.id !== run.lotId);
  const answer = await confirmWithReason({
    heading: `Reassign the run of ${run.serial}`,
    sentence: 'Say where the run belongs in truth. Where it was is kept and shows in its history. It is judged anew where it arrives.',
    act: 'Reassign it',
    fields: ({ errors }) => html`
      <rl-field label="Serial number" name="serial" required .value=${run.serial} hint="A new one makes the unit." .errors=${errors.serial}></rl-field>
      ${run.lotId === null && open.length === 0 ? nothing : html`<rl-field label="Lot" name="lot" .options=${[['', run.lotNumber ?? 'none'], ...open.map((lot) => [lot.id, lot.number])]} .errors=${errors.lot}></rl-field>`}
      ${conditions.length < 2 ? nothing : html`<rl-field label="Condition" name="condition" .options=${conditionOptions({ conditions }).map(([, name]) => [name, name])} .value=${run.condition} .errors=${errors.condition}></rl-field>`}`,
    send: async ({ reason, form }) => {
      const serial = String(form.get('serial') ?? '').trim();
      const lot = String(form.get('lot') ?? '');
      const condition = String(form.get('condition') ?? run.condition);
      if (serial === '')
        return refused({ serial: 'Give the serial number.' });
      const change = { ...(serial === run.serial ? {} : { serial }), ...(lot === '' ? {} : { lot }), ...(condition === run.condition ? {} : { condition }) };
      return Object.keys(change).length === 0
        ? refused({ serial: 'Nothing is changed yet: say what was wrong, the serial number, the lot or the condition.' })
        : send('POST', `/api/runs/${run.id}/reassignment`, { ...change, reason });
    },
  });
  return answer?.body ?? null;
}
