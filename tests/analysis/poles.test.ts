import { describe, expect, it } from 'vitest'
import { freeze } from '../../src/analysis/frozen.ts'
import { frozenRead } from '../../src/analysis/frozenRead.ts'
import { logGain, logGainResult, loopLine } from '../../src/analysis/loopLine.ts'
import { loopParts, pairDeterminant } from '../../src/analysis/loopPair.ts'
import { largestPole, resonances, ringSeconds } from '../../src/analysis/poles.ts'
import { certifiedPole, largestPoleOfLine } from '../../src/analysis/polesOneLine.ts'
import { sweptPole } from '../../src/analysis/polesSweep.ts'
import { polesOutside } from '../../src/analysis/polesWinding.ts'
import { createRandom } from '../../src/signal/random.ts'
import { loopSet } from './loopSets.ts'

const still = { 'sweep.rateHz': 0, 'sweep.startPhase': 0, 'sweep.depthMs': 0 }
const plain = { slope: { slope: 1, averaged: false }, crossFeed: 0 }

describe('a loop of whole samples without filters', () => {
  // Source: J. O. Smith, PASP, "Feedback Comb Filters": M poles of radius |g|^(1/M), 2π/M apart.
  it.each([
    [0.7, 48],
    [-0.7, 48],
    [0.999, 577],
    [0.97, 38400],
  ])('g = %d, M = %i: every radius is |g|^(1/M) and the angles are 2π/M apart', (g, m) => {
    const set = loopSet({ ...still, 'loop.feedback': g, 'line.baseMs': m / 48 })
    const poles = resonances(freeze(set, 0), 20000)
    const ln = Math.log(Math.abs(g)) / m
    for (const pole of poles) expect(Math.abs(pole.lnRadius - ln) * m).toBeLessThan(1e-10)
    const first = g > 0 ? 0 : 24000 / m
    poles.forEach((pole, k) => {
      expect(Math.abs(pole.frequencyHz - first - (k * 48000) / m)).toBeLessThan(1e-6)
    })
    expect(poles.length).toBe(Math.floor((20000 - first) / (48000 / m)) + 1)
  })

  // Source: M. R. Schroeder 1961/62 (from memory) T60 = −3τ/log10|g|; the values are computed from it.
  it.each([
    [0.7, 1, 0.0194],
    [0.9, 5, 0.328],
    [0.99, 10, 6.87],
  ])('g = %d, τ = %d ms rings %d s', (g, ms, seconds) => {
    const pole = largestPole(freeze(loopSet({ ...still, 'loop.feedback': g, 'line.baseMs': ms }), 0))
    const ring = ringSeconds(pole?.lnRadius ?? 0, 48000) as number
    expect(Math.abs(ring / ((-3 * ms) / 1000 / Math.log10(g)) - 1)).toBeLessThan(1e-10)
    expect(Math.abs(ring / seconds - 1)).toBeLessThan(2e-3)
  })

  it('does not ring down at |g| ≥ 1, and g = 0 has no pole', () => {
    expect(ringSeconds(largestPole(freeze(loopSet({ ...still, 'loop.feedback': 1 }), 0))?.lnRadius ?? -1, 48000)).toBeNull()
    expect(largestPole(freeze(loopSet(still), 0))).toBeNull()
    expect(resonances(freeze(loopSet(still), 0), 1000)).toEqual([])
  })
})

describe('long lines', () => {
  const random = createRandom(77)
  const kinds = ['nearest', 'linear', 'lagrange3', 'hermite4', 'allpass1'] as const
  const cases = Array.from({ length: 300 }, (_, i) => {
    const delay = 42 * 10 ** (3.3 * random())
    const gain = (random() < 0.5 ? -1 : 1) * (random() < 0.5 ? 0.01 + 1.29 * random() : 1 - 10 ** (-1 - 5 * random()))
    const lowPass = random() < 0.5 ? Math.exp(-2 * Math.PI * 10 ** (-4.5 + 4.2 * random())) : null
    const highPass = random() < 0.5 ? Math.exp(-2 * Math.PI * 10 ** (-5 + 4.5 * random())) : null
    const reads = [frozenRead(kinds[i % 5] as 'linear', random() < 0.3 ? Math.round(delay) : delay)]
    return loopLine({ ...plain, gain, tone: { lowPass, highPass }, reads }, gain, reads)
  })

  it('the search itself finds the largest pole, 300 times of 300: counting finds none outside', () => {
    expect(cases.filter((line) => certifiedPole(line)?.searched !== true)).toEqual([])
  })

  it('what it finds is a pole: L = 1 there to rounding of its D radians', () => {
    const out = logGainResult()
    for (const line of cases) {
      const pole = largestPoleOfLine(line) as { x: number; theta: number }
      logGain(line, pole.x, pole.theta, out)
      const turns = (out.phase - line.delay * pole.theta) / (2 * Math.PI)
      expect(Math.abs(out.ln)).toBeLessThan(1e-9)
      expect(Math.abs(turns - Math.round(turns))).toBeLessThan(1e-9)
      expect(polesOutside(line, pole.x - 1e-6 / line.delay)).toBeGreaterThan(0)
    }
  })

  it('200 ms at 192 kHz with both filters: 4 000 resonances below 20 kHz, each a pole', () => {
    const set = loopSet({
      ...still,
      sampleRate: 192000,
      'line.baseMs': 200,
      'loop.feedback': 0.97,
      'loop.dampingHz': 3000,
      'loop.lowCutHz': 50,
      'loop.interpolation': 'lagrange3',
    })
    const frozen = freeze(set, 0)
    const found = resonances(frozen, 20000)
    expect(Math.abs(found.length - 4000)).toBeLessThan(8)
    const line = loopLine(frozen.loop, 0.97, frozen.loop.reads)
    const out = logGainResult()
    for (const { frequencyHz, lnRadius } of found) {
      logGain(line, lnRadius, (2 * Math.PI * frequencyHz) / 192000, out)
      expect(Math.abs(out.ln)).toBeLessThan(1e-8)
    }
    const largest = largestPole(frozen, { certify: true })
    expect(largest?.lnRadius).toBeCloseTo(Math.max(...found.map((r) => r.lnRadius)), 12)
  })

  it('a low cut without damping puts the largest pole next to fs/2', () => {
    const pole = largestPole(freeze(loopSet({ ...still, 'loop.feedback': 0.9, 'loop.lowCutHz': 300 }), 0))
    expect(pole?.frequencyHz).toBeGreaterThan(23900)
  })
})

