// One interpolated read with its delay held: a short rational function behind whole samples of delay.
// Invariant: every kind is  A(z) = z^-first · Σ taps[k] z^-k / (1 + pole z^-1),  pole = 0 but for allpass1.
import { allpassCoefficient, firstTap, splitDelay, tapsOf } from '../dsp/interpolators.ts'
import type { Interpolation } from '../set/types.ts'

export interface FrozenRead {
  readonly kind: Interpolation
  /** The delay read, in samples. `nearest` reads the nearest whole one. */
  readonly delaySamples: number
  /** Whole samples before the first tap. */
  readonly first: number
  /** One to four taps, at first, first + 1, … samples. */
  readonly taps: readonly number[]
  /** All-pass coefficient η of allpass1 (pole at −η); 0 for the others. */
  readonly pole: number
}

/** The read of `delaySamples` by `kind` as the engine does it (DESIGN 3). Throws RangeError for a delay that is not finite. */
export function frozenRead(kind: Interpolation, delaySamples: number): FrozenRead {
  if (!Number.isFinite(delaySamples)) throw new RangeError(`delaySamples must be finite, got ${delaySamples}`)
  const { whole, fraction } = splitDelay(kind, delaySamples)
  const first = whole + firstTap(kind)
  if (kind !== 'allpass1') return { kind, delaySamples, first, taps: tapsOf(kind, fraction), pole: 0 }
  const eta = allpassCoefficient(fraction)
  return { kind, delaySamples, first, taps: [eta, 1], pole: eta }
}
