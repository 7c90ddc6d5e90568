import { describe, expect, it } from 'vitest'
import { renderSet } from '../../src/dsp/render.ts'
import { delaySamples, edge, frozenShapeValue, loopDelaySamples, sweepPhase, sweepShapeValue } from '../../src/dsp/sweep.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { changedSet } from './sets.ts'

const sweep = (change: Partial<ParameterSet['sweep']>) => ({ ...changedSet(() => {}).sweep, ...change })

// Oracle: MurmurHash3_x86_32 of the empty string is the finaliser of its seed. Test values: the algorithm's public test vectors (from memory).
it('drift levels are those of the MurmurHash3 finaliser', () => {
  const level = (seed: number) => sweepShapeValue(sweep({ shape: 'drift', seed }), 0) * 2 ** 31
  expect(level(0)).toBe(0)
  expect(level(1)).toBe(0x514e28b7)
  expect(level(0xffffffff)).toBe(0x81f16f39 - 2 ** 32)
})

describe('shapes at marked places', () => {
  // Oracle: the printed shapes; e = 0.2 at 4 Hz and 50 ms.
  const at = { rateHz: 4, edgeMs: 50 }
  it.each([
    ['sine', [0, 1, 0, -1]],
    ['triangle', [0, 1, 0, -1]],
    ['square', [0, 1, 0, -1]],
    ['rampUp', [0, -0.625, 0, 0.625]],
    ['rampDown', [0, 0.625, 0, -0.625]],
  ] as const)('%s', (shape, values) => {
    values.forEach((value, i) => {
      expect(sweepShapeValue(sweep({ ...at, shape }), i / 4)).toBeCloseTo(value, 14)
      expect(sweepShapeValue(sweep({ ...at, shape }), i / 4 - 7)).toBeCloseTo(value, 14)
    })
  })

  it('an edge lasts edgeMs of the cycle, at most half of it', () => {
    expect(edge({ ...at } as ParameterSet['sweep'])).toBeCloseTo(0.2, 15)
    expect(edge({ rateHz: 100, edgeMs: 50 } as ParameterSet['sweep'])).toBe(0.5)
    expect(sweepShapeValue(sweep({ ...at, shape: 'square' }), 0.05)).toBeCloseTo(0.5, 14)
    expect(sweepShapeValue(sweep({ ...at, shape: 'rampUp' }), 0.1)).toBeCloseTo(-1, 14)
    expect(sweepShapeValue(sweep({ ...at, shape: 'rampUp' }), 0.9)).toBeCloseTo(1, 14)
  })

  it('without an edge the square is +1 below half and the ramp jumps at 0', () => {
    const jump = { rateHz: 4, edgeMs: 0 }
    expect([0, 0.4999, 0.5, 0.9999].map((phase) => sweepShapeValue(sweep({ ...jump, shape: 'square' }), phase))).toEqual([1, 1, -1, -1])
    expect(sweepShapeValue(sweep({ ...jump, shape: 'rampUp' }), 0)).toBe(-1)
  })

  it('drawn runs straight between points and closes over the end of the cycle', () => {
    const s = sweep({
      shape: 'drawn',
      points: [
        [0.1, 0],
        [0.6, 1],
      ],
    })
    expect(sweepShapeValue(s, 0.35)).toBeCloseTo(0.5, 14)
    expect(sweepShapeValue(s, 0.85)).toBeCloseTo(0.5, 14)
    expect(sweepShapeValue(s, 0)).toBeCloseTo(0.2, 14)
  })

  it('a frozen drift counts as the sine, the others as themselves', () => {
    expect(frozenShapeValue(sweep({ shape: 'drift' }), 1.25)).toBeCloseTo(1, 14)
    expect(frozenShapeValue(sweep({ shape: 'triangle' }), 0.125)).toBeCloseTo(0.5, 14)
  })
})

