// Oracles: FACTS 3 (computed there) and closed forms.
import { describe, expect, it } from 'vitest'
import { droop, droopFrequencyHz, readLossDb } from '../../src/analysis/droop.ts'
import { changedSet } from '../dsp/sets.ts'

const omega = (hz: number) => (2 * Math.PI * hz) / 48000

describe('the loss of one read', () => {
  // FACTS 3, C: linear at half a sample cos(πF/fs); third-order Lagrange there.
  it.each([
    ['linear', 5000, 0.474],
    ['linear', 10000, 2.01],
    ['linear', 15000, 5.1],
    ['lagrange3', 5000, 0.036],
    ['lagrange3', 10000, 0.534],
    ['lagrange3', 15000, 2.53],
    ['lagrange3', 20000, 8.4],
    ['hermite4', 10000, 0.534],
  ] as const)('%s at half a sample loses at %i Hz %f dB', (kind, hz, db) => {
    expect(readLossDb(kind, 7.5, omega(hz))).toBeCloseTo(db, hz === 20000 || db === 5.1 ? 1 : 2)
  })

  it('a linear read loses −20 log10 cos(ω/2) at half a sample, nothing at whole ones', () => {
    expect(readLossDb('linear', 3.5, 1.1)).toBeCloseTo(-20 * Math.log10(Math.cos(0.55)), 12)
    for (const kind of ['linear', 'lagrange3', 'hermite4', 'nearest'] as const) expect(readLossDb(kind, 4, 1.1)).toBeCloseTo(0, 12)
  })

  it('an all-pass read loses nothing at any fraction', () => {
    for (const delay of [3, 3.3, 3.5, 3.9]) expect(readLossDb('allpass1', delay, 1.3)).toBe(0)
  })
})

describe('the worst loss over the sweep', () => {
  const still = (samples: number) =>
    changedSet((set) => {
      set.voices.count = 1
      set.sweep.rateHz = 0
      set.sweep.depthMs = 0
      set.line.interpolation = 'linear'
      set.line.baseMs = samples / 48
    })

  it('is judged at 10 kHz or 0.4 fs', () => {
    expect([droopFrequencyHz(48000), droopFrequencyHz(192000), droopFrequencyHz(8000)]).toEqual([10000, 10000, 3200])
  })

  it('a delay that stands has one fraction', () => {
    expect(droop(still(100)).voices.lossDb).toBeCloseTo(0, 9)
    const { voices } = droop(still(100.25))
    expect(voices.lossDb).toBeCloseTo(-10 * Math.log10(0.75 ** 2 + 0.25 ** 2 + 2 * 0.75 * 0.25 * Math.cos(omega(10000))), 9)
    expect(voices.fractions[0]).toBeCloseTo(0.25, 9)
  })

  it('a delay that moves a little reaches a few fractions, one that moves a sample all', () => {
    const moved = (depthSamples: number, base = 100.1) =>
      droop(
        changedSet((set) => {
          set.voices.count = 1
          set.line.interpolation = 'linear'
          set.line.baseMs = base / 48
          set.sweep.depthMs = depthSamples / 48
        }),
      ).voices
    const little = moved(0.05)
    expect(little.fractions[0]).toBeCloseTo(0.05, 9)
    expect(little.fractions[1]).toBeCloseTo(0.15, 9)
    expect(little.lossDb).toBeCloseTo(readLossDb('linear', 100.15, omega(10000)), 9)
    expect(moved(1).lossDb).toBeCloseTo(2.0107, 3)
    // From 0.8 to 0.2 over a whole sample: half a sample is not reached.
    expect(moved(0.2, 100).lossDb).toBeCloseTo(readLossDb('linear', 100.2, omega(10000)), 9)
  })

  it('a square without an edge reaches its two ends alone', () => {
    const { voices } = droop(
      changedSet((set) => {
        set.voices.count = 1
        set.line.interpolation = 'linear'
        set.line.baseMs = 100 / 48
        Object.assign(set.sweep, { shape: 'square', edgeMs: 0, depthMs: 3 / 48 })
      }),
    )
    expect(voices.lossDb).toBeCloseTo(0, 9)
  })

  it('the loop counts when it is heard, at its own read', () => {
    const looped = (feedback: number, antialias: boolean) =>
      droop(
        changedSet((set) => {
          set.line.baseMs = 480 / 48
          Object.assign(set.loop, { feedback, delay: 'fixed', interpolation: 'linear' })
          if (antialias) set.loop.shaper = { ...shaper, antialias: 'adaa1' }
        }),
      ).loop
    expect(looped(0, false)).toBeNull()
    expect(looped(0.5, false)?.lossDb).toBeCloseTo(0, 9)
    // The shaper delays by half a sample, which the read gives back: it stands at half a sample.
    expect(looped(0.5, true)?.lossDb).toBeCloseTo(2.0107, 3)
  })
})

const shaper = {
  curve: 'tanh',
  drive: 1,
  ceiling: 1,
  positive: 1,
  negative: 1,
  deadZone: 0,
  points: [],
  tableSize: 1024,
  tableRange: 1,
  tableInterpolation: 'linear',
  antialias: 'none',
} as const
