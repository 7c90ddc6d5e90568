// A field's track: where the value stands between its useful ends, and the usual range as a band. The pointer drags it; keys and
// speech go through the field's input, so it is hidden from them.
import type { CSSProperties, HTMLAttributes } from 'react'

interface TrackProps {
  /** Position of the value, 0 to 1; null while the field is off. */
  readonly at: number | null
  /** Where the filled part starts: the zero of a two-sided value, else 0. */
  readonly from: number
  readonly band: readonly [number, number] | null
  readonly handlers: HTMLAttributes<HTMLElement>
}

export function Track({ at, from, band, handlers }: TrackProps) {
  return (
    <div className="cw-track" aria-hidden="true" {...handlers}>
      <div className="cw-track-line" />
      {band && <div className="cw-track-band" style={span(band[0], band[1])} />}
      {at !== null && <div className="cw-track-fill" style={span(Math.min(from, at), Math.max(from, at))} />}
      {at !== null && <div className="cw-track-thumb" style={{ '--at': at } as CSSProperties} />}
    </div>
  )
}

const span = (low: number, high: number) => ({ '--low': low, '--high': high }) as CSSProperties
