// Oracles: FACTS 1 closed forms of combs (J. O. Smith, PASP, "Feedforward Comb Filters", "Feedback Comb Filters"), FACTS 2a and 3 (computed),
// and derivatives taken by difference.
import { describe, expect, it } from 'vitest'
import { freeze } from '../../src/analysis/frozen.ts'
import { type ChannelResponse, frozenResponse } from '../../src/analysis/response.ts'
import { defaultShaper } from '../../src/set/defaults.ts'
import { changedSet, randomSet } from '../dsp/sets.ts'
import { combSet } from './combs.ts'

const at = (set: Parameters<typeof freeze>[0], ...hz: number[]): ChannelResponse => frozenResponse(freeze(set, 0), hz)[0]!
const magnitude = (r: ChannelResponse, i = 0) => Math.hypot(r.re[i]!, r.im[i]!)

describe('closed forms', () => {
  it('feed-forward comb: |H| = √(b0² + bM² + 2 b0 bM cos ωM)', () => {
    const set = combSet({ samples: 37, dry: 0.8, wet: -0.5 })
    for (const hz of [0, 100, 1000, 7777, 24000]) {
      const w = (2 * Math.PI * hz) / 48000
      expect(magnitude(at(set, hz))).toBeCloseTo(Math.sqrt(0.64 + 0.25 - 0.8 * Math.cos(37 * w)), 12)
    }
  })

  // FACTS 1, computed there: g = 0.7 gives peak 3.33333 and trough 0.588235.
  it('feedback comb, g = 0.7: peak 1/(1 − g) at k fs/M, trough 1/(1 + g) half way', () => {
    const set = combSet({ samples: 48, dry: 1, wet: 0, tap: 'line', feedback: 0.7 })
    expect(magnitude(at(set, 1000))).toBeCloseTo(3.33333, 5)
    expect(magnitude(at(set, 1500))).toBeCloseTo(0.588235, 6)
  })

  it('a feedback comb of negative gain swaps peaks and troughs', () => {
    const set = combSet({ samples: 48, dry: 1, wet: 0, tap: 'line', feedback: -0.7 })
    expect(magnitude(at(set, 1500))).toBeCloseTo(1 / 0.3, 9)
    expect(magnitude(at(set, 1000))).toBeCloseTo(1 / 1.7, 9)
  })

  // FACTS 2a: white chorus is all-pass when the moving tap passes the fixed one; its magnitude is 1.000000 at every frequency.
  it('white chorus has magnitude 1 where its tap passes the centre', () => {
    const set = combSet({ samples: 400, dry: Math.SQRT1_2, wet: 1, tap: 'line', feedback: -Math.SQRT1_2 })
    const response = at(set, ...Array.from({ length: 500 }, (_, i) => 7 + 47.9 * i))
    response.db.forEach((db) => {
      expect(Math.abs(db)).toBeLessThan(1e-9)
    })
  })

  // FACTS 3, computed there: loss of linear and Lagrange 3 at half a sample, 48 kHz.
  it.each([
    ['linear', [-0.474, -2.01, -5.1], 0.006],
    ['lagrange3', [-0.036, -0.534, -2.53], 0.006],
  ] as const)('%s half way between samples loses what the table says', (kind, table, tolerance) => {
    const response = at(combSet({ samples: 20.5, dry: 0, wet: 1, voice: kind }), 5000, 10000, 15000)
    table.forEach((db, i) => {
      expect(Math.abs(response.db[i]! - db)).toBeLessThan(tolerance)
    })
  })

  it('the all-pass read has magnitude 1 and its delay at 0 Hz', () => {
    const response = at(combSet({ samples: 20.8, dry: 0, wet: 1, voice: 'allpass1' }), 0, 5000, 15000, 23999)
    response.db.forEach((db) => {
      expect(Math.abs(db)).toBeLessThan(1e-10)
    })
    expect(response.groupDelaySamples[0]).toBeCloseTo(20.8, 9)
  })

  it('two lines that feed each other: (I − g X diag(A))⁻¹ by Cramer', () => {
    const set = changedSet((s) => {
      s.sweep.rateHz = 0
      s.sweep.startPhase = 0.25
      s.sweep.stereoPhase = 180
      s.sweep.depthMs = 1
      s.line.baseMs = 2
      s.line.interpolation = 'linear'
      s.voices.count = 1
      s.loop.feedback = 0.6
      s.loop.crossFeed = 0.3
      s.mix.dry = 1
      s.mix.wet = 0
      s.mix.dryTap = 'line'
    })
    const hz = 777
    const w = (2 * Math.PI * hz) / 48000
    // Lines of 144 and 48 samples; multiplied out by hand on complex numbers.
    const [a, b] = [144, 48].map((d) => ({ re: Math.cos(w * d), im: -Math.sin(w * d) })) as [Complex, Complex]
    const det = minus(minus({ re: 1, im: 0 }, times({ re: 0.42, im: 0 }, plus(a, b))), times({ re: -0.36 * 0.4, im: 0 }, times(a, b)))
    const left = minus({ re: 1, im: 0 }, times({ re: 0.42 - 0.18, im: 0 }, b))
    const right = minus({ re: 1, im: 0 }, times({ re: 0.42 - 0.18, im: 0 }, a))
    const channels = frozenResponse(freeze(set, 0.25), [hz])
    for (const [c, top] of [left, right].entries()) {
      const wanted = over(top, det)
      expect(channels[c]!.re[0]).toBeCloseTo(wanted.re, 10)
      expect(channels[c]!.im[0]).toBeCloseTo(wanted.im, 10)
    }
  })
})

