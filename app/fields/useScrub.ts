import { type PointerEvent, useRef } from 'react'

/** Pointer travel, px, before a press counts as a drag; below it a press on a label focuses the field. */
const SLOP_PX = 3
/** Travel that crosses the whole track when a label is dragged, px; ten times that with Shift. */
const CROSSING_PX = 400

export interface Scrub {
  /** Where the value stands, 0 to 1. */
  readonly position: () => number
  readonly move: (position: number) => void
  readonly end: () => void
}

type Handlers = Pick<
  React.HTMLAttributes<HTMLElement>,
  'onPointerDown' | 'onPointerMove' | 'onPointerUp' | 'onPointerCancel' | 'onLostPointerCapture'
>

/** Dragging a field sideways: `track` goes to where the pointer is, `label` moves by how far it went, Shift finer. */
export function useScrub({ position, move, end }: Scrub): { readonly track: Handlers; readonly label: Handlers } {
  const drag = useRef<{ x: number; at: number; moved: boolean } | null>(null)

  const start = (event: PointerEvent<HTMLElement>) => {
    if (event.button !== 0 || !event.isPrimary) return false
    event.currentTarget.setPointerCapture(event.pointerId)
    drag.current = { x: event.clientX, at: position(), moved: false }
    return true
  }
  const stop = () => {
    if (drag.current?.moved) end()
    drag.current = null
  }
  const common = { onPointerUp: stop, onPointerCancel: stop, onLostPointerCapture: stop }

  const toPointer = (event: PointerEvent<HTMLElement>) => {
    const { left, width } = event.currentTarget.getBoundingClientRect()
    move((event.clientX - left) / width)
  }
  const track: Handlers = {
    ...common,
    onPointerDown: (event) => {
      if (!start(event) || !drag.current) return
      drag.current.moved = true
      toPointer(event)
    },
    onPointerMove: (event) => {
      if (drag.current) toPointer(event)
    },
  }

  const label: Handlers = {
    ...common,
    onPointerDown: start,
    onPointerMove: (event) => {
      const now = drag.current
      if (!now) return
      const travel = event.clientX - now.x
      if (!now.moved && Math.abs(travel) < SLOP_PX) return
      now.moved = true
      now.x = event.clientX
      now.at = Math.max(0, Math.min(1, now.at + travel / (CROSSING_PX * (event.shiftKey ? 10 : 1))))
      move(now.at)
    },
  }
  return { track, label }
}
