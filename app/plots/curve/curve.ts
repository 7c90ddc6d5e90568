// Curve: the shaper's transfer curve with its table, or what it makes of a sine against drive.
import './curve.css'
import type { PresentShaper } from '../../../src/checks/shaperFigures.ts'
import { currentSet, subscribeSet } from '../../state/current.ts'
import { onFrame } from '../../state/frames.ts'
import { useView } from '../../state/view.ts'
import { openCurveFeed } from '../../workers/curveClient.ts'
import type { MountedPlot, PlotPlace } from '../plotTypes.ts'
import { readingLine } from '../readingLine.ts'
import { chosenShaper } from './chosenShaper.ts'
import type { CurveView } from './curveView.ts'
import { NO_SHAPER, type Shown } from './curveWords.ts'
import { HIGHEST_HARMONIC, mountHarmonics } from './harmonicsView.ts'
import { mountTransfer } from './transferView.ts'

const VIEWS = { transfer: { label: 'Transfer', mount: mountTransfer }, harmonics: { label: 'Harmonics', mount: mountHarmonics } } as const
type ViewName = keyof typeof VIEWS

/** Which view was looked at last: kept while the page is open. */
let lastView: ViewName = 'transfer'

export function mountCurve({ element, reading }: PlotPlace): MountedPlot {
  const { frame, name, buttons, area } = parts()
  element.append(frame)

  let chosen: PresentShaper | null = null
  let shown: Shown | null = null
  let problem = ''
  let view: CurveView

  const feed = openCurveFeed(
    (reply) => {
      if (!chosen) return
      problem = ''
      shown = { name: chosen.name, reply }
      draw()
    },
    (message) => {
      problem = `This plot could not be computed:\n${message}`
      shown = null
      draw()
    },
  )
  const why = () => problem || (chosen === null ? NO_SHAPER : '')
  const line = readingLine(() => reading(shown ? view.reading(shown) : ''))

  function draw() {
    view.update()
    line.changed()
  }

  function ask() {
    const set = currentSet()
    const next = chosenShaper(set, useView.getState().block)
    if (next === null) shown = null
    else if (next.path !== chosen?.path) shown = null
    chosen = next
    name.textContent = next ? next.name.charAt(0).toUpperCase() + next.name.slice(1) : 'No shaper'
    if (next) feed.ask({ shaper: next.shaper, amplitude: next.amplitude, sampleRate: set.sampleRate, highest: HIGHEST_HARMONIC })
    if (shown === null) draw()
  }

  function show(next: ViewName): CurveView {
    lastView = next
    for (const [key, button] of buttons) button.setAttribute('aria-pressed', String(key === next))
    return VIEWS[next].mount({ element: area, shown: () => shown, why, changed: line.changed })
  }

  for (const [key, button] of buttons)
    button.addEventListener('click', () => {
      if (key === lastView) return
      view.destroy()
      view = show(key)
      draw()
    })

  view = show(lastView)
  ask()
  const stopSet = subscribeSet(ask)
  const stopView = useView.subscribe((now, before) => {
    if (now.block !== before.block) ask()
  })
  const stopFrames = onFrame(() => view.frame(), 'canvas')

  return {
    summary: () => (shown ? view.summary(shown) : `Curve: ${why() || 'being computed'}`),
    table: () => (shown ? view.table(shown) : { caption: why() || 'being computed', head: [], rows: [] }),
    numbers: () => (shown ? view.numbers(shown) : { head: [], columns: [] }),
    picture: () => view.picture(),
    destroy() {
      stopFrames()
      stopView()
      stopSet()
      line.stop()
      feed.stop()
      view.destroy()
      frame.remove()
    },
  }
}

/** A line with the shaper's name and the switch between views, over the plot's own area. */
function parts() {
  const frame = made('div', 'cw-curve')
  const bar = made('div', 'cw-curve-bar')
  const name = made('p', 'cw-curve-name')
  const group = made('div', 'cw-curve-views')
  group.setAttribute('role', 'group')
  group.setAttribute('aria-label', 'View of the curve')
  const buttons = (Object.keys(VIEWS) as ViewName[]).map((key) => {
    const button = made('button', 'cw-button')
    button.type = 'button'
    button.textContent = VIEWS[key].label
    group.append(button)
    return [key, button] as const
  })
  const area = made('div', 'cw-plot cw-curve-plot')
  bar.append(name, group)
  frame.append(bar, area)
  return { frame, name, buttons, area }
}

function made<T extends keyof HTMLElementTagNameMap>(tag: T, className: string): HTMLElementTagNameMap[T] {
  const element = document.createElement(tag)
  element.className = className
  return element
}
