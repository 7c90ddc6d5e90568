// The plot's cursor from the keyboard: the plot is a slider whose value is where its cursor stands, spoken as what is read there.
import type { HostedPlot } from './createPlot.ts'

export interface CursorWords {
  readonly label: string
  /** What is read at a part of the width, 0 to 1. */
  spoken(part: number): string
}

const STEPS: Readonly<Record<string, number>> = {
  ArrowRight: 0.01,
  ArrowUp: 0.01,
  ArrowLeft: -0.01,
  ArrowDown: -0.01,
  PageUp: 0.1,
  PageDown: -0.1,
}

/** Where a key leads from `part`, within 0 to 1; null for a key that is none of a slider's. */
export function sliderKey(key: string, part: number): number | null {
  if (key === 'Home') return 0
  if (key === 'End') return 1
  const step = STEPS[key]
  return step === undefined ? null : Math.max(0, Math.min(1, Math.round((part + step) * 1e6) / 1e6))
}

export function plotCursor(plot: HostedPlot, element: HTMLElement, { label, spoken }: CursorWords): { destroy(): void } {
  let part = 0.5
  const attributes: Readonly<Record<string, string>> = {
    role: 'slider',
    tabindex: '0',
    'aria-label': label,
    'aria-valuemin': '0',
    'aria-valuemax': '1',
    'aria-orientation': 'horizontal',
  }
  for (const [name, value] of Object.entries(attributes)) element.setAttribute(name, value)

  function speak() {
    element.setAttribute('aria-valuenow', part.toFixed(2))
    element.setAttribute('aria-valuetext', spoken(part))
  }

  function onKey(event: KeyboardEvent) {
    if (event.ctrlKey || event.metaKey || event.altKey) return
    const next = sliderKey(event.key, part)
    if (next === null) return
    event.preventDefault()
    part = next
    plot.cursorAt(part)
    speak()
  }

  function onFocus() {
    speak()
    if (element.matches(':focus-visible')) plot.cursorAt(part)
  }

  const onBlur = () => plot.cursorAt(null)

  speak()
  element.addEventListener('keydown', onKey)
  element.addEventListener('focus', onFocus)
  element.addEventListener('blur', onBlur)
  return {
    destroy() {
      element.removeEventListener('keydown', onKey)
      element.removeEventListener('focus', onFocus)
      element.removeEventListener('blur', onBlur)
      for (const name of [...Object.keys(attributes), 'aria-valuenow', 'aria-valuetext']) element.removeAttribute(name)
    },
  }
}
