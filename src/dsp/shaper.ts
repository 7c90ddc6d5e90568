// A shaper: ceiling · c(drive · x), with c(v) = P k(v/P) for v ≥ 0 and −N k(−v/N) below, P and N its positive and negative limits.
import type { Shaper } from '../set/types.ts'
import { type CurveParameters, curveIntegral, curveMean, curveSectorBound, curveSlopeAtZero, curveValue } from './shaperCurves.ts'

/** What a shaper's value depends on: the curve and the four gains. */
export type ShaperParameters = CurveParameters & Pick<Shaper, 'drive' | 'ceiling' | 'positive' | 'negative'>

/** c(v), any finite v. */
export function halvesValue(p: ShaperParameters, v: number): number {
  return v >= 0 ? p.positive * curveValue(p, v / p.positive) : -p.negative * curveValue(p, -v / p.negative)
}

/** C(v) = ∫₀ᵛ c: P² K(v/P) above, N² K(−v/N) below; never negative. */
export function halvesIntegral(p: ShaperParameters, v: number): number {
  const limit = v >= 0 ? p.positive : p.negative
  return limit * limit * curveIntegral(p, Math.abs(v) / limit)
}

/** Mean of c between two values in either order: (C(v1) − C(v0))/(v1 − v0), c(v0) when they are equal, without the cancellation of the difference. */
export function halvesMean(p: ShaperParameters, v0: number, v1: number): number {
  const low = Math.min(v0, v1)
  const high = Math.max(v0, v1)
  if (low >= 0) return p.positive * curveMean(p, low / p.positive, high / p.positive)
  if (high <= 0) return -p.negative * curveMean(p, -high / p.negative, -low / p.negative)
  const above = high * p.positive * curveMean(p, 0, high / p.positive)
  const below = low * p.negative * curveMean(p, 0, -low / p.negative)
  return (above + below) / (high - low)
}

/** ceiling · c(drive · x). */
export function shaperValue(p: ShaperParameters, x: number): number {
  return p.ceiling * halvesValue(p, p.drive * x)
}

/**
 * First-order antiderivative anti-aliasing: ceiling times the mean of c between drive · previous and drive · x; delays half a
 * sample. Source: Parker, Zavalishin, Le Bivic, DAFx-16.
 */
export function shaperMean(p: ShaperParameters, previous: number, x: number): number {
  return p.ceiling * halvesMean(p, p.drive * previous, p.drive * x)
}

export interface ShaperFunctions {
  /** shaper(x). */
  readonly curve: (x: number) => number
  /** ∫₀ˣ shaper. */
  readonly antiderivative: (x: number) => number
  /** What `adaa1` plays after `previous`: the mean of the shaper between the two. */
  readonly mean: (previous: number, x: number) => number
  /** Slope for the smallest signals, ceiling · drive · k'(0+); with `adaa1` it is followed by (1 + z⁻¹)/2. */
  readonly slopeAtZero: number
  /** σ = sup |shaper(x)/x| over x ≠ 0. */
  readonly sectorBound: number
}

/** The functions of one shaper of a set, for analysis and tables. The engine uses the functions above on its own copy. */
export function createShaper(p: Shaper): ShaperFunctions {
  const gain = p.ceiling * p.drive
  return {
    curve: (x) => shaperValue(p, x),
    antiderivative: (x) => (p.ceiling * halvesIntegral(p, p.drive * x)) / p.drive,
    mean: (previous, x) => shaperMean(p, previous, x),
    slopeAtZero: gain * curveSlopeAtZero(p),
    sectorBound: gain * curveSectorBound(p),
  }
}
