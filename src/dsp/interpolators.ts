// Reading a line between its samples. A read at D samples takes points I − 1 … I + 2 (cubics), I … I + 1 (linear),
// floor(D + ½) (nearest) or M … M + 1 with one recursive state (allpass1).
import type { Interpolation } from '../set/types.ts'

/** Where a read takes its taps: `whole` samples ago and the `fraction` beyond, as that interpolator divides D. */
export interface SplitDelay {
  readonly whole: number
  readonly fraction: number
}

/**
 * D (samples, ≥ 0) as the read uses it. nearest: floor(D + ½), 0. allpass1: M = floor(D − ½) and d = D − M in [0.5, 1.5).
 * Others: floor D and D − floor D.
 */
export function splitDelay(kind: Interpolation, delay: number): SplitDelay {
  if (kind === 'nearest') return { whole: Math.floor(delay + 0.5), fraction: 0 }
  const whole = Math.floor(kind === 'allpass1' ? delay - 0.5 : delay)
  return { whole, fraction: delay - whole }
}

/** Distance in samples from `splitDelay().whole` to the newest tap: −1 for cubics (point I − 1), 0 for the others. */
export function firstTap(kind: Interpolation): number {
  return kind === 'lagrange3' || kind === 'hermite4' ? -1 : 0
}

/**
 * Taps on successively older points, newest first at `firstTap`: fraction f in [0, 1]. linear [1 − f, f]; lagrange3 is the
 * third-order Lagrange filter at D = 1 + f (source: Laakso, Välimäki, Karjalainen, Laine, "Splitting the Unit Delay", 1996);
 * hermite4 is Catmull-Rom (source: Niemitalo 2001, "4-point, 3rd-order Hermite"). Throws RangeError for allpass1, whose
 * read is recursive: see allpassCoefficient.
 */
export function tapsOf(kind: Interpolation, f: number): readonly number[] {
  switch (kind) {
    case 'nearest':
      return [1]
    case 'linear':
      return [1 - f, f]
    case 'lagrange3':
      return [(-f * (f - 1) * (f - 2)) / 6, ((f + 1) * (f - 1) * (f - 2)) / 2, (-(f + 1) * f * (f - 2)) / 2, ((f + 1) * f * (f - 1)) / 6]
    case 'hermite4':
      return [((-f + 2) * f - 1) * f * 0.5, (3 * f - 5) * f * f * 0.5 + 1, ((-3 * f + 4) * f + 1) * f * 0.5, (f - 1) * f * f * 0.5]
    case 'allpass1':
      throw new RangeError('allpass1 reads recursively and has no taps; use allpassCoefficient')
  }
}

/**
 * η = (1 − d)/(1 + d) of the first-order Thiran all-pass y[n] = η x[n] + x[n−1] − η y[n−1], d in [0.5, 1.5) samples: η in (−0.2, ⅓].
 * Exact delay at DC, |H| = 1 everywhere. Source: J. O. Smith, PASP, "First-Order Allpass Interpolation"; the range of d is our choice of the two published.
 */
export function allpassCoefficient(d: number): number {
  return (1 - d) / (1 + d)
}
