import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { createAnalysisClient, type WorkerLike } from '../../../app/workers/analysisClient.ts'
import type { FromWorker, ToWorker } from '../../../app/workers/analysisRunner.ts'
import { defaultSet } from '../../../src/set/defaults.ts'

/** A worker that notes what it is told and answers when the test says so. */
class FakeWorker implements WorkerLike {
  onmessage: ((event: MessageEvent) => void) | null = null
  onerror: ((event: ErrorEvent) => void) | null = null
  readonly heard: ToWorker[] = []
  ended = false
  postMessage(message: ToWorker) {
    this.heard.push(message)
  }
  terminate() {
    this.ended = true
  }
  answer(message: FromWorker) {
    this.onmessage?.({ data: message } as MessageEvent)
  }
  get runs() {
    return this.heard.filter((message) => message.type === 'run')
  }
}

function client() {
  const made: FakeWorker[] = []
  const made$ = createAnalysisClient(() => {
    const worker = new FakeWorker()
    made.push(worker)
    return worker
  })
  return { client: made$, made }
}

const set = defaultSet()
const named = (name: string) => ({ set: { ...set, name } })
const nameOf = (message: ToWorker | undefined) =>
  message?.type === 'run' ? (message.request as { set: { name: string } }).set.name : undefined

beforeEach(() => {
  vi.useFakeTimers()
})
afterEach(() => {
  vi.useRealTimers()
})

describe('a feed of the analysis client', () => {
  it('keeps one request under way and, of those that come meanwhile, the latest', () => {
    const { client: c, made } = client()
    const replies: string[] = []
    const feed = c.openFeed('checks', (_, request) => replies.push(request.set.name))
    for (const name of ['a', 'b', 'c', 'd']) feed.ask(named(name))
    const [worker] = made
    expect(worker?.runs.map(nameOf)).toEqual(['a'])
    worker?.answer({ id: worker.runs[0]?.id ?? 0, ok: true, value: null })
    expect(worker?.runs.map(nameOf)).toEqual(['a', 'd'])
    worker?.answer({ id: worker.runs[1]?.id ?? 0, ok: true, value: null })
    expect(worker?.runs).toHaveLength(2)
    expect(replies).toEqual(['a', 'd'])
  })

  it('cancels and drops what is under way when it stops, and may ask again', () => {
    const { client: c, made } = client()
    const replies: string[] = []
    const feed = c.openFeed('checks', (_, request) => replies.push(request.set.name))
    feed.ask(named('a'))
    feed.ask(named('b'))
    feed.stop()
    const [worker] = made
    const [first] = worker?.runs ?? []
    expect(worker?.heard.at(-1)).toEqual({ type: 'cancel', id: first?.id })
    worker?.answer({ id: first?.id ?? 0, ok: true, value: null })
    expect(replies).toEqual([])
    feed.ask(named('c'))
    worker?.answer({ id: worker.runs.at(-1)?.id ?? 0, ok: true, value: null })
    expect(replies).toEqual(['c'])
  })

  it('hands a failure to onFailure and goes on', () => {
    const { client: c, made } = client()
    const failures: string[] = []
    const feed = c.openFeed(
      'checks',
      () => {},
      (message) => failures.push(message),
    )
    feed.ask(named('a'))
    made[0]?.answer({ id: made[0].runs[0]?.id ?? 0, ok: false, message: 'no such part' })
    expect(failures).toEqual(['no such part'])
    feed.ask(named('b'))
    expect(made[0]?.runs.map(nameOf)).toEqual(['a', 'b'])
  })

  it('abandons a job over 4 s old for a newer one, worker and all; the jobs of other feeds are given to the fresh worker', () => {
    const { client: c, made } = client()
    const replies: string[] = []
    const checks = c.openFeed('checks', (_, request) => replies.push(request.set.name))
    const reach = c.openFeed('reach', (_, request) => replies.push(`reach ${request.set.name}`))
    const columns = { lowHz: 20, highHz: 20000, count: 10 }
    checks.ask(named('a'))
    reach.ask({ ...named('r'), columns })
    vi.advanceTimersByTime(3000)
    checks.ask(named('b'))
    vi.advanceTimersByTime(999)
    expect(made).toHaveLength(1)
    vi.advanceTimersByTime(1)
    expect(made[0]?.ended).toBe(true)
    const fresh = made[1]
    expect(fresh?.runs.map(nameOf)).toEqual(['r', 'b'])
    for (const { id } of fresh?.runs ?? []) fresh?.answer({ id, ok: true, value: null })
    expect(replies).toEqual(['reach r', 'b'])
  })

  it('lets a long job finish when nothing newer waits', () => {
    const { client: c, made } = client()
    c.openFeed('checks', () => {}).ask(named('a'))
    vi.advanceTimersByTime(60_000)
    expect(made).toHaveLength(1)
    expect(made[0]?.ended).toBe(false)
  })

  it('tells every waiting feed when the worker cannot be started, and starts a fresh one for the next request', () => {
    const { client: c, made } = client()
    const failures: string[] = []
    const feed = c.openFeed(
      'checks',
      () => {},
      (message) => failures.push(message),
    )
    feed.ask(named('a'))
    made[0]?.onerror?.({ message: '' } as ErrorEvent)
    expect(failures).toEqual(['the analysis worker could not be started'])
    feed.ask(named('b'))
    expect(made).toHaveLength(2)
    expect(made[1]?.runs.map(nameOf)).toEqual(['b'])
  })
})

describe('a feed for what takes long', () => {
  const step = { label: 'Stepping', total: 1, part: 0.5, checks: [] }

  it('hands over how far it is and still waits for the answer', () => {
    const { client: c, made } = client()
    const heard: string[] = []
    const feed = c.openFeed(
      'longChecks',
      (_, request) => heard.push(`done ${request.set.name}`),
      () => {},
      ({ part }, request) => heard.push(`${part} ${request.set.name}`),
    )
    feed.ask(named('a'))
    const id = made[0]?.runs[0]?.id ?? 0
    made[0]?.answer({ id, ok: true, progress: step })
    made[0]?.answer({ id, ok: true, value: { checks: [] } })
    expect(heard).toEqual(['0.5 a', 'done a'])
  })

  it('cancels what is under way for a newer request and hears no more of it', () => {
    const { client: c, made } = client()
    const heard: string[] = []
    const feed = c.openFeed(
      'longChecks',
      (_, request) => heard.push(request.set.name),
      () => {},
      (_, request) => heard.push(`${request.set.name} goes on`),
    )
    feed.ask(named('a'))
    feed.askInstead(named('b'))
    const worker = made[0]
    const [a, b] = worker?.runs ?? []
    expect(worker?.heard.map(({ type, id }) => [type, id])).toEqual([
      ['run', a?.id],
      ['cancel', a?.id],
      ['run', b?.id],
    ])
    worker?.answer({ id: a?.id ?? 0, ok: true, progress: step })
    worker?.answer({ id: b?.id ?? 0, ok: true, value: { checks: [] } })
    expect(heard).toEqual(['b'])
  })
})

describe('lanes', () => {
  it('answer every frame beside long work: trace, checks and rendered checks run in different workers', () => {
    const { client: c, made } = client()
    c.openFeed('checks', () => {}).ask(named('a'))
    c.openFeed('trace', () => {}).ask({ set, position: 0, columns: { lowHz: 20, highHz: 20000, count: 10 } })
    c.openFeed('longChecks', () => {}).ask(named('a'))
    expect(made).toHaveLength(3)
  })
})
