// A comb that stands still, as the references describe it: one voice, one line, everything else at its default.
import type { DryTap, Interpolation, ParameterSet } from '../../src/set/types.ts'
import { changedSet } from '../dsp/sets.ts'

export interface StandingComb {
  readonly samples: number
  readonly feedback: number
  readonly dry: number
  readonly wet: number
  readonly tap: DryTap
  readonly damping: number | null
  readonly lowCut: number | null
  readonly highCut: number | null
  readonly wetLowCut: number | null
}

export interface CombReads {
  readonly voice: Interpolation
  readonly loop: Interpolation
  /** Samples. */
  readonly dryDelay?: number
}

export const standingComb = (comb: StandingComb, { voice, loop, dryDelay = 0 }: CombReads, sampleRate: number): ParameterSet =>
  changedSet((s) => {
    s.layout = 'mono'
    s.sampleRate = sampleRate
    s.sweep.rateHz = 0
    s.sweep.depthMs = 0
    s.voices.count = 1
    s.line.baseMs = (comb.samples * 1000) / sampleRate
    s.line.interpolation = voice
    s.loop.interpolation = loop
    s.loop.feedback = comb.feedback
    s.loop.dampingHz = comb.damping
    s.loop.lowCutHz = comb.lowCut
    s.mix.dry = comb.dry
    s.mix.wet = comb.wet
    s.mix.dryTap = comb.tap
    s.mix.dryDelayMs = (dryDelay * 1000) / sampleRate
    s.mix.wetHighCutHz = comb.highCut
    s.mix.wetLowCutHz = comb.wetLowCut
  })
