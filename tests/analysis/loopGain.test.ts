import { describe, expect, it } from 'vitest'
import { freeze } from '../../src/analysis/frozen.ts'
import { largestCrossing } from '../../src/analysis/loopCrossing.ts'
import { loopGain, loopSummary } from '../../src/analysis/loopGain.ts'
import { loopParts } from '../../src/analysis/loopPair.ts'
import { largestPole } from '../../src/analysis/poles.ts'
import { frozenResponse } from '../../src/analysis/response.ts'
import { loopSet, shaper } from './loopSets.ts'

const frequencies = Array.from({ length: 400 }, (_, i) => 24000 * ((i + 0.5) / 400) ** 2)

describe('loop gain against frequency', () => {
  it.each([
    ['linear', {}],
    ['lagrange3, both filters', { 'loop.interpolation': 'lagrange3', 'loop.dampingHz': 4000, 'loop.lowCutHz': 150 }],
    ['all-pass, inverted', { 'loop.interpolation': 'allpass1', 'loop.feedback': -0.8 }],
    ['tanh, anti-aliased', { 'loop.shaper': shaper('tanh', { drive: 1.1, antialias: 'adaa1' }) }],
  ])('%s: closed it makes the response of the line, 1/(1 − L)', (_, fields) => {
    const set = loopSet({ 'loop.feedback': 0.7, 'mix.dryTap': 'line', 'mix.dry': 1, 'mix.wet': 0, ...fields })
    const frozen = freeze(set, 0.137)
    const [curve] = loopGain(frozen, frequencies)
    const [response] = frozenResponse(frozen, frequencies)
    frequencies.forEach((_, i) => {
      const size = 10 ** ((curve?.db[i] as number) / 20)
      const phase = curve?.phaseRad[i] as number
      const closed = -20 * Math.log10(Math.hypot(1 - size * Math.cos(phase), size * Math.sin(phase)))
      expect(Math.abs(closed - (response?.db[i] as number))).toBeLessThan(1e-9)
    })
  })

  it('crossed lines: both eigenvalues close to the determinant the response divides by', () => {
    const set = loopSet({ layout: 'stereo', 'loop.feedback': 0.8, 'loop.crossFeed': 0.3, 'sweep.stereoPhase': 77, 'loop.dampingHz': 5000 })
    const frozen = freeze(set, 0.4)
    const [first, second] = loopGain(frozen, frequencies)
    expect([first?.kind, second?.kind]).toEqual(['eigenvalue', 'eigenvalue'])
    const straight = loopGain({ ...frozen, loop: { ...frozen.loop, crossFeed: 0 } }, frequencies)
    const value = (curve: typeof first, i: number): [number, number] => {
      const size = 10 ** ((curve?.db[i] as number) / 20)
      return [size * Math.cos(curve?.phaseRad[i] as number), size * Math.sin(curve?.phaseRad[i] as number)]
    }
    frequencies.forEach((_, i) => {
      const [a, b] = [value(straight[0], i), value(straight[1], i)]
      const [p, q] = [value(first, i), value(second, i)]
      // Trace and determinant of X diag(L0, L1).
      for (const part of [0, 1] as const) expect(Math.abs(p[part] + q[part] - 0.7 * (a[part] + b[part]))).toBeLessThan(1e-12)
      expect(Math.abs(p[0] * q[0] - p[1] * q[1] - 0.4 * (a[0] * b[0] - a[1] * b[1]))).toBeLessThan(1e-12)
      expect(first?.db[i]).toBeGreaterThanOrEqual(second?.db[i] as number)
    })
  })

  it('without feedback it is at the floor, and a frequency past fs/2 is refused', () => {
    const frozen = freeze(loopSet({}), 0)
    expect([...(loopGain(frozen, [100, 1000])[0]?.db ?? [])]).toEqual([-400, -400])
    expect(() => loopGain(frozen, [24001])).toThrow(RangeError)
  })
})

describe('summary at a position', () => {
  it('is gain, radius and ring of that position', () => {
    const frozen = freeze(loopSet({ 'loop.feedback': -0.9, 'loop.dampingHz': 3000, 'loop.lowCutHz': 100 }), 0.3)
    const { gain, radius, ringSeconds } = loopSummary(frozen)
    const [curve] = loopGain(frozen, frequencies)
    expect(20 * Math.log10(gain)).toBeGreaterThanOrEqual(Math.max(...(curve?.db ?? [])) - 1e-12)
    expect(radius).toBe(largestPole(frozen)?.radius)
    expect(ringSeconds).toBeCloseTo(Math.log(1000) / -Math.log(radius as number) / 48000, 6)
  })

  it('without a loop there is nothing to ring', () => {
    expect(loopSummary(freeze(loopSet({}), 0))).toEqual({ gain: 0, radius: null, ringSeconds: null })
  })
})

describe('how far a frozen line is from singing', () => {
  it.each([
    ['short', { 'line.baseMs': 0.2, 'sweep.depthMs': 0.1 }],
    ['long', {}],
    ['inverted', { 'loop.feedback': -0.7 }],
    ['low cut', { 'loop.lowCutHz': 900, 'line.baseMs': 0.5, 'sweep.depthMs': 0.3 }],
    ['both filters', { 'loop.lowCutHz': 200, 'loop.dampingHz': 1000, 'loop.interpolation': 'allpass1' }],
  ])('%s: at the gain it names a pole reaches the circle, from inside', (_, fields) => {
    const frozen = freeze(loopSet({ 'loop.feedback': 0.7, ...fields }), 0.2)
    const crossing = Math.max(...loopParts(frozen.loop).lines.map(largestCrossing))
    const at = (share: number) =>
      largestPole({ ...frozen, loop: { ...frozen.loop, gain: (frozen.loop.gain * share) / crossing } })?.lnRadius as number
    expect(at(1 - 1e-6)).toBeLessThan(0)
    expect(at(1 + 1e-6)).toBeGreaterThan(0)
    for (const share of [0.05, 0.3, 0.6, 0.9]) expect(at(share)).toBeLessThan(0)
  })
})
