// Runs before the first paint, so that a chosen theme never flashes. src/shell/theme.ts writes the same key.
try {
  const theme = localStorage.getItem('stepwell-theme');
  if (theme === 'light' || theme === 'dark') document.documentElement.dataset.theme = theme;
} catch {
  // Storage may be switched off: the system's theme stands.
}
