// Sweep: delay over the cycle of every voice, the detune of the first, and the position being shown, which can be
// taken hold of.
import type { ParameterSet } from '../../../src/set/types.ts'
import { currentSet } from '../../state/current.ts'
import { onFrame } from '../../state/frames.ts'
import { shownPosition } from '../../state/position.ts'
import { useView } from '../../state/view.ts'
import { axis, evenSplits } from '../host/axes.ts'
import { cornerText } from '../host/corner.ts'
import { createPlot, type Layer } from '../host/createPlot.ts'
import { plotTheme } from '../host/theme.ts'
import type { MountedPlot, PlotPlace, PlotTable } from '../plotTypes.ts'
import { readingLine } from '../readingLine.ts'
import { cents, decimal, milliseconds } from '../words.ts'
import './sweep.css'
import { nowMarker } from './nowMarker.ts'
import { delayAxis, type SweepCurves, sweepAt, sweepCurves, sweepWords } from './sweepCurves.ts'

const FAINT = 0.38

export function mountSweep({ element, reading }: PlotPlace): MountedPlot {
  let curves: SweepCurves = sweepCurves(currentSet())
  let set = currentSet()
  let placed = Number.NaN
  // Kept, because asking the page for it in a frame makes it lay itself out.
  let size = { widthPx: 0, heightPx: 0 }
  let cursor: number | null = null

  const centsAxis = (): [number, number] => {
    const most = Math.max(curves.maxCents, 0.1) * 1.25
    return [-most, most]
  }
  const faintVoices: Layer = (ctx, box, theme, u) => {
    ctx.strokeStyle = theme.now
    ctx.globalAlpha = FAINT
    ctx.lineWidth = box.ratio
    ctx.beginPath()
    for (const { delayMs } of curves.voices.slice(1))
      delayMs.forEach((ms, i) => {
        const x = u.valToPos(curves.positions[i] as number, 'x', true)
        const y = u.valToPos(ms, 'delay', true)
        if (i === 0) ctx.moveTo(x, y)
        else ctx.lineTo(x, y)
      })
    ctx.stroke()
  }
  const plot = createPlot(element, {
    scales: {
      x: { time: false, range: [0, 1] },
      delay: { range: () => delayAxis(curves) },
      cents: { range: centsAxis },
    },
    axes: [
      axis({
        scale: 'x',
        side: 2,
        splits: () => [0, 0.25, 0.5, 0.75, 1],
        label: (part) => decimal(part, part % 0.5 === 0 ? (part % 1 === 0 ? 0 : 1) : 2),
      }),
      axis({
        scale: 'delay',
        side: 3,
        splits: (min, max, length) => evenSplits(min, max, length, 28),
        label: (ms, all) => decimal(ms, decimalsIn(all)),
        colour: 'now',
      }),
      axis({
        scale: 'cents',
        side: 1,
        splits: (min, max, length) => (set.sweep.shape === 'drift' ? [] : evenSplits(min, max, length, 40)),
        label: (ct, all) => `${decimal(ct, decimalsIn(all), true)} ct`,
        colour: 'second',
        grid: false,
        room: 4.2,
      }),
    ],
    series: [
      { scale: 'cents', stroke: () => plotTheme().second, width: 1.25, dash: [5, 4], points: { show: false }, pxAlign: 0 },
      { scale: 'delay', stroke: () => plotTheme().now, width: 1.75, points: { show: false }, pxAlign: 0 },
    ],
    data: data(curves),
    under: faintVoices,
    over: (ctx, box, theme) => {
      cornerText(ctx, box, theme, 'topLeft', 'ms', theme.now)
    },
    legend: () => legend(set),
    onCursor: (part) => {
      cursor = part
      read()
    },
    onSize: (widthPx, heightPx) => {
      size = { widthPx, heightPx }
      placed = Number.NaN
    },
  })
  const marker = nowMarker(plot.u, element, (position) => sweepWords(currentSet(), position))

  function read() {
    const held = useView.getState().held === null ? '' : ' · held'
    reading(cursor === null ? `${sweepWords(currentSet(), shownPosition())}${held}` : sweepWords(currentSet(), cursor))
  }

  function frame() {
    if (set !== currentSet()) {
      set = currentSet()
      curves = sweepCurves(set)
      plot.u.setData(data(curves))
      placed = Number.NaN
    }
    const position = shownPosition()
    if (position !== placed) {
      placed = position
      line.changed()
      const [low, high] = delayAxis(curves)
      const down = (high - sweepAt(set, position).delayMs) / (high - low)
      marker.place(position * size.widthPx, down * size.heightPx)
    }
  }

  const line = readingLine(read)
  const stopFrames = onFrame(frame)
  const stopView = useView.subscribe(line.changed)

  return {
    summary: () => summary(curves, set),
    table: () => table(curves),
    numbers: () => ({
      head: [
        'position',
        ...curves.voices.flatMap(({ channel, voice }) =>
          ['delay_ms', 'cents'].map((what) => `channel_${channel + 1}_voice_${voice + 1}_${what}`),
        ),
      ],
      columns: [curves.positions, ...curves.voices.flatMap(({ delayMs, cents }) => [delayMs, cents])],
    }),
    picture: plot.picture,
    destroy() {
      stopFrames()
      stopView()
      line.stop()
      marker.destroy()
      plot.destroy()
    },
  }
}

function data({ positions, voices }: SweepCurves): [Float64Array, Float64Array, Float64Array] {
  const empty = new Float64Array(positions.length)
  return [positions, voices[0]?.cents ?? empty, voices[0]?.delayMs ?? empty]
}

function legend({ sweep, voices, layout }: ParameterSet): string {
  const parts = sweep.shape === 'drift' ? ['drift stands as a sine'] : ['dashed: detune']
  if (voices.count > 1) parts.push('faint: the other voices')
  else if (layout !== 'mono' && sweep.stereoPhase % 360 !== 0) parts.push('faint: the second channel')
  return parts.join(' · ')
}

/** As many decimals as the longest of an axis' numbers has. */
const decimalsIn = (all: readonly number[]): number => Math.min(4, Math.max(0, ...all.map(decimalsOf)))
const decimalsOf = (value: number): number => (String(value).split('.')[1] ?? '').length

function summary({ minMs, maxMs, maxCents, voices }: SweepCurves, { sweep }: ParameterSet): string {
  const many = voices.length > 1 ? ` of ${voices.length} voices` : ''
  const bend = sweep.shape === 'drift' ? 'drifting' : `the first voice detuned by up to ${decimal(maxCents, 1)} cents`
  return `Sweep: delay${many} from ${milliseconds(minMs)} to ${milliseconds(maxMs)} over a cycle at ${decimal(sweep.rateHz, 2)} Hz, ${bend}.`
}

const ROWS = 32

function table({ positions, voices }: SweepCurves): PlotTable {
  const name = (channel: number, voice: number) => `channel ${channel + 1}, voice ${voice + 1}`
  return {
    caption: 'Delay and detune over the cycle of the sweep',
    head: ['Position', ...voices.flatMap(({ channel, voice }) => [`Delay, ${name(channel, voice)}`, `Detune, ${name(channel, voice)}`])],
    rows: Array.from({ length: ROWS + 1 }, (_, k) => {
      const i = (k * (positions.length - 1)) / ROWS
      return [
        decimal(positions[i] as number, 3),
        ...voices.flatMap((voice) => {
          const bend = voice.cents[i] as number
          return [milliseconds(voice.delayMs[i] as number), Number.isNaN(bend) ? 'none' : cents(bend)]
        }),
      ]
    }),
  }
}
