// The checks of the set being shown. Those that follow from formulas are computed whenever the set changes, also while a gesture tries
// values; those that take rendering start when nothing is being tried, and are dropped for every newer set.
import { create } from 'zustand'
import type { CheckId } from '../../src/checks/limits.ts'
import type { Check, Verdict } from '../../src/checks/types.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { type AnalysisClient, analysis } from '../workers/analysisClient.ts'
import { currentSet, useCurrent } from './current.ts'
import { countStatus, type Judged, listed, listOrder, missing, withJudged } from './judged.ts'
import { useVerdict } from './verdict.ts'

export interface ChecksState {
  readonly checks: readonly Check[]
  /** Ids in the order they are listed: by status, but as they stood while a gesture runs. */
  readonly order: readonly CheckId[]
  /** Those whose figure is of the set before, for longer than a moment. */
  readonly before: readonly CheckId[]
  /** The set the checks from formulas speak of; null before the first answer. */
  readonly set: ParameterSet | null
  /** What is being worked out, once that takes over a second. */
  readonly working: Working | null
  /** Why there are none, or not all, in words. */
  readonly problem: string | null
}

export interface Working {
  /** The check's label. */
  readonly label: string
  /** Checks done, of how many, and the part of the next one, 0 to 1. */
  readonly done: number
  readonly total: number
  readonly part: number
}

export const useChecks = create<ChecksState>()(() => ({ checks: [], order: [], before: [], set: null, working: null, problem: null }))

/** Figures of the set before are marked after this long, and progress is shown after that. */
const MARK_AFTER_MS = 300
const SHOW_AFTER_MS = 1000

let following = false

/** Starts following the set; once for the page, further calls do nothing. */
export function followChecks(): void {
  if (following) return
  following = true
  follow(analysis())
}

/** Follows the set through `client`. Returns the way to stop. */
export function follow(client: AnalysisClient): () => void {
  let judged: Judged = new Map()
  /** Ids that the long run gives; null until the first answer says which. */
  let slow: readonly CheckId[] | null = null
  let closedOf: ParameterSet | null = null
  /** The set whose long run is under way, or failed. */
  let running: ParameterSet | null = null
  let failedOf: ParameterSet | null = null
  let beganMs = 0

  const awaited = () => missing(judged, slow ?? [], currentSet())
  const owed = () => (failedOf === currentSet() ? [] : awaited())

  function show(more: Partial<ChecksState> = {}) {
    const { inGesture } = useCurrent.getState()
    const checks = listed(judged)
    const { fails, near, note, holds } = countStatus(checks)
    const late = inGesture || running === null || performance.now() - beganMs >= MARK_AFTER_MS
    // Those from formulas are a moment behind while a gesture runs, and are not marked for it.
    const marked = ({ id }: Check) => judged.get(id)?.of !== currentSet() && (!inGesture || slow?.includes(id) === true)
    const before = late ? checks.filter(marked).map(({ id }) => id) : []
    const now = useChecks.getState()
    useChecks.setState({
      checks,
      order: same(now.order, listOrder(checks, inGesture ? now.order : [])),
      before: same(now.before, before),
      ...more,
    })
    const pending = owed().length
    const settled = !inGesture && closedOf === currentSet() && slow !== null && pending === 0
    const verdict: Verdict = fails > 0 ? 'fails' : near > 0 ? 'near' : 'holds'
    useVerdict.setState({ verdict: closedOf && verdict, fails, near, notes: note, holds, pending, settled })
  }

  const closed = client.openFeed(
    'checks',
    ({ checks, slow: ids }, { set }) => {
      judged = withJudged(judged, checks, set)
      closedOf = set
      const first = slow === null
      slow = ids
      show({ set, problem: failedOf === currentSet() ? useChecks.getState().problem : null })
      if (first) startLong()
    },
    (problem) => useChecks.setState({ problem }),
  )

  const long = client.openFeed(
    'longChecks',
    ({ checks }, { set }) => {
      judged = withJudged(judged, checks, set)
      running = null
      show({ working: null })
    },
    (problem) => {
      failedOf = running
      running = null
      show({ working: null, problem })
    },
    ({ checks, label, total, part }, { set }) => {
      judged = withJudged(judged, checks, set)
      show({ working: performance.now() - beganMs < SHOW_AFTER_MS ? null : { label, done: checks.length, total, part } })
    },
  )

  /** What takes long begins when nothing is being tried; what is under way for another set is dropped. */
  function startLong() {
    const { set, inGesture } = useCurrent.getState()
    const wanted = slow !== null && !inGesture && owed().length > 0
    if (wanted && running === set) return
    if (running !== null) long.stop()
    running = null
    if (wanted) {
      running = set
      beganMs = performance.now()
      long.askInstead({ set })
    }
    show({ working: null })
  }

  closed.ask({ set: currentSet() })
  const stop = useCurrent.subscribe((now, before) => {
    if (now.set !== before.set) closed.ask({ set: now.set })
    startLong()
  })
  return () => {
    stop()
    closed.stop()
    long.stop()
  }
}

/** `before` where both hold the same, so that nobody who shows it draws again. */
const same = <T>(before: readonly T[], now: readonly T[]): readonly T[] =>
  before.length === now.length && before.every((one, i) => one === now[i]) ? before : now
