// What the four checks of the loop share, computed once a run.
import { type SweptPole, sweptPole } from '../analysis/polesSweep.ts'
import { type Stability, stability } from '../analysis/stability.ts'
import type { CheckInput } from './types.ts'

export interface LoopFigures {
  readonly stability: Stability
  /** Largest pole for small signals over the sweep; null without a loop, or when the shaper passes no small signals. */
  readonly pole: SweptPole | null
}

const cache = new WeakMap<CheckInput, LoopFigures>()

export function loopFigures(input: CheckInput): LoopFigures {
  const known = cache.get(input)
  if (known) return known
  const { set, sampleRate } = input
  const word = stability(set, sampleRate)
  const figures = { stability: word, pole: word.pole ?? sweptPole(set, sampleRate) }
  cache.set(input, figures)
  return figures
}

/** Why there is no loop to speak of; null when there is one. */
export function noLoopReason({ set }: CheckInput, { stability: { sector } }: LoopFigures): string | null {
  if (set.loop.feedback === 0) return 'No loop: feedback is 0'
  return sector.bound === 0 ? 'No loop: the loop shaper lets nothing through' : null
}
