// The response over the whole sweep as a picture: a cell for each sweep position and pixel row of frequency, and the tracks of
// the first notches and peaks.
import { type Frozen, freeze } from '../../../src/analysis/frozen.ts'
import { type Transfer, transferAt, transferGrid, transferOf, transferStep } from '../../../src/analysis/transfer.ts'
import type { ParameterSet } from '../../../src/set/types.ts'
import { type Columns, frequencyAt } from '../../plots/columns.ts'
import { type Track, trackPointsAt, tracksOf } from './mapTracks.ts'
import { powerDb } from './powerDb.ts'
import { sweepStands } from './reach.ts'

export interface MapRequest {
  readonly set: ParameterSet
  /** Of the frequency axis; `count` rows, rising. */
  readonly rows: Columns
  /** Cells across a cycle. */
  readonly positions: number
}

export interface SweepMap {
  readonly rows: Columns
  /** Cells across; 1 when nothing moves. Cell i is at position (i + ½)/positions, or where the sweep stands. */
  readonly positions: number
  /** One a channel: dB of cell i, row r at i · rows.count + r. Its middle, or the mean power of a row wider than part of a tooth. */
  readonly channels: readonly Float32Array[]
  /** The second channel is another one. */
  readonly differs: boolean
  /** From this frequency on rows hold the mean power, Hz; null when none does. */
  readonly meanFromHz: number | null
  readonly tracks: readonly Track[]
  readonly stands: boolean
  readonly drifts: boolean
  /** Shapers count by their slope at 0. */
  readonly smallSignal: boolean
}

/** Points on a tooth of a comb without a loop, and at most, where a loop sharpens its peaks. */
const TOOTH_POINTS = 6
const MOST_TOOTH_POINTS = 40
/** A row takes no more points. */
const MOST_POINTS = 80
/** Positions at which notches and peaks are looked for. */
const MOST_TRACK_POINTS = 192

export function* mapJob({ set, rows, positions }: MapRequest): Generator<undefined, SweepMap> {
  const stands = sweepStands(set)
  const count = stands ? 1 : positions
  const positionOf = (i: number) => (stands ? set.sweep.startPhase : (i + 0.5) / count)
  const outputs = set.layout === 'mono' ? 1 : 2
  const channels = Array.from({ length: outputs }, () => new Float32Array(count * rows.count))
  const edges = Float64Array.from({ length: rows.count + 1 }, (_, r) => frequencyAt(rows, r / rows.count))
  const middles = Float64Array.from({ length: rows.count }, (_, r) => frequencyAt(rows, (r + 0.5) / rows.count))
  let meanFrom = rows.count
  for (let i = 0; i < count; i++) {
    const frozen = freeze(set, positionOf(i))
    meanFrom = Math.min(meanFrom, fillColumn(frozen, { edges, middles, channels, at: i * rows.count }))
    yield
  }
  const trackPoints = []
  const last = stands ? 1 : Math.min(count, MOST_TRACK_POINTS)
  for (let j = 0; j <= last; j++) {
    trackPoints.push(trackPointsAt(freeze(set, stands ? set.sweep.startPhase : j / last), rows.lowHz, rows.highHz))
    yield
  }
  return {
    rows,
    positions: count,
    channels,
    differs: differ(channels),
    meanFromHz: meanFrom < rows.count ? (edges[meanFrom] as number) : null,
    tracks: tracksOf(trackPoints),
    stands,
    drifts: set.sweep.shape === 'drift',
    smallSignal: set.input.shaper !== null || set.loop.shaper !== null || set.mix.shaper !== null,
  }
}

interface Column {
  readonly edges: Float64Array
  readonly middles: Float64Array
  readonly channels: readonly Float32Array[]
  /** Of its first cell. */
  readonly at: number
}

/** Levels of one position; returns the first row that holds a mean. */
function fillColumn(frozen: Frozen, { edges, middles, channels, at }: Column): number {
  const transfer = transferOf(frozen)
  const perHz = (2 * Math.PI) / frozen.sampleRate
  const toothHz = frozen.sampleRate / transfer.longest
  const perTooth = toothPoints(frozen)
  const out = new Float64Array(4 * channels.length)
  const power = new Float64Array(channels.length)
  let meanFrom = middles.length
  for (let r = 0; r < middles.length; r++) {
    const low = edges[r] as number
    const high = edges[r + 1] as number
    const needed = Math.ceil(((high - low) * perTooth) / toothHz)
    if (needed < 2) {
      transferAt(transfer, perHz * (middles[r] as number), out)
      channels.forEach((cells, c) => {
        cells[at + r] = powerDb(out[4 * c] as number, out[4 * c + 1] as number)
      })
      continue
    }
    meanFrom = Math.min(meanFrom, r)
    const span = measured(high - low, toothHz, perTooth)
    const points = Math.min(MOST_POINTS, Math.ceil((span * perTooth) / toothHz))
    meanPower(transfer, { low: perHz * ((low + high - span) / 2), step: (perHz * span) / points, points }, out, power)
    channels.forEach((cells, c) => {
      cells[at + r] = powerDb(Math.sqrt(power[c] as number), 0)
    })
  }
  return meanFrom
}

/** The width around a row's middle over which power is averaged, Hz: the row's own, in whole teeth where it is wider than one, as many as points allow. */
function measured(rowHz: number, toothHz: number, perTooth: number): number {
  if (rowHz < toothHz) return rowHz
  return Math.min(Math.round(rowHz / toothHz), Math.floor(MOST_POINTS / perTooth)) * toothHz
}

/** Peaks of a loop are about (1 − g)/π of a tooth wide. */
function toothPoints({ loop }: Frozen): number {
  const gain = Math.min(0.999, Math.abs(loop.gain * loop.slope.slope))
  return Math.min(MOST_TOOTH_POINTS, Math.ceil(TOOTH_POINTS / (1 - gain)))
}

interface Grid {
  /** rad/sample. */
  readonly low: number
  readonly step: number
  readonly points: number
}

/** Mean |H|² of each channel over the middles of `points` steps from `low` on. */
function meanPower(transfer: Transfer, { low, step, points }: Grid, out: Float64Array, power: Float64Array): void {
  power.fill(0)
  for (let j = 0; j < points; j++) {
    if (j === 0) transferGrid(transfer, low + step / 2, step, out)
    else transferStep(transfer, out)
    for (let c = 0; c < power.length; c++) power[c] = (power[c] as number) + (out[4 * c] as number) ** 2 + (out[4 * c + 1] as number) ** 2
  }
  for (let c = 0; c < power.length; c++) power[c] = (power[c] as number) / points
}

/** 0.05 dB, where either is above −100 dB. */
function differ([left, right]: readonly Float32Array[]): boolean {
  return (
    left !== undefined &&
    right !== undefined &&
    left.some((db, i) => Math.abs(db - (right[i] as number)) > 0.05 && Math.max(db, right[i] as number) > -100)
  )
}
