// Runs before the first paint so that a chosen theme never flashes; kept outside index.html for the content security policy.
(function applyTheme() {
  try {
    const chosen = window.localStorage.getItem('scruple.theme');
    if (chosen === 'light' || chosen === 'dark') document.documentElement.dataset.theme = chosen;
  } catch {
    // Storage may be switched off: the system's theme then stands.
  }
})();
