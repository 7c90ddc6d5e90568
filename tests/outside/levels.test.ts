// Oracle: scipy.signal.freqz refined by scipy.optimize, scipy.signal.lfilter's impulse response, numpy's FFT of the taps, all in levels.py.
import { describe, expect, it } from 'vitest'
import { levelFigures } from '../../src/analysis/levels.ts'
import { changedSet } from '../dsp/sets.ts'
import { itIsMadeAgain, reference } from './reference.ts'
import { type StandingComb, standingComb } from './standingComb.ts'

interface Still extends StandingComb {
  readonly read: 'linear' | 'lagrange3'
}

interface Swept extends Pick<Still, 'read' | 'samples' | 'dry' | 'wet' | 'wetLowCut'> {
  readonly depth: number
  readonly voices: number
}

interface Made {
  readonly sampleRate: number
  readonly still: readonly { case: Still; peak: number; line: number; peakL1: number; lineL1: number }[]
  readonly swept: readonly { case: Swept; peak: number }[]
}

const made = reference<Made>('levels')
const db = (gain: number) => 20 * Math.log10(gain)

const stillSet = (comb: Still) => standingComb(comb, { voice: comb.read, loop: comb.read }, made.sampleRate)

describe.each(made.still.map((c, i) => [i, c] as const))('still comb %i', (_, { case: comb, peak, line, peakL1, lineL1 }) => {
  const figures = levelFigures(stillSet(comb))

  it('has the worst gain of freqz at the output and in the line, within 0.01 dB', () => {
    expect(Math.abs((figures.peak.db ?? 0) - db(peak))).toBeLessThan(0.01)
    expect(Math.abs((figures.line.db ?? 0) - db(line))).toBeLessThan(0.01)
  })

  it('has the l1 norm of lfilter’s impulse response between what was run and its bound, 0.02 dB apart', () => {
    for (const [norm, l1] of [
      [figures.peak.l1!, peakL1],
      [figures.line.l1!, lineL1],
    ] as const) {
      expect(norm.sum).toBeLessThanOrEqual(l1 * (1 + 1e-9))
      expect(norm.bound).toBeGreaterThanOrEqual(l1 * (1 - 1e-9))
      expect(db(norm.bound! / norm.sum)).toBeLessThan(0.02)
    }
  })
})

describe.each(made.swept.map((c, i) => [i, c] as const))('swept comb %i', (_, { case: comb, peak }) => {
  // numpy looks at 600 positions and 32 769 frequencies; between them there may be a little more.
  it('comes within 0.05 dB of the largest of numpy’s transforms, and no more than 0.1 dB above it', () => {
    const set = changedSet((s) => {
      s.layout = 'mono'
      s.sweep.rateHz = 0.3
      s.sweep.depthMs = (comb.depth * 1000) / made.sampleRate
      s.line.baseMs = (comb.samples * 1000) / made.sampleRate
      s.line.interpolation = comb.read
      s.voices.count = comb.voices
      s.voices.spreadMs = 0
      s.mix.dry = comb.dry
      s.mix.wet = comb.wet
      s.mix.wetLowCutHz = comb.wetLowCut
    })
    const found = levelFigures(set).peak.db!
    expect(found).toBeGreaterThan(db(peak) - 0.05)
    expect(found).toBeLessThan(db(peak) + 0.1)
  })
})

itIsMadeAgain('levels', 1e-6)
