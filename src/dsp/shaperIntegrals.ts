// Antiderivatives K(t) = ∫₀ᵗ k of the one-sided curves, t ≥ 0. arctan and tanh: calculus (FACTS 7); diode by parts along its voltage. In
// place on arrays, like the curves.
import type { Point } from '../set/types.ts'
import { type CurveParameters, DIODE_I, DIODE_V, diodeVoltages } from './shaperCurves.ts'

export function arctanIntegrals(x: Float64Array, at: number, n: number): void {
  for (let i = at; i < at + n; i++) {
    const u = (Math.PI / 2) * x[i]!
    x[i] = (4 / (Math.PI * Math.PI)) * (u * Math.atan(u) - Math.log1p(u * u) / 2)
  }
}

/** ln cosh t, written so that it neither overflows nor loses t² near 0. */
export function tanhIntegrals(x: Float64Array, at: number, n: number): void {
  for (let i = at; i < at + n; i++) {
    const t = x[i]!
    const tt = t * t
    x[i] = t < 0.01 ? tt / 2 - (tt * tt) / 12 + (tt * tt * tt) / 45 : t + Math.log1p(Math.exp(-2 * t)) - Math.LN2
  }
}

/** ∫ v dt from 0 along t = v + 0.002 sinh(v/0.12), of voltages, not of t. */
export function diodeIntegrals(x: Float64Array, at: number, n: number): void {
  for (let i = at; i < at + n; i++) {
    const v = x[i]!
    const half = Math.sinh(v / (2 * DIODE_V))
    x[i] = (v * v) / 2 + DIODE_I * (v * Math.sinh(v / DIODE_V) - 2 * DIODE_V * half * half)
  }
}

/** ∫ k from x[at] to x[at + 1], 0 ≤ x[at] ≤ x[at + 1], into x[at]: trapezia between the points, and what is held after the last. */
export function drawnIntegral(points: readonly Point[], x: Float64Array, at: number): void {
  const a = x[at]!
  const b = x[at + 1]!
  const last = points.length - 1
  let sum = 0
  for (let i = 0; i <= last; i++) {
    const t = points[i]![0]
    const from = Math.max(a, t)
    const to = i < last ? Math.min(b, points[i + 1]![0]) : b
    if (to <= from) continue
    const slope = i < last ? (points[i + 1]![1] - points[i]![1]) / (points[i + 1]![0] - t) : 0
    sum += (to - from) * (points[i]![1] + slope * ((from - t + to - t) / 2))
  }
  x[at] = sum
}

const pair = new Float64Array(2)

/** K(t), t ≥ 0. */
export function curveIntegral(p: CurveParameters, t: number): number {
  const over = Math.max(0, t - p.deadZone)
  pair[0] = t
  switch (p.curve) {
    case 'hardClip':
      return t < 1 ? (t * t) / 2 : t - 0.5
    case 'cubic':
      return t < 1.5 ? (t * t) / 2 - (t * t * t * t) / 27 : t - 0.5625
    case 'deadZone':
      return (over * over) / 2
    case 'arctan':
      arctanIntegrals(pair, 0, 1)
      break
    case 'tanh':
      tanhIntegrals(pair, 0, 1)
      break
    case 'diode':
      diodeVoltages(pair, 0, 1)
      diodeIntegrals(pair, 0, 1)
      break
    case 'drawn':
      pair[0] = 0
      pair[1] = t
      drawnIntegral(p.points, pair, 0)
      break
  }
  return pair[0]
}
