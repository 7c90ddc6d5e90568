// The look's tokens as the canvas needs them: read from CSS, read again when theme, text size or forced colours change.

export interface PlotTheme {
  readonly paper: string
  readonly ink: string
  readonly soft: string
  readonly edge: string
  readonly hair: string
  readonly now: string
  readonly second: string
  readonly fails: string
  /** CSS px of the small text size, and the font in the canvas's shorthand. */
  readonly textPx: number
  readonly font: string
}

const FORCED = '(forced-colors: active)'

function read(): PlotTheme {
  const style = getComputedStyle(document.documentElement)
  const token = (name: string, system: string) =>
    matchMedia(FORCED).matches ? system : style.getPropertyValue(`--${name}`).trim() || system
  const textPx = 0.75 * (Number.parseFloat(style.fontSize) || 16)
  return {
    paper: token('paper', 'Canvas'),
    ink: token('ink', 'CanvasText'),
    soft: token('soft', 'CanvasText'),
    edge: token('edge', 'CanvasText'),
    hair: token('hair', 'GrayText'),
    now: token('now', 'LinkText'),
    second: token('second', 'VisitedText'),
    fails: token('fails', 'CanvasText'),
    textPx,
    font: `${textPx}px ${getComputedStyle(document.body).fontFamily || 'sans-serif'}`,
  }
}

let theme: PlotTheme | null = null
const listeners = new Set<() => void>()

/** The tokens now. */
export function plotTheme(): PlotTheme {
  theme ??= read()
  return theme
}

function changed() {
  theme = null
  for (const listener of listeners) listener()
}

let watching = false

function watch() {
  if (watching) return
  watching = true
  new MutationObserver(changed).observe(document.documentElement, { attributeFilter: ['data-theme', 'style', 'class'] })
  for (const query of ['(prefers-color-scheme: dark)', FORCED]) matchMedia(query).addEventListener('change', changed)
}

/** Called when the tokens may have changed, until the returned function is called. */
export function onPlotTheme(listener: () => void): () => void {
  watch()
  listeners.add(listener)
  return () => {
    listeners.delete(listener)
  }
}
