// The benches of the lab, and when each was last heard of.

import { send } from '../api.js';
import { Page, html, nothing } from '../parts/element.js';
import { formDialog } from '../parts/form-dialog.js';
import { Listing } from '../parts/listing.js';
import { say } from '../parts/notice.js';
import { when } from '../parts/when.js';
import { quantity, several } from '../numbers.js';
import { go } from '../router.js';
import { may, session } from '../session.js';
import '../parts/busy.js';
import '../parts/data-table.js';
import '../parts/refusal.js';

/** @type {readonly import('../parts/data-table.js').Column<any>[]} */
const columns = [
  { key: 'name', label: 'Bench', head: true, sort: (bench) => bench.name, cell: (bench) => bench.name },
  { key: 'seen', label: 'Last heard of', sort: (bench) => (bench.lastSeenAt === null ? null : -Date.parse(bench.lastSeenAt)), cell: (bench) => (bench.lastSeenAt === null ? html`<span class="soft">never</span>` : when(bench.lastSeenAt, ' ago')) },
  { key: 'serial', label: 'Finds serial numbers by', cell: (bench) => (bench.serialPattern === null ? html`<span class="soft">the part before the first _</span>` : html`<code>${bench.serialPattern}</code>`) },
  { key: 'floor', label: 'Noise floor', sort: (bench) => bench.noiseFloorDb, cell: (bench) => (bench.noiseFloorDb === null ? html`<span class="soft">not stated</span>` : quantity(bench.noiseFloorDb, 'dB')) },
  { key: 'columns', label: 'Answers kept', cell: (bench) => (bench.columns.length === 0 ? html`<span class="soft">none</span>` : `for ${several(bench.columns.length, 'kind of file', 'kinds of files')}`) },
  { key: 'remark', label: 'Remark', cell: (bench) => bench.remark ?? nothing },
];

class BenchesPage extends Page {
  constructor() {
    super();
    this.benches = new Listing(this, () => '/api/benches');
  }

  render() {
    const { items, next, busy, refusal } = this.benches;
    const manages = session.holds(may.manage);
    return html`
      <div class="page-head">
        <h1>Benches</h1>
        ${manages && items !== null && items.length > 0 ? html`<button type="button" class="main" @click=${this.make}>New bench</button>` : nothing}
      </div>
      <rl-refusal .answer=${refusal} @again=${() => this.benches.load()}></rl-refusal>
      ${items === null ? (busy ? html`<rl-busy label="Reading the benches"></rl-busy>` : nothing) : html`
        <div class=${items.length === 0 ? '' : 'panel'}>
          <rl-data-table cards caption="Benches" caption-unseen .columns=${columns} .rows=${items} .href=${(/** @type {any} */ bench) => `/benches/${bench.id}`}
            ?more=${next !== null} ?busy=${busy} @more=${() => this.benches.more()}
            .empty=${html`<div class="empty"><h2>There is no bench yet</h2><p>A bench is where units are swept. It is made here, or by the first run that a person sends for it by a new name.</p>${manages ? html`<button type="button" class="main" @click=${() => this.make()}>Make the first bench</button>` : nothing}</div>`}></rl-data-table>
        </div>`}`;
  }

  async make() {
    const made = await formDialog({
      heading: 'New bench',
      act: 'Make the bench',
      fields: ({ errors }) => html`<rl-field label="Name" name="name" required hint="As people in the lab call it; files are sent under it. It cannot be changed later." .errors=${errors.name}></rl-field>`,
      send: (form) => send('POST', '/api/benches', { name: form.get('name') }),
    });
    if (made === undefined)
      return;
    say(`The bench ${made.body.name} is made.`);
    await go(`/benches/${made.body.id}`);
  }
}

customElements.define('rl-page-benches', BenchesPage);
