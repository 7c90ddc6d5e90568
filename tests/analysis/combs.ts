// The static combs of the tables: mono, one voice, a delay of so many samples at 48 kHz; and one voice swept around 20 ms.
import type { DryTap, Interpolation, ParameterSet, SweepShape } from '../../src/set/types.ts'
import { changedSet } from '../dsp/sets.ts'

export interface Comb {
  readonly samples: number
  readonly dry?: number
  readonly wet?: number
  readonly feedback?: number
  readonly tap?: DryTap
  readonly voice?: Interpolation
  readonly loop?: Interpolation
}

export function combSet({ samples, dry = 1, wet = 1, feedback = 0, tap = 'input', voice = 'linear', loop = 'linear' }: Comb): ParameterSet {
  return changedSet((s) => {
    s.layout = 'mono'
    s.sweep.rateHz = 0
    s.sweep.depthMs = 0
    s.voices.count = 1
    s.line.baseMs = samples / 48
    s.line.interpolation = voice
    s.loop.interpolation = loop
    s.loop.feedback = feedback
    s.mix.dry = dry
    s.mix.wet = wet
    s.mix.dryTap = tap
  })
}

export function sweptSet(shape: SweepShape, depthMs: number, rateHz: number, fields: Partial<ParameterSet['sweep']> = {}): ParameterSet {
  return changedSet((s) => {
    s.layout = 'mono'
    s.voices.count = 1
    s.line.baseMs = 20
    Object.assign(s.sweep, { shape, depthMs, rateHz, updateEvery: 1, ...fields })
  })
}
