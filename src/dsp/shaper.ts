// A shaper: ceiling · c(drive · x), with c(v) = P k(v/P) for v ≥ 0 and −N k(−v/N) below, P and N its positive and negative limits.
import type { Shaper } from '../set/types.ts'
import { CHUNK } from './line.ts'
import { applyCurve, type CurveParameters, curveSectorBound, curveSlopeAtZero } from './shaperCurves.ts'
import { curveIntegral } from './shaperIntegrals.ts'
import { createMeanCell, curveMean, type MeanCell } from './shaperMeans.ts'

/** What a shaper's value depends on: the curve and the four gains. */
export type ShaperParameters = CurveParameters & Pick<Shaper, 'drive' | 'ceiling' | 'positive' | 'negative'>

const limits = new Float64Array(CHUNK)

/** x[at … at + n), n at most CHUNK, becomes ceiling · c(drive · x). */
export function applyShaper(p: ShaperParameters, x: Float64Array, at: number, n: number): void {
  const { drive, ceiling, positive, negative } = p
  for (let i = 0; i < n; i++) {
    const v = drive * x[at + i]!
    limits[i] = v >= 0 ? positive : -negative
    x[at + i] = v / limits[i]!
  }
  applyCurve(p, x, at, n)
  for (let i = 0; i < n; i++) x[at + i] = ceiling * (limits[i]! * x[at + i]!)
}

/** Mean of c between cell[0] and cell[1], in either order, into cell[2]: (C(v1) − C(v0))/(v1 − v0), or c(v0) when they are equal. */
export function halvesMean(p: ShaperParameters, cell: MeanCell): void {
  const { positive, negative } = p
  const low = Math.min(cell[0]!, cell[1]!)
  const high = Math.max(cell[0]!, cell[1]!)
  if (low >= 0) {
    cell[0] = low / positive
    cell[1] = high / positive
    curveMean(p, cell)
    cell[2] = positive * cell[2]!
  } else if (high <= 0) {
    cell[0] = -high / negative
    cell[1] = -low / negative
    curveMean(p, cell)
    cell[2] = -negative * cell[2]!
  } else {
    cell[0] = 0
    cell[1] = high / positive
    curveMean(p, cell)
    const above = high * positive * cell[2]!
    cell[0] = 0
    cell[1] = -low / negative
    curveMean(p, cell)
    cell[2] = (above + low * negative * cell[2]!) / (high - low)
  }
}

export interface ShaperFunctions {
  /** shaper(x). */
  readonly curve: (x: number) => number
  /** ∫₀ˣ shaper. */
  readonly antiderivative: (x: number) => number
  /** What `adaa1` plays after `previous`: the mean of the shaper between the two. It delays half a sample. Source: Parker, Zavalishin, Le Bivic, DAFx-16. */
  readonly mean: (previous: number, x: number) => number
  /** Slope for the smallest signals, ceiling · drive · k'(0+); with `adaa1` it is followed by (1 + z⁻¹)/2. */
  readonly slopeAtZero: number
  /** σ = sup |shaper(x)/x| over x ≠ 0. */
  readonly sectorBound: number
}

/** The functions of one shaper of a set, for analysis and tables. The engine uses the functions above on its own copy. */
export function createShaper(p: Shaper): ShaperFunctions {
  const gain = p.ceiling * p.drive
  const cell = createMeanCell()
  return {
    curve: (x) => {
      cell[0] = x
      applyShaper(p, cell, 0, 1)
      return cell[0]!
    },
    antiderivative: (x) => {
      // Of c: P² K(v/P) above, N² K(−v/N) below.
      const v = p.drive * x
      const limit = v >= 0 ? p.positive : p.negative
      return (p.ceiling * limit * limit * curveIntegral(p, Math.abs(v) / limit)) / p.drive
    },
    mean: (previous, x) => {
      cell[0] = p.drive * previous
      cell[1] = p.drive * x
      halvesMean(p, cell)
      return p.ceiling * cell[2]!
    },
    slopeAtZero: gain * curveSlopeAtZero(p),
    sectorBound: gain * curveSectorBound(p),
  }
}
