// Response: level against frequency at the position being shown, moving with the sound, before the wash of everything
// the sweep reaches; notch and peak marks; a cursor that reads frequency, level and note.
import { currentSet, subscribeSet } from '../../state/current.ts'
import { onFrame } from '../../state/frames.ts'
import { shownPosition } from '../../state/position.ts'
import { analysis } from '../../workers/analysisClient.ts'
import type { Reach } from '../../workers/analysisJobs/reach.ts'
import type { Trace } from '../../workers/analysisJobs/trace.ts'
import { axisColumns, type Columns, frequencyAt, sameColumns } from '../columns.ts'
import { axis, DECIBEL_STEPS, evenSplits, frequencyLabel, frequencySplits } from '../host/axes.ts'
import { middleText } from '../host/corner.ts'
import { createPlot } from '../host/createPlot.ts'
import { plotCursor } from '../host/plotCursor.ts'
import type { MountedPlot, PlotPlace } from '../plotTypes.ts'
import { decimal } from '../words.ts'
import { drawReach, drawTrace } from './drawResponse.ts'
import type { Levels } from './drawTrace.ts'
import { levelRange } from './levelRange.ts'
import { responseNumbers, responseTable } from './responseTable.ts'
import { cursorWords, restWords, summaryWords } from './responseWords.ts'

/** The reading line is renewed this often while the sound moves it. */
const READING_MS = 100

export function mountResponse({ element, reading }: PlotPlace): MountedPlot {
  let columns: Columns = axisColumns(currentSet().sampleRate, element.clientWidth)
  let levels: Levels = { minDb: -24, maxDb: 12 }
  let trace: Trace | null = null
  let reach: Reach | null = null
  let asked = { set: currentSet(), position: -1, columns }
  let problem = ''
  let dirty = false
  let unread = false
  let cursor: number | null = null
  let readAt = 0

  const traces = analysis().openFeed(
    'trace',
    (reply) => {
      trace = reply
      problem = ''
      dirty = true
      if (reach === null) fitLevels()
    },
    (message) => {
      problem = `The response could not be computed:\n${message}`
      dirty = true
    },
  )
  const reaches = analysis().openFeed('reach', (reply) => {
    reach = reply
    dirty = true
    fitLevels()
  })

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
        splits: (min, max, length) => evenSplits(min, max, length, 30, DECIBEL_STEPS).slice(0, -1),
        label: (db) => decimal(db, 0, true),
      }),
    ],
    series: [{ scale: 'level', show: false }],
    data: [
      [columns.lowHz, columns.highHz],
      [0, 0],
    ],
    under: (ctx, box, theme) => drawReach(ctx, box, theme, levels, reach),
    over: (ctx, box, theme) => {
      if (problem !== '') middleText(ctx, box, theme, problem)
      else drawTrace(ctx, box, theme, levels, trace)
    },
    onCursor: (part) => {
      cursor = part
      read()
    },
    onSize: () => measure(),
  })
  const keys = plotCursor(plot, element, { label: 'Response at a frequency', spoken: underCursor })

  function measure() {
    const next = axisColumns(currentSet().sampleRate, plot.u.bbox.width / devicePixelRatio)
    if (sameColumns(next, columns)) return
    columns = next
    plot.u.setData([
      [columns.lowHz, columns.highHz],
      [0, 0],
    ])
    askReach()
  }

  const askReach = () => reaches.ask({ set: currentSet(), columns })

  function fitLevels() {
    const seen = reach ?? trace?.channels[0]
    if (!seen) return
    const next = levelRange(Math.min(...seen.low), Math.max(...seen.high))
    if (next.minDb === levels.minDb && next.maxDb === levels.maxDb) return
    levels = next
    plot.u.setScale('level', { min: levels.minDb, max: levels.maxDb })
  }

  function underCursor(part: number): string {
    return cursorWords(currentSet(), shownPosition(), frequencyAt(columns, part))
  }

  function read() {
    const rest = trace ? restWords(trace) : ''
    reading(cursor === null ? rest : `${underCursor(cursor)}\u2003${rest}`)
  }

  function frame(timeMs: number) {
    const set = currentSet()
    const position = shownPosition()
    if (set !== asked.set || position !== asked.position || columns !== asked.columns) {
      asked = { set, position, columns }
      traces.ask(asked)
    }
    if (dirty) plot.redraw()
    unread ||= dirty
    dirty = false
    if (!unread || timeMs - readAt < READING_MS) return
    unread = false
    readAt = timeMs
    read()
  }

  const stopSet = subscribeSet(() => {
    measure()
    askReach()
  })
  const stopFrames = onFrame(frame)
  askReach()

  return {
    summary: () => summaryWords(trace, reach),
    table: () => responseTable(trace, reach),
    numbers: () => responseNumbers(trace, reach),
    picture: plot.picture,
    destroy() {
      stopFrames()
      stopSet()
      traces.stop()
      reaches.stop()
      keys.destroy()
      plot.destroy()
    },
  }
}
