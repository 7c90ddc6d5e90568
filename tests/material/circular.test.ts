import { describe, expect, it } from 'vitest'
import { addDecayingSine, addToCircle, setLevel } from '../../src/material/circular.ts'
import { pluck } from '../../src/material/string.ts'

const LENGTH = 100

describe('circle', () => {
  it('lays what exceeds the end over the beginning, more than once round', () => {
    const circle = new Float64Array(LENGTH)
    addToCircle(circle, 90, 230, () => 1)
    // 230 samples from 90: two whole turns and 30 more, 90 … 99 and 0 … 19.
    circle.forEach((v, n) => {
      expect(v).toBe(n >= 90 || n < 20 ? 3 : 2)
    })
  })

  // Oracle: closed form of the decaying sine, summed over the turns.
  it('a decaying sine wraps at its exact value', () => {
    const circle = new Float64Array(LENGTH)
    const sine = { start: 250, frames: 333, angle: 0.7, phase: 0.4, amplitude: 2, decay: 0.01 }
    addDecayingSine(circle, sine)
    const expected = new Float64Array(LENGTH)
    for (let n = 0; n < sine.frames; n++) {
      const at = (sine.start + n) % LENGTH
      expected[at] = (expected[at] as number) + 2 * Math.exp(-0.01 * n) * Math.sin(0.4 + 0.7 * n)
    }
    circle.forEach((v, n) => {
      expect(v).toBeCloseTo(expected[n] as number, 12)
    })
  })

  it('levels to the rms asked for, or to the peak where that is lower; silence stays', () => {
    const square = () => Float64Array.of(1, -1, 1, -1)
    expect([...setLevel(square(), { targetRms: 0.1, maxPeak: 0.5 })]).toEqual([0.1, -0.1, 0.1, -0.1])
    expect([...setLevel(square(), { targetRms: 0.1, maxPeak: 0.05 })]).toEqual([0.05, -0.05, 0.05, -0.05])
    expect([...setLevel(new Float64Array(2), { targetRms: 0.1, maxPeak: 0.5 })]).toEqual([0, 0])
  })
})

describe('string', () => {
  const string = { hz: 1000, amplitude: 1, pluckAt: 0.5, stiffness: 0, loss: 3, highLoss: 0, heldSeconds: 0.5 }

  // Oracle: closed form. Plucked in the middle, every even partial is missing: sin(kπ/2)/k for k = 1, 3, 5, all below 0.45 · 12 kHz. Let go
  // after half a second, the decay of 3/s becomes 43/s and the phases go on.
  it('is the sum of its modes, held and damped', () => {
    const circle = new Float64Array(12000)
    pluck(circle, 12000, 0, string)
    for (const n of [1, 10, 500, 5999, 6000, 6001, 6700]) {
      const t = n / 12000
      const modes = [1, 3, 5].reduce((sum, k) => sum + (Math.sin((k * Math.PI) / 2) / k) * Math.sin(2 * Math.PI * 1000 * k * t), 0)
      expect(circle[n]).toBeCloseTo(modes * Math.exp(-3 * t - 40 * Math.max(0, t - 0.5)), 9)
    }
  })

  it('is silent once damped below hearing', () => {
    const circle = new Float64Array(12000)
    pluck(circle, 12000, 0, string)
    expect(circle.subarray(6000 + 3600).every((v) => v === 0)).toBe(true)
  })
})
