// Which figures are known and of which set: closed checks follow every change, those that take rendering come later, so a list may hold both.
import type { CheckId } from '../../src/checks/limits.ts'
import type { Check, Status } from '../../src/checks/types.ts'
import { CHECK_IDS } from '../../src/set/checkIds.ts'
import type { ParameterSet } from '../../src/set/types.ts'

/** The latest figure of each check, and the set it speaks of. */
export type Judged = ReadonlyMap<CheckId, { readonly check: Check; readonly of: ParameterSet }>

export function withJudged(judged: Judged, checks: readonly Check[], of: ParameterSet): Judged {
  const next = new Map(judged)
  for (const check of checks) {
    const known = judged.get(check.id)
    // The same figure again keeps its object, so that its row is not drawn again.
    if (known?.of !== of) next.set(check.id, { check, of })
  }
  return next
}

/** Every known check in the table's order. */
export const listed = (judged: Judged): Check[] => CHECK_IDS.map((id) => judged.get(id)?.check).filter((check) => check !== undefined)

/** Of `ids`, those without a figure of `set`. */
export const missing = (judged: Judged, ids: readonly CheckId[], set: ParameterSet): CheckId[] =>
  ids.filter((id) => judged.get(id)?.of !== set)

const GROUPS: readonly Status[] = ['fails', 'near', 'note', 'holds']

/** Ids by status, the checks' own order within a group; `kept` ids stay where they were, new ones follow. */
export function listOrder(checks: readonly Check[], kept: readonly CheckId[] = []): CheckId[] {
  const present = new Set(checks.map(({ id }) => id))
  const grouped = GROUPS.flatMap((status) => checks.filter((check) => check.status === status).map(({ id }) => id))
  return [...kept.filter((id) => present.has(id)), ...grouped.filter((id) => !kept.includes(id))]
}

export function countStatus(checks: readonly Check[]): Record<Status, number> {
  const counts = { fails: 0, near: 0, note: 0, holds: 0 }
  for (const { status } of checks) counts[status] += 1
  return counts
}
