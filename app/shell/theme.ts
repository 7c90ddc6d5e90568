// The theme chosen, put on the root element as data-theme. public/theme.js does the same before the first paint, from the same key.
import { useView } from '../state/view.ts'

export const THEME_KEY = 'combwright.theme'
export type Theme = 'system' | 'light' | 'dark'

/** Chooses a theme for this browser. */
export function chooseTheme(theme: Theme): void {
  try {
    localStorage.setItem(THEME_KEY, theme)
  } catch {
    // Without storage the choice lasts for this visit.
  }
  useView.setState({ theme })
}

/** The theme this browser last chose. */
export function keptTheme(): Theme {
  try {
    const kept = localStorage.getItem(THEME_KEY)
    return kept === 'light' || kept === 'dark' ? kept : 'system'
  } catch {
    return 'system'
  }
}

/** Keeps data-theme on the root true to the choice and the system; returns the way to stop. */
export function watchTheme(): () => void {
  const system = matchMedia('(prefers-color-scheme: dark)')
  const apply = () => {
    const { theme } = useView.getState()
    const dark = theme === 'dark' || (theme === 'system' && system.matches)
    document.documentElement.dataset.theme = dark ? 'dark' : 'light'
  }
  apply()
  system.addEventListener('change', apply)
  const stop = useView.subscribe((now, before) => {
    if (now.theme !== before.theme) apply()
  })
  return () => {
    system.removeEventListener('change', apply)
    stop()
  }
}
