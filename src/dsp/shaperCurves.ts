// The one-sided curves k(t), t ≥ 0, k(0) = 0, exact; the tables of twins and C are made from these.
//
// They work in place on arrays: a number handed to or from a function that the machine does not inline is boxed, which allocates, and the
// audio thread must not.
import type { Point, Shaper } from '../set/types.ts'

/** A curve with what shapes it: the dead zone's width, or the drawn points [t, k], t ascending from [0, 0]. */
export type CurveParameters = Pick<Shaper, 'curve' | 'deadZone' | 'points'>

/** Resistor into a Shockley pair: t − v = DIODE_I sinh(v/DIODE_V). */
export const DIODE_I = 0.002
export const DIODE_V = 0.12

/** x[at … at + n), each ≥ 0, become k of themselves. Curves: DESIGN 4. */
export function applyCurve(p: CurveParameters, x: Float64Array, at: number, n: number): void {
  const end = at + n
  switch (p.curve) {
    case 'hardClip':
      for (let i = at; i < end; i++) x[i] = Math.min(x[i]!, 1)
      break
    case 'arctan':
      for (let i = at; i < end; i++) x[i] = (2 / Math.PI) * Math.atan((Math.PI / 2) * x[i]!)
      break
    case 'tanh':
      for (let i = at; i < end; i++) x[i] = Math.tanh(x[i]!)
      break
    case 'cubic':
      for (let i = at; i < end; i++) x[i] = x[i]! < 1.5 ? x[i]! - (4 * x[i]! * x[i]! * x[i]!) / 27 : 1
      break
    case 'diode':
      diodeVoltages(x, at, n)
      break
    case 'deadZone':
      for (let i = at; i < end; i++) x[i] = Math.max(0, x[i]! - p.deadZone)
      break
    case 'drawn':
      drawnCurve(p.points, x, at, n)
      break
  }
}

const one = new Float64Array(1)

/** k(t) for t ≥ 0. */
export function curveValue(p: CurveParameters, t: number): number {
  one[0] = t
  applyCurve(p, one, 0, 1)
  return one[0]
}

/** Each t ≥ 0 becomes the v ≥ 0 with v + 0.002 sinh(v/0.12) = t. Newton from above on a convex function, so it only ever descends to the root. */
export function diodeVoltages(x: Float64Array, at: number, n: number): void {
  for (let i = at; i < at + n; i++) {
    const t = x[i]!
    // Both terms are at most t, so each alone bounds v; the smaller start is within a few steps of the root.
    let v = Math.min(t, DIODE_V * Math.asinh(t / DIODE_I))
    for (let k = 0; k < 40; k++) {
      const step = (v + DIODE_I * Math.sinh(v / DIODE_V) - t) / (1 + (DIODE_I / DIODE_V) * Math.cosh(v / DIODE_V))
      v -= step
      if (Math.abs(step) <= 2e-16 * v) break
    }
    x[i] = v
  }
}

/** Each t becomes k on straight lines through the points; the last k held; no points: 0. */
function drawnCurve(points: readonly Point[], x: Float64Array, at: number, n: number): void {
  const count = points.length
  for (let i = at; i < at + n; i++) {
    const t = x[i]!
    let k = 1
    while (k < count && points[k]![0] < t) k++
    if (count === 0) x[i] = 0
    else if (k === count) x[i] = points[k - 1]![1]
    else x[i] = points[k - 1]![1] + ((points[k]![1] - points[k - 1]![1]) * (t - points[k - 1]![0])) / (points[k]![0] - points[k - 1]![0])
  }
}

/** k'(0+): slope of the curve for the smallest signals. */
export function curveSlopeAtZero(p: CurveParameters): number {
  switch (p.curve) {
    case 'diode':
      return 1 / (1 + DIODE_I / DIODE_V)
    case 'deadZone':
      return p.deadZone > 0 ? 0 : 1
    case 'drawn':
      return p.points.length > 1 ? (p.points[1] as Point)[1] / (p.points[1] as Point)[0] : 0
    default:
      return 1
  }
}

/** sup |k(t)|/t over t > 0. The concave curves and the dead zone's asymptote give 1 (diode: its slope at 0); drawn: at one of its corners. */
export function curveSectorBound(p: CurveParameters): number {
  if (p.curve === 'diode') return curveSlopeAtZero(p)
  if (p.curve !== 'drawn') return 1
  let bound = 0
  for (let i = 1; i < p.points.length; i++) {
    const [t, k] = p.points[i] as Point
    bound = Math.max(bound, Math.abs(k) / t)
  }
  return bound
}
