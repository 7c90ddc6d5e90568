// Width in cents to depth: the depth at which the sweep, as it is read, bends pitch by so much either way at most.
import { sweepDetune } from '../../../../src/analysis/detune.ts'
import { parameter } from '../../../../src/set/parameters.ts'
import { withAt } from '../../../../src/set/path.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'

export const depthPath = (set: ParameterSet): 'sweep.depthMs' | 'sweep.depthOctaves' =>
  set.sweep.law === 'time' ? 'sweep.depthMs' : 'sweep.depthOctaves'

const STEPS = 40
const DIGITS = 6

/** Depth (ms or octaves by the set's law) whose largest detune is `cents` ≥ 0, to six digits; null when no depth in range reaches it. */
export function solveWidth(set: ParameterSet, cents: number): number | null {
  if (cents === 0) return 0
  const row = parameter(depthPath(set))
  if (row.kind !== 'number') return null
  const depth = set.sweep.law === 'time' ? proportional(set, cents) : bisected(set, cents, row.max)
  return depth === null || depth > row.max ? null : Number(depth.toPrecision(DIGITS))
}

/** Law time: slopes grow with the depth. Down it takes dτ/dt = 1 − 2^(−cents/1200), up −dτ/dt = 2^(cents/1200) − 1; the first reached counts. */
function proportional(set: ParameterSet, cents: number): number | null {
  const { maxSlope, minSlope } = sweepDetune(withAt(set, 'sweep.depthMs', 1))
  const down = (1 - 2 ** (-cents / 1200)) / maxSlope
  const up = (2 ** (cents / 1200) - 1) / -minSlope
  const depth = Math.min(maxSlope > 0 ? down : Number.POSITIVE_INFINITY, minSlope < 0 ? up : Number.POSITIVE_INFINITY)
  return Number.isFinite(depth) ? depth : null
}

/** Law ratio: the detune still grows with the depth. */
function bisected(set: ParameterSet, cents: number, most: number): number | null {
  const reaches = (depth: number) => {
    const { maxCents } = sweepDetune(withAt(set, 'sweep.depthOctaves', depth))
    return maxCents === null || maxCents >= cents
  }
  if (!reaches(most)) return null
  let low = 0
  let high = most
  for (let i = 0; i < STEPS; i++) {
    const middle = (low + high) / 2
    if (reaches(middle)) high = middle
    else low = middle
  }
  return high
}
