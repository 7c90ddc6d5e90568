// Stepping: what update interval and interpolator add to the wet signal that a perfect read of the true delay would not.
import type { ParameterSet } from '../set/types.ts'
import { type ArtefactBench, artefactBench, choiceOf, everySample, levelsOf, settingOf } from './artefactBench.ts'
import type { ArtefactLevels } from './artefactLevels.ts'
import { type SweepMovement, sweepMovement } from './artefactPlaces.ts'

export interface Artefacts {
  readonly movement: SweepMovement
  /** The rest is null unless the sweep moves. As the set is. */
  readonly own: ArtefactLevels | null
  /** Its interpolators alone: an update every sample. */
  readonly interpolators: ArtefactLevels | null
  /** Its updates alone: read by the reference. */
  readonly updates: ArtefactLevels | null
  /** Which of them leaves most: the voices' interpolator, the loop's, or the updates. */
  readonly blame: Blame | null
}

export type Blame = 'voices' | 'loop' | 'updates'

/** {@link artefacts} in steps: yields the part done. */
export function* artefactSteps(set: ParameterSet, sampleRate = set.sampleRate): Generator<number, Artefacts> {
  const movement = sweepMovement(set)
  if (movement !== 'moves') return { movement, own: null, interpolators: null, updates: null, blame: null }
  return yield* benchArtefacts(yield* artefactBench(set, sampleRate))
}

/** The same, on a bench that is there. */
export function* benchArtefacts(bench: ArtefactBench): Generator<number, Artefacts> {
  const setting = settingOf(bench.stage.set)
  const choice = choiceOf(setting)
  const own = yield* levelsOf(bench, choice)
  const interpolators = yield* levelsOf(bench, everySample(setting))
  const updates = yield* levelsOf(bench, { ...choice, voices: 'reference', loop: 'reference' })
  const blame = updates.db > interpolators.db ? 'updates' : (interpolators.loopDb ?? -400) > interpolators.voicesDb ? 'loop' : 'voices'
  return { movement: 'moves', own, interpolators, updates, blame }
}

/**
 * Artefacts of a valid set's updates and interpolators below its wet signal, dB, at `sampleRate` (Hz, the set's by default), overall and per octave.
 *
 * e = read − reference, where the reference reads the true D(t), evaluated every sample, by a windowed sinc of 96 taps (referenceRead.ts). In the line is
 * noise of the plucked chords' spectrum (artefactNoise.ts). What stands still in e, the interpolator's mean loss, is a filter and counts under tone.droop;
 * the rest is the artefact: 10 log10 Σ|E − H X|²/Σ|X|² over the octaves of wet (wet filters included), the larger of stretches spread over the cycle and
 * stretches where it moves fastest. A sweep that a held delay makes late in the mean is no artefact, nor is a jump without an edge. Channel 0 is measured:
 * the other makes the same sweep at other times. A moving loop's read adds what one pass leaves, by a²/(1 − a²), a = g F: passes add in power.
 * Deterministic. About a quarter of a second; {@link artefactSteps} gives way in between.
 */
export function artefacts(set: ParameterSet, sampleRate = set.sampleRate): Artefacts {
  const steps = artefactSteps(set, sampleRate)
  let step = steps.next()
  while (!step.done) step = steps.next()
  return step.value
}
