import { describe, expect, it } from 'vitest'
import { createRandom } from '../../src/signal/random.ts'
import { MAX_RESAMPLED_FRAMES, RESAMPLE_REACH, resampledLength, resampleTo } from '../../src/signal/resample.ts'

const PHASE = 0.3
const sine = (hz: number, rate: number, seconds: number) =>
  Float64Array.from({ length: Math.ceil(rate * seconds) }, (_, n) => Math.sin((2 * Math.PI * hz * n) / rate + PHASE))
const one = (x: Float64Array, from: number, to: number) => resampleTo([x], from, to)[0] as Float64Array
/** Samples whose taps lie wholly inside the input. */
const inner = (y: Float64Array, from: number, to: number) => {
  const edge = Math.ceil(((RESAMPLE_REACH + 2) * to) / Math.min(from, to))
  return { from: edge, to: y.length - edge }
}

const RATES = [
  [44100, 48000],
  [48000, 44100],
  [22050, 48000],
  [48000, 96000],
  [96000, 48000],
  [192000, 8000],
  [8000, 192000],
  [44101, 48000],
  [48000, 44100.5],
] as const

describe('resampleTo', () => {
  // Oracle: closed form, the same sine at the other rate, sample by sample: gain, delay and images in one figure.
  it.each(RATES)('%d Hz to %d Hz: a sine up to 0.9 of Nyquist is the same sine, in place', (from, to) => {
    for (const part of [0.01, 0.2, 0.5, 0.8, 0.9]) {
      const hz = (part * Math.min(from, to)) / 2
      const y = one(sine(hz, from, 0.25), from, to)
      const range = inner(y, from, to)
      let worst = 0
      for (let m = range.from; m < range.to; m++) {
        worst = Math.max(worst, Math.abs((y[m] as number) - Math.sin((2 * Math.PI * hz * m) / to + PHASE)))
      }
      expect(range.to - range.from).toBeGreaterThan(100)
      // 0.01 dB of ripple alone would be 1.2e-3; designed for −120 dB.
      expect(worst).toBeLessThan(2e-6)
    }
  })

  it.each(RATES.filter(([from, to]) => to < from))('%d Hz to %d Hz: what would fold is at least 100 dB down', (from, to) => {
    for (const part of [1.0001, 1.03, 1.2, 1.7]) {
      const hz = (part * to) / 2
      if (hz >= from / 2) continue
      const y = one(sine(hz, from, 0.25), from, to)
      const range = inner(y, from, to)
      const worst = y.subarray(range.from, range.to).reduce((a, v) => Math.max(a, Math.abs(v)), 0)
      expect(worst).toBeLessThan(1e-5)
    }
  })

  it('passes a constant exactly, away from the ends', () => {
    const y = one(new Float64Array(2000).fill(0.7), 44100, 48000)
    for (let m = 200; m < 1900; m++) expect(Math.abs((y[m] as number) - 0.7)).toBeLessThan(1e-14)
  })

  it('keeps an impulse where it was, with even sides', () => {
    const x = new Float64Array(401)
    x[200] = 1
    const y = one(x, 48000, 96000)
    expect(y.indexOf(Math.max(...y))).toBe(400)
    for (let k = 1; k < 150; k++) expect((y[400 + k] as number) - (y[400 - k] as number)).toBeCloseTo(0, 14)
  })

  it('is linear and treats channels apart', () => {
    const random = createRandom(2)
    const [a, b] = [0, 1].map(() => Float64Array.from({ length: 500 }, () => random() - 0.5)) as [Float64Array, Float64Array]
    const [ya, yb] = resampleTo([a, b], 44100, 48000) as [Float64Array, Float64Array]
    expect(yb).toEqual(one(b, 44100, 48000))
    const sum = one(
      a.map((v, i) => v - 2 * (b[i] as number)),
      44100,
      48000,
    )
    sum.forEach((v, m) => {
      expect(v).toBeCloseTo((ya[m] as number) - 2 * (yb[m] as number), 13)
    })
  })

  it.each([
    [1, 44100, 48000, 2],
    [44100, 44100, 48000, 48000],
    [44101, 44100, 48000, 48002],
    [48000, 48000, 44100, 44100],
    [3, 96000, 48000, 2],
    [0, 44100, 48000, 0],
    [1_000_000_007, 44100, 48000, 1_088_435_382],
  ])('%i samples from %i Hz to %i Hz are ceil(n·to/from) = %i', (n, from, to, length) => {
    expect(resampledLength(n, from, to)).toBe(length)
    if (n < 1e6) expect(one(new Float64Array(n), from, to).length).toBe(length)
  })

  it('equal rates give a copy, single precision comes back double', () => {
    const x = Float32Array.of(0.1, -0.2)
    expect(resampleTo([x], 48000, 48000)).toEqual([Float64Array.from(x)])
  })

  it('gives the same bits each time', () => {
    expect(one(sine(440, 44100, 0.05), 44100, 48000)).toEqual(one(sine(440, 44100, 0.05), 44100, 48000))
  })

  it('refuses rates and lengths out of range, naming them', () => {
    expect(() => one(new Float64Array(4), 999, 48000)).toThrow(/fromHz must be 1000 to 768000 Hz.*got 999/)
    expect(() => one(new Float64Array(4), 48000, Number.NaN)).toThrow(/toHz/)
    expect(() => one(new Float64Array(4), 48000.0004, 44100)).toThrow(/48000.0004/)
    expect(() => one(new Float64Array(MAX_RESAMPLED_FRAMES / 256), 1000, 768000)).toThrow(/1048576 samples make/)
  })
})
