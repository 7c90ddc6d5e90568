// Oracle: the engine itself. The frozen response must be the transform of what it plays with the sweep held.
import { describe, expect, it } from 'vitest'
import { freeze } from '../../src/analysis/frozen.ts'
import { frozenResponse } from '../../src/analysis/response.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import type { Spectrum } from '../../src/signal/fft.ts'
import { randomSet } from '../dsp/sets.ts'
import { binFrequencies, heldSpectra, standingSpectra } from './engineResponse.ts'

/** 218 passes of a loop of 0.9 leave 1e-10; the longest random delay is about 900 samples. */
const FRAMES = 2 ** 18
const EVERY = 61

/** Largest difference in dB where both are within 80 dB of the channel's peak, and of the phase, rad, in the same place. */
function largestDifference(
  set: ParameterSet,
  position: number,
  spectra: readonly Spectrum[],
): { db: number; phase: number; compared: number } {
  const frequencies = binFrequencies(FRAMES, set.sampleRate, EVERY)
  let db = 0
  let phase = 0
  let compared = 0
  frozenResponse(freeze(set, position), frequencies).forEach((channel, c) => {
    const peak = channel.db.reduce((a, b) => Math.max(a, b))
    channel.db.forEach((level, i) => {
      const re = spectra[c]!.re[i * EVERY]!
      const im = spectra[c]!.im[i * EVERY]!
      if (level < peak - 80 || peak <= -300) return
      compared++
      db = Math.max(db, Math.abs(level - 20 * Math.log10(Math.hypot(re, im))))
      const turned = channel.phaseRad[i]! - Math.atan2(im, re)
      phase = Math.max(phase, Math.abs(turned - 2 * Math.PI * Math.round(turned / (2 * Math.PI))))
    })
  })
  return { db, phase, compared }
}

const SEEDS = Array.from({ length: 36 }, (_, i) => 7000 + i)

describe('frozenResponse is the transform of the engine’s frozen impulse response within 1e-6 dB', () => {
  it.each(SEEDS)('random set, seed %i', (seed) => {
    const random = randomSet(seed)
    // At rate 0 the engine's drift stands on its own values, the frozen view on the sine.
    const shape = random.sweep.shape === 'drift' ? 'sine' : random.sweep.shape
    const set = { ...random, sweep: { ...random.sweep, shape, rateHz: 0 } } as ParameterSet
    const { db, phase, compared } = largestDifference(set, set.sweep.startPhase, standingSpectra(set, FRAMES))
    expect(db).toBeLessThan(1e-6)
    expect(phase).toBeLessThan(1e-7)
    // A dead zone swallows the impulse: nothing to compare, and both say so.
    const silent = [set.input.shaper, set.mix.shaper].some((shaper) => shaper?.curve === 'deadZone' && shaper.deadZone > 0)
    if (!silent) expect(compared).toBeGreaterThan(0)
  })

  it('the sets cover layouts, interpolators and curves', () => {
    const sets = SEEDS.map(randomSet)
    const seen = (of: (set: ParameterSet) => unknown) => new Set(sets.map(of)).size
    expect(seen((s) => s.layout)).toBe(3)
    expect(seen((s) => s.line.interpolation)).toBe(5)
    expect(seen((s) => (s.loop.feedback === 0 ? null : s.loop.interpolation))).toBe(6)
    expect(seen((s) => s.sweep.law)).toBe(2)
    expect(seen((s) => `${s.loop.delay} ${s.mix.dryTap}`)).toBe(4)
    const curves = sets.flatMap((s) => [s.input, s.loop, s.mix].map(({ shaper }) => shaper?.curve))
    expect(new Set(curves).size).toBe(8)
    expect(sets.some((s) => s.loop.shaper?.antialias === 'adaa1' && s.loop.feedback !== 0)).toBe(true)
    expect(sets.some((s) => s.layout === 'stereo' && s.loop.crossFeed !== 0 && s.loop.feedback !== 0)).toBe(true)
  })
})

describe('frozenResponse is what the running engine plays when its sweep is held', () => {
  it.each([7105, 7111, 7112, 7113, 7115, 7121])('random set, seed %i, drift and edges included', (seed) => {
    const random = randomSet(seed)
    const set = random.sweep.rateHz > 0 ? random : { ...random, sweep: { ...random.sweep, rateHz: 1.3 } }
    const position = (seed % 7) / 7
    const { db } = largestDifference(set, position, heldSpectra(set, position, FRAMES))
    expect(db).toBeLessThan(1e-6)
  })
})
