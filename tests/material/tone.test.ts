import { describe, expect, it } from 'vitest'
import { phrase } from '../../src/material/phrases.ts'
import { toneInto } from '../../src/material/tone.ts'
import { peak, toDb } from '../../src/signal/levels.ts'

describe('tone', () => {
  it('phrase: whole cycles in the circle, level as asked', () => {
    const x = phrase('tone', 48000, { tone: { hz: 1000.07, levelDb: -12 } })
    expect(toDb(peak(x))).toBeCloseTo(-12, 2)
    // Oracle: closed form, 4000 cycles in 192000 samples.
    for (const n of [0, 1, 777, 191999]) expect(x[n]).toBeCloseTo(10 ** (-12 / 20) * Math.sin((2 * Math.PI * 4000 * n) / 192000), 9)
  })

  it('toneInto goes on from the phase it returned, at any frequency and in any blocks', () => {
    const whole = new Float64Array(5000)
    toneInto(whole, { sampleRate: 44100, hz: 441.37, levelDb: -6, phase: 0.25 })
    const parts = new Float64Array(5000)
    let phase = 0.25
    for (let n = 0; n < 5000; n += 128)
      phase = toneInto(parts.subarray(n, Math.min(5000, n + 128)), { sampleRate: 44100, hz: 441.37, levelDb: -6, phase })
    parts.forEach((v, n) => {
      expect(Math.abs(v - 10 ** -0.3 * Math.sin(2 * Math.PI * (0.25 + (n * 441.37) / 44100)))).toBeLessThan(1e-9)
      expect(Math.abs(v - (whole[n] as number))).toBeLessThan(1e-9)
    })
    expect(phase).toBeGreaterThanOrEqual(0)
    expect(phase).toBeLessThan(1)
  })

  it('refuses frequencies and levels out of range, naming them', () => {
    expect(() => phrase('tone', 48000, { tone: { hz: 24001, levelDb: -6 } })).toThrow(/hz must be 1 to 24000, got 24001/)
    expect(() => phrase('tone', 48000, { tone: { hz: 440, levelDb: 1 } })).toThrow(/levelDb must be -120 to 0 dBFS, got 1/)
  })
})