describe('phase and delay', () => {
  const set = changedSet((s) => {
    s.sampleRate = 48000
    s.line.baseMs = 10
    s.sweep = { ...s.sweep, rateHz: 3, startPhase: 0.2, stereoPhase: 90, depthMs: 2 }
    s.voices = { count: 3, phaseSpread: 180, spreadMs: 4 }
  })

  it('phase is the printed sum, in its order', () => {
    expect(sweepPhase(set, 12345, 1, 2, 48000)).toBe((12345 * 3) / 48000 + 0.2 + (2 * 180) / (360 * 3) + (1 * 90) / 360)
  })

  it('time law: base, offset and depth in ms', () => {
    expect(delaySamples(set, 0.25, 0, 48000)).toBeCloseTo((10 - 2 + 2) * 48, 10)
    expect(delaySamples(set, 0.75, 1, 48000)).toBeCloseTo((10 + 0 - 2) * 48, 10)
    expect(delaySamples(set, 0.25, 2, 48000)).toBeCloseTo((10 + 2 + 2) * 48, 10)
  })

  it('ratio law: depth in octaves', () => {
    const ratio = { ...set, sweep: { ...set.sweep, law: 'ratio' as const, depthOctaves: 1 } }
    expect(delaySamples(ratio, 0.25, 1, 48000)).toBeCloseTo(20 * 48, 10)
    expect(delaySamples(ratio, 0.75, 0, 48000)).toBeCloseTo(4 * 48, 10)
  })

  it('the loop reads without the spread, or at base, half a sample sooner under adaa1', () => {
    expect(loopDelaySamples(set, 0.25, 48000)).toBeCloseTo(12 * 48, 10)
    const fixed = { ...set, loop: { ...set.loop, delay: 'fixed' as const } }
    expect(loopDelaySamples(fixed, 0.25, 48000)).toBe(480)
    const shaper = { ...changedSet(() => {}).loop, shaper: { curve: 'tanh', antialias: 'adaa1' } as ParameterSet['loop']['shaper'] }
    expect(loopDelaySamples({ ...set, loop: { ...shaper, delay: 'fixed' } }, 0.25, 48000)).toBe(479.5)
  })
})

describe('Doppler: the delay read changes pitch by 1 − dD/dt', () => {
  // Oracle: FACTS 4, computed examples of J. O. Smith's formula (PASP, "Time-Varying Delay-Line Reads"): sine D ms, f Hz, cents up and down.
  it.each([
    [1, 0.5, 5.43, -5.45],
    [2, 0.25, 5.43, -5.45],
    [5, 1, 53.6, -55.3],
    [3, 5, 155.9, -171.4],
  ])('a sine of ±%d ms at %d Hz bends by the published cents', (depthMs, rateHz, up, down) => {
    const set = changedSet((s) => {
      s.line.baseMs = 20
      s.sweep = { ...s.sweep, depthMs, rateHz }
    })
    const fs = 48000
    const step = rateHz / fs
    const cents = (phase: number) =>
      1200 * Math.log2(1 - (delaySamples(set, phase + step / 2, 0, fs) - delaySamples(set, phase - step / 2, 0, fs)))
    expect(cents(0.5)).toBeCloseTo(up, 1)
    expect(cents(0)).toBeCloseTo(down, 1)
  })

  // Oracle: FACTS 4, triangle |dD/dt| = 4 f D; frequency counted from the zero crossings of what comes out.
  it('a rendered tone under a triangle sweep comes out at f (1 ∓ 4 f D)', () => {
    const set = changedSet((s) => {
      s.sampleRate = 48000
      s.layout = 'mono'
      s.line = { baseMs: 10, interpolation: 'lagrange3' }
      s.sweep = { ...s.sweep, shape: 'triangle', rateHz: 0.5, depthMs: 4, updateEvery: 1 }
      s.voices = { count: 1, phaseSpread: 0, spreadMs: 0 }
      Object.assign(s.mix, { dry: 0, wet: 1 })
    })
    const tone = Float64Array.from({ length: 96000 }, (_, n) => Math.sin((2 * Math.PI * 1000 * n) / 48000))
    const y = renderSet(set, [tone])[0]!
    const frequency = (from: number, to: number) => {
      const crossings: number[] = []
      for (let n = from; n < to; n++) if (y[n - 1]! < 0 && y[n]! >= 0) crossings.push(n - 1 + -y[n - 1]! / (y[n]! - y[n - 1]!))
      return ((crossings.length - 1) * 48000) / (crossings.at(-1)! - crossings[0]!)
    }
    // Delay grows for the first quarter of the cycle and after three quarters, and shrinks between.
    expect(frequency(2000, 23000)).toBeCloseTo(1000 * (1 - 4 * 0.5 * 0.004), 2)
    expect(frequency(26000, 70000)).toBeCloseTo(1000 * (1 + 4 * 0.5 * 0.004), 2)
  })
})
