// How fast the sweep moves: ds/dφ of the frozen shape, and where that slope changes or turns.
import { edge, frozenShapeValue, wrapPhase } from '../dsp/sweep.ts'
import type { ParameterSet } from '../set/types.ts'

type Sweep = ParameterSet['sweep']

/**
 * Phases in [0, 1), ascending, between which s(φ) is smooth and runs one way: turning points, corners of edges, drawn points.
 * With no edge (edgeMs or rateHz 0) a square or ramp jumps at its corner.
 */
export function shapeCorners(sweep: Sweep): readonly number[] {
  const e = edge(sweep)
  switch (sweep.shape) {
    case 'sine':
    case 'triangle':
    case 'drift':
      return [0.25, 0.75]
    case 'square': {
      const corners = e === 0 ? [0, 0.5] : [e / 2, 0.5 - e / 2, 0.5 + e / 2, 1 - e / 2]
      return corners.filter((phi, i) => phi !== corners[i + 1])
    }
    case 'rampUp':
    case 'rampDown':
      return e === 0 ? [0] : [e / 2, 1 - e / 2]
    case 'drawn':
      return sweep.points.length === 0 ? [0] : sweep.points.map(([phi]) => phi)
  }
}

/** ds/dφ of the frozen shape just after φ, per cycle; a jump counts as what follows it. `drift` counts as the sine. */
export function shapeSlope(sweep: Sweep, phi: number): number {
  if (sweep.shape === 'sine' || sweep.shape === 'drift') return 2 * Math.PI * Math.cos(2 * Math.PI * phi)
  // The other shapes are straight between their corners.
  const at = wrapPhase(phi)
  const corners = shapeCorners(sweep)
  const next = corners.find((corner) => corner > at) ?? (corners[0] as number) + 1
  const previous = corners.findLast((corner) => corner <= at) ?? (corners.at(-1) as number) - 1
  const quarter = (next - previous) / 4
  return (frozenShapeValue(sweep, previous + 3 * quarter) - frozenShapeValue(sweep, previous + quarter)) / (2 * quarter)
}
