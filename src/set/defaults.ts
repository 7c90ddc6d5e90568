// A set from nothing but the table's defaults: what a file with only `format` and `version` reads as.
import { PARAMETERS, parameter } from './parameters.ts'
import type { ParameterSet, Shaper } from './types.ts'

/** The default set: fresh all through, so that a caller may keep or change it. */
export function defaultSet(): ParameterSet {
  const set: Record<string, unknown> = { format: 'combwright-set', version: 1 }
  for (const { path, default: value } of PARAMETERS) {
    if (/\.shaper\./.test(path)) continue
    const [group, field] = path.split('.') as [string, string | undefined]
    if (field === undefined) set[group] = value
    else set[group] = { ...(set[group] as object | undefined), [field]: value }
  }
  const of = (group: string) => set[group] as Record<string, unknown>
  of('input').shaper = null
  of('loop').shaper = null
  of('mix').shaper = null
  of('sweep').points = []
  const { target, ...before } = set
  return { ...before, panel: [], limits: {}, target } as unknown as ParameterSet
}

/** A shaper of this curve with the table's defaults for the rest. */
export function defaultShaper(curve: Shaper['curve']): Shaper {
  const row = (field: string) => parameter(`input.shaper.${field}`).default
  return {
    curve,
    drive: row('drive') as number,
    ceiling: row('ceiling') as number,
    positive: row('positive') as number,
    negative: row('negative') as number,
    deadZone: row('deadZone') as number,
    points: [],
    tableSize: row('tableSize') as number,
    tableRange: row('tableRange') as number,
    tableInterpolation: 'linear',
    antialias: row('antialias') as Shaper['antialias'],
  }
}
