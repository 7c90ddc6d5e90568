// The plot's cursor from the keyboard: the plot is a slider whose value is where its cursor stands, spoken as what is read there.
import type { HostedPlot } from './createPlot.ts'
import { makeSlider } from './slider.ts'

export interface CursorWords {
  readonly label: string
  /** What is read at a part of the width, 0 to 1. */
  spoken(part: number): string
}

export function plotCursor(plot: HostedPlot, element: HTMLElement, { label, spoken }: CursorWords): { destroy(): void } {
  let part = 0.5
  const slider = makeSlider(element, {
    label,
    value: () => part,
    move(next) {
      part = next
      plot.cursorAt(part)
      slider.speak(part, spoken(part))
    },
  })

  function onFocus() {
    slider.speak(part, spoken(part))
    if (element.matches(':focus-visible')) plot.cursorAt(part)
  }
  const onBlur = () => plot.cursorAt(null)

  slider.speak(part, spoken(part))
  element.addEventListener('focus', onFocus)
  element.addEventListener('blur', onBlur)
  return {
    destroy() {
      element.removeEventListener('focus', onFocus)
      element.removeEventListener('blur', onBlur)
      slider.destroy()
    },
  }
}
