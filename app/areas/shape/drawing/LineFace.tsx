// The line's own face: how far the voices are reading now, how far they move, and a ruler with a mark for every read.
import { type CSSProperties, useEffect, useRef } from 'react'
import type { ParameterSet } from '../../../../src/set/types.ts'
import { showNumber } from '../../../fields/quantity.ts'
import { currentSet } from '../../../state/current.ts'
import { onFrame } from '../../../state/frames.ts'
import { shownPosition } from '../../../state/position.ts'
import { type Read, type Reads, readsAt, rulerScale } from './delays.ts'

/** Frames are skipped to four a second when the reader asked for less motion. */
const CALM_MS = 250

const figure = (ms: number) => showNumber(Number(ms.toFixed(2)), { kind: 'number', unit: 'ms' })

/** "1.00 to 6.00 ms", or the one delay it stands at. */
export function lineSummary(set: ParameterSet): string {
  const { minMs, maxMs } = rulerScale(set)
  return figure(minMs) === figure(maxMs) ? `${figure(minMs)} ms` : `${figure(minMs)} to ${figure(maxMs)} ms`
}

export function LineFace({ set }: { readonly set: ParameterSet }) {
  const now = useRef<HTMLSpanElement>(null)
  const ruler = useRef<HTMLSpanElement>(null)
  useLiveReads(now, ruler)
  const scale = rulerScale(set)
  const reads = readsAt(set, shownPosition())
  const part = (ms: number) => ({ '--at': Math.max(0, ms) / scale.endMs }) as CSSProperties
  return (
    <>
      <span className="cw-block-text cw-line-text">
        <span ref={now} className="cw-line-now">
          {nowText(reads)}
        </span>{' '}
        · {lineSummary(set)}
      </span>
      <span className="cw-ruler" ref={ruler} aria-hidden="true">
        <span
          className="cw-ruler-range"
          style={{ '--low': Math.max(0, scale.minMs) / scale.endMs, '--high': scale.maxMs / scale.endMs } as CSSProperties}
        />
        {set.mix.dryDelayMs > 0 && <span className="cw-ruler-dry" style={part(set.mix.dryDelayMs)} />}
        {reads.voices.map((read) => (
          <span key={read.id} className="cw-ruler-voice" data-channel={read.channel} style={part(read.delayMs)} />
        ))}
        {set.loop.feedback !== 0 && reads.loop.map((read) => <span key={read.id} className="cw-ruler-loop" style={part(read.delayMs)} />)}
      </span>
    </>
  )
}

const nowText = (reads: Reads) => `${figure(reads.voices[0]?.delayMs ?? 0)} ms now`

/** Moves number and marks every frame, without React. */
function useLiveReads(now: React.RefObject<HTMLElement | null>, ruler: React.RefObject<HTMLElement | null>) {
  useEffect(() => {
    const calm = matchMedia('(prefers-reduced-motion: reduce)')
    let lastTime = 0
    let lastPosition = -1
    return onFrame((time) => {
      const position = shownPosition()
      if (position === lastPosition || (calm.matches && time - lastTime < CALM_MS)) return
      lastTime = time
      lastPosition = position
      const set = currentSet()
      const reads = readsAt(set, position)
      const { endMs } = rulerScale(set)
      if (now.current) now.current.textContent = nowText(reads)
      place(ruler.current, '.cw-ruler-voice', reads.voices, endMs)
      place(ruler.current, '.cw-ruler-loop', reads.loop, endMs)
    })
  }, [now, ruler])
}

function place(ruler: HTMLElement | null, marks: string, reads: readonly Read[], endMs: number) {
  ruler?.querySelectorAll<HTMLElement>(marks).forEach((mark, i) => {
    mark.style.setProperty('--at', String(Math.max(0, reads[i]?.delayMs ?? 0) / endMs))
  })
}
