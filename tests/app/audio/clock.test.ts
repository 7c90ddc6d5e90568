import { describe, expect, it } from 'vitest'
import { createStallWatch, positionAt } from '../../../app/audio/clock.ts'

describe('the position heard', () => {
  const stamp = { frame: 48_000, position: 0.2, step: 0.5 / 48_000 }

  // Oracle: closed form. Half a cycle a second; 40 ms of latency lie 0.02 cycles back.
  it('lies behind the stamp by latency × rate', () => {
    expect(positionAt(stamp, 1, 48_000)).toBeCloseTo(0.2, 12)
    expect(positionAt(stamp, 0.96, 48_000)).toBeCloseTo(0.18, 12)
  })

  it('wraps into [0, 1) on both sides', () => {
    expect(positionAt({ ...stamp, position: 0.999 }, 1.1, 48_000)).toBeCloseTo(0.049, 12)
    expect(positionAt({ ...stamp, position: 0.001 }, 0.9, 48_000)).toBeCloseTo(0.951, 12)
    expect(positionAt({ ...stamp, position: -0 }, 1, 48_000)).toBe(0)
  })

  it('stops half a second from the last stamp: a stopped report does not let it run on', () => {
    expect(positionAt(stamp, 9, 48_000)).toBeCloseTo(0.45, 12)
    expect(positionAt(stamp, -9, 48_000)).toBeCloseTo(0.95, 12)
  })

  it('stands while the sweep is held', () => {
    expect(positionAt({ ...stamp, step: 0 }, 1.3, 48_000)).toBe(0.2)
  })
})

describe('the stall watch', () => {
  it('calls a clock still after a second without movement, and not before', () => {
    const isStalled = createStallWatch(1000)
    expect(isStalled(1, 0)).toBe(false)
    expect(isStalled(1, 999)).toBe(false)
    expect(isStalled(1, 1000)).toBe(true)
    expect(isStalled(1.01, 1100)).toBe(false)
    expect(isStalled(1.01, 2099)).toBe(false)
  })
})
