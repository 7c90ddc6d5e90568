import { type SweepDetune, sweepDetune } from '../../../../src/analysis/detune.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'

const known = new WeakMap<ParameterSet, SweepDetune>()

/** {@link sweepDetune} of a set, found once: several fields show it, and the search in it costs up to a millisecond. */
export function detuneOf(set: ParameterSet): SweepDetune {
  let found = known.get(set)
  if (!found) {
    found = sweepDetune(set)
    known.set(set, found)
  }
  return found
}
