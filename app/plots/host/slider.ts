// An element of a plot as a slider from 0 to 1: its role and name, and where its keys lead.

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

export interface SliderSpec {
  readonly label: string
  /** Where it stands when a key is pressed, 0 to 1. */
  value(): number
  /** A key moved it. */
  move(part: number): void
}

export interface Slider {
  /** Value and words as they are spoken. */
  speak(part: number, words: string): void
  destroy(): void
}

export function makeSlider(element: HTMLElement, { label, value, move }: SliderSpec): Slider {
  const attributes: Readonly<Record<string, string>> = {
    role: 'slider',
    tabindex: '0',
    'aria-label': label,
    'aria-valuemin': '0',
    'aria-valuemax': '1',
    'aria-orientation': 'horizontal',
  }
  for (const [name, text] of Object.entries(attributes)) element.setAttribute(name, text)

  function onKey(event: KeyboardEvent) {
    if (event.ctrlKey || event.metaKey || event.altKey) return
    const next = sliderKey(event.key, value())
    if (next === null) return
    event.preventDefault()
    move(next)
  }
  element.addEventListener('keydown', onKey)

  return {
    speak(part, words) {
      element.setAttribute('aria-valuenow', part.toFixed(2))
      element.setAttribute('aria-valuetext', words)
    },
    destroy() {
      element.removeEventListener('keydown', onKey)
      for (const name of [...Object.keys(attributes), 'aria-valuenow', 'aria-valuetext']) element.removeAttribute(name)
    },
  }
}
