// Turning a knob by hand: keys, a vertical drag, the wheel while it has the focus. A turn is one gesture; it ends with the hand.
import { type KeyboardEvent, type PointerEvent, useEffect, useRef } from 'react'
import type { Knob } from '../../../../src/set/types.ts'
import { endGesture, useDraft } from '../../../state/draft.ts'
import { tryTurn } from '../../../state/panel.ts'
import { keyedPosition } from './keyedPosition.ts'

/** Vertical travel, px, of a whole turn; ten times that with Shift. */
const TURN_PX = 160
const WHEEL_IDLE_MS = 500
/** Part of a turn by one notch of the wheel. */
const NOTCH = 0.02

interface Options {
  readonly index: number
  readonly knob: Pick<Knob, 'position' | 'steps'>
  /** Sees each turn, with why it was held before the place it was turned to; null when it was not. */
  readonly onTurn: (problems: ReturnType<typeof tryTurn>, position: number) => void
}

export function useTurn({ index, knob, onTurn }: Options) {
  const ref = useRef<HTMLDivElement>(null)
  const drag = useRef<{ y: number; at: number; moved: boolean } | null>(null)
  const turn = (position: number) => {
    const to = Math.max(0, Math.min(1, position))
    onTurn(tryTurn(index, to), to)
  }

  const latest = useRef({ turn, knob })
  useEffect(() => {
    latest.current = { turn, knob }
  })
  useEffect(() => {
    const dial = ref.current
    if (!dial) return
    let idle: ReturnType<typeof setTimeout> | undefined
    // Between two steps of a stepped knob the wheel's own place is kept, or fine notches would never leave a step.
    let at: number | null = null
    const onWheel = (event: WheelEvent) => {
      if (document.activeElement !== dial || event.deltaY === 0 || event.ctrlKey) return
      event.preventDefault()
      const now = latest.current
      at = Math.max(0, Math.min(1, (at ?? now.knob.position) - Math.sign(event.deltaY) * NOTCH * (event.shiftKey ? 0.1 : 1)))
      now.turn(at)
      clearTimeout(idle)
      idle = setTimeout(() => {
        at = null
        endGesture()
      }, WHEEL_IDLE_MS)
    }
    dial.addEventListener('wheel', onWheel, { passive: false })
    return () => {
      dial.removeEventListener('wheel', onWheel)
      if (idle !== undefined) endGesture()
      clearTimeout(idle)
    }
  }, [])

  const stop = () => {
    if (drag.current?.moved) endGesture()
    drag.current = null
  }
  return {
    ref,
    onPointerDown: (event: PointerEvent<HTMLElement>) => {
      if (event.button !== 0 || !event.isPrimary) return
      event.currentTarget.setPointerCapture(event.pointerId)
      drag.current = { y: event.clientY, at: knob.position, moved: false }
    },
    onPointerMove: (event: PointerEvent<HTMLElement>) => {
      const now = drag.current
      if (!now) return
      // Escape dropped the gesture: the hand has to start again.
      if (now.moved && useDraft.getState().set === null) {
        drag.current = null
        return
      }
      const travel = now.y - event.clientY
      if (travel === 0) return
      now.y = event.clientY
      now.at = Math.max(0, Math.min(1, now.at + travel / (TURN_PX * (event.shiftKey ? 10 : 1))))
      now.moved = true
      turn(now.at)
    },
    onPointerUp: stop,
    onPointerCancel: stop,
    onLostPointerCapture: stop,
    onKeyDown: (event: KeyboardEvent) => {
      if (event.ctrlKey || event.metaKey || event.altKey) return
      const to = keyedPosition(event.key, event.shiftKey, knob)
      if (to === null) return
      event.preventDefault()
      turn(to)
    },
    onKeyUp: (event: KeyboardEvent) => {
      if (keyedPosition(event.key, false, knob) !== null) endGesture()
    },
    onBlur: endGesture,
  }
}
