// What no single field shows: problems between the fields of a set whose values each stand in their own range.
import { closeReads } from './closeReads.ts'
import { drawnProblems } from './drawnPoints.ts'
import { limitProblems } from './limitKeys.ts'
import { panelProblems } from './panelProblems.ts'
import type { Problem } from './result.ts'
import type { ParameterSet } from './types.ts'

/**
 * Problems between fields: drawn curves without their points, panel moves that point nowhere, limits of no check, and reads closer to the write
 * point than an interpolator can, at `sampleRate` in Hz (default the set's). Empty when the set is valid. Each field's own range is the schema's.
 */
export function setProblems(set: ParameterSet, sampleRate = set.sampleRate): Problem[] {
  const drawn = drawnProblems(set)
  // Without its points a drawn sweep has no range to judge.
  const reads = drawn.some((problem) => problem.path.startsWith('sweep')) ? [] : closeReads(set, sampleRate)
  return [...drawn, ...panelProblems(set), ...limitProblems(set.limits), ...reads]
}