describe('crossed lines', () => {
  it.each([0, 0.5, 1])('at one delay both modes count, at k = %d', (k) => {
    const reads = [frozenRead('linear', 100), frozenRead('linear', 100)]
    const loop = { ...plain, gain: 0.8, crossFeed: k, tone: { lowPass: null, highPass: null }, reads }
    // Gains g and g (1 − 2k): the larger is g for every k.
    const { lines } = loopParts(loop)
    expect(lines.map((line) => line.gain)).toEqual(k === 0 ? [0.8] : [0.8, 0.8 * (1 - 2 * k)])
  })

  it('long ones: what is found is a pole, and no pole found anywhere exceeds the bound', () => {
    const random = createRandom(5)
    const det = new Float64Array(4)
    for (let i = 0; i < 40; i++) {
      const set = loopSet({
        layout: 'stereo',
        'line.baseMs': 5 + 100 * random(),
        'sweep.depthMs': 4,
        'sweep.stereoPhase': 30 + 120 * random(),
        'sweep.rateHz': 1,
        'loop.feedback': (random() < 0.5 ? -1 : 1) * (0.5 + 0.49 * random()),
        'loop.crossFeed': 0.02 + 0.96 * random(),
        'loop.dampingHz': random() < 0.5 ? 500 + 8000 * random() : null,
        'loop.lowCutHz': random() < 0.5 ? 20 + 500 * random() : null,
      })
      const frozen = freeze(set, random())
      const pole = largestPole(frozen) as NonNullable<ReturnType<typeof largestPole>>
      const { pair } = loopParts(frozen.loop)
      pairDeterminant(pair as NonNullable<typeof pair>, pole.lnRadius, (2 * Math.PI * (pole.frequencyHz ?? 0)) / 48000, det)
      if (pole.frequencyHz !== null) expect(Math.hypot(det[0] as number, det[1] as number)).toBeLessThan(1e-8)
      const all = Math.max(...resonances(frozen, 24000).map((r) => r.lnRadius))
      expect(all).toBeLessThanOrEqual(pole.lnBound + 1e-12)
      expect(pole.lnRadius).toBeLessThanOrEqual(pole.lnBound)
    }
  })
})

describe('the largest pole over a sweep', () => {
  it.each([
    ['linear', {}],
    ['lagrange3 with filters', { 'loop.interpolation': 'lagrange3', 'loop.dampingHz': 2000, 'loop.lowCutHz': 100 }],
    ['all-pass', { 'loop.interpolation': 'allpass1' }],
    ['nearest, inverted, low cut', { 'loop.interpolation': 'nearest', 'loop.feedback': -0.9, 'loop.lowCutHz': 200 }],
    ['short', { 'line.baseMs': 1, 'sweep.depthMs': 0.9, 'loop.interpolation': 'hermite4' }],
    ['growing', { 'loop.feedback': 1.05 }],
  ])('%s: none of 400 positions exceeds it', (_, fields) => {
    const set = loopSet({ 'loop.feedback': 0.95, ...fields })
    const worst = sweptPole(set) as NonNullable<ReturnType<typeof sweptPole>>
    const random = createRandom(4)
    for (let i = 0; i < 400; i++) {
      const pole = largestPole(freeze(set, random())) as NonNullable<ReturnType<typeof largestPole>>
      expect(pole.lnRadius).toBeLessThanOrEqual(worst.lnRadius + 1e-6 * Math.abs(worst.lnRadius))
    }
  })

  it('crossed lines half a cycle apart: none of 100 positions exceeds its bound', () => {
    const set = loopSet({ layout: 'stereo', 'loop.feedback': 0.9, 'loop.crossFeed': 0.3, 'sweep.stereoPhase': 180, 'loop.dampingHz': 6000 })
    const worst = sweptPole(set) as NonNullable<ReturnType<typeof sweptPole>>
    for (let i = 0; i < 100; i++) expect(largestPole(freeze(set, i / 100))?.lnRadius).toBeLessThanOrEqual(worst.lnBound + 1e-9)
  })
})
