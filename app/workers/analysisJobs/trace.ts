// The response at one sweep position as a plot draws it: levels at the points of its pixel columns, the smallest and
// largest level inside each column (every notch and peak counted, so nothing aliases), marks, tooth spacing.
import { type Extreme, frozenExtremes } from '../../../src/analysis/extremes.ts'
import { type Frozen, freeze } from '../../../src/analysis/frozen.ts'
import { largestPole } from '../../../src/analysis/poles.ts'
import { transferAt, transferOf } from '../../../src/analysis/transfer.ts'
import type { ParameterSet } from '../../../src/set/types.ts'
import { type Columns, columnPoints, partOf, sameColumns } from '../../plots/columns.ts'
import { outline } from './outline.ts'
import { powerDb } from './powerDb.ts'
import { sweepStands } from './reach.ts'
import { DENSE_DASHED_PX, denseColumn, type Mark, marksOf, spacingOf } from './teeth.ts'

export interface TraceRequest {
  readonly set: ParameterSet
  /** Sweep position, 0 to 1. */
  readonly position: number
  readonly columns: Columns
}

export interface TraceChannel {
  /** dB at the 2 · count + 1 points of the columns. */
  readonly db: Float64Array
  /** Smallest and largest dB inside each column, edges included. */
  readonly low: Float64Array
  readonly high: Float64Array
}

/** Smooth outlines around the last columns, from `dense` on or, of the second channel, sooner: never inside any column's levels. */
export interface DenseBand {
  readonly low: Float64Array
  readonly high: Float64Array
}

export interface Trace {
  readonly position: number
  readonly columns: Columns
  readonly channels: readonly TraceChannel[]
  /** The second channel's response is another one. */
  readonly differs: boolean
  /** Of the first channel. */
  readonly marks: readonly Mark[]
  /** Hz between the first channel's notches where they are evenly spaced, else null. */
  readonly spacingHz: number | null
  /** First column whose teeth are denser than pixels can show; `count` when there is none. */
  readonly dense: number
  /** One a channel. */
  readonly bands: readonly DenseBand[]
  /** Shapers count by their slope at 0. */
  readonly smallSignal: boolean
  /** The sweep drifts: its position is that of a sine in its place. */
  readonly drifts: boolean
  readonly stands: boolean
  /** Held here the loop builds up: no steady sound has these levels. */
  readonly unstable: boolean
}

let points = { columns: { lowHz: 0, highHz: 0, count: 0 } as Columns, hz: new Float64Array() as Float64Array }

export function pointsOf(columns: Columns): Float64Array {
  if (!sameColumns(points.columns, columns)) points = { columns, hz: columnPoints(columns) }
  return points.hz
}

/** Marks are written in tenths of a hertz at most. */
const WITHIN_HZ = 0.02

export function traceJob({ set, position, columns }: TraceRequest): Trace {
  const frozen = freeze(set, position)
  const channels = levels(frozen, columns)
  const extremes = frozenExtremes(frozen, { maxHz: columns.highHz, withinHz: WITHIN_HZ })
  const first = extremes.filter((extreme) => extreme.channel === 0)
  const dense = denseColumn(extremes, columns)
  const [left, right] = channels
  const columnBands = channels.map((db, channel) => columnBand(db, extremes, channel, columns))
  return {
    position,
    columns,
    channels: columnBands,
    differs: left !== undefined && right !== undefined && differ(left, right),
    marks: marksOf(first, columns),
    spacingHz: spacingOf(first),
    dense,
    bands: columnBands.map((band, channel) => (channel === 0 ? outlines(band, dense) : dashedOutlines(band, extremes, columns))),
    smallSignal: frozen.smallSignal,
    drifts: set.sweep.shape === 'drift',
    stands: sweepStands(set),
    unstable: buildsUp(frozen),
  }
}

function outlines({ low, high }: TraceChannel, from: number, widen?: number): DenseBand {
  return { low: outline(low.subarray(from), Math.min, widen), high: outline(high.subarray(from), Math.max, widen) }
}

/** Teeth that a dashed line could not follow are outlined, wide enough to bridge them. */
function dashedOutlines(band: TraceChannel, extremes: readonly Extreme[], columns: Columns): DenseBand {
  const own = extremes.filter(({ channel }) => channel === 1)
  return outlines(band, denseColumn(own, columns, DENSE_DASHED_PX), DENSE_DASHED_PX / 2)
}

/** No read and no filter of the loop gives back more than it gets: below 1, the gain alone decides. */
function buildsUp(frozen: Frozen): boolean {
  const { gain, slope } = frozen.loop
  return Math.abs(gain * slope.slope) >= 1 && (largestPole(frozen)?.radius ?? 0) >= 1
}

/** dB at the columns' points, every channel. */
function levels(frozen: Frozen, columns: Columns): Float64Array[] {
  const transfer = transferOf(frozen)
  const hz = pointsOf(columns)
  const channels = frozen.channels.map(() => new Float64Array(hz.length))
  const out = new Float64Array(4 * channels.length)
  for (let i = 0; i < hz.length; i++) {
    transferAt(transfer, (2 * Math.PI * (hz[i] as number)) / frozen.sampleRate, out)
    channels.forEach((db, c) => {
      db[i] = powerDb(out[4 * c] as number, out[4 * c + 1] as number)
    })
  }
  return channels
}

/** Levels of each column from its three points and every extreme in it. */
export function columnBand(db: Float64Array, extremes: readonly Extreme[], channel: number, columns: Columns): TraceChannel {
  const { count } = columns
  const low = new Float64Array(count)
  const high = new Float64Array(count)
  for (let i = 0; i < count; i++) {
    const a = db[2 * i] as number
    const b = db[2 * i + 1] as number
    const c = db[2 * i + 2] as number
    low[i] = Math.min(a, b, c)
    high[i] = Math.max(a, b, c)
  }
  for (const extreme of extremes) {
    if (extreme.channel !== channel) continue
    const i = Math.floor(partOf(columns, extreme.frequencyHz) * count)
    if (i < 0 || i >= count) continue
    low[i] = Math.min(low[i] as number, extreme.db)
    high[i] = Math.max(high[i] as number, extreme.db)
  }
  return { db, low, high }
}

/** 0.001 dB, where both are above −100 dB. */
function differ(a: Float64Array, b: Float64Array): boolean {
  return a.some((value, i) => Math.abs(value - (b[i] as number)) > 1e-3 && Math.max(value, b[i] as number) > -100)
}
