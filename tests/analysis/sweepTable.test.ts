// Oracles: FACTS 4 (cents of sine and triangle sweeps, computed there from 1200 log2(1 − dτ/dt)), and slopes taken by difference.
import { describe, expect, it } from 'vitest'
import { sweepDetune } from '../../src/analysis/detune.ts'
import { shapeCorners, shapeSlope } from '../../src/analysis/sweepSlope.ts'
import { centsOfSlope, sweepTable } from '../../src/analysis/sweepTable.ts'
import { frozenShapeValue } from '../../src/dsp/sweep.ts'
import type { SweepShape } from '../../src/set/types.ts'
import { changedSet, randomSet } from '../dsp/sets.ts'
import { sweptSet } from './combs.ts'

const SHAPES: readonly SweepShape[] = ['sine', 'triangle', 'square', 'rampUp', 'rampDown', 'drift', 'drawn']

const oneVoice = (shape: SweepShape, depthMs: number, rateHz: number) =>
  sweptSet(shape, depthMs, rateHz, {
    points: [
      [0.1, -0.5],
      [0.35, 1],
      [0.9, 0.2],
    ],
  })

const largest = (values: readonly (number | null)[]) => Math.max(...values.map((v) => v ?? Number.NaN))
const smallest = (values: readonly (number | null)[]) => Math.min(...values.map((v) => v ?? Number.NaN))

describe('cents', () => {
  // FACTS 4, "Examples (sine)", marked computed there.
  it.each([
    [1, 0.5, 5.43, -5.45],
    [2, 0.25, 5.43, -5.45],
    [5, 1, 53.6, -55.3],
    [3, 5, 155.9, -171.4],
  ])('sine of %f ms at %f Hz: +%f and %f', (depthMs, rateHz, up, down) => {
    const { cents } = sweepTable(oneVoice('sine', depthMs, rateHz), 1000).voices[0]!
    const digits = up < 10 ? 0.005 : 0.051
    expect(Math.abs(largest(cents) - up)).toBeLessThan(digits)
    expect(Math.abs(smallest(cents) - down)).toBeLessThan(digits)
  })

  it.each([
    [1, 0.5, 3.46],
    [5, 1, 34.3],
    [3, 5, 100.9],
  ])('triangle of %f ms at %f Hz: %f up, the same everywhere on a side', (depthMs, rateHz, up) => {
    const { cents } = sweepTable(oneVoice('triangle', depthMs, rateHz), 16).voices[0]!
    const falling = cents.slice(4, 12)
    for (const c of falling) expect(Math.abs(c! - up)).toBeLessThan(up < 10 ? 0.005 : 0.051)
    expect(new Set(cents.map((c) => Math.sign(c!))).size).toBe(2)
  })

  it('1200 log2(1 − slope), 0 at 0, none from 1 on', () => {
    expect(centsOfSlope(0.5)).toBeCloseTo(-1200, 9)
    expect(centsOfSlope(-1)).toBeCloseTo(1200, 9)
    expect(Object.is(centsOfSlope(0), 0)).toBe(true)
    expect(centsOfSlope(1)).toBeNull()
    expect(centsOfSlope(3)).toBeNull()
    // FACTS 4, small-signal rule: about 1731.2 per unit of slope.
    expect(centsOfSlope(-1e-6)! / 1e-6).toBeCloseTo(1731.23, 2)
  })

  it('a drift bends no more than sweep.detune allows it: its sine runs as slowly as the steepest drift', () => {
    for (const law of ['time', 'ratio'] as const) {
      const set = sweptSet('drift', 2, 1, { law, depthOctaves: 0.3, updateEvery: 1 })
      const detune = sweepDetune(set)
      const { cents } = sweepTable(set, 4000).voices[0]!
      expect(Math.abs(largest(cents) - detune.upCents)).toBeLessThan(1e-3)
      expect(Math.abs(smallest(cents) - (detune.downCents ?? 0))).toBeLessThan(1e-3)
    }
  })

  it('rate 0 bends nothing, a sweep too steep gives null, never NaN', () => {
    for (const c of sweepTable(oneVoice('sine', 5, 0), 32).voices[0]!.cents) expect(c).toBe(0)
    const { cents } = sweepTable(oneVoice('sine', 19, 30), 32).voices[0]!
    expect(cents).toContain(null)
    expect(JSON.stringify(cents)).not.toContain('NaN')
  })
})

