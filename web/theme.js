// Sets data-theme on <html> before anything is painted: what the person chose here, else what the system prefers.
// A classic script on purpose: a module would run after the first paint.
(() => {
  const key = 'responseledger-theme';
  const root = document.documentElement;
  const dark = matchMedia('(prefers-color-scheme: dark)');

  /** @returns {'auto'|'light'|'dark'} */
  function chosen() {
    try {
      const kept = localStorage.getItem(key);
      return kept === 'light' || kept === 'dark' ? kept : 'auto';
    } catch {
      return 'auto';
    }
  }

  function apply() {
    const choice = chosen();
    root.dataset.themeChoice = choice;
    root.dataset.theme = choice === 'auto' ? (dark.matches ? 'dark' : 'light') : choice;
  }

  dark.addEventListener('change', apply);
  addEventListener('storage', apply);
  addEventListener('responseledger-theme', (event) => {
    const choice = /** @type {CustomEvent} */ (event).detail;
    try {
      if (choice === 'auto')
        localStorage.removeItem(key);
      else
        localStorage.setItem(key, choice);
    } catch {
      // Without storage the choice holds for this page.
    }

    apply();
    if (chosen() !== choice)
      root.dataset.theme = choice;
  });

  // Paper is light.
  addEventListener('beforeprint', () => {
    root.dataset.theme = 'light';
  });
  addEventListener('afterprint', apply);
  apply();
})();
