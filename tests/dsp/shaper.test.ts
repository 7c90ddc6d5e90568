import { describe, expect, it } from 'vitest'
import { createShaper } from '../../src/dsp/shaper.ts'
import { curveValue } from '../../src/dsp/shaperCurves.ts'
import { defaultShaper } from '../../src/set/defaults.ts'
import type { Curve, Shaper } from '../../src/set/types.ts'
import { largestDifference } from './close.ts'
import { random } from './sets.ts'

const CURVES: readonly Curve[] = ['hardClip', 'arctan', 'tanh', 'cubic', 'diode', 'deadZone', 'drawn']
const asymmetric = (curve: Curve): Shaper => ({
  ...defaultShaper(curve),
  drive: 2,
  ceiling: 0.8,
  positive: 0.5,
  negative: 0.9,
  deadZone: 0.1,
  points: [
    [0, 0],
    [0.4, 0.5],
    [1, 0.8],
    [2, 0.6],
  ],
})

/** Amplitude of harmonic n of curve(A sin t): coefficient of sin nt, by a long sum. */
function harmonic(curve: (x: number) => number, amplitude: number, n: number, odd = true): number {
  const N = 1 << 14
  let sum = 0
  for (let i = 0; i < N; i++) {
    const t = (2 * Math.PI * (i + 0.5)) / N
    sum += curve(amplitude * Math.sin(t)) * (odd ? Math.sin(n * t) : Math.cos(n * t))
  }
  return ((n === 0 ? 1 : 2) * sum) / N
}

// Oracle: Fourier series of a clipped sine (standard integral; values FACTS 7).
describe('a sine clipped hard has the published harmonics', () => {
  it.each([
    [0.5, [0.608998, 0.137832, 0.027566, -0.009845]],
    [0.8, [0.895912, 0.073339, -0.031096]],
  ] as const)('at %d of its peak', (limit, values) => {
    const { curve } = createShaper({ ...defaultShaper('hardClip'), positive: limit, negative: limit })
    const found = values.map((_, i) => harmonic(curve, 1, 2 * i + 1))
    expect(largestDifference(found, values)).toBeLessThan(1e-6)
    expect(harmonic(curve, 1, 2, false)).toBeCloseTo(0, 12)
  })

  it('unlike limits add DC and even harmonics', () => {
    const { curve } = createShaper({ ...defaultShaper('hardClip'), positive: 0.4, negative: 0.8 })
    // FACTS 7: asymmetric clip +0.4/−0.8: |DC| 0.117, h1 0.696, h2 0.118, h3 0.102.
    expect(Math.abs(harmonic(curve, 1, 0, false))).toBeCloseTo(0.117, 3)
    expect(Math.abs(harmonic(curve, 1, 1))).toBeCloseTo(0.696, 3)
    expect(Math.abs(harmonic(curve, 1, 2, false))).toBeCloseTo(0.118, 3)
    expect(Math.abs(harmonic(curve, 1, 3))).toBeCloseTo(0.102, 3)
  })
})

// Oracle: the printed curves of DESIGN 4 at hand-worked points.
it.each([
  ['hardClip', 0.7, 0.7],
  ['hardClip', 3, 1],
  ['arctan', 2 / Math.PI, 0.5],
  ['tanh', 1, Math.tanh(1)],
  ['cubic', 0.75, 0.6875],
  ['cubic', 1.5, 1],
  ['cubic', 4, 1],
  ['deadZone', 0.3, 0.3],
  ['diode', 0.5 + 0.002 * Math.sinh(0.5 / 0.12), 0.5],
] as const)('%s of %d is %d', (curve, x, y) => {
  const shaper = createShaper(defaultShaper(curve))
  expect(shaper.curve(x)).toBeCloseTo(y, 14)
  expect(shaper.curve(-x)).toBeCloseTo(-y, 14)
})

it('the diode solves its equation to the last places from nothing to very loud', () => {
  for (const t of [0, 1e-300, 1e-9, 0.1, 0.7, 1, 10, 1e3, 1e6]) {
    const v = curveValue(defaultShaper('diode'), t)
    expect(Math.abs(v + 0.002 * Math.sinh(v / 0.12) - t)).toBeLessThanOrEqual(4e-14 * Math.max(t, 1e-300))
  }
})

describe.each(CURVES)('%s', (name) => {
  const shaper = createShaper(asymmetric(name))
  const r = random(7)
  const xs = Array.from({ length: 200 }, () => r.between(-3, 3))

  it('the antiderivative has the curve as its slope and is 0 at 0', () => {
    expect(shaper.antiderivative(0)).toBe(0)
    for (const x of xs) {
      const h = 1e-4
      const slope = (shaper.antiderivative(x + h) - shaper.antiderivative(x - h)) / (2 * h)
      // Central difference: h² c''/6 on the smooth parts, up to h/2 times the change of slope at a corner.
      expect(Math.abs(slope - shaper.curve(x))).toBeLessThan(2e-4)
    }
  })

  it('the mean is the quotient of the antiderivative, also where that cancels', () => {
    for (const x of xs) {
      for (const width of [2, 0.3, 1e-2]) {
        const quotient = (shaper.antiderivative(x + width) - shaper.antiderivative(x)) / width
        expect(Math.abs(shaper.mean(x, x + width) - quotient)).toBeLessThan(1e-12)
      }
      // The curve is at most 1.6 steep, so its mean over so little is the curve in the middle within that times half the width.
      for (const width of [1e-5, 1e-8, 1e-12, 0]) {
        expect(Math.abs(shaper.mean(x, x + width) - shaper.curve(x + width / 2))).toBeLessThanOrEqual(width + 1e-15)
      }
      expect(shaper.mean(x + 0.3, x)).toBe(shaper.mean(x, x + 0.3))
    }
  })

  it('the slope at 0 is that of the smallest signals, either way', () => {
    expect(shaper.curve(1e-9) / 1e-9).toBeCloseTo(shaper.slopeAtZero, 6)
    expect(shaper.curve(-1e-9) / -1e-9).toBeCloseTo(shaper.slopeAtZero, 6)
  })

  it('the sector bound is reached and not passed', () => {
    let most = 0
    for (let i = 1; i <= 400000; i++) {
      const x = i * 1e-4 - 20
      if (x !== 0) most = Math.max(most, Math.abs(shaper.curve(x) / x))
    }
    const { sectorBound } = shaper
    expect(most).toBeLessThanOrEqual(sectorBound * (1 + 1e-9))
    // A dead zone comes near its asymptote only far out.
    expect(most).toBeGreaterThan(sectorBound * (name === 'deadZone' ? 0.99 : 0.999))
  })
})
