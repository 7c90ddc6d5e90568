// The text of a number field: a draft in the input until Enter or leaving applies it. What is typed is never applied on the way.
import { type KeyboardEvent, useEffect, useRef, useState } from 'react'
import { parseQuantity, type QuantityContext } from '../../src/set/units.ts'
import type { Binding, Refusal } from './binding.ts'
import { type NumberSpec, showNumber } from './quantity.ts'
import { stepped } from './taper.ts'

const WHEEL_IDLE_MS = 500

export interface NumberText {
  readonly text: string
  readonly edited: boolean
  readonly refusal: Refusal
  /** Why the last step or drag was held, null when it was not. */
  readonly held: string | null
  readonly setHeld: (held: string | null) => void
  readonly ref: React.RefObject<HTMLInputElement | null>
  readonly onChange: (event: { readonly target: { readonly value: string } }) => void
  readonly onKeyDown: (event: KeyboardEvent) => void
  readonly onKeyUp: (event: KeyboardEvent) => void
  readonly onFocus: (event: { readonly target: HTMLInputElement }) => void
  readonly onBlur: () => void
}

interface Options {
  readonly spec: NumberSpec
  readonly binding: Binding<number | null>
  readonly context: () => QuantityContext
  /** Where stepping starts while the field is off. */
  readonly whenOff: number
  /** Shown for null. */
  readonly none?: string
  /** Sees each applied text: the rate's tempo stands in it. */
  readonly onApplied?: ((text: string) => void) | undefined
}

export function useNumberText({ spec, binding, context, whenOff, none = 'off', onApplied }: Options): NumberText {
  const { value } = binding
  const [draft, setDraft] = useState<string | null>(null)
  const [refusal, setRefusal] = useState<Refusal>(null)
  const [held, setHeld] = useState<string | null>(null)
  const ref = useRef<HTMLInputElement>(null)
  const shown = value === null ? none : showNumber(value, spec)

  // A value that changed from elsewhere (a drag, undo, an offer taken) replaces what was typed and refused.
  const [lastValue, setLastValue] = useState(value)
  if (value !== lastValue) {
    setLastValue(value)
    setDraft(null)
    setRefusal(null)
  }

  const restore = () => {
    setDraft(null)
    setRefusal(null)
  }

  /** Applies the draft; true when nothing stands in the way any more. */
  const applyDraft = (): boolean => {
    if (draft === null || draft.trim() === shown) {
      restore()
      return true
    }
    const read = readTyped(draft, spec, context())
    if (!read.ok) {
      setRefusal({ why: read.why, ways: [] })
      return false
    }
    setHeld(null)
    const refused = binding.apply(read.value)
    setRefusal(refused)
    if (refused) return false
    setDraft(null)
    onApplied?.(draft)
    return true
  }

  const step = (direction: 1 | -1, big: boolean) => {
    if (draft !== null && !applyDraft()) return
    setHeld(binding.attempt(stepped(spec, value ?? whenOff, direction, big)))
  }

  useWheel(ref, step, binding.settle)

  return {
    text: draft ?? shown,
    edited: draft !== null,
    refusal,
    held,
    setHeld,
    ref,
    onChange: (event) => setDraft(event.target.value),
    onFocus: (event) => event.target.select(),
    onBlur: () => {
      binding.settle()
      applyDraft()
    },
    onKeyUp: (event) => {
      if (stepOf(event)) binding.settle()
    },
    onKeyDown: (event) => {
      const direction = stepOf(event)
      if (direction) {
        event.preventDefault()
        step(direction, event.shiftKey || event.key.startsWith('Page'))
      } else if (event.key === 'Enter') {
        event.preventDefault()
        if (applyDraft()) requestAnimationFrame(() => ref.current?.select())
      } else if (event.key === 'Escape' && (draft !== null || refusal)) {
        event.preventDefault()
        restore()
        requestAnimationFrame(() => ref.current?.select())
      }
    },
  }
}

function readTyped(
  text: string,
  spec: NumberSpec,
  context: QuantityContext,
): { readonly ok: true; readonly value: number | null } | { readonly ok: false; readonly why: string } {
  if (spec.nullable && /^\s*(off|none|-|–|−)?\s*$/i.test(text)) return { ok: true, value: null }
  const result = parseQuantity(text, spec.unit, context)
  if (result.ok) return result
  const [problem] = result.problems
  return { ok: false, why: problem?.hint ? `${problem.message}: ${problem.hint}` : (problem?.message ?? 'not a number') }
}

function stepOf(event: KeyboardEvent): 1 | -1 | null {
  if (event.ctrlKey || event.metaKey || event.altKey) return null
  if (event.key === 'ArrowUp' || event.key === 'PageUp') return 1
  if (event.key === 'ArrowDown' || event.key === 'PageDown') return -1
  return null
}

/** The wheel steps the focused field; the gesture ends after half a second of rest. Elsewhere the wheel scrolls. */
function useWheel(ref: React.RefObject<HTMLInputElement | null>, step: (direction: 1 | -1, big: boolean) => void, settle: () => void) {
  const latest = useRef({ step, settle })
  useEffect(() => {
    latest.current = { step, settle }
  })
  useEffect(() => {
    const input = ref.current
    if (!input) return
    let idle: ReturnType<typeof setTimeout> | undefined
    const onWheel = (event: WheelEvent) => {
      if (document.activeElement !== input || event.deltaY === 0 || event.ctrlKey) return
      event.preventDefault()
      latest.current.step(event.deltaY < 0 ? 1 : -1, event.shiftKey)
      clearTimeout(idle)
      idle = setTimeout(() => latest.current.settle(), WHEEL_IDLE_MS)
    }
    input.addEventListener('wheel', onWheel, { passive: false })
    return () => {
      input.removeEventListener('wheel', onWheel)
      if (idle !== undefined) latest.current.settle()
      clearTimeout(idle)
    }
  }, [ref])
}
