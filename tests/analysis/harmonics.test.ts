// Oracles: FACTS 7 (clipped-sine series, a standard integral; computed figures there), textbook square wave, Chebyshev polynomials.
import { describe, expect, it } from 'vitest'
import { drivenSine, harmonicDb, totalDistortion } from '../../src/analysis/harmonics.ts'
import { defaultShaper } from '../../src/set/defaults.ts'
import type { Shaper } from '../../src/set/types.ts'

const shaper = (curve: Shaper['curve'], change: Partial<Shaper> = {}): Shaper => ({ ...defaultShaper(curve), ...change })

/** b_n of a sine of amplitude A clipped at ±c. Against cosines the 3rd, 7th … change sign. */
function clipped(n: number, a: number, c: number): number {
  const theta = Math.asin(c / a)
  if (n === 1) return ((2 * a) / Math.PI) * (theta + Math.sin(theta) * Math.cos(theta))
  const size = n * Math.cos(theta) * Math.sin(n * theta) - Math.sin(theta) * Math.cos(n * theta)
  return ((4 * a) / (Math.PI * n * (n * n - 1))) * size
}

describe('drivenSine', () => {
  it('a clipped sine has the harmonics of its series, to the last places; even ones exactly none', () => {
    // Limit 0.5 of amplitude 1, and 0.8: figures printed in FACTS 7.
    const printed = [
      [0.5, [0.608998, 0.137832, 0.027566, -0.009845]],
      [0.8, [0.895912, 0.073339, -0.031096]],
    ] as const
    for (const [limit, figures] of printed) {
      const { amplitudes } = drivenSine(shaper('hardClip', { positive: limit, negative: limit }), 1, 21)
      figures.forEach((figure, k) => {
        expect(Math.abs(Math.abs(amplitudes[2 * k + 1] as number) - Math.abs(figure))).toBeLessThan(6e-7)
      })
      for (let n = 1; n <= 21; n += 2) {
        const sign = n % 4 === 3 ? -1 : 1
        expect(Math.abs((amplitudes[n] as number) - sign * clipped(n, 1, limit)), `harmonic ${n}`).toBeLessThan(2e-15)
      }
      for (let n = 0; n <= 20; n += 2) expect(amplitudes[n]).toBe(0)
    }
  })

  it('unlike limits leave DC and even harmonics: FACTS 7, +0.4 and −0.8', () => {
    const { amplitudes } = drivenSine(shaper('hardClip', { positive: 0.4, negative: 0.8 }), 1, 4)
    const sizes = Array.from(amplitudes, Math.abs)
    expect(sizes[0]).toBeCloseTo(0.117, 3)
    ;[0.696, 0.118, 0.102, 0.027].forEach((figure, k) => {
      expect(sizes[k + 1]).toBeCloseTo(figure, 3)
    })
  })

  it('driven hard, a clip is a square wave: −9.54, −13.98, −16.90, −19.08 dB', () => {
    const sine = drivenSine(shaper('hardClip', { drive: 1000 }), 1, 9)
    ;[3, 5, 7, 9].forEach((n) => {
      expect(harmonicDb(sine, n)).toBeCloseTo(-20 * Math.log10(n), 3)
    })
    // √(π²/8 − 1), all harmonics of a square wave; edges of a thousandth take a thousandth of it.
    expect(totalDistortion(sine)).toBeCloseTo(Math.sqrt((Math.PI * Math.PI) / 8 - 1), 2)
  })

  it('a cubic below its end makes a third harmonic alone: cos³ = (3 cos + cos 3)/4', () => {
    const sine = drivenSine(shaper('cubic'), 1, 9)
    expect(sine.amplitudes[1]).toBeCloseTo(1 - 1 / 9, 14)
    expect(sine.amplitudes[3]).toBeCloseTo(-1 / 27, 14)
    for (const n of [2, 4, 5, 6, 7, 8, 9]) expect(harmonicDb(sine, n)).toBeNull()
    expect(sine.restRms).toBeLessThan(1e-15)
  })

  it('known harmonics and rest together are the whole energy, by a plain mean over the cycle', () => {
    for (const curve of ['hardClip', 'arctan', 'tanh', 'cubic', 'diode', 'deadZone'] as const)
      for (const drive of [0.3, 4, 300]) {
        const p = shaper(curve, { drive, positive: 0.9, negative: 0.6, deadZone: 0.05, ceiling: 0.8 })
        const whole = (count: number) => {
          const { amplitudes, restRms } = drivenSine(p, 0.7, count)
          return amplitudes.reduce((sum, c, n) => sum + (n === 0 ? c * c : (c * c) / 2), restRms * restRms)
        }
        expect(whole(40) / whole(3), `${curve} × ${drive}`).toBeCloseTo(1, 12)
      }
  })

  it('nothing through a dead zone: no first, so no levels', () => {
    const sine = drivenSine(shaper('deadZone', { deadZone: 0.6 }), 0.5, 5)
    expect([harmonicDb(sine, 3), totalDistortion(sine)]).toEqual([null, null])
  })

  it('refuses what it cannot answer, with range and value', () => {
    expect(() => drivenSine(shaper('tanh'), 0, 3)).toThrow(/amplitude must be above 0, got 0/)
    expect(() => drivenSine(shaper('tanh'), 1, 0)).toThrow(/count must be .* got 0/)
    expect(() => drivenSine(shaper('tanh'), 1, 3, 4)).toThrow(/radiansPerSample must be .* got 4/)
  })
})
