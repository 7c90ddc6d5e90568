// Oracle: the frozen response itself at thousands of positions, a way of finding the envelope that needs no cleverness.
import { describe, expect, it } from 'vitest'
import { sweepEnvelope } from '../../src/analysis/envelope.ts'
import { freeze } from '../../src/analysis/frozen.ts'
import { frozenResponse } from '../../src/analysis/response.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { changedSet, randomSet } from '../dsp/sets.ts'
import { combSet } from './combs.ts'

const HZ = Float64Array.from({ length: 24 }, (_, i) => 20 * 900 ** (i / 23))

interface Ends {
  readonly minDb: Float64Array
  readonly maxDb: Float64Array
}

function denseEnvelope(set: ParameterSet, positions: number, hz = HZ): Ends[] {
  const ends = Array.from({ length: set.layout === 'mono' ? 1 : 2 }, () => ({
    minDb: new Float64Array(hz.length).fill(Number.POSITIVE_INFINITY),
    maxDb: new Float64Array(hz.length).fill(Number.NEGATIVE_INFINITY),
  }))
  for (let k = 0; k < positions; k++) {
    const position = set.sweep.rateHz === 0 ? set.sweep.startPhase : k / positions
    frozenResponse(freeze(set, position), hz).forEach(({ db }, c) => {
      db.forEach((level, i) => {
        ends[c]!.minDb[i] = Math.min(ends[c]!.minDb[i]!, level)
        ends[c]!.maxDb[i] = Math.max(ends[c]!.maxDb[i]!, level)
      })
    })
  }
  return ends
}

/** How far `found` falls short of `dense`, dB: at the top, and at the bottom down to 20 dB below the top. */
function shortfall(found: readonly Ends[], dense: readonly Ends[]): { top: number; bottom: number } {
  let top = 0
  let bottom = 0
  dense.forEach(({ minDb, maxDb }, c) => {
    maxDb.forEach((level, i) => {
      top = Math.max(top, level - found[c]!.maxDb[i]!)
      const floor = level - 20
      bottom = Math.max(bottom, Math.max(found[c]!.minDb[i]!, floor) - Math.max(minDb[i]!, floor))
    })
  })
  return { top, bottom }
}

const flanger = (change: Partial<ParameterSet['loop']> = {}) =>
  changedSet((s) => {
    s.voices.count = 1
    s.line.baseMs = 3
    s.sweep.depthMs = 2
    Object.assign(s.loop, change)
  })

const SETS: readonly (readonly [string, ParameterSet])[] = [
  ['three voices', changedSet(() => {})],
  ['flanger, feedback 0.7', flanger({ feedback: 0.7 })],
  ['flanger, feedback −0.9 damped', flanger({ feedback: -0.9, dampingHz: 6000 })],
  ['flanger, all-pass reads', { ...flanger({ feedback: 0.5, interpolation: 'allpass1' }) }],
  ['fixed loop', flanger({ feedback: 0.6, delay: 'fixed' })],
  [
    'cross-fed lines, two voices',
    changedSet((s) => {
      s.voices.count = 2
      s.line.baseMs = 5
      s.sweep.depthMs = 2
      s.loop.feedback = 0.6
      s.loop.crossFeed = 0.3
    }),
  ],
  [
    'right inverted',
    changedSet((s) => {
      s.mix.invertRight = true
      s.voices.count = 2
    }),
  ],
  [
    'square without edges',
    changedSet((s) => {
      s.sweep.shape = 'square'
      s.sweep.edgeMs = 0
    }),
  ],
  [
    'drawn, ratio law, one line for both sides',
    changedSet((s) => {
      s.layout = 'monoToStereo'
      s.loop.feedback = 0.4
      s.voices.count = 1
      s.sweep.law = 'ratio'
      s.sweep.depthOctaves = 0.4
      s.sweep.shape = 'drawn'
      s.sweep.points = [
        [0.1, -1],
        [0.3, 0.4],
        [0.8, 0.9],
      ]
    }),
  ],
]

describe('sweepEnvelope against 6,000 positions', () => {
  it.each(SETS)('%s: the top within 0.5 dB, the bottom within 1 dB down to −20', (_, set) => {
    const found = sweepEnvelope(set, HZ)
    const { top, bottom } = shortfall(found, denseEnvelope(set, 6000))
    expect(top).toBeLessThan(0.5)
    expect(bottom).toBeLessThan(1)
  })

  it.each(SETS)('%s: what it gives is really reached, near a position', (_, set) => {
    // Twice the positions must find all but the sharpest of it.
    const { top } = shortfall(denseEnvelope(set, 12000), sweepEnvelope(set, HZ))
    expect(top).toBeLessThan(0.3)
  })

  it.each(Array.from({ length: 12 }, (_, i) => 500 + i))(
    'random set, seed %i: within 2 dB of the top, sweeps of thousands of turns included',
    (seed) => {
      const set = randomSet(seed)
      const hz = HZ.filter((f) => f < 0.45 * set.sampleRate)
      const { top } = shortfall(sweepEnvelope(set, hz), denseEnvelope(set, 3000, hz))
      expect(top).toBeLessThan(2)
    },
  )
})

describe('closed forms', () => {
  it('a comb swept through more than a turn reaches |dry| ± |wet| at every frequency', () => {
    const set = changedSet((s) => {
      s.layout = 'mono'
      s.voices.count = 1
      s.line.baseMs = 10
      s.line.interpolation = 'allpass1'
      s.sweep.depthMs = 6
      s.mix.dry = 0.8
      s.mix.wet = 0.5
    })
    const [{ minDb, maxDb }] = sweepEnvelope(set, [100, 1000, 5000, 15000]) as [Ends]
    for (const db of maxDb) expect(db).toBeCloseTo(20 * Math.log10(1.3), 2)
    for (const db of minDb) expect(db).toBeCloseTo(20 * Math.log10(0.3), 1)
  })

  it('where the sweep stands it is the response itself', () => {
    const set = combSet({ samples: 48, feedback: 0.5 })
    const [{ minDb, maxDb }] = sweepEnvelope(set, HZ) as [Ends]
    const { db } = frozenResponse(freeze(set, 0), HZ)[0]!
    db.forEach((level, i) => {
      expect(minDb[i]).toBeCloseTo(level, 9)
      expect(maxDb[i]).toBeCloseTo(level, 9)
    })
  })

  it('a depth of 0 is a comb that stands, too', () => {
    const set = changedSet((s) => {
      s.sweep.depthMs = 0
      s.layout = 'mono'
    })
    const [{ minDb, maxDb }] = sweepEnvelope(set, HZ) as [Ends]
    minDb.forEach((level, i) => {
      expect(maxDb[i]! - level).toBeLessThan(1e-9)
    })
  })
})

describe('limits', () => {
  it('the top is never below the bottom, and both are finite', () => {
    for (const seed of [600, 601, 602, 603]) {
      const set = randomSet(seed)
      for (const { minDb, maxDb } of sweepEnvelope(set, [0, 50, set.sampleRate / 2])) {
        minDb.forEach((level, i) => {
          expect(Number.isFinite(level)).toBe(true)
          expect(maxDb[i]).toBeGreaterThanOrEqual(level)
        })
      }
    }
  })

  it('a frequency that is none throws', () => {
    expect(() => sweepEnvelope(combSet({ samples: 48 }), [24001])).toThrow(/frequenciesHz\[0\]/)
  })
})
