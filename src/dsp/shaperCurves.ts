// The one-sided curves k(t), t ≥ 0, k(0) = 0, their antiderivatives, and their mean over an interval, which is what
// antiderivative anti-aliasing plays. All exact; the tables of twins and C are made from these.
import type { Point, Shaper } from '../set/types.ts'

/** A curve with what shapes it: the dead zone's width, or the drawn points [t, k], t ascending from [0, 0]. */
export type CurveParameters = Pick<Shaper, 'curve' | 'deadZone' | 'points'>

/** Resistor into a Shockley pair: t − v = DIODE_I sinh(v/DIODE_V). */
const DIODE_I = 0.002
const DIODE_V = 0.12

/** v ≥ 0 with v + 0.002 sinh(v/0.12) = t. Newton from above on a convex function, so it only ever descends to the root. */
export function diodeVoltage(t: number): number {
  // Both terms are at most t, so each alone bounds v; the smaller start is within a few steps of the root.
  let v = Math.min(t, DIODE_V * Math.asinh(t / DIODE_I))
  for (let i = 0; i < 40; i++) {
    const f = v + DIODE_I * Math.sinh(v / DIODE_V) - t
    const step = f / (1 + (DIODE_I / DIODE_V) * Math.cosh(v / DIODE_V))
    v -= step
    if (Math.abs(step) <= 2e-16 * v) break
  }
  return v
}

function drawnCurve(points: readonly Point[], t: number): number {
  const count = points.length
  if (count === 0) return 0
  let i = 1
  while (i < count && (points[i] as Point)[0] < t) i++
  const [t1, k1] = points[i - 1] as Point
  if (i === count) return k1
  const [t2, k2] = points[i] as Point
  return k1 + ((k2 - k1) * (t - t1)) / (t2 - t1)
}

/** k(t) for t ≥ 0. Curves: DESIGN 4. */
export function curveValue(p: CurveParameters, t: number): number {
  switch (p.curve) {
    case 'hardClip':
      return Math.min(t, 1)
    case 'arctan':
      return (2 / Math.PI) * Math.atan((Math.PI / 2) * t)
    case 'tanh':
      return Math.tanh(t)
    case 'cubic':
      return t < 1.5 ? t - (4 * t * t * t) / 27 : 1
    case 'diode':
      return diodeVoltage(t)
    case 'deadZone':
      return Math.max(0, t - p.deadZone)
    case 'drawn':
      return drawnCurve(p.points, t)
  }
}

/** K(t) = ∫₀ᵗ k for t ≥ 0. arctan and tanh: calculus (FACTS 7); diode by parts along v; drawn by trapezia. */
export function curveIntegral(p: CurveParameters, t: number): number {
  switch (p.curve) {
    case 'hardClip':
      return t < 1 ? (t * t) / 2 : t - 0.5
    case 'arctan': {
      const u = (Math.PI / 2) * t
      return (4 / (Math.PI * Math.PI)) * (u * Math.atan(u) - Math.log1p(u * u) / 2)
    }
    case 'tanh':
      // ln cosh t, written so that it neither overflows nor loses t² near 0.
      return t < 0.01 ? (t * t) / 2 - (t * t * t * t) / 12 + t ** 6 / 45 : t + Math.log1p(Math.exp(-2 * t)) - Math.LN2
    case 'cubic':
      return t < 1.5 ? (t * t) / 2 - (t * t * t * t) / 27 : t - 0.5625
    case 'diode': {
      const v = diodeVoltage(t)
      const u = v / DIODE_V
      const half = Math.sinh(u / 2)
      return (v * v) / 2 + DIODE_I * (v * Math.sinh(u) - 2 * DIODE_V * half * half)
    }
    case 'deadZone': {
      const over = Math.max(0, t - p.deadZone)
      return (over * over) / 2
    }
    case 'drawn':
      return piecewiseIntegral(p, 0, t)
  }
}

/** Corners of the piecewise polynomial curves, in ascending t: the i-th, or Infinity past the last. */
function corner(p: CurveParameters, i: number): number {
  if (p.curve === 'drawn') return i < p.points.length ? (p.points[i] as Point)[0] : Number.POSITIVE_INFINITY
  if (i > 0) return Number.POSITIVE_INFINITY
  if (p.curve === 'hardClip') return 1
  return p.curve === 'cubic' ? 1.5 : p.deadZone
}

/** Simpson's rule over [a, b]: exact for polynomials up to the third degree. */
function simpson(p: CurveParameters, a: number, b: number): number {
  return ((b - a) * (curveValue(p, a) + 4 * curveValue(p, (a + b) / 2) + curveValue(p, b))) / 6
}

/** ∫ k over [a, b], 0 ≤ a ≤ b, of a piecewise polynomial curve of at most third degree: exact but for rounding, however short the interval. */
function piecewiseIntegral(p: CurveParameters, a: number, b: number): number {
  let sum = 0
  let from = a
  for (let i = 0; from < b; i++) {
    const to = Math.min(b, corner(p, i))
    if (to > from) {
      sum += simpson(p, from, to)
      from = to
    }
  }
  return sum
}

/** Below this width a difference of antiderivatives loses more digits than Simpson's rule does on the smooth curves. */
const SMOOTH_WIDTH = 1e-3

/** Mean of k over [a, b], 0 ≤ a ≤ b: (K(b) − K(a))/(b − a), k(a) when a = b, without the cancellation of the difference. */
export function curveMean(p: CurveParameters, a: number, b: number): number {
  const width = b - a
  // A width of a few last places is a point, and dividing by it would be noise.
  if (width <= 1e-14 * b) return curveValue(p, b)
  const smooth = p.curve === 'arctan' || p.curve === 'tanh' || p.curve === 'diode'
  if (!smooth) return piecewiseIntegral(p, a, b) / width
  if (width < SMOOTH_WIDTH) return simpson(p, a, b) / width
  return (curveIntegral(p, b) - curveIntegral(p, a)) / width
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
