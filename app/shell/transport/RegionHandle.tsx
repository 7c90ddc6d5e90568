// One end of the repeat region, as a slider: arrows a hundredth of a second, with Shift a tenth, Page keys a tenth of the recording.
import { SHORTEST_REPEAT_S, setRepeat } from '../../audio/audition.ts'
import type { Region } from './Waveform.tsx'
import { timeText } from './words.ts'

interface RegionHandleProps {
  readonly end: 'start' | 'end'
  readonly region: Region
  readonly seconds: number
}

export function RegionHandle({ end, region, seconds }: RegionHandleProps) {
  const value = end === 'start' ? region.startS : region.endS
  const min = end === 'start' ? 0 : region.startS + SHORTEST_REPEAT_S
  const max = end === 'start' ? region.endS - SHORTEST_REPEAT_S : seconds

  function onKeyDown(event: React.KeyboardEvent) {
    const next = moved(event, value, seconds)
    if (next === null) return
    event.preventDefault()
    const held = Math.min(max, Math.max(min, next))
    setRepeat(end === 'start' ? { startS: held, endS: region.endS } : { startS: region.startS, endS: held })
  }

  return (
    <div
      className="cw-waveform-handle"
      data-end={end}
      style={{ left: `${(100 * value) / seconds}%` }}
      role="slider"
      tabIndex={0}
      aria-label={end === 'start' ? 'Repeat from' : 'Repeat to'}
      aria-valuemin={round(Math.min(min, value))}
      aria-valuemax={round(Math.max(max, value))}
      aria-valuenow={round(value)}
      aria-valuetext={timeText(value)}
      onKeyDown={onKeyDown}
    />
  )
}

const round = (s: number) => Math.round(s * 1000) / 1000

function moved({ key, shiftKey }: React.KeyboardEvent, value: number, seconds: number): number | null {
  const step = shiftKey ? 0.1 : 0.01
  if (key === 'ArrowLeft' || key === 'ArrowDown') return value - step
  if (key === 'ArrowRight' || key === 'ArrowUp') return value + step
  if (key === 'PageDown') return value - seconds / 10
  if (key === 'PageUp') return value + seconds / 10
  if (key === 'Home') return 0
  if (key === 'End') return seconds
  return null
}
