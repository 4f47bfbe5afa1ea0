// Runs before anything is drawn, so that the saved theme and density never flash. Kept outside the bundle because the
// page's policy allows scripts from its own address only, and none written into the page.
(() => {
  let saved = {};
  try {
    saved = JSON.parse(localStorage.getItem('hummock.preferences') ?? '{}');
  } catch {
    // a private window without storage: the defaults will do
  }
  const prefersDark = matchMedia('(prefers-color-scheme: dark)').matches;
  const isDark = saved.theme === 'dark' || (saved.theme !== 'light' && prefersDark);
  document.documentElement.dataset.theme = isDark ? 'dark' : 'light';
  document.documentElement.dataset.density = saved.density ?? 'comfortable';
})();
