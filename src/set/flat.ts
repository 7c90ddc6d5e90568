// A set as one Float64Array in parameter-table order: what the audio thread is sent. Fixed length, so that
// the receiver allocates nothing. Texts, panel, limits and target stay behind: they change no sample.
//
// layout: [ one slot per audible parameter | four curves of drawn points: count, then MAX_POINTS × (x, y) ]
// null is NaN, a choice its index (−1 when null), a boolean 0 or 1.
import { MAX_POINTS, PARAMETERS, type Parameter } from './parameters.ts'
import { getAt } from './path.ts'
import type { ParameterSet, Point } from './types.ts'

export const FLAT_PARAMETERS: readonly Parameter[] = PARAMETERS.filter(
  (p) => p.kind !== 'text' && p.path !== 'intent' && !p.path.startsWith('target.'),
)

const POINT_CURVES = ['sweep', 'input.shaper', 'loop.shaper', 'mix.shaper'] as const
const CURVE_LENGTH = 1 + 2 * MAX_POINTS
export const FLAT_LENGTH = FLAT_PARAMETERS.length + POINT_CURVES.length * CURVE_LENGTH

const indexByPath = new Map(FLAT_PARAMETERS.map((p, i) => [p.path, i]))

/** Slot of a parameter in the flat array. Throws RangeError for a path that is not sent. */
export function flatIndex(path: string): number {
  const index = indexByPath.get(path)
  if (index === undefined) throw new RangeError(`${path} is not part of the flat set`)
  return index
}

/** Writes `set` into `out` (made when absent) and returns it. */
export function flatten(set: ParameterSet, out: Float64Array = new Float64Array(FLAT_LENGTH)): Float64Array {
  if (out.length !== FLAT_LENGTH) throw new RangeError(`flat set must have ${FLAT_LENGTH} slots, got ${out.length}`)
  FLAT_PARAMETERS.forEach((p, i) => {
    out[i] = toSlot(p, getAt(set, p.path))
  })
  POINT_CURVES.forEach((owner, c) => {
    const points = (getAt(set, `${owner}.points`) ?? []) as readonly Point[]
    const at = FLAT_PARAMETERS.length + c * CURVE_LENGTH
    out.fill(0, at, at + CURVE_LENGTH)
    out[at] = points.length
    points.forEach(([x, y], i) => {
      out[at + 1 + 2 * i] = x
      out[at + 2 + 2 * i] = y
    })
  })
  return out
}

/** Where drawn points start in the flat array: the count, then x, y pairs. */
export function flatPointsOffset(owner: (typeof POINT_CURVES)[number]): number {
  return FLAT_PARAMETERS.length + POINT_CURVES.indexOf(owner) * CURVE_LENGTH
}

function toSlot(p: Parameter, value: unknown): number {
  if (value === null || value === undefined) return p.kind === 'choice' ? -1 : Number.NaN
  if (p.kind === 'choice') return p.options.findIndex((o) => o.value === value)
  if (p.kind === 'boolean') return value ? 1 : 0
  return value as number
}
