// Scope: what went in (dashed) and what came out, aligned, from a rising zero crossing on. The last window stays when
// the sound stops.
import { currentSet } from '../../state/current.ts'
import { onFrame } from '../../state/frames.ts'
import { live, SCOPE_FRAMES } from '../../state/live.ts'
import { useSession } from '../../state/session.ts'
import { axis, evenSplits } from '../host/axes.ts'
import { cornerText, middleText } from '../host/corner.ts'
import { createPlot } from '../host/createPlot.ts'
import { plotCursor } from '../host/plotCursor.ts'
import { plotTheme } from '../host/theme.ts'
import type { MountedPlot, PlotPlace } from '../plotTypes.ts'
import { readingLine } from '../readingLine.ts'
import { decimal } from '../words.ts'
import { triggerAt } from './trigger.ts'

const SHOWN = SCOPE_FRAMES / 2
const RANGES = [0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1, 2, 5, 10, 20, 50, 100]
/** A quieter sound gets a larger scale only after it stayed quiet this long. */
const SHRINK_MS = 2000
const EMPTY = 'Press Play: the sound going in (dashed) and coming out stands here.'

export function mountScope({ element, reading }: PlotPlace): MountedPlot {
  const time = new Float64Array(SHOWN)
  const into = new Float64Array(SHOWN)
  const out = new Float64Array(SHOWN)
  let range = 1
  let quietSince = 0
  let shown = -1
  let cursor: number | null = null

  const rate = () => useSession.getState().contextRate ?? currentSet().sampleRate
  const spanMs = () => (SHOWN / rate()) * 1000
  const plot = createPlot(element, {
    scales: { x: { time: false, range: () => [0, spanMs()] }, level: { range: () => [-range, range] } },
    axes: [
      axis({
        scale: 'x',
        side: 2,
        splits: (min, max, length) => evenSplits(min, max, length, 80),
        label: (ms) => decimal(ms, ms % 1 === 0 ? 0 : 1),
      }),
      axis({ scale: 'level', side: 3, splits: (min, max, length) => evenSplits(min, max, length, 30), label: levelLabel, room: 3.4 }),
    ],
    series: [
      { scale: 'level', stroke: () => plotTheme().second, width: 1, dash: [4, 3], points: { show: false }, pxAlign: 0 },
      { scale: 'level', stroke: () => plotTheme().now, width: 1.5, points: { show: false }, pxAlign: 0 },
    ],
    data: [time, into, out],
    over: (ctx, box, theme) => {
      cornerText(ctx, box, theme, 'topLeft', 'of full scale')
      cornerText(ctx, box, theme, 'bottomRight', 'ms')
      cornerText(ctx, box, theme, 'topRight', 'in dashed, out solid')
      if (live.scopeCount === 0) middleText(ctx, box, theme, EMPTY)
    },
    onCursor: (part) => {
      cursor = part
      read()
    },
  })
  const keys = plotCursor(plot, element, { label: 'Scope at a time', spoken: under })

  function under(part: number): string {
    if (live.scopeCount === 0) return EMPTY
    const i = Math.min(SHOWN - 1, Math.round(part * SHOWN))
    return `${decimal(part * spanMs(), 2)} ms · in ${decimal(into[i] as number, 3, true)} · out ${decimal(out[i] as number, 3, true)}`
  }

  function peaks(): string {
    return live.scopeCount === 0 ? '' : `peak in ${decimal(peakOf(into), 3)} · out ${decimal(peakOf(out), 3)}`
  }

  const read = () => reading(cursor === null ? peaks() : under(cursor))

  function take(timeMs: number) {
    const start = triggerAt(live.scopeIn, SCOPE_FRAMES - SHOWN)
    const first = Math.floor(start)
    for (let i = 0; i < SHOWN; i++) {
      time[i] = ((i - (start - first)) / rate()) * 1000
      into[i] = live.scopeIn[first + i] as number
      out[i] = live.scopeOut[first + i] as number
    }
    const wanted = RANGES.find((r) => r >= 1.02 * Math.max(peakOf(into), peakOf(out))) ?? (RANGES.at(-1) as number)
    if (wanted >= range) quietSince = timeMs
    if (wanted > range || timeMs - quietSince > SHRINK_MS) range = wanted
    plot.u.setData([time, into, out])
  }

  const line = readingLine(read)
  const stopDrawing = onFrame((timeMs) => {
    if (live.scopeCount === shown) return
    shown = live.scopeCount
    line.changed()
    if (shown > 0) take(timeMs)
  }, 'canvas')

  return {
    summary: () => (live.scopeCount === 0 ? `Scope: ${EMPTY}` : `Scope: ${decimal(spanMs(), 1)} ms of sound, ${peaks()}.`),
    table: () => ({
      caption: live.scopeCount === 0 ? EMPTY : 'Input and output, the same instants, of full scale',
      head: ['Time', 'In', 'Out'],
      rows: Array.from({ length: live.scopeCount === 0 ? 0 : 65 }, (_, k) => {
        const i = Math.min(SHOWN - 1, k * (SHOWN / 64))
        return [`${decimal(time[i] as number, 2)} ms`, decimal(into[i] as number, 4, true), decimal(out[i] as number, 4, true)]
      }),
    }),
    numbers: () => ({ head: ['time_ms', 'in', 'out'], columns: live.scopeCount === 0 ? [[], [], []] : [time, into, out] }),
    picture: plot.picture,
    destroy() {
      stopDrawing()
      line.stop()
      keys.destroy()
      plot.destroy()
    },
  }
}

const levelLabel = (level: number): string => decimal(level, Math.abs(level) >= 1 || level === 0 ? 0 : Math.abs(level) < 0.1 ? 3 : 1, true)

function peakOf(values: Float64Array): number {
  let peak = 0
  for (const value of values) peak = Math.max(peak, Math.abs(value))
  return peak
}
