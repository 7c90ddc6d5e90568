import { describe, expect, it } from 'vitest'
import { inverseRealFft, nextPowerOfTwo, realFft } from '../../src/signal/fft.ts'
import { createRandom } from '../../src/signal/random.ts'

describe('realFft', () => {
  // Oracle: the defining sum, evaluated directly.
  it.each([2, 4, 8, 16, 32, 128])('equals the defining sum at %i points', (size) => {
    const random = createRandom(size)
    const x = Float64Array.from({ length: size }, () => 2 * random() - 1)
    const { re, im } = realFft(x)
    expect(re.length).toBe(size / 2 + 1)
    for (let k = 0; k <= size / 2; k++) {
      let [sumRe, sumIm] = [0, 0]
      x.forEach((v, n) => {
        sumRe += v * Math.cos((2 * Math.PI * k * n) / size)
        sumIm -= v * Math.sin((2 * Math.PI * k * n) / size)
      })
      expect(re[k]).toBeCloseTo(sumRe, 11)
      expect(im[k]).toBeCloseTo(sumIm, 11)
    }
  })

  it('puts a cosine of k whole cycles into bin k with half its energy', () => {
    const { re, im } = realFft(Float64Array.from({ length: 64 }, (_, n) => Math.cos((2 * Math.PI * 5 * n) / 64)))
    expect(re[5]).toBeCloseTo(32, 12)
    expect(Math.hypot(...re.filter((_, k) => k !== 5), ...im)).toBeLessThan(1e-12)
  })

  it('pads with zeros to the next power of two, or to the size asked for', () => {
    const x = Float64Array.of(1, -2, 3)
    expect(realFft(x)).toEqual(realFft(Float64Array.of(1, -2, 3, 0)))
    expect(realFft(x, 16).re.length).toBe(9)
  })

  it('comes back through the inverse', () => {
    const random = createRandom(3)
    const x = Float64Array.from({ length: 4096 }, () => random() - 0.5)
    inverseRealFft(realFft(x)).forEach((v, n) => {
      expect(Math.abs(v - (x[n] as number))).toBeLessThan(1e-14)
    })
  })

  it('refuses sizes that are no power of two, naming them', () => {
    expect(() => realFft(new Float64Array(4), 6)).toThrow(/got 6/)
    expect(() => realFft(new Float64Array(4), 2)).toThrow(/4 samples/)
    expect(() => nextPowerOfTwo(0)).toThrow(RangeError)
    expect(() => inverseRealFft({ re: new Float64Array(3), im: new Float64Array(2) })).toThrow(/2/)
  })

  it.each([
    [1, 1],
    [2, 2],
    [3, 4],
    [1025, 2048],
    [2 ** 27, 2 ** 27],
  ])('nextPowerOfTwo(%i) is %i', (n, power) => {
    expect(nextPowerOfTwo(n)).toBe(power)
  })
})
