// What the plots over frequency share: a curve at the position being shown, asked for frame by frame, before the wash of
// the whole sweep, asked for set by set; a level axis that fits both; a cursor; a reading line.
import type { ParameterSet } from '../../src/set/types.ts'
import { currentSet, subscribeSet } from '../state/current.ts'
import { onFrame } from '../state/frames.ts'
import { shownPosition } from '../state/position.ts'
import { analysis } from '../workers/analysisClient.ts'
import type { JobReply } from '../workers/analysisProtocol.ts'
import { axisColumns, type Columns, frequencyAt, sameColumns } from './columns.ts'
import { axis, DECIBEL_STEPS, evenSplits, frequencyLabel, frequencySplits } from './host/axes.ts'
import { cornerText, middleText } from './host/corner.ts'
import { createPlot, type PlotBox } from './host/createPlot.ts'
import { plotCursor } from './host/plotCursor.ts'
import type { PlotTheme } from './host/theme.ts'
import type { Levels } from './levels.ts'
import type { MountedPlot, PlotNumbers, PlotPlace, PlotTable } from './plotTypes.ts'
import { readingLine } from './readingLine.ts'
import { COMPUTED, RENEWED, staleness } from './staleness.ts'
import { decimal } from './words.ts'

/** The kinds of job that answer frame by frame, and the one for the whole sweep beside each. */
export type LiveKind = 'trace' | 'loop'
export type WholeKind = 'reach' | 'loopReach'

export interface FrequencyPlotSpec<L extends LiveKind, W extends WholeKind> {
  readonly live: L
  readonly whole: W
  /** Of the cursor as a slider. */
  readonly cursorLabel: string
  levels(live: JobReply<L> | null, whole: JobReply<W> | null): Levels
  drawWhole(on: Surface, whole: JobReply<W>): void
  drawLive(on: Surface, live: JobReply<L>): void
  /** What lines and shades mean. */
  legend(live: JobReply<L>): string
  /** What is read at a frequency. */
  cursorWords(at: Under<L>): string
  restWords(live: JobReply<L>, whole: JobReply<W> | null): string
  summary(live: JobReply<L>, whole: JobReply<W> | null): string
  table(live: JobReply<L>, whole: JobReply<W> | null): PlotTable
  numbers(live: JobReply<L>, whole: JobReply<W> | null): PlotNumbers
}

export interface Under<L extends LiveKind> {
  readonly set: ParameterSet
  readonly position: number
  readonly hz: number
  readonly live: JobReply<L> | null
}

export interface Surface {
  readonly ctx: CanvasRenderingContext2D
  readonly box: PlotBox
  readonly theme: PlotTheme
  readonly levels: Levels
  /** Of an older set. */
  readonly pale?: boolean
}

export function mountFrequencyPlot<L extends LiveKind, W extends WholeKind>(spec: FrequencyPlotSpec<L, W>, place: PlotPlace): MountedPlot {
  const { element, reading } = place
  let columns: Columns = axisColumns(currentSet().sampleRate, element.clientWidth)
  let levels = spec.levels(null, null)
  let live: JobReply<L> | null = null
  let whole: JobReply<W> | null = null
  let problem = ''
  let legend = ''
  let asked = { set: currentSet(), position: -1, columns }
  let dirty = false
  let cursor: number | null = null

  function failed(message: string) {
    problem = `This plot could not be computed:\n${message}`
    dirty = true
  }
  const lives = analysis().openFeed(
    spec.live,
    (reply) => {
      live = reply
      problem = ''
      dirty = true
      if (whole === null) fitLevels()
      const words = spec.legend(reply)
      if (words !== legend) plot.redraw()
      legend = words
    },
    failed,
  )
  const wholes = analysis().openFeed(
    spec.whole,
    (reply, { set }) => {
      whole = reply
      age.shows(set)
      line.changed()
      fitLevels()
      plot.redraw()
    },
    failed,
  )

  const plot = createPlot(element, {
    scales: {
      x: { time: false, distr: 3, range: () => [columns.lowHz, columns.highHz] },
      level: { auto: false, range: () => [levels.minDb, levels.maxDb] },
    },
    axes: [
      axis({ scale: 'x', side: 2, splits: frequencySplits, label: frequencyLabel }),
      axis({
        scale: 'level',
        side: 3,
        // The top label would stand on the corner's unit.
        splits: (min, max, length) => evenSplits(min, max, length, 30, DECIBEL_STEPS).filter((db) => db < max),
        label: (db) => decimal(db, 0, true),
      }),
    ],
    series: [{ scale: 'level', show: false }],
    data: ends(columns),
    under: (ctx, box, theme) => {
      if (whole) spec.drawWhole({ ctx, box, theme, levels, pale: age.isStale() }, whole)
    },
    over: (ctx, box, theme) => {
      cornerText(ctx, box, theme, 'topLeft', 'dB')
    },
    legend: () => (age.isStale() ? `${legend}${RENEWED}` : legend),
    live: (ctx, box, theme) => {
      if (problem !== '') middleText(ctx, box, theme, problem)
      else if (live) spec.drawLive({ ctx, box, theme, levels }, live)
    },
    onCursor: (part) => {
      cursor = part
      read()
    },
    onSize: measure,
  })
  const keys = plotCursor(plot, element, { label: spec.cursorLabel, spoken: underCursor })

  function underCursor(part: number): string {
    return spec.cursorWords({ set: currentSet(), position: shownPosition(), hz: frequencyAt(columns, part), live })
  }

  function measure() {
    const next = axisColumns(currentSet().sampleRate, plot.u.bbox.width / devicePixelRatio)
    if (sameColumns(next, columns)) return
    columns = next
    plot.u.setData(ends(columns))
    askWhole()
  }

  function askWhole() {
    wholes.ask({ set: currentSet(), columns })
  }

  function fitLevels() {
    const next = spec.levels(live, whole)
    if (next.minDb === levels.minDb && next.maxDb === levels.maxDb) return
    levels = next
    plot.u.setScale('level', { min: levels.minDb, max: levels.maxDb })
  }

  function read() {
    const rest = live ? spec.restWords(live, whole) : ''
    reading(cursor === null ? rest : `${underCursor(cursor)}\u2003${rest}`)
  }

  const age = staleness(() => plot.redraw())
  const line = readingLine(read)
  const stopDrawing = onFrame(() => {
    const set = currentSet()
    const position = shownPosition()
    if (set !== asked.set || position !== asked.position || columns !== asked.columns) {
      asked = { set, position, columns }
      lives.ask(asked)
    }
    if (dirty) plot.drawLive()
    if (dirty) line.changed()
    dirty = false
  }, 'canvas')
  const stopSet = subscribeSet(() => {
    measure()
    askWhole()
  })
  askWhole()

  return {
    summary: () => (live ? spec.summary(live, whole) : COMPUTED),
    table: () => (live ? spec.table(live, whole) : { caption: COMPUTED, head: [], rows: [] }),
    numbers: () => (live ? spec.numbers(live, whole) : { head: [], columns: [] }),
    picture: plot.picture,
    destroy() {
      stopDrawing()
      line.stop()
      age.stop()
      stopSet()
      lives.stop()
      wholes.stop()
      keys.destroy()
      plot.destroy()
    },
  }
}

/** uPlot takes its frequency range from two points. */
const ends = ({ lowHz, highHz }: Columns): [number[], number[]] => [
  [lowHz, highHz],
  [0, 0],
]
