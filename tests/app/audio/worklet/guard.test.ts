import { describe, expect, it } from 'vitest'
import {
  applyGuard,
  createGuard,
  forgetLatch,
  GUARD_LIMIT,
  GUARD_OPEN,
  GUARD_PROBING,
  type Guard,
  guardRests,
  resumeGuard,
  TRIPPED_BY_LEVEL,
  TRIPPED_BY_NON_FINITE,
} from '../../../../app/audio/worklet/guard.ts'

const FS = 48_000
const PIECE = 128

/** Feeds `seconds` of a signal; what comes out, and how often the effect was to be cleared. */
function feed(guard: Guard, seconds: number, signal: (n: number) => number) {
  const frames = Math.round((seconds * FS) / PIECE) * PIECE
  const out = new Float64Array(frames)
  let clears = 0
  for (let at = 0; at < frames; at += PIECE) {
    if (guardRests(guard, PIECE)) continue
    const left = Float64Array.from({ length: PIECE }, (_, i) => signal(at + i))
    const right = left.slice()
    if (applyGuard(guard, left, right, PIECE)) clears++
    out.set(left, at)
  }
  return { out, clears }
}

const loud = () => GUARD_LIMIT * 1.01
const soft = () => 0.1

describe('the guard', () => {
  it('passes what stays at its limit unchanged, bit for bit', () => {
    const { out, clears } = feed(createGuard(FS, PIECE), 0.5, (n) => (n % 2 ? GUARD_LIMIT : -GUARD_LIMIT))
    expect(out.every((x) => Math.abs(x) === GUARD_LIMIT)).toBe(true)
    expect(clears).toBe(0)
  })

  // The issue asks for 50 ms.
  it('is silent 5 ms after the first sample beyond the limit', () => {
    const first = 1000
    const { out, clears } = feed(createGuard(FS, PIECE), 0.5, (n) => (n < first ? 1 : loud()))
    const silentFrom = out.findIndex((_, n) => n >= first && out.subarray(n).every((x) => x === 0))
    expect((silentFrom - first) / FS).toBeLessThanOrEqual(0.005)
    expect(out.every((x) => Math.abs(x) <= loud())).toBe(true)
    expect(clears).toBeGreaterThan(0)
  })

  it.each([Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY])('never passes on %s', (bad) => {
    const guard = createGuard(FS, PIECE)
    const { out } = feed(guard, 0.1, (n) => (n < 500 ? 0.5 : bad))
    expect(out.every(Number.isFinite)).toBe(true)
    expect(guard.reason).toBe(TRIPPED_BY_NON_FINITE)
    expect(guard.state).toBe(GUARD_PROBING)
  })

  it('says what tripped it and how high it went', () => {
    const guard = createGuard(FS, PIECE)
    feed(guard, 0.1, (n) => (n < 500 ? 0.5 : 7))
    expect([guard.reason, guard.peak, guard.trips]).toEqual([TRIPPED_BY_LEVEL, 7, 1])
  })

  it('lets the sound back after one second of safe output, over 200 ms', () => {
    const guard = createGuard(FS, PIECE)
    feed(guard, 0.05, loud)
    expect(feed(guard, 0.95, soft).out.every((x) => x === 0)).toBe(true)
    const { out } = feed(guard, 0.5, soft)
    expect(guard.state).toBe(GUARD_OPEN)
    expect(out.at(-1)).toBe(0.1)
    const steps = out.slice(1).map((x, n) => x - (out[n] as number))
    expect(Math.max(...steps)).toBeLessThanOrEqual(0.1 / (0.2 * FS) + 1e-12)
  })

  it('stays muted while the output goes on being unsafe, and asks for clearing each time it runs away', () => {
    const guard = createGuard(FS, PIECE)
    feed(guard, 0.05, loud)
    const { out, clears } = feed(guard, 3, (n) => (n % 24_000 < 200 ? loud() : 0.1))
    expect(out.every((x) => x === 0)).toBe(true)
    expect(clears).toBeGreaterThanOrEqual(5)
  })

  it('clears a loop that keeps running away at most every quarter of a second: clearing long lines takes time', () => {
    const guard = createGuard(FS, PIECE)
    const { clears } = feed(guard, 5, loud)
    expect(clears).toBeGreaterThan(10)
    expect(clears).toBeLessThanOrEqual(5 / 0.25 + 1)
  })

  it('latches when the output runs away again within ten seconds, until somebody resumes', () => {
    const guard = createGuard(FS, PIECE)
    feed(guard, 0.05, loud)
    feed(guard, 2, soft)
    expect(guard.state).toBe(GUARD_OPEN)
    feed(guard, 0.05, loud)
    expect(guard.latched).toBe(true)
    expect(feed(guard, 5, soft).out.every((x) => x === 0)).toBe(true)
    expect(resumeGuard(guard)).toBe(true)
    expect(feed(guard, 0.5, soft).out.at(-1)).toBe(0.1)
  })

  it('does not latch after a changed set or after ten quiet seconds', () => {
    const guard = createGuard(FS, PIECE)
    feed(guard, 0.05, loud)
    feed(guard, 2, soft)
    forgetLatch(guard)
    feed(guard, 0.05, loud)
    expect(guard.latched).toBe(false)
    feed(guard, 12, soft)
    feed(guard, 0.05, loud)
    expect(guard.latched).toBe(false)
    expect(guard.trips).toBe(3)
  })

  it('opens from a latch once the set has changed and the output is safe', () => {
    const guard = createGuard(FS, PIECE)
    feed(guard, 0.05, loud)
    feed(guard, 2, soft)
    feed(guard, 0.05, loud)
    forgetLatch(guard)
    feed(guard, 1.5, soft)
    expect(guard.state).toBe(GUARD_OPEN)
  })
})
