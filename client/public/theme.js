// Puts the chosen (or the system's) appearance on <html> before anything is painted.
// src/lib/theme.ts changes it later; the storage key is shared between the two.
(function () {
  var choice = 'system';
  try {
    choice = localStorage.getItem('kerfyard.theme') || 'system';
  } catch {
    // Storage may be closed to us; the system's choice is then the only one.
  }
  var dark = choice === 'dark' || (choice === 'system' && matchMedia('(prefers-color-scheme: dark)').matches);
  document.documentElement.classList.add(dark ? 'dark' : 'light');
})();
