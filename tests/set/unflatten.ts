// What the flat form must hold, by reading a set back from it.
import { FLAT_PARAMETERS, flatIndex, flatPointsOffset } from '../../src/set/flat.ts'
import type { Parameter } from '../../src/set/parameters.ts'
import type { ParameterSet, Shaper } from '../../src/set/types.ts'

const POINT_CURVES = ['sweep', 'input.shaper', 'loop.shaper', 'mix.shaper'] as const

/** The audible part of a set back from its flat form; what was not sent comes from `rest`. */
export function unflatten(flat: Float64Array, rest: ParameterSet): ParameterSet {
  const set = JSON.parse(JSON.stringify(rest)) as Record<string, unknown>
  for (const owner of POINT_CURVES.slice(1)) {
    const [group, field] = owner.split('.') as [string, string]
    const curve = flat[flatIndex(`${owner}.curve`)] as number
    ;(set[group] as Record<string, unknown>)[field] = curve < 0 ? null : ({ points: [] } as unknown as Shaper)
  }
  FLAT_PARAMETERS.forEach((p, i) => {
    const keys = p.path.split('.')
    const last = keys.pop() as string
    const holder = keys.reduce<Record<string, unknown> | null>((o, k) => (o ? (o[k] as Record<string, unknown> | null) : null), set)
    if (holder) holder[last] = fromSlot(p, flat[i] as number)
  })
  POINT_CURVES.forEach((owner) => {
    const holder = owner
      .split('.')
      .reduce<Record<string, unknown> | null>((o, k) => (o ? (o[k] as Record<string, unknown> | null) : null), set)
    const at = flatPointsOffset(owner)
    if (holder) holder.points = Array.from({ length: flat[at] as number }, (_, i) => [flat[at + 1 + 2 * i], flat[at + 2 + 2 * i]])
  })
  return set as unknown as ParameterSet
}

function fromSlot(p: Parameter, slot: number): unknown {
  if (p.kind === 'choice') return slot < 0 ? null : p.options[slot]?.value
  if (p.kind === 'boolean') return slot !== 0
  return Number.isNaN(slot) ? null : slot
}
