import { describe, expect, it } from 'vitest'
import { DB_FLOOR, fromDb, peak, rms, toDb } from '../../src/signal/levels.ts'

describe('levels', () => {
  const sine = Float64Array.from({ length: 4800 }, (_, n) => 0.5 * Math.sin((2 * Math.PI * 100 * n) / 4800))

  // Oracle: closed form, a sine of amplitude a has rms a/√2.
  it('rms of a sine is its amplitude over √2, peak is its amplitude', () => {
    expect(rms(sine)).toBeCloseTo(0.5 / Math.SQRT2, 14)
    expect(peak(sine)).toBeCloseTo(0.5, 14)
    expect(peak(Float64Array.of(0.25, -0.75))).toBe(0.75)
  })

  it('no samples are silent', () => {
    expect([rms(new Float64Array(0)), peak(new Float64Array(0))]).toEqual([0, 0])
  })

  it('decibels: 0.5 is −6.0206, 10 is 20, sign does not count, silence is the floor', () => {
    expect(toDb(-0.5)).toBeCloseTo(-6.020599913279624, 12)
    expect(toDb(10)).toBe(20)
    expect(toDb(0)).toBe(DB_FLOOR)
    expect(toDb(1e-21)).toBe(DB_FLOOR)
    expect(toDb(0, -90)).toBe(-90)
    expect(fromDb(toDb(0.3))).toBeCloseTo(0.3, 15)
  })

  it('a sample that is no number shows', () => {
    expect(peak(Float64Array.of(0, Number.NaN, 1))).toBeNaN()
    expect(rms(Float64Array.of(0, Number.NaN))).toBeNaN()
  })
})
