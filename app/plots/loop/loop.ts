// Loop: the gain once round against frequency, under the limit at 0 dB, before the wash of wherever the sweep can
// stand; the poles; pole radius, ring time and distance from the limit in the reading line.
import type { JobReply } from '../../workers/analysisProtocol.ts'
import { drawWash } from '../drawBand.ts'
import { type FrequencyPlotSpec, mountFrequencyPlot } from '../frequencyPlot.ts'
import type { Levels } from '../levels.ts'
import type { MountPlot } from '../plotTypes.ts'
import { drawLoop, loopLegend } from './drawLoop.ts'
import { loopCursorWords, loopNumbers, loopRestWords, loopSummary, loopTable } from './loopWords.ts'

const STEP_DB = 6
const DEEPEST_DB = 48

/** The limit always shows, with room above it; the rest falls off to −24 to −48 dB. */
export function loopAxis(lowDb: number, highDb: number): Levels {
  const maxDb = Math.max(STEP_DB * 2, Math.ceil((highDb + STEP_DB / 2) / STEP_DB) * STEP_DB)
  const minDb = Math.floor((Math.min(lowDb, highDb - 2 * STEP_DB) - STEP_DB / 2) / STEP_DB) * STEP_DB
  return { minDb: Math.max(maxDb - DEEPEST_DB, Math.min(minDb, -2 * STEP_DB)), maxDb }
}

function ends(trace: JobReply<'loop'> | null, reach: JobReply<'loopReach'> | null): Levels {
  if (reach && reach.high.length > 0) return loopAxis(Math.min(...reach.low), Math.max(...reach.high))
  const [line] = trace?.lines ?? []
  return line ? loopAxis(Math.min(...line), Math.max(...line)) : loopAxis(-24, 0)
}

const LOOP: FrequencyPlotSpec<'loop', 'loopReach'> = {
  live: 'loop',
  whole: 'loopReach',
  cursorLabel: 'Loop gain at a frequency',
  levels: ends,
  drawWhole(surface, reach) {
    if (reach.high.length > 0) drawWash(surface, reach)
  },
  drawLive: drawLoop,
  legend: loopLegend,
  cursorWords: ({ hz, live }) => loopCursorWords(live, hz),
  restWords: loopRestWords,
  summary: loopSummary,
  table: loopTable,
  numbers: loopNumbers,
}

export const mountLoop: MountPlot = (place) => mountFrequencyPlot(LOOP, place)
