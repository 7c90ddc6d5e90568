// A set's own limits: by the id of a check that has one, a finite number.
import { CHECK_IDS, LIMITABLE_IDS } from './checkIds.ts'
import type { Problem } from './result.ts'
import { nearestHint, valueText } from './valueProblem.ts'

const LIMITABLE = LIMITABLE_IDS.join(', ')

export function limitProblems(limits: Readonly<Record<string, unknown>>): Problem[] {
  return Object.entries(limits).flatMap(([id, value]): Problem[] => {
    const path = `limits.${id}`
    if (!(CHECK_IDS as readonly string[]).includes(id)) {
      const hint = nearestHint(id, CHECK_IDS) ?? `checks are ${CHECK_IDS.join(', ')}`
      return [{ path, message: `${path} names no check`, value, range: LIMITABLE, hint }]
    }
    if (!(LIMITABLE_IDS as readonly string[]).includes(id)) {
      const hint = `remove it; limits can be set for ${LIMITABLE}`
      return [{ path, message: `${path}: ${id} is not judged by a number, so it has no limit to set`, value, range: LIMITABLE, hint }]
    }
    if (Number.isFinite(value)) return []
    return [{ path, message: `${path} must be a finite number, got ${valueText(value)}`, value, range: 'a finite number' }]
  })
}
