// Second changes that would make a typed value possible, each tried before it is offered.
import { withoutAbsent } from '../../src/set/panelEdit.ts'
import { getAt, withAt } from '../../src/set/path.ts'
import type { Problem } from '../../src/set/result.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { setProblems } from '../../src/set/validity.ts'

export interface Change {
  readonly path: string
  readonly value: number | string
}

export interface Offer {
  /** Another value for the field itself, or changes beside it. */
  readonly instead: boolean
  readonly changes: readonly Change[]
  readonly set: ParameterSet
  /** Its button's words, where the changes are of no field. */
  readonly words?: string
}

/** Fields that mend by growing; the others mend by shrinking. */
const GROWS = new Set(['line.baseMs'])

/** Offers for a set that became invalid when the field at `path` was typed, from what its problems say would mend them. */
export function offersFor(set: ParameterSet, path: string, problems: readonly Problem[]): readonly Offer[] {
  const rid = withoutAbsent(set)
  if (rid !== set && setProblems(rid).length === 0) return [{ instead: false, changes: [], set: rid, words: 'Also take it off the panel' }]
  const byPath = new Map<string, number | string>()
  for (const mend of problems.flatMap((problem) => problem.mends ?? [])) {
    const before = byPath.get(mend.path)
    const value =
      typeof before === 'number' && typeof mend.value === 'number'
        ? (GROWS.has(mend.path) ? Math.max : Math.min)(before, mend.value)
        : mend.value
    byPath.set(mend.path, value)
  }
  const offers = [...byPath].map(([mendPath, value]) => offer(set, path, { path: mendPath, value })).filter((one) => one !== null)
  if (offers.some((one) => !one.instead)) return offers
  const both = shrinkBoth(set, path)
  return both ? [both, ...offers] : offers
}

function offer(set: ParameterSet, path: string, mend: Change): Offer | null {
  const { value } = mend
  const candidates = typeof value === 'number' ? [roundNicely(value, GROWS.has(mend.path)), value] : [value]
  for (const candidate of candidates) {
    const mended = withAt(set, mend.path, candidate)
    if (setProblems(mended).length === 0)
      return { instead: mend.path === path, changes: [{ path: mend.path, value: candidate }], set: mended }
  }
  return null
}

/** Where neither depth nor spread alone makes room: both by the same part, as large as they can stay. */
function shrinkBoth(set: ParameterSet, path: string): Offer | null {
  const depth = set.sweep.law === 'time' ? 'sweep.depthMs' : 'sweep.depthOctaves'
  const paths = [depth, 'voices.spreadMs']
  if (set.voices.count === 1 || set.voices.spreadMs === 0 || paths.includes(path)) return null
  const shrunk = (part: number) =>
    paths.map((one): Change => ({ path: one, value: roundNicely(part * (getAt(set, one) as number), false) }))
  const applied = (part: number) => shrunk(part).reduce((to, change) => withAt(to, change.path, change.value), set)
  if (setProblems(applied(0)).length > 0) return null
  let low = 0
  let high = 1
  for (let i = 0; i < PART_STEPS; i++) {
    const middle = (low + high) / 2
    if (setProblems(applied(middle)).length === 0) low = middle
    else high = middle
  }
  return { instead: false, changes: shrunk(low), set: applied(low) }
}

const PART_STEPS = 16

/** On a grid of 0.05 from 0.2 up, 0.01 from 0.04, else 0.001, towards the safe side. */
export function roundNicely(value: number, up: boolean): number {
  const perUnit = value >= 0.2 ? 20 : value >= 0.04 ? 100 : 1000
  return (up ? Math.ceil(value * perUnit - 1e-9) : Math.floor(value * perUnit + 1e-9)) / perUnit
}
