// What the response reaches over the whole sweep, as a plot shades it: the exact envelope at the edges of the pixel
// columns, and what stands inside the columns at some positions, for sweeps too small to smear their teeth.
import { bandEnvelope, logBandEdges } from '../../../src/analysis/bandEnvelope.ts'
import { sweepEnvelope } from '../../../src/analysis/envelope.ts'
import { freeze } from '../../../src/analysis/frozen.ts'
import { delayRange } from '../../../src/set/delayRange.ts'
import type { ParameterSet } from '../../../src/set/types.ts'
import { type Columns, partOf } from '../../plots/columns.ts'
import { outline } from './outline.ts'

export interface ReachRequest {
  readonly set: ParameterSet
  readonly columns: Columns
}

/** Smallest and largest dB in each pixel column, over the sweep and all channels; outlines where teeth are only some pixels wide. */
export interface Reach {
  readonly columns: Columns
  readonly low: Float64Array
  readonly high: Float64Array
  /** Nothing moves: the trace is all there is. */
  readonly stands: boolean
}

/** Frequencies a slice takes, so that a newer request waits some milliseconds at most. */
const SLICE = 64
const POSITIONS = 8

export function* reachJob({ set, columns }: ReachRequest): Generator<undefined, Reach> {
  const { count } = columns
  const edges = logBandEdges(columns.lowHz, columns.highHz, count)
  const low = new Float64Array(count).fill(Number.POSITIVE_INFINITY)
  const high = new Float64Array(count).fill(Number.NEGATIVE_INFINITY)
  const take = (i: number, lowDb: number, highDb: number) => {
    if (i < 0 || i >= count) return
    low[i] = Math.min(low[i] as number, lowDb)
    high[i] = Math.max(high[i] as number, highDb)
  }
  for (let from = 0; from < edges.length; from += SLICE) {
    for (const { minDb, maxDb } of sweepEnvelope(set, edges.subarray(from, from + SLICE)))
      minDb.forEach((db, k) => {
        // An edge belongs to the columns on both sides.
        take(from + k - 1, db, maxDb[k] as number)
        take(from + k, db, maxDb[k] as number)
      })
    yield
  }
  for (let k = 0; k < POSITIONS; k++) {
    for (const { minDb, maxDb } of bandEnvelope(freeze(set, k / POSITIONS), edges))
      minDb.forEach((db, i) => {
        take(i, db, maxDb[i] as number)
      })
    yield
  }
  const from = crowded(set, columns)
  low.set(outline(low.subarray(from), Math.min), from)
  high.set(outline(high.subarray(from), Math.max), from)
  return { columns, low, high, stands: sweepStands(set) }
}

export function sweepStands({ sweep }: ParameterSet): boolean {
  return sweep.rateHz === 0 || (sweep.law === 'time' ? sweep.depthMs : sweep.depthOctaves) === 0
}

/** Teeth of the longest delay are narrower than this from the column on which `crowded` gives: between its points a column then hides some. */
const CROWDED_PX = 10

function crowded(set: ParameterSet, columns: Columns): number {
  const { voices, loop } = delayRange(set)
  const toothHz = set.sampleRate / Math.max(1, voices.maxSamples, loop.maxSamples)
  // A pixel at f is f · ln(high/low)/count wide.
  const hz = (toothHz * columns.count) / (CROWDED_PX * Math.log(columns.highHz / columns.lowHz))
  return Math.max(0, Math.min(columns.count, Math.floor(partOf(columns, hz) * columns.count)))
}
