import { describe, expect, it } from 'vitest'
import { delayAxis, sweepAt, sweepCurves, sweepWords } from '../../../app/plots/sweep/sweepCurves.ts'
import { defaultSet } from '../../../src/set/defaults.ts'
import { comb } from '../workers/combs.ts'

const vibrato = { ...comb({ baseMs: 3.5, depthMs: 2.5 }), sweep: { ...comb({ depthMs: 2.5 }).sweep, rateHz: 0.23 } }

describe('the curves of the sweep', () => {
  it('hold one cycle of every voice and channel, the end repeating the start', () => {
    const { positions, voices } = sweepCurves(defaultSet())
    expect([positions[0], positions.at(-1)]).toEqual([0, 1])
    expect(voices).toHaveLength(6)
    for (const { delayMs, cents } of voices) {
      expect(delayMs[0]).toBe(delayMs.at(-1))
      expect(cents[0]).toBe(cents.at(-1))
      expect(delayMs).toHaveLength(positions.length)
    }
  })

  // Oracle: a sine of amplitude D s at f Hz bends by 1200 log2(1 ∓ 2π f D) cents (Dattorro 1997, 4.4.2); delay base + D sin 2πφ.
  it('follow the closed form of a sine', () => {
    const { minMs, maxMs, maxCents } = sweepCurves(vibrato)
    expect(minMs).toBeCloseTo(1, 6)
    expect(maxMs).toBeCloseTo(6, 6)
    expect(maxCents).toBeCloseTo(-1200 * Math.log2(1 - 2 * Math.PI * 0.23 * 0.0025), 3)
    const at = sweepAt(vibrato, 0.38)
    expect(at.delayMs).toBeCloseTo(3.5 + 2.5 * Math.sin(2 * Math.PI * 0.38), 9)
    expect(at.cents).toBeCloseTo(1200 * Math.log2(1 - 2 * Math.PI * 0.23 * 0.0025 * Math.cos(2 * Math.PI * 0.38)), 6)
  })

  it('read as position, delay and cents', () => {
    expect(sweepWords(vibrato, 0.38)).toBe('position 0.38 · 5.21 ms · +4.6 cents')
  })

  it('say where nothing is played forwards', () => {
    const fast = { ...vibrato, line: { ...vibrato.line, baseMs: 40 }, sweep: { ...vibrato.sweep, rateHz: 10, depthMs: 30 } }
    expect(sweepCurves(fast).voices[0]?.cents.some(Number.isNaN)).toBe(true)
    expect(sweepWords(fast, 0)).toBe('position 0.00 · 40.00 ms · not played forwards')
  })

  it('have an axis with air around them, also when the sweep stands', () => {
    const [low, high] = delayAxis({ minMs: 1, maxMs: 6 })
    expect([low, high]).toEqual([0.4, 6.6])
    const [still, above] = delayAxis({ minMs: 5, maxMs: 5 })
    expect(above).toBeGreaterThan(still)
  })
})