interface Complex {
  readonly re: number
  readonly im: number
}
const plus = (a: Complex, b: Complex) => ({ re: a.re + b.re, im: a.im + b.im })
const minus = (a: Complex, b: Complex) => ({ re: a.re - b.re, im: a.im - b.im })
const times = (a: Complex, b: Complex) => ({ re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re })
const over = (a: Complex, b: Complex) => {
  const size = b.re * b.re + b.im * b.im
  return { re: (a.re * b.re + a.im * b.im) / size, im: (a.im * b.re - a.re * b.im) / size }
}

describe('phase and group delay', () => {
  it.each(Array.from({ length: 20 }, (_, i) => 300 + i))('group delay is the phase’s slope, random set %i', (seed) => {
    const set = randomSet(seed)
    const frozen = freeze(set, 0.37)
    const hz = 0.11 * set.sampleRate
    const step = 1e-7 * set.sampleRate
    frozenResponse(frozen, [hz - step, hz, hz + step]).forEach((r) => {
      if (r.db[1]! < -60) return
      let turn = r.phaseRad[2]! - r.phaseRad[0]!
      turn -= 2 * Math.PI * Math.round(turn / (2 * Math.PI))
      const slope = -turn / ((2 * Math.PI * 2 * step) / set.sampleRate)
      expect(Math.abs(slope - r.groupDelaySamples[1]!)).toBeLessThan(1e-3 * Math.max(1, Math.abs(slope)))
    })
  })

  it('at a full null both are finite and the delay is the mean of both sides', () => {
    const response = at(combSet({ samples: 48, dry: 1, wet: 1 }), 500, 1500)
    expect(response.db[0]).toBeLessThan(-280)
    // y = x[n] + x[n−48] is a real comb behind 24 samples, on both sides of its null.
    expect(response.groupDelaySamples[0]).toBeCloseTo(24, 4)
    expect(response.groupDelaySamples[1]).toBeCloseTo(24, 4)
  })

  it('a dry path alone has neither', () => {
    const response = at(combSet({ samples: 48, dry: 1, wet: 0 }), 0, 100, 24000)
    expect([...response.phaseRad]).toEqual([0, 0, 0])
    expect([...response.groupDelaySamples]).toEqual([0, 0, 0])
  })
})

describe('limits', () => {
  it('JSON never sees NaN or infinity: silence is −400 dB, a pole on the circle +400 dB', () => {
    const silent = at(combSet({ samples: 48, dry: 0, wet: 0 }), 0, 1000)
    expect([...silent.db]).toEqual([-400, -400])
    expect([...silent.groupDelaySamples]).toEqual([0, 0])
    const pole = at(combSet({ samples: 48, dry: 0, wet: 1, feedback: 1 }), 0)
    expect(pole.db[0]).toBe(400)
    for (const r of [silent, pole])
      for (const values of [r.re, r.im, r.db, r.phaseRad, r.groupDelaySamples])
        for (const v of values) expect(Number.isFinite(v)).toBe(true)
  })

  it('a frequency below 0 or above half the rate throws, naming it', () => {
    const frozen = freeze(combSet({ samples: 48 }), 0)
    expect(() => frozenResponse(frozen, [100, 24001])).toThrow(/frequenciesHz\[1\].*24000.*24001/)
    expect(() => frozenResponse(frozen, [-1])).toThrow(RangeError)
    expect(() => frozenResponse(frozen, [Number.NaN])).toThrow(RangeError)
  })
})

describe('freeze', () => {
  it('refuses positions outside [0, 1] and rates that are none', () => {
    const set = combSet({ samples: 48 })
    expect(() => freeze(set, 1.01)).toThrow(/\[0, 1\].*1\.01/)
    expect(() => freeze(set, Number.NaN)).toThrow(RangeError)
    expect(() => freeze(set, 0, 0)).toThrow(RangeError)
  })

  it('names reads closer than allowed, holds them at the limit, and is silent about a loop without feedback', () => {
    const close = changedSet((s) => {
      s.sweep.rateHz = 0
      s.line.baseMs = 1
      s.sweep.depthMs = 1
      s.voices.count = 1
      s.layout = 'mono'
      s.loop.feedback = 0.5
    })
    const { held, channels } = freeze(close, 0.75)
    expect(held).toEqual([
      { where: 'voice', channel: 0, voice: 0, delaySamples: 0, limitSamples: 1 },
      { where: 'loop', channel: 0, voice: 0, delaySamples: 0, limitSamples: 1 },
    ])
    expect(channels[0]!.voices[0]!.delaySamples).toBe(1)
    const quiet = { ...close, loop: { ...close.loop, feedback: 0 } }
    expect(freeze(quiet, 0.75).held.map((read) => read.where)).toEqual(['voice'])
    expect(freeze(close, 0.25).held).toEqual([])
  })

  it('says where shapers make it a small-signal view', () => {
    expect(freeze(combSet({ samples: 48 }), 0).smallSignal).toBe(false)
    const shaped = changedSet((s) => {
      s.mix.shaper = { ...defaultShaper('tanh'), drive: 2, ceiling: 0.5, antialias: 'adaa1' }
    })
    const frozen = freeze(shaped, 0)
    expect(frozen.smallSignal).toBe(true)
    expect(frozen.output).toEqual({ slope: 1, averaged: true })
  })
})
