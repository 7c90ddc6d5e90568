// Single changes that bring a level inside the headroom, each tried: less gain into the line or out of it, less feedback, less wet.
import { levelFigures } from '../analysis/levels.ts'
import { largestGainBound } from '../analysis/levelsSearch.ts'
import { lineAsOutput } from '../analysis/levelsSet.ts'
import { type NumberParameter, parameter } from '../set/parameters.ts'
import { getAt, withAt } from '../set/path.ts'
import type { ParameterSet } from '../set/types.ts'
import { type LevelPlace, levelStatus, levelsOf } from './levelStatus.ts'
import type { Limit } from './limits.ts'
import { quantity } from './loopText.ts'
import type { CheckInput, Mend } from './types.ts'

/** Times a smaller value is tried before a field is given up. */
const TRIES = 3

export function levelMends(input: CheckInput, place: LevelPlace, limit: Limit): Mend[] {
  const { set } = input
  const level = levelsOf(input)[place]
  const top = limit.limit ?? 0
  const over = level.db === null ? null : Math.max(level.db - (top - limit.margin), (level.sampleDb ?? level.db + limit.margin) - top)
  const holds = (changed: ParameterSet) => levelStatus(limit, levelFigures(changed, input.sampleRate)[place]) === 'holds'
  const trims =
    over === null
      ? []
      : [
          { path: 'input.gainDb', label: 'Input gain' },
          ...(place === 'peak' ? [{ path: 'mix.outputGainDb', label: 'Output gain' }] : []),
        ].flatMap(({ path, label }) => {
          const value = trimmed(set, path, over)
          return value !== null && holds(withAt(set, path, value)) ? [{ label: `${label} ${quantity(value, 'dB')}`, path, value }] : []
        })
  const fields = [
    ...(set.loop.feedback === 0 ? [] : [{ path: 'loop.feedback', label: 'Feedback' }]),
    ...(place === 'peak' && set.mix.wet !== 0 ? [{ path: 'mix.wet', label: 'Wet' }] : []),
  ]
  return [
    ...trims,
    ...fields.flatMap(({ path, label }) => smaller(input, { path, label, place, limit, over: over ?? limit.margin }, holds)),
  ]
}

/** The gain less what is over, to a tenth of a dB; null below the parameter's range. */
function trimmed(set: ParameterSet, path: string, over: number): number | null {
  const value = Math.floor(((getAt(set, path) as number) - over) * 10 - 0.1) / 10
  return value >= (parameter(path) as NumberParameter).min ? value : null
}

interface Field {
  readonly path: string
  readonly label: string
  readonly place: LevelPlace
  readonly limit: Limit
  /** dB to lose. */
  readonly over: number
}

/** The largest part of a field's value, to two places, at which the bound has lost enough; less where that does not do. */
function smaller(
  { set, sampleRate }: CheckInput,
  { path, label, place, limit, over }: Field,
  holds: (set: ParameterSet) => boolean,
): Mend[] {
  const now = getAt(set, path) as number
  const at = (part: number) => withAt(set, path, now * part)
  const boundDb = (changed: ParameterSet) =>
    20 * Math.log10(largestGainBound(place === 'line' ? lineAsOutput(changed) : changed, sampleRate))
  const start = boundDb(set)
  const wanted = Number.isFinite(start) ? start - over : (limit.limit ?? 0) - limit.margin
  let [low, high] = [0, 1]
  for (let i = 0; i < 20; i++) {
    const middle = (low + high) / 2
    if (boundDb(at(middle)) <= wanted) low = middle
    else high = middle
  }
  for (let part = low, tries = 0; tries < TRIES; tries++, part *= 0.85) {
    const value = Math.sign(now) * (Math.floor(Math.abs(now) * part * 100) / 100)
    if (value === 0) return []
    if (holds(withAt(set, path, value))) return [{ label: `${label} ${quantity(value)}`, path, value }]
  }
  return []
}
