// Runs before the first paint, apart from the bundle, so that a dark page never flashes light. app/shell/theme.ts keeps the same key.
;(() => {
  let chosen = null
  try {
    chosen = localStorage.getItem('combwright.theme')
  } catch {
    // Storage may be switched off; the system's choice remains.
  }
  const dark = chosen === 'dark' || (chosen !== 'light' && matchMedia('(prefers-color-scheme: dark)').matches)
  document.documentElement.dataset.theme = dark ? 'dark' : 'light'
})()
