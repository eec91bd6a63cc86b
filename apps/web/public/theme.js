// Runs before the first paint, so that a page chosen to be dark never flashes. The same rule as src/app/theme.ts.
(() => {
  let choice = null;
  try {
    choice = localStorage.getItem('masswright.theme');
  } catch {
    // Storage may be switched off; the system's preference then decides.
  }
  const night = choice === 'night' || (choice !== 'day' && matchMedia('(prefers-color-scheme: dark)').matches);
  document.documentElement.dataset.theme = night ? 'night' : 'day';
})();
