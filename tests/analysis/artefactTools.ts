// What the tests of artefacts share.
import { type ArtefactBench, artefactBench, levelsOf } from '../../src/analysis/artefactBench.ts'
import type { ArtefactLevels } from '../../src/analysis/artefactLevels.ts'
import type { ReadChoice } from '../../src/analysis/artefactMeasure.ts'
import { NOISE_PERIOD } from '../../src/analysis/artefactNoise.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { changedSet } from '../dsp/sets.ts'

export function drain<T>(steps: Generator<number, T>): T {
  let step = steps.next()
  while (!step.done) step = steps.next()
  return step.value
}

export const benchOf = (set: ParameterSet, material?: Float64Array): ArtefactBench => drain(artefactBench(set, set.sampleRate, material))

export const levels = (bench: ArtefactBench, choice: ReadChoice): ArtefactLevels => drain(levelsOf(bench, choice))

/** One voice, no loop, a sine of 240 ± 48 samples once a second at 48 kHz. */
export const oneVoice = (change: Parameters<typeof changedSet>[0] = () => {}) =>
  changedSet((set) => {
    set.layout = 'mono'
    set.voices.count = 1
    set.line.baseMs = 5
    set.sweep.depthMs = 1
    set.sweep.rateHz = 1
    set.sweep.updateEvery = 1
    change(set)
  })

/** cos of `bin` cycles in a period of the material. */
export const tone = (bin: number): Float64Array =>
  Float64Array.from({ length: NOISE_PERIOD }, (_, n) => Math.cos((2 * Math.PI * ((bin * n) % NOISE_PERIOD)) / NOISE_PERIOD))
