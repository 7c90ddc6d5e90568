// Reading and replacing one field of a set by its path ("loop.shaper.drive", "panel[0].moves[1].max"). A missing shaper reads as undefined.
import type { ParameterSet } from './types.ts'

export function getAt(set: ParameterSet, path: string): unknown {
  let at: unknown = set
  for (const key of keysOf(path)) {
    if (at === null || typeof at !== 'object') return undefined
    at = (at as Record<string, unknown>)[key]
  }
  return at
}

/** A copy of the set with one field replaced; everything not on the path is shared. Throws RangeError when a holder on the path is absent. */
export function withAt(set: ParameterSet, path: string, value: unknown): ParameterSet {
  return replace(set, keysOf(path), value, path) as ParameterSet
}

function replace(at: unknown, keys: readonly string[], value: unknown, path: string): unknown {
  const [key, ...rest] = keys
  if (key === undefined) return value
  if (at === null || typeof at !== 'object') throw new RangeError(`nothing stands at the holder of ${path}`)
  const replaced = replace((at as Record<string, unknown>)[key], rest, value, path)
  return Array.isArray(at) ? at.with(Number(key), replaced) : { ...at, [key]: replaced }
}

const keysOf = (path: string): readonly string[] => (path.includes('[') ? path.replaceAll(']', '').split(/[.[]/) : path.split('.'))
