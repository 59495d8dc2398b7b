// What the server keeps and has no screen for yet: says how to reach it, so that a link to it is no dead end.

import { Page, html } from '../parts/element.js';

/** @type {Readonly<Record<string, { title: string, sentence: string, ways: readonly string[] }>>} */
const subjects = {
  devices: {
    title: 'Devices',
    sentence: 'Devices, their conditions and golden units have no screen in this version. The server keeps them, and a program can read and change them:',
    ways: ['GET and POST /api/devices', 'GET and PATCH /api/devices/{id}', 'PUT /api/devices/{id}/golden'],
  },
  masks: {
    title: 'Masks',
    sentence: 'Masks have no screen in this version. Limits are drawn on the page of a lot and of a run; a program can read, write and release masks:',
    ways: ['GET and POST /api/devices/{id}/masks', 'GET and PUT /api/masks/{id}', 'POST /api/masks/{id}/release'],
  },
  compare: {
    title: 'Compare',
    sentence: 'Runs of different lots cannot be laid over each other on a screen in this version. The page of a lot lays its units over the golden unit; the curves of any run come from:',
    ways: ['GET /api/runs/{id}/trace', 'GET /api/runs/{id}/export?format=csv'],
  },
};

class WithoutScreenPage extends Page {
  render() {
    const subject = subjects[location.pathname.split('/')[1]] ?? subjects.devices;
    return html`
      <h1>${subject.title}</h1>
      <section class="panel">
        <p>${subject.sentence}</p>
        <ul>${subject.ways.map((way) => html`<li><code>${way}</code></li>`)}</ul>
        <p><a href="/openapi/v1.json">The description of the API</a> tells their fields. <a href="/lots">Go to the lots</a>.</p>
      </section>`;
  }
}

customElements.define('rl-page-without-screen', WithoutScreenPage);
