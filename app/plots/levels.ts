// The level axis of a plot: whole steps of 6 dB around everything to be shown, deep notches cut off.
import type { PlotBox } from './host/createPlot.ts'

export interface Levels {
  readonly minDb: number
  readonly maxDb: number
}

/** Canvas y of a level, held a little outside the plot. */
export function levelY(box: PlotBox, { minDb, maxDb }: Levels, db: number): number {
  const part = (maxDb - db) / (maxDb - minDb)
  return box.top + box.height * Math.max(-0.1, Math.min(1.1, part))
}

const STEP_DB = 6
const LEAST_DB = 24
/** Room for marks, their numbers and the corner's words above, for marks and numbers below. */
const ABOVE_DB = 8
const BELOW_DB = 4
/** Peaks of a loop at its limit and bottoms of deep notches are cut off, so that the rest stays legible. */
const HIGHEST_DB = 36
const SPAN_DB = 42
/** Whatever rises above, the level that is neither lost nor gained keeps its place in the plot. */
const KEPT_DB = -12

/** `lowDb`, `highDb`: what should show. At least 24 dB, at most 42 dB below the top, or down to −12 dB. */
export function levelRange(lowDb: number, highDb: number): Levels {
  const maxDb = Math.min(HIGHEST_DB, Math.ceil((highDb + ABOVE_DB) / STEP_DB) * STEP_DB)
  const bottom = Math.max(lowDb - BELOW_DB, Math.min(KEPT_DB, maxDb - SPAN_DB))
  return { minDb: Math.min(Math.floor(bottom / STEP_DB) * STEP_DB, maxDb - LEAST_DB), maxDb }
}
