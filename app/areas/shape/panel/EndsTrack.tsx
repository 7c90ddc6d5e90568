// A move's track: the part of the field's range that the knob covers, which end is which, and where the value stands in it. The pointer drags the
// nearer end; keys and speech go through the inputs, so it is hidden from them.
import { type CSSProperties, useRef } from 'react'
import type { NumberSpec } from '../../../fields/quantity.ts'
import { positionOf, valueAt } from '../../../fields/taper.ts'
import { useScrub } from '../../../fields/useScrub.ts'

interface EndsTrackProps {
  readonly spec: NumberSpec
  readonly min: number
  readonly max: number
  readonly value: number | null
  readonly move: (end: 'min' | 'max', value: number) => void
  readonly end: () => void
}

export function EndsTrack({ spec, min, max, value, move, end }: EndsTrackProps) {
  const dragged = useRef<'min' | 'max' | null>(null)
  const from = positionOf(spec, min)
  const to = positionOf(spec, max)
  const { track } = useScrub({
    position: () => from,
    move: (position) => {
      dragged.current ??= nearer(position, from, to)
      move(dragged.current, valueAt(spec, position))
    },
    end: () => {
      dragged.current = null
      end()
    },
  })
  return (
    <div className="cw-track cw-ends" aria-hidden="true" {...track}>
      <div className="cw-track-line" />
      <div className="cw-track-band" style={{ '--low': Math.min(from, to), '--high': Math.max(from, to) } as CSSProperties} />
      {value !== null && <div className="cw-ends-now" style={at(positionOf(spec, value))} />}
      <div className="cw-track-thumb" style={at(from)} />
      <div className="cw-track-thumb" style={at(to)} />
    </div>
  )
}

const at = (position: number) => ({ '--at': position }) as CSSProperties

/** The end a press means: the nearer one, of two in one place the one on the pressed side. */
function nearer(position: number, from: number, to: number): 'min' | 'max' {
  const [a, b] = [Math.abs(position - from), Math.abs(position - to)]
  if (a !== b) return a < b ? 'min' : 'max'
  return position < from === from <= to ? 'min' : 'max'
}
