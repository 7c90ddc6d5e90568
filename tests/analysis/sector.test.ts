import { describe, expect, it } from 'vitest'
import { boundedLevel, sectorOf, shaperPeak } from '../../src/analysis/sector.ts'
import { createShaper } from '../../src/dsp/shaper.ts'
import { shaper } from './loopSets.ts'

const curves = [
  shaper('hardClip'),
  shaper('arctan', { drive: 3 }),
  shaper('tanh', { drive: 2, ceiling: 0.5, positive: 0.7 }),
  shaper('cubic', { drive: 0.4 }),
  shaper('diode', { drive: 5 }),
  shaper('deadZone', { deadZone: 0.1 }),
  shaper('drawn', {
    points: [
      [0, 0],
      [0.2, 0.6],
      [0.5, 0.1],
      [1, -0.3],
    ],
    negative: 0.5,
  }),
]

describe.each(curves.map((s) => [s.curve, s] as const))('sector of %s', (_, s) => {
  const { curve, mean } = createShaper(s)
  const { bound } = sectorOf(s)
  const inputs = Array.from({ length: 4001 }, (_, i) => ((i - 2000) / 500) ** 3)

  it('|shaper(r)| ≤ σ |r|, and some r comes close', () => {
    const ratios = inputs.filter((r) => r !== 0).map((r) => Math.abs(curve(r) / r))
    expect(Math.max(...ratios)).toBeLessThanOrEqual(bound * (1 + 1e-12))
    expect(Math.max(...ratios)).toBeGreaterThan(0.97 * bound)
  })

  it('anti-aliased it stays in the sector of both its inputs’ mean size', () => {
    for (let i = 1; i < inputs.length; i += 7) {
      for (const j of [i - 1, 4000 - i, 2000]) {
        const [a, b] = [inputs[i] as number, inputs[j] as number]
        expect(Math.abs(mean(a, b))).toBeLessThanOrEqual((bound * (Math.abs(a) + Math.abs(b))) / 2 + 1e-12)
      }
    }
  })

  it('its peak up to a level is the largest value on a grid', () => {
    for (const level of [0.1, 0.3, 1, 4]) {
      const largest = Math.max(...Array.from({ length: 2001 }, (_, i) => Math.abs(curve((level * (i - 1000)) / 1000))))
      const peak = shaperPeak(s, level)
      expect(largest).toBeLessThanOrEqual(peak + 1e-12)
      expect(peak - largest).toBeLessThan(2e-3 * Math.max(1, bound) * level)
    }
  })
})

describe('bounded level A', () => {
  it('of tanh at 1.2 is the smallest solution of 1 + 1.2 tanh A = A', () => {
    const level = boundedLevel(shaper('tanh'), { feedback: 1.2, readPeak: 1, toneL1: 1 }) as number
    expect(Math.abs(1 + 1.2 * Math.tanh(level) - level)).toBeLessThan(1e-9)
  })

  // Beyond its zone a dead zone is a straight line: 1 + g (A − 0.1) = A.
  it('of a dead zone of 0.1 is (1 − 0.1 g)/(1 − g), however near g comes to 1, and from 1 on there is none', () => {
    const zone = shaper('deadZone', { deadZone: 0.1 })
    for (const feedback of [0.5, 0.9, 0.9999]) {
      const expected = (1 - 0.1 * feedback) / (1 - feedback)
      expect(boundedLevel(zone, { feedback, readPeak: 1, toneL1: 1 })! / expected).toBeCloseTo(1, 8)
    }
    for (const feedback of [1, 1.1]) expect(boundedLevel(zone, { feedback, readPeak: 1, toneL1: 1 })).toBeNull()
  })

  it('counts the read and the filters: hard clip, cubic read', () => {
    expect(boundedLevel(shaper('hardClip'), { feedback: 1.5, readPeak: 1.25, toneL1: 2 })).toBeCloseTo(1 + 1.5 * 1.25, 12)
  })

  it('a diode bounds, though it has no ceiling', () => {
    expect(boundedLevel(shaper('diode'), { feedback: 2, readPeak: 1, toneL1: 1 })).toBeLessThan(3)
  })

  it('a dead zone does not, at a gain above 1', () => {
    expect(boundedLevel(shaper('deadZone', { deadZone: 0.1 }), { feedback: 1.1, readPeak: 1, toneL1: 1 })).toBeNull()
  })
})
