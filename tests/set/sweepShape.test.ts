import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { defaultSet } from '../../src/set/defaults.ts'
import { driftValue, sweepEdge, sweepShapeValue } from '../../src/set/sweepShape.ts'
import type { ParameterSet, SweepShape } from '../../src/set/types.ts'

const sweep = (shape: SweepShape, rest: Partial<ParameterSet['sweep']> = {}) => ({
  ...defaultSet().sweep,
  shape,
  rateHz: 1,
  edgeMs: 0,
  ...rest,
})

describe('the sweep’s shape', () => {
  // DESIGN 3, read at places where the formula can be worked out by hand. e = 0.2 from 200 ms at 1 Hz.
  const edge = { edgeMs: 200 }
  it.each<[SweepShape, Partial<ParameterSet['sweep']>, readonly (readonly [number, number])[]]>([
    [
      'sine',
      {},
      [
        [0, 0],
        [1 / 12, 0.5],
        [0.25, 1],
        [0.5, 0],
        [0.75, -1],
        [7.25, 1],
        [-0.25, -1],
      ],
    ],
    [
      'triangle',
      {},
      [
        [0, 0],
        [0.125, 0.5],
        [0.25, 1],
        [0.5, 0],
        [0.75, -1],
        [0.875, -0.5],
      ],
    ],
    [
      'square',
      {},
      [
        [0, 1],
        [0.49, 1],
        [0.5, -1],
        [0.99, -1],
      ],
    ],
    [
      'square',
      edge,
      [
        [0, 0],
        [0.05, 0.5],
        [0.1, 1],
        [0.25, 1],
        [0.45, 0.5],
        [0.5, 0],
        [0.55, -0.5],
        [0.75, -1],
      ],
    ],
    [
      'rampUp',
      {},
      [
        [0, -1],
        [0.5, 0],
        [0.75, 0.5],
      ],
    ],
    [
      'rampUp',
      edge,
      [
        [0, 0],
        [0.05, -0.5],
        [0.1, -1],
        [0.5, 0],
        [0.9, 1],
        [0.95, 0.5],
      ],
    ],
    [
      'rampDown',
      edge,
      [
        [0.05, 0.5],
        [0.5, 0],
        [0.9, -1],
      ],
    ],
    [
      'drawn',
      {
        points: [
          [0.25, -1],
          [0.75, 1],
        ],
      },
      [
        [0.25, -1],
        [0.5, 0],
        [0.75, 1],
        [0, 0],
        [0.125, -0.5],
        [0.875, 0.5],
        [1, 0],
      ],
    ],
    [
      'drawn',
      {
        points: [
          [0, 1],
          [0.5, -1],
        ],
      },
      [
        [0, 1],
        [0.25, 0],
        [0.5, -1],
        [0.75, 0],
      ],
    ],
  ])('%s %j', (shape, rest, places) => {
    for (const [phase, s] of places) expect(sweepShapeValue(sweep(shape, rest), phase)).toBeCloseTo(s, 12)
  })

  it('a square at full edge is the triangle', () => {
    for (let phi = 0; phi < 1; phi += 1 / 64)
      expect(sweepShapeValue(sweep('square', { edgeMs: 1000 }), phi)).toBeCloseTo(sweepShapeValue(sweep('triangle'), phi), 12)
  })

  it('the edge is part of the cycle and at most half of it', () => {
    expect(sweepEdge(sweep('square', { edgeMs: 30, rateHz: 2 }))).toBeCloseTo(0.06, 15)
    expect(sweepEdge(sweep('square', { edgeMs: 900, rateHz: 10 }))).toBe(0.5)
  })

  it('drift joins hashed values by half a cosine, the same every time, another for every voice and seed', () => {
    const drift = sweep('drift', { seed: 7 })
    for (const k of [-3, 0, 1, 1000]) expect(sweepShapeValue(drift, k)).toBe(driftValue(7, 0, k))
    expect(sweepShapeValue(drift, 2.5)).toBeCloseTo((driftValue(7, 0, 2) + driftValue(7, 0, 3)) / 2, 12)
    expect(sweepShapeValue(drift, 2.5, 1)).not.toBe(sweepShapeValue(drift, 2.5, 0))
    expect(driftValue(8, 0, 2)).not.toBe(driftValue(7, 0, 2))
  })

  it('drift hashes with the 32-bit MurmurHash3 finaliser', () => {
    // fmix32(1) = 0x514E28B7 and fmix32(0) = 0, from memory of the published test of that function; int32(0x514E28B7)/2³¹.
    expect(driftValue(1, 0, 0)).toBe(0x514e28b7 / 2 ** 31)
    expect(driftValue(0, 0, 0)).toBe(0)
    // Voices and cycles come in modulo 2³²: v · 0x9E3779B9 + k · 0x85EBCA6B.
    expect(driftValue(0x9e3779b9, 0, 0)).toBe(driftValue(0, 1, 0))
    expect(driftValue(0x85ebca6b, 0, 0)).toBe(driftValue(0, 0, 1))
  })

  it('stays within ±1 for every shape, phase, edge and rate', () => {
    const shapes = fc.constantFrom<SweepShape>('sine', 'triangle', 'square', 'rampUp', 'rampDown', 'drift')
    const phase = fc.double({ min: -1e6, max: 1e6, noNaN: true })
    fc.assert(
      fc.property(
        shapes,
        phase,
        fc.double({ min: 0, max: 1000, noNaN: true }),
        fc.double({ min: 0, max: 100, noNaN: true }),
        (shape, phi, edgeMs, rateHz) => {
          const s = sweepShapeValue(sweep(shape, { edgeMs, rateHz }), phi, 3)
          // A ramp's end lies within rounding of ±1.
          expect(Math.abs(s)).toBeLessThanOrEqual(1 + 1e-12)
        },
      ),
      { numRuns: 1000 },
    )
  })
})
