import { describe, expect, it } from 'vitest'
import { createRunner, type FetchedJob, type FromWorker, type SlicedJob, type ToWorker } from '../../../app/workers/analysisRunner.ts'

/** A runner whose turns and clock the test moves by hand. */
function byHand(jobs: Readonly<Record<string, SlicedJob<never, unknown, unknown> | FetchedJob<never, unknown, unknown>>>) {
  const posted: FromWorker[] = []
  const turns: (() => void)[] = []
  const clock = { ms: 0 }
  const hear = createRunner({ jobs, post: (message) => posted.push(message), later: (turn) => turns.push(turn), now: () => clock.ms })
  const turn = () => turns.shift()?.()
  return { hear, posted, turn, clock, waiting: () => turns.length }
}

const run = (id: number, kind: string, request: unknown = null): ToWorker => ({ type: 'run', id, kind, request })

describe('the runner of analysis jobs', () => {
  it('answers a short job with its value and the id it was asked under', () => {
    const { hear, posted, turn } = byHand({ double: (x: number) => 2 * x })
    hear(run(7, 'double', 21))
    turn()
    expect(posted).toEqual([{ id: 7, ok: true, value: 42 }])
  })

  it('answers a failing job with its message and goes on with the next', () => {
    const { hear, posted, turn } = byHand({
      fail: () => {
        throw new RangeError('position must be in [0, 1], got 2')
      },
      fine: () => 'fine',
    })
    hear(run(1, 'fail'))
    hear(run(2, 'fine'))
    turn()
    turn()
    expect(posted).toEqual([
      { id: 1, ok: false, message: 'position must be in [0, 1], got 2' },
      { id: 2, ok: true, value: 'fine' },
    ])
  })

  it('names a kind of job it does not know', () => {
    const { hear, posted, turn } = byHand({})
    hear(run(1, 'tea'))
    turn()
    expect(posted).toEqual([{ id: 1, ok: false, message: 'no job is called tea' }])
  })

  it('cuts a long job into slices of 12 ms and hears messages between them', () => {
    const { hear, posted, turn, clock, waiting } = byHand({
      *long() {
        for (let k = 0; k < 5; k++) {
          clock.ms += 10
          yield
        }
        return 'done'
      },
    })
    hear(run(1, 'long'))
    let turns = 0
    while (waiting() > 0) {
      turn()
      turns += 1
    }
    expect(posted).toEqual([{ id: 1, ok: true, value: 'done' }])
    // Five steps of 10 ms: two fit before 12 ms are over.
    expect(turns).toBe(3)
  })

  it('lets a short job in after one slice of a long one', () => {
    const { hear, posted, turn, clock, waiting } = byHand({
      *long() {
        for (let k = 0; k < 5; k++) {
          clock.ms += 20
          yield
        }
        return 'long done'
      },
      short: () => 'short done',
    })
    hear(run(1, 'long'))
    turn()
    hear(run(2, 'short'))
    while (waiting() > 0) turn()
    expect(posted.map(({ id }) => id)).toEqual([2, 1])
  })

  it('drops a cancelled job between its slices, without an answer', () => {
    let steps = 0
    const { hear, posted, turn, clock, waiting } = byHand({
      *long() {
        for (let k = 0; k < 100; k++) {
          steps += 1
          clock.ms += 20
          yield
        }
        return 'done'
      },
    })
    hear(run(1, 'long'))
    turn()
    hear({ type: 'cancel', id: 1 })
    while (waiting() > 0) turn()
    expect(posted).toEqual([])
    expect(steps).toBe(1)
  })

  it('tells how far a long job is, the latest only and ten times a second at most; then answers', () => {
    const { hear, posted, turn, clock, waiting } = byHand({
      *long() {
        for (let k = 1; k <= 30; k++) {
          clock.ms += 10
          yield k
        }
        return 'done'
      },
    })
    hear(run(1, 'long'))
    while (waiting() > 0) turn()
    // 30 steps of 10 ms in slices of two: told at 100 ms and 200 ms.
    expect(posted).toEqual([
      { id: 1, ok: true, progress: 10 },
      { id: 1, ok: true, progress: 20 },
      { id: 1, ok: true, progress: 30 },
      { id: 1, ok: true, value: 'done' },
    ])
  })

  it('fetches a job’s code when it is first asked for, once, and does other jobs meanwhile', async () => {
    let fetches = 0
    const { hear, posted, turn, waiting } = byHand({
      far: {
        fetch: async () => {
          fetches += 1
          return (x: number) => -x
        },
      },
      near: (x: number) => x,
    })
    hear(run(1, 'far', 1))
    hear(run(2, 'near', 2))
    while (waiting() > 0) turn()
    expect(posted).toEqual([{ id: 2, ok: true, value: 2 }])
    await Promise.resolve()
    await Promise.resolve()
    hear(run(3, 'far', 3))
    while (waiting() > 0) turn()
    expect(posted.slice(1)).toEqual([
      { id: 1, ok: true, value: -1 },
      { id: 3, ok: true, value: -3 },
    ])
    expect(fetches).toBe(1)
  })

  it('fetches for each request only the part it needs', async () => {
    const fetches: string[] = []
    const part = (x: number) => (x < 0 ? 'negative' : 'positive')
    const { hear, posted, turn, waiting } = byHand({
      far: {
        part,
        fetch: async (x: number) => {
          fetches.push(part(x))
          return (y: number) => `${part(x)} ${y}`
        },
      },
    })
    for (const [i, x] of [1, 2, -3, -4].entries()) {
      hear(run(i, 'far', x))
      await new Promise((done) => setTimeout(done))
      while (waiting() > 0) turn()
    }
    expect(fetches).toEqual(['positive', 'negative'])
    expect(posted.map((message) => 'value' in message && message.value)).toEqual(['positive 1', 'positive 2', 'negative -3', 'negative -4'])
  })

  it('does not begin a job that was cancelled while its code was fetched', async () => {
    const { hear, posted, turn, waiting } = byHand({ far: { fetch: async () => () => 'done' } })
    hear(run(1, 'far'))
    hear({ type: 'cancel', id: 1 })
    await new Promise((done) => setTimeout(done))
    while (waiting() > 0) turn()
    expect(posted).toEqual([])
  })

  it('answers with the reason when a job’s code cannot be fetched, and tries again next time', async () => {
    let there = false
    const { hear, posted, turn, waiting } = byHand({
      far: {
        fetch: async () => {
          if (!there) throw new TypeError('no server')
          return () => 'done'
        },
      },
    })
    hear(run(1, 'far'))
    await new Promise((done) => setTimeout(done))
    there = true
    hear(run(2, 'far'))
    await new Promise((done) => setTimeout(done))
    while (waiting() > 0) turn()
    expect(posted).toEqual([
      { id: 1, ok: false, message: 'no server' },
      { id: 2, ok: true, value: 'done' },
    ])
  })
})
