// Oracles: FACTS 4 (sine and triangle, computed there), closed forms of chords, and the delays the signal path evaluates, sample by sample.
import { describe, expect, it } from 'vitest'
import { sweepDetune } from '../../src/analysis/detune.ts'
import { delaySamples, sweepPhase } from '../../src/dsp/sweep.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { randomSet } from '../dsp/sets.ts'
import { sweptSet } from './combs.ts'

describe('published figures', () => {
  it.each([
    [1, 0.5, 5.43, -5.45],
    [2, 0.25, 5.43, -5.45],
    [5, 1, 53.6, -55.3],
    [3, 5, 155.9, -171.4],
  ])('sine of %f ms at %f Hz: +%f and %f', (depthMs, rateHz, up, down) => {
    const { upCents, downCents, maxCents, motion } = sweepDetune(sweptSet('sine', depthMs, rateHz))
    const digits = up < 10 ? 0.005 : 0.051
    expect(Math.abs(upCents - up)).toBeLessThan(digits)
    expect(Math.abs(downCents! - down)).toBeLessThan(digits)
    expect(maxCents).toBe(-downCents!)
    expect(motion).toBe('plays')
  })

  it.each([
    [1, 0.5, 3.46],
    [5, 1, 34.3],
    [3, 5, 100.9],
  ])('triangle of %f ms at %f Hz: %f up', (depthMs, rateHz, up) => {
    expect(Math.abs(sweepDetune(sweptSet('triangle', depthMs, rateHz)).upCents - up)).toBeLessThan(up < 10 ? 0.005 : 0.051)
  })

  // FACTS 2a, white chorus: 400 ± 350 samples at 44.1 kHz, 0.15 Hz: +12.90 and −13.00 cents.
  it('white chorus', () => {
    const set = { ...sweptSet('sine', 350000 / 44100, 0.15), sampleRate: 44100 }
    const { upCents, downCents } = sweepDetune(set)
    expect(upCents).toBeCloseTo(12.9, 2)
    expect(downCents).toBeCloseTo(-13.0, 2)
  })
})

describe('what is really read', () => {
  it('a sine through updates every K samples: the chord 2 depth sin(π rate h)/h', () => {
    const h = 64 / 8000
    const set = { ...sweptSet('sine', 1, 60, { updateEvery: 64 }), sampleRate: 8000 }
    expect(sweepDetune(set).maxSlope).toBeCloseTo((2 * 0.001 * Math.sin(Math.PI * 60 * h)) / h, 10)
  })

  it('an edge shorter than the update is spread over it, at any rate', () => {
    const jump = sweptSet('square', 1, 0.5, { edgeMs: 0, updateEvery: 64 })
    const { minSlope, hopSamples } = sweepDetune(jump)
    expect(hopSamples).toBeCloseTo(96, 9)
    expect(minSlope).toBeCloseTo(-96 / 64, 9)
    expect(sweepDetune(jump, 96000).minSlope).toBeCloseTo(-192 / 64, 9)
  })

  it('an edge longer than the update has its own slope: 2 depth over the edge', () => {
    for (const shape of ['square', 'rampUp', 'rampDown'] as const)
      for (const between of ['ramp', 'hold'] as const) {
        const { maxSlope, minSlope } = sweepDetune(sweptSet(shape, 1, 0.5, { edgeMs: 20, updateEvery: 16, between }))
        expect(Math.max(maxSlope, -minSlope)).toBeCloseTo(0.1, 9)
      }
  })

  it('slope 1 stalls, above it the read runs backwards, and neither has cents down', () => {
    const depthMs = 1000 / (4 * 20)
    expect(sweepDetune(sweptSet('triangle', depthMs, 20))).toMatchObject({ motion: 'stalls', downCents: null, maxCents: null })
    expect(sweepDetune(sweptSet('triangle', depthMs * 1.01, 20))).toMatchObject({ motion: 'reversed', downCents: null })
    expect(sweepDetune(sweptSet('triangle', depthMs * 0.99, 20)).motion).toBe('plays')
  })

  it('rate 0 and depth 0 stand still', () => {
    for (const set of [sweptSet('sine', 5, 0), sweptSet('sine', 0, 5)])
      expect(sweepDetune(set)).toMatchObject({ maxCents: 0, upCents: 0, downCents: 0, maxSlope: 0, minSlope: 0, hopSamples: 0 })
  })

  it('drift is bounded by a full step in one cycle: π rate depth', () => {
    const { maxSlope } = sweepDetune(sweptSet('drift', 2, 3))
    expect(maxSlope).toBeCloseTo(Math.PI * 3 * 0.002, 9)
    const ratio = sweptSet('drift', 0, 3, { law: 'ratio', depthOctaves: 0.5 })
    expect(sweepDetune(ratio).maxSlope).toBeCloseTo(steepestStep(3, 0.5), 6)
    expect(sweepDetune(ratio).maxSlope).toBeGreaterThan(observed(ratio).largest)
  })
})

/** Steepest τ' of a full drift step of 20 ms · 2^(∓octaves cos πx), by fine difference of its own formula; seconds a second. */
function steepestStep(rateHz: number, octaves: number): number {
  const tau = (x: number) => 0.02 * 2 ** (-octaves * Math.cos(Math.PI * x))
  const parts = 20000
  return Math.max(...Array.from({ length: parts }, (_, i) => (tau((i + 1) / parts) - tau(i / parts)) * parts * rateHz))
}

/** Slopes from one evaluation of the delay to the next over three cycles and more, as the signal path evaluates it. */
function observed(set: ParameterSet): { largest: number; smallest: number } {
  const { updateEvery, rateHz } = set.sweep
  const updates = rateHz === 0 ? 2 : 200 + (3 * set.sampleRate) / (rateHz * updateEvery)
  let largest = 0
  let smallest = 0
  for (let v = 0; v < set.voices.count; v++) {
    let before = Number.NaN
    for (let k = 0; k < updates; k++) {
      const d = delaySamples(set, sweepPhase(set, k * updateEvery, 0, v, set.sampleRate), v, set.sampleRate)
      if (k > 0) {
        largest = Math.max(largest, (d - before) / updateEvery)
        smallest = Math.min(smallest, (d - before) / updateEvery)
      }
      before = d
    }
  }
  return { largest, smallest }
}

describe('no update of the signal path is steeper, and over a few cycles some come close', () => {
  it.each(Array.from({ length: 40 }, (_, i) => 1200 + i))('random set, seed %i', (seed) => {
    const random = randomSet(seed)
    const set = { ...random, sweep: { ...random.sweep, rateHz: random.sweep.rateHz === 0 ? 0 : 2 + random.sweep.rateHz } }
    const { maxSlope, minSlope } = sweepDetune(set)
    const { largest, smallest } = observed(set)
    expect(largest).toBeLessThanOrEqual(maxSlope * (1 + 1e-9) + 1e-9)
    expect(smallest).toBeGreaterThanOrEqual(minSlope * (1 + 1e-9) - 1e-9)
    // Drift seldom draws its bound.
    if (set.sweep.shape === 'drift') return
    expect(largest).toBeGreaterThanOrEqual(0.9 * maxSlope)
    expect(smallest).toBeLessThanOrEqual(0.9 * minSlope)
  })
})
