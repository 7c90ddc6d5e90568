// The checks of the set being shown, computed in a worker whenever the set changes, also while a gesture tries values.
import { create } from 'zustand'
import type { CheckId } from '../../src/checks/limits.ts'
import type { Check, Status } from '../../src/checks/types.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { analysis } from '../workers/analysisClient.ts'
import type { ChecksReply } from '../workers/analysisJobs/checks.ts'
import { currentSet, subscribeSet, useCurrent } from './current.ts'
import { useVerdict } from './verdict.ts'

export interface ChecksState {
  readonly checks: readonly Check[]
  /** Ids in the order they are listed: by status, but as they stood while a gesture runs. */
  readonly order: readonly CheckId[]
  /** The set the checks speak of; null before the first answer. */
  readonly set: ParameterSet | null
  /** Why there are none, in words. */
  readonly problem: string | null
}

export const useChecks = create<ChecksState>()(() => ({ checks: [], order: [], set: null, problem: null }))

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

function take({ checks, verdict }: ChecksReply, set: ParameterSet) {
  const { fails, near, note, holds } = countStatus(checks)
  const { order } = useChecks.getState()
  useChecks.setState({ checks, set, problem: null, order: listOrder(checks, useCurrent.getState().inGesture ? order : []) })
  useVerdict.setState({ verdict, fails, near, notes: note, holds })
}

let following = false

/** Starts following the set; once for the page, further calls do nothing. */
export function followChecks(): void {
  if (following) return
  following = true
  const feed = analysis().openFeed(
    'checks',
    (reply, { set }) => take(reply, set),
    (problem) => useChecks.setState({ problem }),
  )
  feed.ask({ set: currentSet() })
  subscribeSet((set) => feed.ask({ set }))
  useCurrent.subscribe((now, before) => {
    // The gesture's last values are in: the groups may move again.
    if (before.inGesture && !now.inGesture) useChecks.setState(({ checks }) => ({ order: listOrder(checks) }))
  })
}
