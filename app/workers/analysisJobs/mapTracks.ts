// Where the first notches and peaks of the first channel stand over the cycle of the sweep.
import { type Extreme, type ExtremeKind, frozenExtremes } from '../../../src/analysis/extremes.ts'
import { firstChannel, longestOwnDelay } from '../../../src/analysis/firstExtreme.ts'
import type { Frozen } from '../../../src/analysis/frozen.ts'
import { standsOut } from './teeth.ts'

/** One notch or peak by its place in the row of its kind, at positions j / (length − 1) of the cycle; NaN where there are fewer. */
export interface Track {
  readonly kind: ExtremeKind
  /** 1 the lowest. */
  readonly order: number
  readonly frequencyHz: Float64Array
  readonly db: Float64Array
}

/** Tracks of a kind. */
const MOST = 6
/** Root search, Hz: tracks are written in tenths at most. */
const WITHIN_HZ = 0.02

export interface TrackPoint {
  readonly kind: ExtremeKind
  readonly order: number
  readonly frequencyHz: number
  readonly db: number
}

/** The first notches and peaks of the first channel in [lowHz, highHz] that stand out from their neighbours. */
export function trackAt(frozen: Frozen, lowHz: number, highHz: number): TrackPoint[] {
  const first = firstChannel(frozen)
  // A dry path that is delayed leaves wider teeth than its delay has: the search goes on where the first teeth show too little.
  for (let maxHz = ((MOST + 2) * frozen.sampleRate) / longestOwnDelay(first); ; maxHz *= 4) {
    const end = Math.min(highHz, maxHz)
    const found = lowest(frozenExtremes(first, { maxHz: end, withinHz: WITHIN_HZ }), lowHz)
    if (end === highHz || found.length === 2 * MOST) return found
  }
}

function lowest(extremes: readonly Extreme[], lowHz: number): TrackPoint[] {
  const orders = { notch: 0, peak: 0 }
  const found: TrackPoint[] = []
  extremes.forEach(({ kind, frequencyHz, db }, i) => {
    if (frequencyHz < lowHz || orders[kind] >= MOST || !standsOut(extremes, i)) return
    orders[kind] += 1
    found.push({ kind, order: orders[kind], frequencyHz, db })
  })
  return found
}

/** Tracks from what stands at each position. */
export function tracksOf(positions: readonly (readonly TrackPoint[])[]): Track[] {
  const tracks: Track[] = []
  for (const kind of ['notch', 'peak'] as const)
    for (let order = 1; order <= MOST; order++) {
      const at = positions.map((points) => points.find((point) => point.kind === kind && point.order === order))
      if (!at.some((point) => point)) break
      tracks.push({
        kind,
        order,
        frequencyHz: Float64Array.from(at, (point) => point?.frequencyHz ?? Number.NaN),
        db: Float64Array.from(at, (point) => point?.db ?? Number.NaN),
      })
    }
  return tracks
}
