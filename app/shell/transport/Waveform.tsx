// The recording's outline with its repeat region: drag across it for a new region, drag an end or the middle, or move the ends by keys.
// The play head is moved by the frame loop.
import { useEffect, useRef } from 'react'
import { setRepeat } from '../../audio/audition.ts'
import { onFrame } from '../../state/frames.ts'
import { live } from '../../state/live.ts'
import { type Overview, useSession } from '../../state/session.ts'
import { RegionHandle } from './RegionHandle.tsx'
import { useRegionDrag } from './useRegionDrag.ts'
import { timeText } from './words.ts'

const HEIGHT = 100

export function Waveform() {
  const overview = useSession((s) => s.overview)
  const repeat = useSession((s) => s.repeat)
  if (!overview) return <div className="cw-waveform cw-waveform--empty" />
  const region = repeat ?? { startS: 0, endS: overview.seconds }
  return (
    <div className="cw-waveform">
      <Picture overview={overview} region={region} />
      <p className="cw-waveform-line">
        <span>
          Repeats {timeText(region.startS)} to {timeText(region.endS)}
        </span>
        <button type="button" className="cw-button" disabled={repeat === null} onClick={() => setRepeat(null)}>
          Repeat everything
        </button>
      </p>
    </div>
  )
}

export interface Region {
  readonly startS: number
  readonly endS: number
}

function Picture({ overview, region }: { readonly overview: Overview; readonly region: Region }) {
  const frame = useRef<HTMLDivElement>(null)
  const drag = useRegionDrag(frame, overview.seconds, region)
  const from = `${(100 * region.startS) / overview.seconds}%`
  const width = `${(100 * (region.endS - region.startS)) / overview.seconds}%`
  return (
    <div className="cw-waveform-frame" ref={frame} {...drag}>
      <svg className="cw-waveform-svg" viewBox={`0 0 ${overview.min.length} ${HEIGHT}`} preserveAspectRatio="none" aria-hidden="true">
        <path d={outline(overview)} />
      </svg>
      <div className="cw-waveform-region" style={{ left: from, width }} />
      <PlayHead seconds={overview.seconds} />
      <RegionHandle end="start" region={region} seconds={overview.seconds} />
      <RegionHandle end="end" region={region} seconds={overview.seconds} />
    </div>
  )
}

function PlayHead({ seconds }: { readonly seconds: number }) {
  const head = useRef<HTMLDivElement>(null)
  const playing = useSession((s) => s.playing)
  useEffect(() => {
    if (!playing) return
    return onFrame(() => {
      const at = live.sourceSeconds
      if (!head.current) return
      head.current.style.visibility = at === null ? 'hidden' : 'visible'
      head.current.style.transform = `translateX(${(100 * (at ?? 0)) / seconds}%)`
    })
  }, [playing, seconds])
  return <div className="cw-waveform-head" ref={head} style={{ visibility: 'hidden' }} />
}

/** Down along the largest samples, back along the smallest; at least a hair high, so that silence shows as a line. */
export function outline({ min, max }: Overview): string {
  const y = (x: number) => ((1 - Math.max(-1, Math.min(1, x))) * HEIGHT) / 2
  const top = Array.from(max, (x, i) => `${i} ${(y(x) - 0.5).toFixed(2)}`)
  const bottom = Array.from(min, (x, i) => `${i} ${(y(x) + 0.5).toFixed(2)}`).reverse()
  return `M${top.join('L')}L${bottom.join('L')}Z`
}
