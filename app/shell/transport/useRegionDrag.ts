// Dragging on the waveform: an end near the pointer moves that end; inside a region that is not everything, the region; elsewhere a new one
// begins. A press without a drag changes nothing.
import { type PointerEvent, type RefObject, useRef } from 'react'
import { SHORTEST_REPEAT_S, setRepeat } from '../../audio/audition.ts'
import type { Region } from './Waveform.tsx'

/** Pointer distance that still takes hold of an end, and that makes a press a drag, px. */
const NEAR_PX = 12
const MOVED_PX = 3

interface Drag {
  readonly pointer: number
  readonly fromX: number
  readonly fromS: number
  readonly act: 'start' | 'end' | 'move' | 'new'
  readonly region: Region
  moved: boolean
}

export function useRegionDrag(frame: RefObject<HTMLDivElement | null>, seconds: number, region: Region) {
  const drag = useRef<Drag | null>(null)

  function secondsAt(clientX: number): number {
    const box = frame.current?.getBoundingClientRect()
    if (!box || box.width === 0) return 0
    return Math.min(seconds, Math.max(0, ((clientX - box.left) / box.width) * seconds))
  }

  function onPointerDown(event: PointerEvent<HTMLDivElement>) {
    const box = frame.current?.getBoundingClientRect()
    if (!box || event.button !== 0) return
    const fromS = secondsAt(event.clientX)
    const reach = (NEAR_PX / box.width) * seconds
    event.currentTarget.setPointerCapture(event.pointerId)
    drag.current = {
      pointer: event.pointerId,
      fromX: event.clientX,
      fromS,
      act: actAt(fromS, region, seconds, reach),
      region,
      moved: false,
    }
  }

  function onPointerMove(event: PointerEvent<HTMLDivElement>) {
    const now = drag.current
    if (!now || now.pointer !== event.pointerId) return
    now.moved ||= Math.abs(event.clientX - now.fromX) > MOVED_PX
    if (now.moved) setRepeat(draggedRegion(now, secondsAt(event.clientX), seconds))
  }

  const end = () => {
    drag.current = null
  }
  return { onPointerDown, onPointerMove, onPointerUp: end, onPointerCancel: end }
}

function actAt(atS: number, { startS, endS }: Region, seconds: number, reachS: number): Drag['act'] {
  const toStart = Math.abs(atS - startS)
  const toEnd = Math.abs(atS - endS)
  if (Math.min(toStart, toEnd) <= reachS) return toStart < toEnd ? 'start' : 'end'
  const isEverything = startS === 0 && endS === seconds
  return !isEverything && atS > startS && atS < endS ? 'move' : 'new'
}

/** The region a drag has made of the one it began with. */
export function draggedRegion({ act, fromS, region }: Pick<Drag, 'act' | 'fromS' | 'region'>, atS: number, seconds: number): Region {
  const { startS, endS } = region
  switch (act) {
    case 'start':
      return { startS: Math.min(atS, endS - SHORTEST_REPEAT_S), endS }
    case 'end':
      return { startS, endS: Math.max(atS, startS + SHORTEST_REPEAT_S) }
    case 'move': {
      const by = Math.min(seconds - endS, Math.max(-startS, atS - fromS))
      return { startS: startS + by, endS: endS + by }
    }
    case 'new':
      return { startS: Math.min(fromS, atS), endS: Math.max(fromS, atS) }
  }
}
