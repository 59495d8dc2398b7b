// The table of pages: an address, the element that shows it, and who may see it. DEVELOPERS.md says how a page is added.

import { may } from './session.js';

/** @type {readonly import('./router.js').Route[]} */
export const routes = [
  { pattern: '/lots', tag: 'rl-page-lots', load: () => import('./pages/lots.js'), title: 'Lots' },
  { pattern: '/runs', tag: 'rl-page-runs', load: () => import('./pages/runs.js'), title: 'Runs' },
  { pattern: '/runs/{id}', tag: 'rl-page-run', load: () => import('./pages/run.js'), title: 'Run' },
  { pattern: '/send', tag: 'rl-page-send', load: () => import('./pages/send.js'), title: 'Send files', roles: may.operate },
  { pattern: '/password', tag: 'rl-page-password', load: () => import('./pages/password.js'), title: 'Change password' },
];
