import { describe, expect, it } from 'vitest'
import { allpassCoefficient, firstTap, splitDelay, tapsOf } from '../../src/dsp/interpolators.ts'
import { renderSet } from '../../src/dsp/render.ts'
import type { Interpolation } from '../../src/set/types.ts'
import { largestDifference } from './close.ts'
import { changedSet } from './sets.ts'

const fractions = [0, 0.1, 0.25, 0.5, 0.77, 0.999]

/** |H| in dB of taps at a frequency. */
function levelDb(taps: readonly number[], hz: number, fs = 48000): number {
  const w = (2 * Math.PI * hz) / fs
  const re = taps.reduce((sum, h, k) => sum + h * Math.cos(w * k), 0)
  const im = taps.reduce((sum, h, k) => sum + h * Math.sin(w * k), 0)
  return 20 * Math.log10(Math.hypot(re, im))
}

// Oracle: h[n] = Π (D − k)/(n − k) over k ≠ n, the formula of Laakso, Välimäki, Karjalainen, Laine 1996 as printed in a public library (FACTS 3).
describe('Lagrange taps are the general formula', () => {
  const lagrange = (order: number, delay: number) =>
    Array.from({ length: order + 1 }, (_, n) =>
      Array.from({ length: order + 1 }, (_, k) => (k === n ? 1 : (delay - k) / (n - k))).reduce((a, b) => a * b, 1),
    )
  it.each(fractions)('order 1 and order 3 at fraction %d', (f) => {
    expect(largestDifference(tapsOf('linear', f), lagrange(1, f))).toBeLessThan(1e-15)
    expect(largestDifference(tapsOf('lagrange3', f), lagrange(3, 1 + f))).toBeLessThan(1e-15)
  })
})

// Oracle: the x-form of Niemitalo 2001, "4-point, 3rd-order Hermite" (FACTS 3), fed unit points.
it.each(fractions)('Hermite taps are Niemitalo’s x-form at fraction %d', (x) => {
  const form = (y0: number, y1: number, y2: number, y3: number) => {
    const c1 = (y2 - y0) / 2
    const c2 = y0 - 2.5 * y1 + 2 * y2 - 0.5 * y3
    const c3 = (y3 - y0) / 2 + 1.5 * (y1 - y2)
    return ((c3 * x + c2) * x + c1) * x + y1
  }
  const expected = [form(1, 0, 0, 0), form(0, 1, 0, 0), form(0, 0, 1, 0), form(0, 0, 0, 1)]
  expect(largestDifference(tapsOf('hermite4', x), expected)).toBeLessThan(1e-15)
})

// Oracle: the table of FACTS 3 (computed there by grid and formula).
describe('published losses and norms', () => {
  it.each([
    [5000, -0.474],
    [10000, -2.01],
    [15000, -5.1],
  ])('linear at half a sample, %d Hz: %d dB', (hz, db) => {
    expect(levelDb(tapsOf('linear', 0.5), hz)).toBeCloseTo(db, 1.9)
  })
  it.each([
    [5000, -0.036],
    [10000, -0.534],
    [15000, -2.53],
    [20000, -8.4],
  ])('Lagrange 3 at half a sample, %d Hz: %d dB', (hz, db) => {
    expect(Math.abs(levelDb(tapsOf('lagrange3', 0.5), hz) - db)).toBeLessThan(db < -8 ? 0.05 : 0.005)
  })
  it.each(['lagrange3', 'hermite4'] as const)('%s: Σ|h| = 1 + f(1 − f), Σh = 1, and −1/16, 9/16, 9/16, −1/16 in the middle', (kind) => {
    for (const f of fractions) {
      const taps = tapsOf(kind, f)
      expect(taps.reduce((a, h) => a + Math.abs(h), 0)).toBeCloseTo(1 + f * (1 - f), 14)
      expect(taps.reduce((a, h) => a + h, 0)).toBeCloseTo(1, 14)
    }
    expect(tapsOf(kind, 0.5)).toEqual([-1 / 16, 9 / 16, 9 / 16, -1 / 16])
  })
})

