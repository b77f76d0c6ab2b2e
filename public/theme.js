// Runs before the first paint so that the page never flashes in the wrong theme.
(function () {
  var chosen = null;
  try {
    chosen = window.localStorage.getItem('millpond.theme');
  } catch {
    // Storage is shut off in this browser: the system's choice stands.
  }
  var dark = window.matchMedia('(prefers-color-scheme: dark)').matches;
  document.documentElement.dataset.theme =
    chosen === 'light' || chosen === 'dark' ? chosen : dark ? 'dark' : 'light';
})();
