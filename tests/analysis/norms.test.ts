import { describe, expect, it } from 'vitest'
import { frozenRead } from '../../src/analysis/frozenRead.ts'
import { loopLine } from '../../src/analysis/loopLine.ts'
import { lineMax, READ_PEAK, toneL1, toneMax } from '../../src/analysis/norms.ts'
import { allpassCoefficient, tapsOf } from '../../src/dsp/interpolators.ts'

/** Impulse response of damping and low cut in series, and a bound on what is left after it. */
function tone(a: number | null, b: number | null): { response: Float64Array; tail: number } {
  const slowest = Math.max(a ?? 0, b ?? 0, 0.5)
  const length = Math.min(4_000_000, Math.ceil(40 / (1 - slowest)))
  const response = new Float64Array(length)
  let low = 0
  let high = 0
  let before = 0
  for (let n = 0; n < length; n++) {
    let x = n === 0 ? 1 : 0
    if (a !== null) x = low = (1 - a) * x + a * low
    if (b !== null) {
      high = ((1 + b) / 2) * (x - before) + b * high
      before = x
      x = high
    }
    response[n] = x
  }
  // Both decays together fall at least like the slower pole times a linear factor.
  return { response, tail: length * slowest ** length }
}

const FILTERS = [
  [null, null],
  [0.5, null],
  [0.999, null],
  [null, 0.3],
  [null, 0.9995],
  [0.7, 0.99],
  [0.99, 0.7],
  [0.9, 0.9],
  [0.9, 0.9000000001],
  [0.9999, 0.9998],
  [0.02, 0.03],
] as const

describe('norms of the loop filters', () => {
  it.each(FILTERS)('a = %s, b = %s: ‖f‖₁ is the sum of the impulse response', (a, b) => {
    const { response, tail } = tone(a, b)
    const sum = response.reduce((total, x) => total + Math.abs(x), 0)
    expect(tail).toBeLessThan(1e-9)
    expect(Math.abs(toneL1({ lowPass: a, highPass: b }) - sum)).toBeLessThan(1e-9)
  })

  it.each(FILTERS)('a = %s, b = %s: max|F| is the largest on a grid, and reached', (a, b) => {
    let largest = 0
    for (let i = 0; i <= 200000; i++) {
      const w = Math.PI * (i / 200000) ** 3
      const low = a === null ? 1 : (1 - a) / Math.hypot(1 - a * Math.cos(w), a * Math.sin(w))
      const high = b === null ? 1 : (((1 + b) / 2) * 2 * Math.sin(w / 2)) / Math.hypot(1 - b * Math.cos(w), b * Math.sin(w))
      largest = Math.max(largest, low * high)
    }
    const value = toneMax({ lowPass: a, highPass: b })
    expect(largest).toBeLessThanOrEqual(value + 1e-12)
    expect(value - largest).toBeLessThan(1e-7)
  })
})

describe('ρ∞ of the reads', () => {
  // Source: computed, Σ|h| = 1 + f(1 − f) for both cubics between their middle points; convex reads 1.
  it.each(['nearest', 'linear', 'lagrange3', 'hermite4'] as const)('%s: largest Σ|h| over all fractions', (kind) => {
    let largest = 0
    for (let i = 0; i <= 1000; i++) {
      const f = i / 1000
      const sum = tapsOf(kind, f).reduce((total, h) => total + Math.abs(h), 0)
      if (kind === 'lagrange3' || kind === 'hermite4') expect(Math.abs(sum - 1 - f * (1 - f))).toBeLessThan(1e-12)
      largest = Math.max(largest, sum)
    }
    expect(READ_PEAK[kind]).toBeCloseTo(largest, 12)
  })

  it('allpass1: (1 + |η|)/(1 − |η|) over fractions 0.5 to 1.5', () => {
    let largest = 0
    for (let i = 0; i < 1000; i++) {
      const size = Math.abs(allpassCoefficient(0.5 + i / 1000))
      largest = Math.max(largest, (1 + size) / (1 - size))
    }
    expect(READ_PEAK.allpass1).toBeCloseTo(largest, 12)
  })
})

describe('largest gain of a frozen line', () => {
  it.each(['linear', 'lagrange3', 'hermite4', 'allpass1'] as const)('%s, both filters: what a fine grid finds', (kind) => {
    const reads = [frozenRead(kind, 20.4)]
    const loop = { gain: 0.8, crossFeed: 0, slope: { slope: 1, averaged: false }, tone: { lowPass: 0.6, highPass: 0.97 }, reads }
    const { value, theta } = lineMax(loopLine(loop, 0.8, reads))
    expect(value).toBeLessThanOrEqual(0.8 * toneMax(loop.tone) + 1e-12)
    expect(value).toBeGreaterThan(0.79 * toneMax(loop.tone))
    expect(theta).toBeGreaterThan(0.05)
    expect(theta).toBeLessThan(0.4)
  })
})
