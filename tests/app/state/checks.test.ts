import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { follow, useChecks } from '../../../app/state/checks.ts'
import { commit, restoreDocument } from '../../../app/state/document.ts'
import { dropGesture, endGesture, tryOut } from '../../../app/state/draft.ts'
import { useVerdict } from '../../../app/state/verdict.ts'
import type { AnalysisClient } from '../../../app/workers/analysisClient.ts'
import type { CheckId } from '../../../src/checks/limits.ts'
import type { Check, Status } from '../../../src/checks/types.ts'
import { defaultSet } from '../../../src/set/defaults.ts'
import type { ParameterSet } from '../../../src/set/types.ts'

const check = (id: CheckId, status: Status): Check => ({ id, status, value: 1, limit: null, unit: '', label: id, text: '', working: [] })
const named = (name: string): ParameterSet => ({ ...defaultSet(), name })

interface FakeFeed {
  readonly asked: ParameterSet[]
  stops: number
  reply(value: object): void
  fail(message: string): void
  progress(value: object): void
}

/** Feeds that note what they are asked and answer when the test says so. */
function fakeClient() {
  const feeds: Record<string, FakeFeed> = {}
  const openFeed = (
    kind: string,
    onReply: (reply: unknown, request: unknown) => void,
    onFailure: (message: string) => void,
    onProgress: (progress: unknown, request: unknown) => void,
  ) => {
    const asked: ParameterSet[] = []
    const last = () => ({ set: asked.at(-1) })
    const feed: FakeFeed = {
      asked,
      stops: 0,
      reply: (value) => onReply(value, last()),
      fail: onFailure,
      progress: (value) => onProgress(value, last()),
    }
    feeds[kind] = feed
    const ask = ({ set }: { set: ParameterSet }) => asked.push(set)
    return {
      ask,
      askInstead: ask,
      stop: () => {
        feed.stops += 1
      },
    }
  }
  return {
    client: { openFeed } as unknown as AnalysisClient,
    closed: () => feeds.checks as FakeFeed,
    long: () => feeds.longChecks as FakeFeed,
  }
}

const SLOW: readonly CheckId[] = ['sweep.steps', 'level.dc']
const closedReply = (status: Status) => ({ checks: [check('loop.margin', status)], slow: SLOW })
const longReply = (steps: Status, dc: Status = 'holds') => ({ checks: [check('sweep.steps', steps), check('level.dc', dc)] })
const progress = (part: number, checks: readonly Check[] = []) => ({
  label: 'Stepping',
  total: 2,
  part,
  checks,
})

let stop = () => {}
let fake = fakeClient()
beforeEach(() => {
  vi.useFakeTimers()
  restoreDocument({ slots: { A: named('first') }, slot: 'A' })
  useChecks.setState(useChecks.getInitialState(), true)
  useVerdict.setState(useVerdict.getInitialState(), true)
  fake = fakeClient()
  stop = follow(fake.client)
})
afterEach(() => {
  stop()
  dropGesture()
  vi.useRealTimers()
})

