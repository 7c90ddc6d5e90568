// Where in the sweep artefacts are measured: evenly over a cycle, and where the delay moves fastest.
import { frozenShapeValue } from '../dsp/sweep.ts'
import { driftValue } from '../set/sweepShape.ts'
import type { ParameterSet } from '../set/types.ts'
import { shapeCorners } from './sweepSlope.ts'

/** How the voices' delay moves: at all times, in jumps with stillness between, or not at all. */
export type SweepMovement = 'moves' | 'jumps' | 'stands'

/** `jumps`: a square without an edge. */
export function sweepMovement({ sweep, line, voices }: ParameterSet): SweepMovement {
  const depth = sweep.law === 'time' ? sweep.depthMs : sweep.depthOctaves * (line.baseMs + (voices.count > 1 ? voices.spreadMs : 0))
  const values = sweep.points.map(([, s]) => s)
  const flat = sweep.shape === 'drawn' && values.every((s) => s === values[0])
  if (sweep.rateHz === 0 || depth === 0 || flat) return 'stands'
  return sweep.shape === 'square' && sweep.edgeMs === 0 ? 'jumps' : 'moves'
}

/**
 * Unwrapped phases, cycles, of voice 0 of channel 0 at the middle of each stretch: `count` of them over the cycle (drift: over as many cycles, at
 * different places of each), and `count` about the places where s moves fastest, up and down by turns, a little apart so that fractions differ.
 */
export function artefactPlaces(
  set: ParameterSet,
  count: number,
): { readonly cycle: readonly number[]; readonly steepest: readonly number[] } {
  const drifts = set.sweep.shape === 'drift'
  const cycle = Array.from({ length: count }, (_, i) => 4 + (drifts ? i : 0) + (i + 0.5) / count)
  const steep = drifts ? steepestDrift(set, count) : steepestPlaces(set.sweep)
  const steepest = Array.from({ length: count }, (_, i) => {
    const { phase, width } = steep[i % steep.length] as SteepPlace
    const turn = Math.floor(i / steep.length) / Math.ceil(count / steep.length)
    return 4 + phase + (turn - 0.5) * Math.min(width / 2, 0.05)
  })
  return { cycle, steepest }
}

interface SteepPlace {
  readonly phase: number
  /** Length of the stretch of about that slope, cycles. */
  readonly width: number
}

const CELLS = 32

/** Where s rises and falls fastest: middles of cells between the corners of the shape. One place if it only moves one way. */
function steepestPlaces(sweep: ParameterSet['sweep']): readonly SteepPlace[] {
  const corners = shapeCorners(sweep)
  let up = { slope: 0, phase: 0, width: 0 }
  let down = up
  corners.forEach((from, i) => {
    const to = corners[i + 1] ?? (corners[0] as number) + 1
    const cell = (to - from) / CELLS
    for (let k = 0; k < CELLS; k++) {
      // Inside the cell: on a corner without an edge the shape jumps.
      const low = from + (k + 0.05) * cell
      const slope = (frozenShapeValue(sweep, low + 0.9 * cell) - frozenShapeValue(sweep, low)) / (0.9 * cell)
      const at = { slope, phase: from + (k + 0.5) * cell, width: sweep.shape === 'sine' ? 0.1 : to - from }
      // A straight piece has one slope but for rounding: its middle stands for it.
      const steeper = (than: number) => Math.abs(slope) > Math.abs(than) * (1 + 1e-6)
      if (slope > 0 && steeper(up.slope)) up = at
      if (slope < 0 && steeper(down.slope)) down = at
    }
  })
  const middle = (at: typeof up): SteepPlace => ({ phase: at.phase, width: at.width })
  // A piece a hundred times slower than the fastest is not what is looked for: a ramp's own run beside its edge.
  const fastest = Math.max(up.slope, -down.slope)
  const steep = [up, down].filter(({ slope }) => Math.abs(slope) > 0.1 * fastest).map(middle)
  // Drawn so that it stands between leaps, like a square without an edge.
  return steep.length > 0 ? steep : [{ phase: corners[0] as number, width: 0 }]
}

/** The fastest changes from one random value to the next among the first 64 cycles of voice 0. */
function steepestDrift({ sweep }: ParameterSet, count: number): readonly SteepPlace[] {
  return Array.from({ length: 64 }, (_, k) => ({
    k,
    change: Math.abs(driftValue(sweep.seed, 0, 4 + k + 1) - driftValue(sweep.seed, 0, 4 + k)),
  }))
    .sort((a, b) => b.change - a.change)
    .slice(0, count)
    .map(({ k }) => ({ phase: k + 0.5, width: 0.1 }))
}
