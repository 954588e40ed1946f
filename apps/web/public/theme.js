// Sets the theme before the first paint. A file of its own, so that the content security policy needs no exception.
(() => {
  let chosen = null;
  try {
    chosen = localStorage.getItem('nightcone.theme');
  } catch {
    // Storage may be refused; then the system decides.
  }
  const night = chosen ? chosen === 'night' : matchMedia('(prefers-color-scheme: dark)').matches;
  document.documentElement.dataset.theme = night ? 'night' : 'paper';
})();
