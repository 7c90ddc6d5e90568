// A check's limit as the set's own: put, taken away, each as one step of history.
import { type CheckId, labelOf, limitOf } from '../../../../src/checks/limits.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'
import type { Binding, Refusal } from '../../../fields/binding.ts'
import type { NumberSpec } from '../../../fields/quantity.ts'
import { commit, committedSet } from '../../../state/document.ts'
import { dropGesture, endGesture, tryOut, useDraft } from '../../../state/draft.ts'

/** The set with `limit` as its own for a check; null takes its own away. */
export function withOwnLimit(set: ParameterSet, id: CheckId, limit: number | null): ParameterSet {
  const { [id]: own, ...others } = set.limits
  if (limit === null) return own === undefined ? set : { ...set, limits: others }
  return own === limit ? set : { ...set, limits: { ...set.limits, [id]: limit } }
}

/** The limit that holds when the set has none of its own. */
export const tableLimit = (set: ParameterSet, id: CheckId): number | null => limitOf(withOwnLimit(set, id, null), id).limit

/** How far from the table's limit one can drag or step; typing goes anywhere. */
const REACH: Readonly<Record<string, number>> = { dB: 60, dBFS: 100, ms: 200, s: 30, cents: 1200 }
const ANYWHERE = 1e6

export function limitSpec(set: ParameterSet, id: CheckId): NumberSpec {
  const { row } = limitOf(set, id)
  const table = tableLimit(set, id) ?? 0
  const reach = REACH[row.unit] ?? 100
  return {
    kind: 'number',
    label: 'Limit',
    help: `${row.sense === 'atMost' ? 'The largest figure that does not' : 'The figure must stay above it not to'} ${row.outside === 'note' ? 'be noted' : row.outside === 'near' ? 'count as near' : 'fail'}. Kept in the set.`,
    // Read as plain decibels; the row beside it says against what.
    unit: row.unit === 'dBFS' ? 'dB' : row.unit,
    min: -ANYWHERE,
    max: ANYWHERE,
    taper: 'linear',
    trackMin: table - reach,
    trackMax: table + reach,
  }
}

/** Typing and stepping a check's limit. */
export function limitBinding(id: CheckId, value: number | null): Binding<number | null> {
  const step = `Limit: ${labelOf(id).toLowerCase()}`
  return {
    value,
    attempt: (limit) => {
      if (useDraft.getState().gesture !== step) endGesture()
      if (limit !== null) tryOut(step, withOwnLimit(committedSet(), id, limit))
      return null
    },
    settle: endGesture,
    drop: dropGesture,
    apply: (limit): Refusal => {
      endGesture()
      commit(step, withOwnLimit(committedSet(), id, limit))
      return null
    },
  }
}
