// Before the first paint, so that a dark choice never flashes light.
(() => {
  let chosen = null;
  try {
    chosen = localStorage.getItem('stemma-theme');
  } catch {
    // Storage may be forbidden; the system's choice stands then.
  }
  const dark = chosen ? chosen === 'dark' : matchMedia('(prefers-color-scheme: dark)').matches;
  document.documentElement.dataset.theme = dark ? 'dark' : 'light';
})();
