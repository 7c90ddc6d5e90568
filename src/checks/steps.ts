// A check comes at once or in steps: the one way to run either to its end.
import type { Check, CheckSteps } from './types.ts'

const isSteps = (begun: Check | CheckSteps): begun is CheckSteps => 'next' in begun

/** The check that was begun, once it is done; yields at each step what `at` makes of its part done, 0 to 1. */
export function* finished<Progress>(begun: Check | CheckSteps, at: (part: number) => Progress): Generator<Progress, Check> {
  if (!isSteps(begun)) return begun
  let step = begun.next()
  for (; !step.done; step = begun.next()) yield at(step.value)
  return step.value
}
