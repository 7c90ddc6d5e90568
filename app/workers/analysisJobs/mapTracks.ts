// Where the first notches and peaks of the first channel stand over the cycle of the sweep, each followed from position to position.
import { type Extreme, type ExtremeKind, frozenExtremes } from '../../../src/analysis/extremes.ts'
import { firstChannel, longestOwnDelay } from '../../../src/analysis/firstExtreme.ts'
import type { Frozen } from '../../../src/analysis/frozen.ts'
import { prominence } from './teeth.ts'

/** One notch or peak at positions j / (length − 1) of the cycle; NaN where it is not there. */
export interface Track {
  readonly kind: ExtremeKind
  readonly frequencyHz: Float64Array
  readonly db: Float64Array
}

/** Of a kind, looked for at each position. */
const MOST = 6
/** Root search, Hz: tracks are written in tenths at most. */
const WITHIN_HZ = 0.02
/** A track is followed while it stands out by the first, and told when it somewhere does by the second, dB. */
const FOLLOWED_DB = 1
const TOLD_DB = 3
/** Between two positions no notch moves by a larger ratio: it jumped, or another one took its place. */
const JUMP = 1.5
/** Shorter ones, in parts of the cycle, come and go between others. */
const SHORTEST = 0.12

export interface TrackPoint {
  readonly kind: ExtremeKind
  readonly frequencyHz: number
  readonly db: number
  /** dB by which it stands out from its neighbours. */
  readonly prominence: number
}

/** The lowest notches and peaks of the first channel in [lowHz, highHz], rising. */
export function trackPointsAt(frozen: Frozen, lowHz: number, highHz: number): TrackPoint[] {
  const first = firstChannel(frozen)
  // A dry path that is delayed leaves wider teeth than its delay has: the search goes on where the first teeth show too little.
  for (let maxHz = ((MOST + 2) * frozen.sampleRate) / longestOwnDelay(first); ; maxHz *= 4) {
    const end = Math.min(highHz, maxHz)
    const found = lowest(frozenExtremes(first, { maxHz: end, withinHz: WITHIN_HZ }), lowHz)
    if (end === highHz || found.length === 2 * MOST) return found
  }
}

function lowest(extremes: readonly Extreme[], lowHz: number): TrackPoint[] {
  const count = { notch: 0, peak: 0 }
  const found: TrackPoint[] = []
  extremes.forEach(({ kind, frequencyHz, db }, i) => {
    const stands = prominence(extremes, i)
    if (frequencyHz < lowHz || count[kind] >= MOST || stands < FOLLOWED_DB) return
    count[kind] += 1
    found.push({ kind, frequencyHz, db, prominence: stands })
  })
  return found
}

/** Tracks through what stands at each position, each kind rising by where it is lowest. */
export function tracksOf(positions: readonly (readonly TrackPoint[])[]): Track[] {
  return (['notch', 'peak'] as const).flatMap((kind) => {
    const chains = chained(positions.map((points) => points.filter((point) => point.kind === kind)))
    return chains
      .filter(({ points }) => points.length - 1 >= SHORTEST * (positions.length - 1) && points.some((point) => point.prominence >= TOLD_DB))
      .map(({ start, points }) => {
        const at = (value: (point: TrackPoint) => number) =>
          Float64Array.from(positions, (_, j) => {
            const point = points[j - start]
            return point ? value(point) : Number.NaN
          })
        return { kind, frequencyHz: at((point) => point.frequencyHz), db: at((point) => point.db) }
      })
      .sort((a, b) => leastOf(a) - leastOf(b))
  })
}

const leastOf = ({ frequencyHz }: Track) => Math.min(...frequencyHz.filter((hz) => !Number.isNaN(hz)))

interface Chain {
  /** Position of its first point. */
  readonly start: number
  readonly points: TrackPoint[]
}

/** Joins points of following positions that are each other's nearest. */
function chained(positions: readonly (readonly TrackPoint[])[]): Chain[] {
  const chains: Chain[] = []
  let before: readonly TrackPoint[] = []
  let open: readonly Chain[] = []
  positions.forEach((points, start) => {
    open = points.map((point) => {
      const k = nearest(before, point)
      const old = before[k]
      const follows = old !== undefined && points[nearest(points, old)] === point && distance(old, point) < Math.log(JUMP)
      const chain = follows ? (open[k] as Chain) : { start, points: [] }
      if (!follows) chains.push(chain)
      chain.points.push(point)
      return chain
    })
    before = points
  })
  return chains
}

const distance = (a: TrackPoint, b: TrackPoint) => Math.abs(Math.log(a.frequencyHz / b.frequencyHz))

/** Index of the point nearest to `to`, −1 of none. */
function nearest(points: readonly TrackPoint[], to: TrackPoint): number {
  let best = -1
  points.forEach((point, i) => {
    if (best < 0 || distance(point, to) < distance(points[best] as TrackPoint, to)) best = i
  })
  return best
}
