// Oracle: scipy.signal.freqz and group_delay on polynomials built in response_scipy.py, taps from scipy.interpolate.lagrange and numpy.linalg.
import { describe, expect, it } from 'vitest'
import { freeze } from '../../src/analysis/frozen.ts'
import { frozenResponse } from '../../src/analysis/response.ts'
import type { DryTap, Interpolation } from '../../src/set/types.ts'
import { changedSet } from '../dsp/sets.ts'
import { itIsMadeAgain, reference } from './reference.ts'

interface Comb {
  readonly voice: Interpolation
  readonly loop: Interpolation
  readonly samples: number
  readonly feedback: number
  readonly dry: number
  readonly wet: number
  readonly tap: DryTap
  readonly dryDelay: number
  readonly damping: number | null
  readonly lowCut: number | null
  readonly highCut: number | null
  readonly wetLowCut: number | null
}

interface Made {
  readonly sampleRate: number
  readonly cases: readonly { case: Comb; hz: number[]; re: number[]; im: number[]; groupDelay: number[] }[]
}

const made = reference<Made>('response_scipy')

const combSet = (comb: Comb) =>
  changedSet((s) => {
    s.layout = 'mono'
    s.sampleRate = made.sampleRate
    s.sweep.rateHz = 0
    s.sweep.depthMs = 0
    s.voices.count = 1
    s.line.baseMs = (comb.samples * 1000) / made.sampleRate
    s.line.interpolation = comb.voice
    s.loop.interpolation = comb.loop
    s.loop.feedback = comb.feedback
    s.loop.dampingHz = comb.damping
    s.loop.lowCutHz = comb.lowCut
    s.mix.dry = comb.dry
    s.mix.wet = comb.wet
    s.mix.dryTap = comb.tap
    s.mix.dryDelayMs = (comb.dryDelay * 1000) / made.sampleRate
    s.mix.wetHighCutHz = comb.highCut
    s.mix.wetLowCutHz = comb.wetLowCut
  })

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
