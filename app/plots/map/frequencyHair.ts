// The frequency that is read in a map: a line across it that the pointer carries along and that keys move, as a slider of its own.
import type uPlot from 'uplot'
import { makeSlider, type Slider } from '../host/slider.ts'

export interface FrequencyHair {
  /** Part of the height from below, 0 to 1; null while nothing is read. */
  part(): number | null
  speak(): void
  destroy(): void
}

interface HairSpec {
  /** What is read at a part of the height. */
  spoken(part: number): string
  /** The part has changed. */
  onMove(): void
}

export function frequencyHair({ over }: uPlot, { spoken, onMove }: HairSpec): FrequencyHair {
  const line = document.createElement('div')
  line.className = 'cw-map-hair'
  line.dataset.away = ''
  over.append(line)
  // The pointer's own part; keys keep theirs for when it has left.
  let pointed: number | null = null
  let kept = 0.5

  const part = () => pointed ?? (document.activeElement === line ? kept : null)
  function place() {
    line.style.top = `${(100 * (1 - (pointed ?? kept))).toFixed(3)}%`
    line.toggleAttribute('data-away', pointed === null)
    onMove()
  }
  const slider: Slider = makeSlider(line, {
    label: 'Frequency read in the map',
    value: () => kept,
    move(next) {
      kept = next
      pointed = null
      speak()
      place()
    },
  })
  line.setAttribute('aria-orientation', 'vertical')
  const speak = () => slider.speak(kept, spoken(kept))

  function onPoint(event: PointerEvent) {
    const box = over.getBoundingClientRect()
    pointed = Math.max(0, Math.min(1, (box.bottom - event.clientY) / box.height))
    place()
  }
  // A finger that lifts leaves its reading.
  function onLeave(event: PointerEvent) {
    if (event.pointerType !== 'mouse') return
    pointed = null
    place()
  }
  const onKeyFocus = () => {
    speak()
    place()
  }
  over.addEventListener('pointerdown', onPoint)
  over.addEventListener('pointermove', onPoint)
  over.addEventListener('pointerleave', onLeave)
  line.addEventListener('focus', onKeyFocus)
  line.addEventListener('blur', place)
  speak()

  return {
    part,
    speak,
    destroy() {
      over.removeEventListener('pointerdown', onPoint)
      over.removeEventListener('pointermove', onPoint)
      over.removeEventListener('pointerleave', onLeave)
      slider.destroy()
      line.remove()
    },
  }
}