describe('shape slopes', () => {
  it.each(SHAPES)('%s: the slope is the difference quotient away from corners', (shape) => {
    const { sweep } = oneVoice(shape, 5, 2)
    const corners = shapeCorners(sweep)
    for (let i = 0; i < 200; i++) {
      const phi = (i + 0.37) / 200
      if (corners.some((corner) => Math.abs(corner - phi) < 1e-5)) continue
      const quotient = (frozenShapeValue(sweep, phi + 1e-6) - frozenShapeValue(sweep, phi - 1e-6)) / 2e-6
      expect(Math.abs(shapeSlope(sweep, phi) - quotient)).toBeLessThan(1e-5 * Math.max(1, Math.abs(quotient)))
    }
  })

  it.each(SHAPES)('%s: between corners it runs one way', (shape) => {
    const { sweep } = oneVoice(shape, 5, 2)
    const corners = shapeCorners(sweep)
    corners.forEach((from, i) => {
      const to = corners[i + 1] ?? (corners[0] as number) + 1
      const signs = [0.1, 0.3, 0.5, 0.7, 0.9].map((part) => Math.sign(shapeSlope(sweep, from + part * (to - from))))
      expect(new Set(signs).size).toBe(1)
    })
  })

  it('no edge at all: a square is flat but for its jumps', () => {
    const flat = changedSet((s) => {
      s.sweep.shape = 'square'
      s.sweep.edgeMs = 0
    }).sweep
    expect(shapeCorners(flat)).toEqual([0, 0.5])
    for (const phi of [0, 0.2, 0.5, 0.7]) expect(shapeSlope(flat, phi)).toBe(0)
  })

  it('the longest edge makes a square a triangle', () => {
    const wide = changedSet((s) => {
      s.sweep.shape = 'square'
      s.sweep.edgeMs = 1000
      s.sweep.rateHz = 1
    }).sweep
    expect(shapeCorners(wide)).toEqual([0.25, 0.75])
    expect(shapeSlope(wide, 0.1)).toBeCloseTo(4, 12)
  })
})

describe('sweepTable', () => {
  it('positions are k/N, one entry a channel and voice in order', () => {
    const table = sweepTable(
      changedSet(() => {}),
      5,
    )
    expect(table.positions).toEqual([0, 0.2, 0.4, 0.6, 0.8])
    expect(table.voices.map(({ channel, voice }) => [channel, voice])).toEqual([
      [0, 0],
      [0, 1],
      [0, 2],
      [1, 0],
      [1, 1],
      [1, 2],
    ])
  })

  it('default set: delays of every voice and channel at position 0, from the equations by hand', () => {
    const { voices } = sweepTable(
      changedSet(() => {}),
      1,
    )
    // 12 ms ± 2.5 ms sine, offsets −2, 0, 2 ms, voices a third of a cycle apart, channel 1 a quarter later.
    const wanted = [0, 1, 2].map((v) => 12 + 2 * (v - 1) + 2.5 * Math.sin((2 * Math.PI * v) / 3))
    const later = [0, 1, 2].map((v) => 12 + 2 * (v - 1) + 2.5 * Math.sin(2 * Math.PI * (v / 3 + 0.25)))
    voices.forEach(({ delayMs }, i) => {
      expect(delayMs[0]).toBeCloseTo([...wanted, ...later][i]!, 12)
    })
  })

  it.each(Array.from({ length: 15 }, (_, i) => 40 + i))('cents are those of the delay’s own slope, random set %i', (seed) => {
    const set = randomSet(seed)
    const points = 20000
    const { voices } = sweepTable(set, points)
    for (const { delayMs, cents } of voices) {
      for (let k = 1; k < points - 1; k += 97) {
        const before = (delayMs[k]! - delayMs[k - 1]!) * points
        const after = (delayMs[k + 1]! - delayMs[k]!) * points
        // Corners have two slopes.
        if (Math.abs(after - before) > 0.02 * Math.max(Math.abs(after), Math.abs(before))) continue
        // A drift's sine lasts two of its cycles.
        const slope = ((before + after) / 2000) * (set.sweep.shape === 'drift' ? set.sweep.rateHz / 2 : set.sweep.rateHz)
        if (slope > 0.99) continue
        expect(Math.abs((cents[k] ?? 0) - (1200 * Math.log1p(-slope)) / Math.LN2)).toBeLessThan(
          0.02 * Math.max(0.1, Math.abs(cents[k] ?? 0)),
        )
      }
    }
  })

  it('a number of points that is none throws', () => {
    const set = changedSet(() => {})
    for (const points of [0, -1, 1.5, Number.NaN, 1e7]) expect(() => sweepTable(set, points)).toThrow(RangeError)
  })
})