describe('following the checks', () => {
  it('asks for what takes long only after the first answer from formulas, and counts it as still to come', () => {
    expect(fake.closed().asked.map(({ name }) => name)).toEqual(['first'])
    expect(fake.long().asked).toEqual([])
    fake.closed().reply(closedReply('holds'))
    expect(fake.long().asked.map(({ name }) => name)).toEqual(['first'])
    expect(useVerdict.getState()).toMatchObject({ verdict: 'holds', holds: 1, pending: 2, settled: false })
    fake.long().reply(longReply('near'))
    expect(useVerdict.getState()).toMatchObject({ verdict: 'near', near: 1, holds: 2, pending: 0, settled: true })
    expect(useChecks.getState().order).toEqual(['sweep.steps', 'loop.margin', 'level.dc'])
  })

  it('lists all in the table’s order whichever came first', () => {
    fake.closed().reply(closedReply('holds'))
    fake.long().reply({ checks: [check('level.dc', 'holds'), check('sweep.steps', 'holds')] })
    expect(useChecks.getState().checks.map(({ id }) => id)).toEqual(['loop.margin', 'sweep.steps', 'level.dc'])
  })

  it('drops a long run at once for a newer set, and takes nothing as settled in between', () => {
    fake.closed().reply(closedReply('holds'))
    commit('change', named('second'))
    expect(fake.long().stops).toBe(1)
    expect(fake.long().asked.map(({ name }) => name)).toEqual(['first', 'second'])
    expect(useVerdict.getState().settled).toBe(false)
    fake.long().reply(longReply('holds'))
    // The figures from formulas are still those of the set before.
    expect(useVerdict.getState().settled).toBe(false)
    fake.closed().reply(closedReply('fails'))
    expect(useVerdict.getState()).toMatchObject({ verdict: 'fails', settled: true })
  })

  it('runs nothing long while a gesture runs, marks its figures as of the set before, and starts when it ends', () => {
    fake.closed().reply(closedReply('holds'))
    fake.long().reply(longReply('holds'))
    tryOut('Base delay', named('tried'))
    tryOut('Base delay', named('tried more'))
    expect(fake.long().asked).toHaveLength(1)
    expect(useChecks.getState().before).toEqual(SLOW)
    expect(useVerdict.getState()).toMatchObject({ pending: 2, settled: false })
    endGesture()
    expect(fake.long().asked.map(({ name }) => name)).toEqual(['first', 'tried more'])
    fake.closed().reply(closedReply('holds'))
    fake.long().reply(longReply('holds'))
    expect(useChecks.getState().before).toEqual([])
    expect(useVerdict.getState().settled).toBe(true)
  })

  it('asks for nothing long again when a dropped gesture leaves the set as it was', () => {
    fake.closed().reply(closedReply('holds'))
    fake.long().reply(longReply('holds'))
    tryOut('Base delay', named('tried'))
    dropGesture()
    expect(fake.long().asked).toHaveLength(1)
    expect(useChecks.getState().before).toEqual([])
  })

  it('keeps the rows’ places while a gesture runs and groups them by status after it', () => {
    fake.closed().reply(closedReply('holds'))
    fake.long().reply(longReply('near'))
    const places = useChecks.getState().order
    tryOut('Feedback', named('tried'))
    fake.closed().reply(closedReply('fails'))
    expect(useChecks.getState().order).toEqual(places)
    endGesture()
    expect(useChecks.getState().order[0]).toBe('loop.margin')
  })

  it('shows progress once it takes over a second, takes each figure as it comes, and marks the rest after 0.3 s', () => {
    fake.closed().reply(closedReply('holds'))
    fake.long().reply(longReply('holds'))
    commit('change', named('second'))
    fake.long().progress(progress(0.1))
    expect(useChecks.getState()).toMatchObject({ working: null, before: [] })
    vi.advanceTimersByTime(400)
    fake.long().progress(progress(0.5))
    expect(useChecks.getState()).toMatchObject({ working: null, before: ['loop.margin', ...SLOW] })
    fake.closed().reply(closedReply('holds'))
    vi.advanceTimersByTime(700)
    fake.long().progress(progress(0.25, [check('sweep.steps', 'fails')]))
    expect(useChecks.getState().working).toEqual({ label: 'Stepping', done: 1, total: 2, part: 0.25 })
    expect(useChecks.getState().before).toEqual(['level.dc'])
    expect(useVerdict.getState()).toMatchObject({ fails: 1, pending: 1, settled: false })
    fake.long().reply(longReply('fails'))
    expect(useChecks.getState()).toMatchObject({ working: null, before: [] })
  })

  it('says why when what takes long fails, without waiting for it for ever, and tries again with the next set', () => {
    fake.closed().reply(closedReply('holds'))
    fake.long().fail('out of memory')
    expect(useChecks.getState().problem).toBe('out of memory')
    expect(useVerdict.getState()).toMatchObject({ pending: 0, settled: true })
    commit('change', named('second'))
    fake.closed().reply(closedReply('holds'))
    expect(useChecks.getState().problem).toBeNull()
    expect(fake.long().asked.map(({ name }) => name)).toEqual(['first', 'second'])
  })
})
