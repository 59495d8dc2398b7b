// The table of pages: an address, the element that shows it, and who may see it. DEVELOPERS.md says how a page is added.

/** @type {readonly import('./router.js').Route[]} */
export const routes = [
  { pattern: '/lots', tag: 'rl-page-lots', load: () => import('./pages/lots.js'), title: 'Lots' },
  { pattern: '/password', tag: 'rl-page-password', load: () => import('./pages/password.js'), title: 'Change password' },
];
