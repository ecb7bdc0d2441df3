// Runs before the first paint, so that a person who chose a theme never sees the other one flash by.
try {
  var chosen = JSON.parse(localStorage.getItem('quartzhold.preferences') || '{}').theme;
  if (chosen === 'light' || chosen === 'dark') document.documentElement.dataset.theme = chosen;
} catch {
  // Storage may be closed to us; the system's choice then holds.
}
