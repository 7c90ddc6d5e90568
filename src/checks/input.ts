// What checks are given: one object a run, so that those that share a costly figure can key it on it.
import type { ParameterSet } from '../set/types.ts'
import type { CheckInput, CheckKind, CheckMaterial } from './types.ts'

export interface CheckOptions {
  /** Hz, 8000 to 192000; the set's own when absent. */
  readonly sampleRate?: number
  readonly material?: CheckMaterial
  /** Only these kinds; all when absent. */
  readonly kinds?: readonly CheckKind[]
}

/** What checks of `set` look at. Throws RangeError for a rate out of range. */
export function checkInput(set: ParameterSet, { sampleRate = set.sampleRate, material }: CheckOptions = {}): CheckInput {
  if (!(sampleRate >= 8000 && sampleRate <= 192000)) throw new RangeError(`sampleRate must be 8000 to 192000 Hz, got ${sampleRate}`)
  return { set, sampleRate, ...(material && { material }) }
}
