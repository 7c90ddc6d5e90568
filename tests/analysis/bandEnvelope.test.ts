// Oracle: the frozen response at 2,000 frequencies inside each band.
import { describe, expect, it } from 'vitest'
import { bandEnvelope, logBandEdges } from '../../src/analysis/bandEnvelope.ts'
import { freeze } from '../../src/analysis/frozen.ts'
import { frozenResponse } from '../../src/analysis/response.ts'
import { randomSet } from '../dsp/sets.ts'
import { combSet } from './combs.ts'

describe('logBandEdges', () => {
  it('equal ratios, ends exact', () => {
    const edges = logBandEdges(20, 20000, 3)
    expect([...edges].map((hz) => Math.round(hz))).toEqual([20, 200, 2000, 20000])
    expect(edges[3]).toBe(20000)
  })

  it('bands that are none throw', () => {
    expect(() => logBandEdges(0, 100, 3)).toThrow(RangeError)
    expect(() => logBandEdges(100, 100, 3)).toThrow(RangeError)
    expect(() => logBandEdges(20, 100, 0)).toThrow(RangeError)
  })
})

describe('bandEnvelope', () => {
  it.each(Array.from({ length: 10 }, (_, i) => 800 + i))('holds every level of the band and no more, random set, seed %i', (seed) => {
    const set = randomSet(seed)
    const frozen = freeze(set, 0.6)
    const edges = logBandEdges(30, 0.4 * set.sampleRate, 40)
    const bands = bandEnvelope(frozen, edges)
    for (let b = 0; b < 40; b += 3) {
      const [low, high] = [edges[b]!, edges[b + 1]!]
      const inside = Float64Array.from({ length: 2001 }, (_, i) => low + ((high - low) * i) / 2000)
      frozenResponse(frozen, inside).forEach(({ db }, c) => {
        const [least, most] = [Math.min(...db), Math.max(...db)]
        const { minDb, maxDb } = bands[c]!
        // Nothing lies outside the band's ends but what rounding and the search leave …
        expect(least).toBeGreaterThan(minDb[b]! - 1e-3 - 1e-12)
        expect(most).toBeLessThan(maxDb[b]! + 1e-3)
        // … and the ends are reached as far as 2,001 points show it.
        expect(maxDb[b]! - most).toBeLessThan(0.5)
        if (minDb[b]! > -40) expect(least - minDb[b]!).toBeLessThan(1)
      })
    }
  })

  it('a band with ten teeth in it spans from null to peak', () => {
    const [{ minDb, maxDb }] = bandEnvelope(freeze(combSet({ samples: 480 }), 0), [10025, 11025]) as [
      { minDb: Float64Array; maxDb: Float64Array },
    ]
    expect(minDb[0]).toBeLessThan(-100)
    expect(maxDb[0]).toBeCloseTo(20 * Math.log10(2), 6)
  })

  it('bands between teeth are as narrow as the response in them', () => {
    const frozen = freeze(combSet({ samples: 48 }), 0)
    const [{ minDb, maxDb }] = bandEnvelope(frozen, [600, 700]) as [{ minDb: Float64Array; maxDb: Float64Array }]
    const { db } = frozenResponse(frozen, [600, 700])[0]!
    expect(minDb[0]).toBeCloseTo(db[0]!, 12)
    expect(maxDb[0]).toBeCloseTo(db[1]!, 12)
  })

  it('edges that do not ascend within 0 to half the rate throw', () => {
    const frozen = freeze(combSet({ samples: 48 }), 0)
    for (const edges of [[100], [100, 100], [200, 100], [-1, 100], [100, 24001], [100, Number.NaN]])
      expect(() => bandEnvelope(frozen, edges)).toThrow(RangeError)
  })
})
