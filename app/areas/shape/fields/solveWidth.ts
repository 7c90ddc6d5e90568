// Width in cents to depth: the depth at which the sweep, as it is read, bends pitch by so much either way at most.
import { sweepDetune } from '../../../../src/analysis/detune.ts'
import { parameter } from '../../../../src/set/parameters.ts'
import { withAt } from '../../../../src/set/path.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'

export const depthPath = (set: ParameterSet): 'sweep.depthMs' | 'sweep.depthOctaves' =>
  set.sweep.law === 'time' ? 'sweep.depthMs' : 'sweep.depthOctaves'

const STEPS = 40

/** Depth (ms or octaves by the set's law) whose largest detune is `cents` ≥ 0, within a billionth of the range; null when no depth in range reaches it. */
export function solveWidth(set: ParameterSet, cents: number): number | null {
  if (cents === 0) return 0
  const path = depthPath(set)
  const row = parameter(path)
  if (!('min' in row)) return null
  const reaches = (depth: number) => {
    const { maxCents } = sweepDetune(withAt(set, path, depth))
    return maxCents === null || maxCents >= cents
  }
  let low = 0
  let high = row.max
  if (!reaches(high)) return null
  for (let i = 0; i < STEPS; i++) {
    const middle = (low + high) / 2
    if (reaches(middle)) high = middle
    else low = middle
  }
  return Number(high.toPrecision(6))
}
