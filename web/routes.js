// The table of pages: an address, the element that shows it, and who may see it. DEVELOPERS.md says how a page is added.

import { may } from './session.js';

/** @type {readonly import('./router.js').Route[]} */
export const routes = [
  { pattern: '/lots', tag: 'rl-page-lots', load: () => import('./pages/lots.js'), title: 'Lots' },
  { pattern: '/lots/{id}', tag: 'rl-page-lot', load: () => import('./pages/lot.js'), title: 'Lot' },
  { pattern: '/benches', tag: 'rl-page-benches', load: () => import('./pages/benches.js'), title: 'Benches' },
  { pattern: '/benches/{id}', tag: 'rl-page-bench', load: () => import('./pages/bench.js'), title: 'Bench' },
  { pattern: '/people', tag: 'rl-page-people', load: () => import('./pages/people.js'), title: 'People', roles: may.manage },
  { pattern: '/tokens', tag: 'rl-page-tokens', load: () => import('./pages/tokens.js'), title: 'Tokens', roles: may.manage },
  { pattern: '/ledger', tag: 'rl-page-ledger', load: () => import('./pages/ledger.js'), title: 'Ledger' },
  { pattern: '/checklist', tag: 'rl-page-checklist', load: () => import('./pages/checklist.js'), title: 'Checklist', roles: may.manage },
  { pattern: '/runs', tag: 'rl-page-runs', load: () => import('./pages/runs.js'), title: 'Runs' },
  { pattern: '/runs/{id}', tag: 'rl-page-run', load: () => import('./pages/run.js'), title: 'Run' },
  { pattern: '/send', tag: 'rl-page-send', load: () => import('./pages/send.js'), title: 'Send files', roles: may.operate },
  { pattern: '/devices', tag: 'rl-page-without-screen', load: () => import('./pages/without-screen.js'), title: 'Devices' },
  { pattern: '/devices/{id}', tag: 'rl-page-without-screen', load: () => import('./pages/without-screen.js'), title: 'Device' },
  { pattern: '/masks/{id}', tag: 'rl-page-without-screen', load: () => import('./pages/without-screen.js'), title: 'Mask' },
  { pattern: '/compare', tag: 'rl-page-without-screen', load: () => import('./pages/without-screen.js'), title: 'Compare' },
  { pattern: '/password', tag: 'rl-page-password', load: () => import('./pages/password.js'), title: 'Change password' },
];