// Oracle: J. O. Smith, PASP, "First-Order Allpass Interpolation" (FACTS 3): values of η, and |H| = 1.
describe('first-order Thiran', () => {
  it.each([
    [0.1, 0.818],
    [1.1, -0.0476],
    [0.5, 1 / 3],
    [1.5, -0.2],
  ])('η at d = %d is %d', (d, eta) => {
    expect(allpassCoefficient(d)).toBeCloseTo(eta, 3)
  })
  it('keeps every level and delays low frequencies by d', () => {
    for (const d of [0.5, 0.9, 1.49]) {
      const eta = allpassCoefficient(d)
      for (let k = 1; k <= 50; k++) {
        const w = (Math.PI * k) / 51
        const [c, s] = [Math.cos(w), -Math.sin(w)]
        expect(Math.hypot(eta + c, s) / Math.hypot(1 + eta * c, eta * s)).toBeCloseTo(1, 12)
      }
      const w = 1e-4
      const phase = Math.atan2(-Math.sin(w), eta + Math.cos(w)) - Math.atan2(-eta * Math.sin(w), 1 + eta * Math.cos(w))
      expect(-phase / w).toBeCloseTo(d, 6)
    }
  })
  it('has no taps', () => expect(() => tapsOf('allpass1', 0.5)).toThrow(RangeError))
})

describe('delays are divided as each interpolator reads', () => {
  it.each([
    ['nearest', 10.49, 10, 0],
    ['nearest', 10.5, 11, 0],
    ['linear', 10.25, 10, 0.25],
    ['lagrange3', 10.25, 10, 0.25],
    ['allpass1', 10.25, 9, 1.25],
    ['allpass1', 10.5, 10, 0.5],
  ] as const)('%s at %d', (kind, delay, whole, fraction) => {
    expect(splitDelay(kind, delay)).toEqual({ whole, fraction })
  })
})

// The engine's reads use other forms of the same weights; its impulse response shows the taps themselves.
describe('the impulse response of a standing voice is the taps', () => {
  const impulse = Float64Array.from({ length: 64 }, (_, n) => (n === 0 ? 1 : 0))
  const response = (kind: Interpolation, delay: number) => {
    const set = changedSet((s) => {
      s.sampleRate = 48000
      s.layout = 'mono'
      s.line = { baseMs: delay / 48, interpolation: kind }
      s.sweep.rateHz = 0
      s.sweep.depthMs = 0
      s.voices = { count: 1, phaseSpread: 0, spreadMs: 0 }
      Object.assign(s.mix, { dry: 0, wet: 1 })
    })
    return renderSet(set, [impulse])[0]!
  }
  it.each(['nearest', 'linear', 'lagrange3', 'hermite4'] as const)('%s', (kind) => {
    for (const f of fractions) {
      const y = response(kind, 20 + f)
      const { whole, fraction } = splitDelay(kind, 20 + f)
      const expected = new Float64Array(64)
      expected.set(tapsOf(kind, fraction), whole + firstTap(kind))
      // The delay passes through milliseconds and back, which costs a few units in its last place.
      expect(largestDifference(y, expected)).toBeLessThan(1e-13)
    }
  })
  it('allpass1', () => {
    for (const delay of [20.5, 20.9, 21.4]) {
      const y = response('allpass1', delay)
      const { whole, fraction } = splitDelay('allpass1', delay)
      const eta = allpassCoefficient(fraction)
      // η δ[n] + (1 − η²) Σ (−η)^k δ[n − 1 − k]: the series of (η + z⁻¹)/(1 + η z⁻¹).
      const expected = y.map((_, n) => {
        const k = n - whole - 1
        return n === whole ? eta : k >= 0 ? (1 - eta * eta) * (-eta) ** k : 0
      })
      expect(largestDifference(y, expected)).toBeLessThan(1e-13)
    }
  })
})
