import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { defaultSet, defaultShaper } from '../../src/set/defaults.ts'
import { delayRange, interpolationPoints, smallestDelay, voiceOffsetMs } from '../../src/set/delayRange.ts'
import { withAt } from '../../src/set/path.ts'
import { sweepShapeValue } from '../../src/set/sweepShape.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { anySet } from './anySet.ts'

const at = (values: Record<string, unknown>): ParameterSet =>
  Object.entries(values).reduce((set, [path, value]) => withAt(set, path, value), defaultSet())

describe('smallest delays', () => {
  // DESIGN 3: outside / inside the loop nearest, linear 0/1; cubics 1/2; allpass1 0.5/1.5.
  it.each([
    ['nearest', 0, 1, 1],
    ['linear', 0, 1, 2],
    ['lagrange3', 1, 2, 4],
    ['hermite4', 1, 2, 4],
    ['allpass1', 0.5, 1.5, 2],
  ] as const)('%s reads no closer than %d, in the loop %d, from %d points', (kind, voice, loop, points) => {
    expect(smallestDelay(kind, 'voice')).toBe(voice)
    expect(smallestDelay(kind, 'loop')).toBe(loop)
    expect(interpolationPoints(kind)).toBe(points)
  })

  it('an antiderivative shaper in the loop costs half a sample', () => {
    const shaper = { ...defaultShaper('tanh'), antialias: 'adaa1' as const }
    expect(delayRange(at({ 'loop.shaper': shaper })).loopLimitSamples).toBe(1.5)
    expect(delayRange(at({ 'loop.shaper': { ...shaper, antialias: 'none' } })).loopLimitSamples).toBe(1)
  })
})

describe('the range of delays', () => {
  it('law time: base, outer offsets and depth add up', () => {
    // 12 ± 2 ± 2.5 ms at 48 kHz; the loop has no offset.
    const range = delayRange(defaultSet())
    expect(range.voices).toEqual({ minSamples: 7.5 * 48, maxSamples: 16.5 * 48 })
    expect(range.loop).toEqual({ minSamples: 9.5 * 48, maxSamples: 14.5 * 48 })
    expect(range).toMatchObject({ minSweep: -1, maxSweep: 1, voiceLimitSamples: 1, loopLimitSamples: 1 })
  })

  it('law ratio: an octave halves and doubles base and offset together', () => {
    const range = delayRange(at({ 'sweep.law': 'ratio', 'sweep.depthOctaves': 1, 'line.baseMs': 4, 'voices.spreadMs': 2 }))
    expect(range.voices).toEqual({ minSamples: 1.5 * 48, maxSamples: 10 * 48 })
    expect(range.loop).toEqual({ minSamples: 2 * 48, maxSamples: 8 * 48 })
  })

  it('a fixed loop stands at base', () => {
    expect(delayRange(at({ 'loop.delay': 'fixed' })).loop).toEqual({ minSamples: 576, maxSamples: 576 })
  })

  it('a drawn sweep reaches its points and no further', () => {
    const set = at({
      'sweep.shape': 'drawn',
      'sweep.points': [
        [0, -0.2],
        [0.5, 0.6],
      ],
      'voices.count': 1,
    })
    expect(delayRange(set)).toMatchObject({ minSweep: -0.2, maxSweep: 0.6, voices: { minSamples: 11.5 * 48, maxSamples: 13.5 * 48 } })
  })

  it('at rate 0 only where the sweep stands counts, for every voice and channel', () => {
    const still = { 'sweep.rateHz': 0, 'voices.count': 1, 'sweep.startPhase': 0.25, 'sweep.stereoPhase': 90 }
    const set = at({ ...still, 'sweep.depthMs': 100, layout: 'mono' })
    expect(delayRange(set).voices).toEqual({ minSamples: 112 * 48, maxSamples: 112 * 48 })
    expect(delayRange(at({ ...still, 'sweep.depthMs': 4 })).voices).toEqual({ minSamples: 12 * 48, maxSamples: 16 * 48 })
  })

  it('runs at another rate in other samples', () => {
    expect(delayRange(defaultSet(), 96000).voices.minSamples).toBe(7.5 * 96)
  })

  it('holds every delay that the sweep takes, whatever the set', () => {
    fc.assert(
      fc.property(anySet, fc.double({ min: 0, max: 50, noNaN: true }), (set, phase) => {
        const { voices } = delayRange(set, 1000)
        const reached = set.sweep.rateHz === 0 ? set.sweep.startPhase : phase
        for (let v = 0; v < set.voices.count; v++) {
          const offset = set.sweep.rateHz === 0 ? (v * set.voices.phaseSpread) / (360 * set.voices.count) : 0
          const s = sweepShapeValue(set.sweep, reached + offset, v)
          const base = set.line.baseMs + voiceOffsetMs(set.voices, v)
          const delay = set.sweep.law === 'time' ? base + set.sweep.depthMs * s : base * 2 ** (set.sweep.depthOctaves * s)
          // Rounding of the largest term.
          const slack = 1e-12 * (set.line.baseMs + set.sweep.depthMs + voices.maxSamples)
          expect(delay).toBeGreaterThanOrEqual(voices.minSamples - slack)
          expect(delay).toBeLessThanOrEqual(voices.maxSamples + slack)
        }
      }),
      { numRuns: 300 },
    )
  })
})
