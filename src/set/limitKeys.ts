// A set's own limits: by the id of a check, a finite number.
import { CHECK_IDS } from './checkIds.ts'
import type { Problem } from './result.ts'
import { nearestHint, valueText } from './valueProblem.ts'

export function limitProblems(limits: Readonly<Record<string, unknown>>): Problem[] {
  return Object.entries(limits).flatMap(([id, value]): Problem[] => {
    const path = `limits.${id}`
    if (!(CHECK_IDS as readonly string[]).includes(id)) {
      const hint = nearestHint(id, CHECK_IDS) ?? `checks are ${CHECK_IDS.join(', ')}`
      return [{ path, message: `${path} names no check`, value, range: CHECK_IDS.join(', '), hint }]
    }
    if (Number.isFinite(value)) return []
    return [{ path, message: `${path} must be a finite number, got ${valueText(value)}`, value, range: 'a finite number' }]
  })
}
