// C of the moving read, N² ≤ 1 + C ε, from its argument. A frozen read is passive: 1 − |a_f|² = Σ ρ_d e^{jωd} ≥ 0 factors as |b(e^{jω})|², and Q = θ b bᵀ + (1 − θ)
// (its reversal) completes the Gram matrix h hᵀ of one row so that rows one sample apart add up to the identity. While the delay moves by at most ε a sample, rows stand
// 1 ± ε apart; RᵀR ≤ Σ(h hᵀ + Q), whose norm is at most its largest absolute row sum. No source retrieved: derived, and computed here over every fraction and spacing.
import { describe, expect, it } from 'vitest'
import { MOVING_CONSTANT, MOVING_LIMIT } from '../../src/analysis/norms.ts'
import { tapsOf } from '../../src/dsp/interpolators.ts'
import { createRandom } from '../../src/signal/random.ts'

type Kind = 'linear' | 'lagrange3' | 'hermite4'

/** Where between both factors of the completion the proof stands; continuous in f. */
const SHARE: Record<Kind, (f: number) => number> = { linear: () => 0.5, lagrange3: () => 0.5, hermite4: (f) => 0.5 - 0.4 * (f - 0.5) }

/** h hᵀ + Q of a row with fraction f: points oldest first. */
function completed(kind: Kind, f: number): number[][] {
  const h = [...tapsOf(kind, f)].reverse()
  const apart = (d: number) => -h.reduce((sum, x, i) => sum + x * (h[i + d] ?? 0), 0)
  let b: number[]
  if (h.length === 2) {
    // 1 − |a|² = ρ1 |1 − v|² · (−1): b = √(f(1−f)) (1, −1).
    const root = Math.sqrt(Math.max(0, -apart(1)))
    b = [root, -root]
  } else {
    // 1 − |a|² = |1 − v|⁴ (c0 + 2 c1 cos ω).
    const c1 = apart(3)
    const c0 = apart(2) + 4 * c1
    const sum = Math.sqrt(Math.max(0, c0 + 2 * c1))
    const difference = Math.sqrt(Math.max(0, c0 - 2 * c1))
    const [alpha, beta] = [(sum + difference) / 2, (sum - difference) / 2]
    b = [alpha, beta - 2 * alpha, alpha - 2 * beta, beta]
  }
  const back = [...b].reverse()
  const share = SHARE[kind](f)
  return h.map((x, i) =>
    h.map((y, j) => x * y + share * (b[i] as number) * (b[j] as number) + (1 - share) * (back[i] as number) * (back[j] as number)),
  )
}

/** Largest absolute row sum at column 0 for rows at these positions (time read, in samples). */
function rowSum(kind: Kind, positions: readonly number[], table: (f: number) => number[][]): number {
  const points = kind === 'linear' ? 2 : 4
  const sums = new Float64Array(2 * points - 1)
  for (const p of positions) {
    const whole = Math.floor(p)
    const oldest = whole - (points / 2 - 1)
    if (oldest > 0 || oldest + points - 1 < 0) continue
    const m = table(1 - (p - whole))
    for (let j = 0; j < points; j++)
      sums[oldest + j + points - 1] = (sums[oldest + j + points - 1] as number) + ((m[-oldest] as number[])[j] as number)
  }
  return sums.reduce((sum, x) => sum + Math.abs(x), 0)
}

const FRACTIONS = 320
const EPSILONS = [0.001, 0.02, 0.1, 0.2, MOVING_LIMIT]

/** Largest (row sum − 1)/ε over positions of the nearest row and spacings 1 ± ε of its three neighbours on either side (64 of them). */
function largestConstant(kind: Kind, epsilon: number): number {
  let worst = 0
  for (let i = 0; i <= FRACTIONS; i++) {
    const at = (i / FRACTIONS - 0.5) * (1 + epsilon)
    for (let signs = 0; signs < 64; signs++)
      worst = Math.max(
        worst,
        rowSum(
          kind,
          neighbours(at, (k) => 1 + ((signs >> k) & 1 ? epsilon : -epsilon)),
          (f) => completed(kind, f),
        ),
      )
  }
  return (worst - 1) / epsilon
}

/** Seven positions: `at`, and three before and after it at spacings 0 to 2 and 3 to 5. */
function neighbours(at: number, spacing: (k: number) => number): number[] {
  const positions = [at]
  for (const side of [0, 3]) {
    let p = at
    for (let k = 0; k < 3; k++) {
      p += side === 0 ? -spacing(k) : spacing(3 + k)
      positions.push(p)
    }
  }
  return positions
}

describe.each(['linear', 'lagrange3', 'hermite4'] as const)('%s', (kind) => {
  it('rows one sample apart add up to the identity, whatever the fraction', () => {
    for (let i = 0; i <= 50; i++) {
      const at = i / 50
      expect(Math.abs(rowSum(kind, [at - 3, at - 2, at - 1, at, at + 1, at + 2, at + 3], (f) => completed(kind, f)) - 1)).toBeLessThan(
        1e-12,
      )
    }
  })

  it('Q is what is missing to 1 − |a|² at every frequency', () => {
    for (const f of [0, 0.1, 0.37, 0.5, 0.9]) {
      const m = completed(kind, f)
      for (let d = 0; d < m.length; d++) {
        const diagonal = m.reduce((sum, row, i) => sum + (row[i + d] ?? 0), 0)
        expect(Math.abs(diagonal - (d === 0 ? 1 : 0))).toBeLessThan(1e-12)
      }
    }
  })

  it(`C = ${MOVING_CONSTANT[kind]} covers every movement up to ε = ${MOVING_LIMIT}`, () => {
    const found = EPSILONS.map((epsilon) => largestConstant(kind, epsilon))
    // The sums are flat to 0.01 between neighbours of this grid; linear is 2 exactly at every fraction, rounding apart.
    const grid = kind === 'linear' ? -1e-9 : 0.01
    expect(Math.max(...found)).toBeLessThan((MOVING_CONSTANT[kind] as number) - grid)
    expect(Math.max(...found)).toBeGreaterThan((MOVING_CONSTANT[kind] as number) - 0.1)
  })

  it('also between the extremes: 20 000 movements drawn with seed 9', () => {
    const random = createRandom(9)
    let worst = 0
    for (let i = 0; i < 20000; i++) {
      const epsilon = MOVING_LIMIT * random()
      const at = (random() - 0.5) * (1 + epsilon)
      const sum = rowSum(
        kind,
        neighbours(at, () => 1 + epsilon * (2 * random() - 1)),
        (f) => completed(kind, f),
      )
      worst = Math.max(worst, (sum - 1 - 1e-13) / epsilon)
    }
    expect(worst).toBeLessThanOrEqual(MOVING_CONSTANT[kind] as number)
  })
})
