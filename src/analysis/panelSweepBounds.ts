// A bound of how fast the delay moves that rises with rate and depth whatever the shape: the steepest place of the sweep, where the checks' own figure is the
// steepest chord between two updates, which a faster sweep can make flatter.
import { delayRange, voiceOffsetMs } from '../set/delayRange.ts'
import type { ParameterSet } from '../set/types.ts'

/** Largest |ds/dφ| of a shape without its edges, per cycle: sine 2π, triangle 4, drift π (from −1 to 1 as half a sine), drawn its steepest piece. */
export function steepestPiece(sweep: ParameterSet['sweep']): number {
  switch (sweep.shape) {
    case 'sine':
      return 2 * Math.PI
    case 'drift':
      return Math.PI
    case 'drawn':
      return steepestDrawn(sweep.points).slope
    default:
      return 4
  }
}

/** Steepest piece of a drawn sweep, closed: its slope per cycle and its length in cycles; rising only or falling only with `sign`. */
export function steepestDrawn(points: ParameterSet['sweep']['points'], sign = 0): { readonly slope: number; readonly length: number } {
  return points.reduce(
    (best, [x1, y1], i) => {
      const [x0, y0] = i === 0 ? [(points.at(-1)?.[0] ?? 0) - 1, points.at(-1)?.[1] ?? 0] : (points[i - 1] as readonly [number, number])
      const length = x1 - x0
      const rise = (y1 - y0) / length
      const slope = sign === 0 ? Math.abs(rise) : sign * rise
      return slope > best.slope ? { slope, length } : best
    },
    { slope: 0, length: 1 },
  )
}

/**
 * No chord of τ over one update is steeper than this, s a second: |ds/dt| dτ/ds, with |ds/dt| ≤ rate · steepest piece, or 2/edge over an edge, and never more than 2 an
 * update; dτ/ds ≤ depth (time law) or ln 2 · depth · longest delay (ratio law). `voices`: with their spread; the loop has none.
 */
export function slopeBound(set: ParameterSet, sampleRate: number, voices: boolean): number {
  const { sweep } = set
  const { shape, rateHz, edgeMs, law, depthMs, depthOctaves, updateEvery } = sweep
  if (rateHz === 0) return 0
  const edge = edgeMs > 0 ? 2000 / edgeMs : Number.POSITIVE_INFINITY
  const hasEdges = shape === 'square' || shape === 'rampUp' || shape === 'rampDown'
  const perSecond = Math.max(rateHz * steepestPiece(sweep), hasEdges ? edge : 0)
  const speed = Math.min(perSecond, (2 * sampleRate) / updateEvery)
  if (law === 'time') return (speed * depthMs) / 1000
  const { maxSweep } = delayRange(set, sampleRate)
  const base = set.line.baseMs + (voices ? voiceOffsetMs(set.voices, set.voices.count - 1) : 0)
  return (speed * Math.LN2 * depthOctaves * base * 2 ** (depthOctaves * Math.max(0, maxSweep))) / 1000
}
