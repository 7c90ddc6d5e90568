// The open loop as a plot draws it: |g| σ |A F| against frequency where the sweep stands and wherever it can stand,
// and the poles of the closed loop.
import { type Frozen, freeze } from '../../../src/analysis/frozen.ts'
import { frozenRead } from '../../../src/analysis/frozenRead.ts'
import { loopGain } from '../../../src/analysis/loopGain.ts'
import { loopMovement } from '../../../src/analysis/movingRead.ts'
import { largestPole, resonances, ringSeconds } from '../../../src/analysis/poles.ts'
import { sectorOf } from '../../../src/analysis/sector.ts'
import type { ParameterSet } from '../../../src/set/types.ts'
import { type Columns, partOf } from '../../plots/columns.ts'
import { pointsOf } from './trace.ts'

export interface LoopRequest {
  readonly set: ParameterSet
  readonly position: number
  readonly columns: Columns
}

export interface PoleMark {
  readonly frequencyHz: number
  readonly radius: number
  /** null when it does not die away. */
  readonly ringSeconds: number | null
  /** |g| σ |A F| at its frequency, dB. */
  readonly db: number
  readonly labelled: boolean
}

export interface LoopTrace {
  readonly position: number
  readonly columns: Columns
  /** One a line: dB at the columns' points. Empty without a loop. */
  readonly lines: readonly Float64Array[]
  readonly differs: boolean
  /** Poles of the closed loop, rising frequency, thinned; of both lines. */
  readonly poles: readonly PoleMark[]
  /** Of largest radius; null without a loop. */
  readonly largest: { readonly radius: number; readonly ringSeconds: number | null } | null
}

export interface LoopReachRequest {
  readonly set: ParameterSet
  readonly columns: Columns
}

/** Least and most of |g| σ |A F| in each column wherever the sweep can stand, dB. Empty without a loop. */
export interface LoopReach {
  readonly columns: Columns
  readonly low: Float64Array
  readonly high: Float64Array
}

const MARK_APART_PX = 14
const LABEL_APART_PX = 40

export function loopJob({ set, position, columns }: LoopRequest): LoopTrace {
  const frozen = freeze(set, position)
  const largest = largestPole(frozen)
  if (largest === null) return { position, columns, lines: [], differs: false, poles: [], largest: null }
  const open = openLoop(set, frozen)
  const lines = loopGain(open, pointsOf(columns)).map(({ db }) => db)
  const [left, right] = lines
  return {
    position,
    columns,
    lines,
    differs: left !== undefined && right !== undefined && left.some((db, i) => Math.abs(db - (right[i] as number)) > 1e-3),
    poles: poleMarks(frozen, open, columns),
    largest: { radius: largest.radius, ringSeconds: ringSeconds(largest.lnRadius, frozen.sampleRate) },
  }
}

/**
 * Each line's own loop with the shaper at its largest gain σ, so that 0 dB is the limit. Crossed lines are bounded by the larger
 * of them (X has norm 1); the averaging of an antiderivative shaper is left out, as no gain can be counted on there.
 */
function openLoop(set: ParameterSet, frozen: Frozen): Frozen {
  return { ...frozen, loop: { ...frozen.loop, crossFeed: 0, slope: { slope: sectorOf(set.loop.shaper).bound, averaged: false } } }
}

function poleMarks(frozen: Frozen, open: Frozen, columns: Columns): PoleMark[] {
  // Above this, even the poles of one line are closer than marks: a pixel at f is f · ln(high/low)/count wide.
  const spacing = frozen.sampleRate / Math.max(1, ...frozen.loop.reads.map(({ delaySamples }) => delaySamples))
  const closeHz = (spacing * columns.count) / (MARK_APART_PX * Math.log(columns.highHz / columns.lowHz))
  const marks: PoleMark[] = []
  let last = Number.NEGATIVE_INFINITY
  let lastLabel = Number.NEGATIVE_INFINITY
  for (const { frequencyHz, radius, ringSeconds } of resonances(frozen, Math.min(columns.highHz, closeHz))) {
    const x = partOf(columns, frequencyHz) * columns.count
    if (x < 0 || x - last < MARK_APART_PX) continue
    const labelled = x - lastLabel >= LABEL_APART_PX
    const levels = loopGain(open, [frequencyHz]).map(({ db }) => db[0] as number)
    marks.push({ frequencyHz, radius, ringSeconds, db: Math.max(...levels), labelled })
    last = x
    if (labelled) lastLabel = x
  }
  return marks
}

/** Fractions of a sample at which the read is looked at: the size of every read depends on its fraction alone. */
const FRACTIONS = 16

export function loopReachJob({ set, columns }: LoopReachRequest): LoopReach {
  const frozen = freeze(set, set.sweep.startPhase)
  const empty = new Float64Array(0)
  if (frozen.loop.gain === 0) return { columns, low: empty, high: empty }
  const { moves, minSamples, maxSamples } = loopMovement(set)
  const from = Math.max(minSamples, maxSamples - 1)
  const delays = moves ? Array.from({ length: FRACTIONS + 1 }, (_, k) => from + ((maxSamples - from) * k) / FRACTIONS) : null
  // A whole delay loses nothing, a half one most: both are met where the sweep passes them.
  const special = moves ? [Math.floor(maxSamples), Math.floor(maxSamples - 0.5) + 0.5].filter((delay) => delay >= minSamples) : []
  const reads = delays ? [...delays, ...special].map((delay) => frozenRead(set.loop.interpolation, delay)) : frozen.loop.reads
  const middles = pointsOf(columns).filter((_, i) => i % 2 === 1)
  const low = new Float64Array(columns.count).fill(Number.POSITIVE_INFINITY)
  const high = new Float64Array(columns.count).fill(Number.NEGATIVE_INFINITY)
  for (const read of reads) {
    const [curve] = loopGain(openLoop(set, { ...frozen, loop: { ...frozen.loop, reads: [read] } }), middles)
    curve?.db.forEach((db, i) => {
      low[i] = Math.min(low[i] as number, db)
      high[i] = Math.max(high[i] as number, db)
    })
  }
  return { columns, low, high }
}
