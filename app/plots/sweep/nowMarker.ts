// The sweep position as a line with a dot over the plot: moved by style alone, so that a frame draws nothing. It is a
// slider: dragged by pointer, moved by keys. Moving it holds the sweep.
import type uPlot from 'uplot'
import { holdAt, shownPosition } from '../../state/position.ts'
import { useView } from '../../state/view.ts'
import { makeSlider } from '../host/slider.ts'

export interface NowMarker {
  /** Puts the line at x and the dot at x, y, in CSS pixels of the plotting area; no dot where y is null. */
  place(x: number, y: number | null): void
  destroy(): void
}

export function nowMarker(u: uPlot, element: HTMLElement, spoken: (position: number) => string): NowMarker {
  const line = document.createElement('div')
  line.className = 'cw-now-line'
  const dot = document.createElement('div')
  dot.className = 'cw-now-dot'
  u.over.append(line, dot)
  u.over.classList.add('cw-now-drag')

  const slider = makeSlider(element, {
    label: 'Sweep position',
    value: shownPosition,
    move: (part) => holdAt(Math.min(part, LAST)),
  })

  // A value that changes by itself is not spoken: while it follows the sound, only that is said.
  function speak() {
    const { held } = useView.getState()
    slider.speak(shownPosition(), held === null ? 'follows the sound' : `${spoken(held)}, held`)
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
  u.over.addEventListener('pointerdown', onDown)
  u.over.addEventListener('pointermove', onMove)

  return {
    place(x, y) {
      line.style.transform = `translateX(${x}px)`
      dot.style.transform = y === null ? 'scale(0)' : `translate(${x}px, ${y}px)`
    },
    destroy() {
      stopView()
      u.over.removeEventListener('pointerdown', onDown)
      u.over.removeEventListener('pointermove', onMove)
      slider.destroy()
      line.remove()
      dot.remove()
    },
  }
}

/** Position 1 is position 0 again: the right end stays just before it. */
const LAST = 1 - 1e-6
