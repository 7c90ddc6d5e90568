// Norms of what stands in the loop: how much the interpolated read and the loop filters can raise a peak (∞) or an energy (2).
import type { Interpolation } from '../set/types.ts'
import type { FrozenTone } from './frozen.ts'
import { type LoopLine, logGain, logGainResult } from './loopLine.ts'
import { goldenMaximum, localMaxima } from './loopSearch.ts'
import { loopAngles } from './polesWinding.ts'

/**
 * ρ∞, the largest Σ|h_k| of a read over all fractions: what it can make of a peak of 1, however it moves. Convex reads 1; cubics 1 + f(1−f) ≤ 1.25
 * (FACTS 3); allpass1, its state included, (1+|η|)/(1−|η|) ≤ 2 at η = ⅓.
 */
export const READ_PEAK: Readonly<Record<Interpolation, number>> = { nearest: 1, linear: 1, lagrange3: 1.25, hermite4: 1.25, allpass1: 2 }

/**
 * C in N² ≤ 1 + C ε: the largest energy gain of a read whose delay changes by at most ε ≤ MOVING_LIMIT samples a sample, in any manner. null: no such
 * bound is known. The argument, and C computed from it: tests/analysis/movingReadConstant.test.ts.
 */
export const MOVING_CONSTANT: Readonly<Record<Interpolation, number | null>> = {
  nearest: null,
  linear: 2,
  lagrange3: 2.25,
  hermite4: 2.05,
  allpass1: null,
}
export const MOVING_LIMIT = 0.3

/** (b^n − a^n)/(b − a) for a, b in (0, 1), without cancellation where they are close. */
function powerQuotient(a: number, b: number, n: number): number {
  const q = (b - a) / a
  return q === 0 ? n * a ** (n - 1) : (a ** (n - 1) * Math.expm1(n * Math.log1p(q))) / q
}

/**
 * ‖f‖₁ = Σ|f[n]| of damping and low cut in series, in closed form, so that no tail is left: low-pass 1; high-pass 1 + b; both: f changes sign
 * once and sums to 0, so it is twice the peak of the step response K (aⁿ − bⁿ)/(a − b), K = (1−a)(1+b)/2.
 */
export function toneL1({ lowPass: a, highPass: b }: FrozenTone): number {
  if (b === null) return 1
  if (a === null) return 1 + b
  const k = ((1 - a) * (1 + b)) / 2
  const ratio = Math.log(b / a)
  const turn = Math.abs(ratio) < 1e-12 ? -1 / Math.log(a) : Math.log((1 - a) / (1 - b)) / ratio
  const start = Math.max(1, Math.floor(turn))
  let peak = 0
  for (let n = Math.max(1, start - 1); n <= start + 2; n++) peak = Math.max(peak, k * powerQuotient(a, b, n))
  return 2 * peak
}

/** max|F| over frequency of damping and low cut in series: 1 alone; both: at cos ω = 1 − (1−a)(1−b)/(2√(ab)), held at fs/2. */
export function toneMax({ lowPass: a, highPass: b }: FrozenTone): number {
  if (a === null || b === null) return 1
  const c = Math.max(-1, 1 - ((1 - a) * (1 - b)) / (2 * Math.sqrt(a * b)))
  const low = (1 - a) ** 2 / ((1 - a) ** 2 + 2 * a * (1 - c))
  const high = ((1 + b) ** 2 * (1 - c)) / (2 * ((1 - b) ** 2 + 2 * b * (1 - c)))
  return Math.sqrt(low * high)
}

const scratch = logGainResult()

/** max|L| over frequency of one frozen line, as a linear gain, and the angle (rad) where it is. */
export function lineMax(line: LoopLine): { value: number; theta: number } {
  const ln = (theta: number) => logGain(line, 0, theta, scratch).ln
  const grid = loopAngles(line.delay)
  const values = grid.map(ln)
  let best = { value: Number.NEGATIVE_INFINITY, at: 0 }
  for (const i of localMaxima(values).slice(0, 4)) {
    const top = goldenMaximum(ln, grid[Math.max(0, i - 1)] as number, grid[Math.min(grid.length - 1, i + 1)] as number, 1e-9)
    for (const point of [top, { value: values[i] as number, at: grid[i] as number }]) if (point.value > best.value) best = point
  }
  return { value: Math.exp(best.value), theta: best.at }
}
