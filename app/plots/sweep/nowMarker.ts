// The sweep position as a line with a dot over the plot: moved by style alone, so that a frame draws nothing. It is a
// slider: dragged by pointer, moved by keys. Moving it holds the sweep.
import type uPlot from 'uplot'
import { holdAt, shownPosition } from '../../state/position.ts'
import { useView } from '../../state/view.ts'
import { sliderKey } from '../host/plotCursor.ts'

export interface NowMarker {
  /** Puts line and dot at a position, the dot at a part of the height from the top. */
  place(position: number, dotPart: number): void
  destroy(): void
}

export function nowMarker(u: uPlot, element: HTMLElement, spoken: (position: number) => string): NowMarker {
  const line = document.createElement('div')
  line.className = 'cw-now-line'
  const dot = document.createElement('div')
  dot.className = 'cw-now-dot'
  u.over.append(line, dot)
  u.over.classList.add('cw-now-drag')

  const attributes: Readonly<Record<string, string>> = {
    role: 'slider',
    tabindex: '0',
    'aria-label': 'Sweep position',
    'aria-valuemin': '0',
    'aria-valuemax': '1',
    'aria-orientation': 'horizontal',
  }
  for (const [name, value] of Object.entries(attributes)) element.setAttribute(name, value)

  // A value that changes by itself is not spoken: while it follows the sound, only that is said.
  function speak() {
    const { held } = useView.getState()
    element.setAttribute('aria-valuenow', shownPosition().toFixed(2))
    element.setAttribute('aria-valuetext', held === null ? 'follows the sound' : `${spoken(held)}, held`)
  }

  function onKey(event: KeyboardEvent) {
    if (event.ctrlKey || event.metaKey || event.altKey) return
    const next = sliderKey(event.key, shownPosition())
    if (next === null) return
    event.preventDefault()
    holdAt(Math.min(next, LAST))
  }

  const holdUnder = (event: PointerEvent) => {
    const box = u.over.getBoundingClientRect()
    holdAt(Math.max(0, Math.min(LAST, (event.clientX - box.left) / box.width)))
  }
  function onDown(event: PointerEvent) {
    if (event.button !== 0) return
    u.over.setPointerCapture(event.pointerId)
    holdUnder(event)
  }
  function onMove(event: PointerEvent) {
    if (u.over.hasPointerCapture(event.pointerId)) holdUnder(event)
  }

  speak()
  const stopView = useView.subscribe((now, before) => {
    if (now.held !== before.held) speak()
  })
  element.addEventListener('keydown', onKey)
  u.over.addEventListener('pointerdown', onDown)
  u.over.addEventListener('pointermove', onMove)

  return {
    place(position, dotPart) {
      const x = position * u.over.clientWidth
      line.style.transform = `translateX(${x}px)`
      dot.style.transform = `translate(${x}px, ${dotPart * u.over.clientHeight}px)`
    },
    destroy() {
      stopView()
      element.removeEventListener('keydown', onKey)
      u.over.removeEventListener('pointerdown', onDown)
      u.over.removeEventListener('pointermove', onMove)
      for (const name of [...Object.keys(attributes), 'aria-valuenow', 'aria-valuetext']) element.removeAttribute(name)
      line.remove()
      dot.remove()
    },
  }
}

/** Position 1 is position 0 again: the right end stays just before it. */
const LAST = 1 - 1e-6
