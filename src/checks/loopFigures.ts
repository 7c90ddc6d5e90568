// What the four checks of the loop share, each figure computed once a run and only when asked for.
import { type SweptPole, sweptPole } from '../analysis/polesSweep.ts'
import { type Stability, stabilityWord, withNorm } from '../analysis/stability.ts'
import { quantity } from './loopText.ts'
import type { CheckInput, WorkingStep } from './types.ts'

interface Known {
  word?: Stability
  whole?: Stability
  pole?: SweptPole | null
}

const cache = new WeakMap<CheckInput, Known>()

function known(input: CheckInput): Known {
  const figures = cache.get(input) ?? {}
  cache.set(input, figures)
  return figures
}

/** The strongest word with what decides it: cheap, because a norm that cannot decide is not certified. */
export function loopWord(input: CheckInput): Stability {
  const figures = known(input)
  figures.word ??= stabilityWord(input.set, input.sampleRate)
  return figures.word
}

/** The same word with the norm of the sweep wherever one can be certified: what texts and mends of a weaker word show. */
export function loopWhole(input: CheckInput): Stability {
  const figures = known(input)
  figures.whole ??= withNorm(input.set, input.sampleRate, loopWord(input))
  return figures.whole
}

/** Largest pole for small signals over the sweep; null without a loop, or when the shaper passes no small signals. */
export function loopPole(input: CheckInput): SweptPole | null {
  const figures = known(input)
  if (figures.pole === undefined) figures.pole = figures.word?.pole ?? sweptPole(input.set, input.sampleRate)
  return figures.pole
}

/** Why there is no loop to speak of; null when there is one. */
export function noLoopReason(input: CheckInput): string | null {
  if (input.set.loop.feedback === 0) return 'No loop: feedback is 0'
  return loopWord(input).sector.bound === 0 ? 'No loop: the loop shaper lets nothing through' : null
}

/** The working where there is nothing to work out. */
export function noLoopWorking(input: CheckInput): WorkingStep[] {
  const { feedback, shaper } = input.set.loop
  const bound = loopWord(input).sector.bound
  return [
    {
      formula: 'w[n] = u[n] + g · s[n]',
      numbers: `g = ${quantity(feedback)}${shaper === null ? '' : `, σ = sup |shaper(r)/r| = ${quantity(bound)}`}`,
      result:
        feedback === 0 || bound === 0 ? 'w = u: nothing comes back' : 'nothing comes back of small signals: the shaper’s slope at 0 is 0',
      source: 'the signal path',
    },
  ]
}
