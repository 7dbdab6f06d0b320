// Runs before the first paint, so that nobody is dazzled at night. A file of its own because the content policy
// refuses inline scripts. The same rule stands in src/lib/theme.ts.
(function () {
  let choice = 'system';
  try {
    choice = localStorage.getItem('saltmark.theme') || 'system';
  } catch {
    // Storage may be switched off; the system's own choice is right then.
  }
  if (!['light', 'dark', 'sun'].includes(choice)) {
    choice = matchMedia('(prefers-color-scheme: dark)').matches ? 'dark' : 'light';
  }
  document.documentElement.dataset.theme = choice;
})();
