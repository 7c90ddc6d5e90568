// Oracle: scipy.signal.freqz and group_delay on polynomials built in response_scipy.py, taps from scipy.interpolate.lagrange and numpy.linalg.
import { describe, expect, it } from 'vitest'
import { freeze } from '../../src/analysis/frozen.ts'
import { frozenResponse } from '../../src/analysis/response.ts'
import { itIsMadeAgain, reference } from './reference.ts'
import { type CombReads, type StandingComb, standingComb } from './standingComb.ts'

type Comb = StandingComb & Required<CombReads>

interface Made {
  readonly sampleRate: number
  readonly cases: readonly { case: Comb; hz: number[]; re: number[]; im: number[]; groupDelay: number[] }[]
}

const made = reference<Made>('response_scipy')

const combSet = (comb: Comb) => standingComb(comb, comb, made.sampleRate)

describe.each(made.cases.map((c, i) => [i, c] as const))('comb %i', (_, { case: comb, hz, re, im, groupDelay }) => {
  const response = frozenResponse(freeze(combSet(comb), 0), hz)[0]!

  it('has the response of freqz within 1e-9', () => {
    const scale = Math.max(...re.map((value, i) => Math.hypot(value, im[i]!)))
    hz.forEach((_, i) => {
      expect(Math.abs(response.re[i]! - re[i]!)).toBeLessThan(1e-9 * scale)
      expect(Math.abs(response.im[i]! - im[i]!)).toBeLessThan(1e-9 * scale)
      expect(response.phaseRad[i]).toBeCloseTo(Math.atan2(response.im[i]!, response.re[i]!), 12)
    })
  })

  // scipy multiplies numerator and denominator out, which costs it five digits with two low cuts (numpy's long double agrees with ours there).
  it('has the group delay of group_delay within 3e-5 of it', () => {
    hz.forEach((_, i) => {
      // Next to a null scipy gives up and says 0.
      if (Math.hypot(re[i]!, im[i]!) < 1e-6) return
      expect(Math.abs(response.groupDelaySamples[i]! - groupDelay[i]!)).toBeLessThan(3e-5 * Math.max(1, Math.abs(groupDelay[i]!)))
    })
  })
})

itIsMadeAgain('response_scipy', 1e-7)
