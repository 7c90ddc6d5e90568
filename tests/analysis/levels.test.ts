// Oracles: closed forms and the table of FACTS 2 (Dattorro 1997 table 6; J. O. Smith, PASP), the frozen response at random places.
import { describe, expect, it } from 'vitest'
import { frozenExtremes } from '../../src/analysis/extremes.ts'
import { freeze } from '../../src/analysis/frozen.ts'
import { levelFigures } from '../../src/analysis/levels.ts'
import { largestGain } from '../../src/analysis/levelsSearch.ts'
import { freezeAtLargestSlope } from '../../src/analysis/levelsSet.ts'
import { frozenResponse } from '../../src/analysis/response.ts'
import { defaultShaper } from '../../src/set/defaults.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { changedSet, random, randomSet } from '../dsp/sets.ts'
import { combSet } from './combs.ts'

const db = (gain: number) => 20 * Math.log10(gain)

describe('the general comb', () => {
  // FACTS 2c, C: flanger row 4.828 (+13.68 dB), white chorus 2.414 (+7.7 dB), standard chorus 1.707 (+4.6 dB). The sign of feedback is turned to ours.
  it.each([
    ['flanger', { dry: 0.7071, wet: 0.7071, feedback: 0.7071 }, 4.828, 4.828],
    ['white chorus', { dry: 0.7071, wet: 1, feedback: -0.7071 }, 1, 2.414],
    ['standard chorus', { dry: 1, wet: 0.7071, feedback: 0 }, 1.707, 1.707],
  ])('%s: worst gain and worst sample of the published table', (_, comb, gain, l1) => {
    const { peak } = levelFigures(combSet({ samples: 100, tap: 'line', ...comb }))
    expect(peak.worst?.gain).toBeCloseTo(gain, 3)
    expect(peak.l1?.bound).toBeGreaterThan(l1 - 1e-3)
    expect(peak.l1?.sum).toBeLessThan(l1 + 1e-3)
  })

  it('the white chorus held at its tap centre is all-pass, magnitude 1.000000 at all frequencies, and still needs 7.7 dB of headroom', () => {
    const set = combSet({ samples: 400, tap: 'line', dry: Math.SQRT1_2, wet: 1, feedback: -Math.SQRT1_2 })
    const [response] = frozenResponse(
      freeze(set, 0),
      Float64Array.from({ length: 1000 }, (_, i) => i * 24),
    )
    for (const level of response!.db) expect(Math.abs(level)).toBeLessThan(1e-6)
    const { peak } = levelFigures(set)
    expect(Math.abs(peak.db!)).toBeLessThan(1e-6)
    expect(peak.worst?.bound).toBeCloseTo(1, 9)
    expect(peak.sampleDb).toBeCloseTo(7.66, 1)
    // A sweep without depth stands as one without rate does; rounding is no gain.
    const { peak: flat } = levelFigures({ ...set, sweep: { ...set.sweep, rateHz: 0.3, depthMs: 0 } })
    expect(flat.worst?.bound).toBeCloseTo(1, 9)
    expect(flat.db).toBe(0)
  })

  // FACTS 2c, D: max(|(BL+FF)/(1+a)|, |(BL−FF)/(1−a)|); l1 |BL| + |FF − BL a|/(1 − |a|).
  it('any general comb of whole samples: the closed forms', () => {
    const r = random(2)
    for (let i = 0; i < 60; i++) {
      const [dry, wet, feedback] = [r.between(-1, 1), r.between(-1, 1), r.between(-0.95, 0.95)]
      const samples = r.integer(2, 90)
      const { peak, line } = levelFigures(combSet({ samples, tap: 'line', dry, wet, feedback }))
      const gain = Math.max(Math.abs((dry + wet) / (1 - feedback)), Math.abs((dry - wet) / (1 + feedback)))
      const l1 = Math.abs(dry) + Math.abs(wet + dry * feedback) / (1 - Math.abs(feedback))
      expect(Math.abs(peak.db! - db(gain))).toBeLessThan(0.01)
      expect(peak.worst!.bound).toBeGreaterThan(gain * (1 - 1e-9))
      expect(peak.l1!.sum).toBeLessThan(l1 * (1 + 1e-9))
      expect(peak.l1!.bound).toBeGreaterThan(l1 * (1 - 1e-9))
      expect(peak.anyMovement).toBeCloseTo(l1, 2)
      expect(line.db).toBeCloseTo(db(1 / (1 - Math.abs(feedback))), 2)
    }
  })

  // FACTS 2c: with the loop fixed and the voice elsewhere nothing cancels any more: (|BL| + |FF|)/(1 − |a|).
  it('the white chorus swept away from its tap centre: 15.3 dB of worst sample, 7.7 dB only while it passes it', () => {
    const set = changedSet((s) => {
      Object.assign(s, combSet({ samples: 400, tap: 'line', dry: 0.7071, wet: 1, feedback: -0.7071 }))
      s.loop.delay = 'fixed'
      s.sweep = { ...s.sweep, rateHz: 0.15, depthMs: 7.9 }
    })
    expect(levelFigures(set).peak.sampleDb).toBeCloseTo(db(1.7071 / 0.2929), 1)
  })
})

describe('worst gain over frequency and sweep', () => {
  it('the place named has the gain given', () => {
    for (let seed = 1; seed <= 40; seed++) {
      const set = stableSet(seed)
      const { worst } = levelFigures(set).peak
      if (worst === null) continue
      const held = freezeAtLargestSlope(set, worst.position, set.sampleRate)
      const level = frozenResponse(held, [Math.min(worst.frequencyHz, set.sampleRate / 2)])[worst.channel]!.db[0]!
      expect(Math.abs(level - Math.max(-400, db(worst.gain))), `seed ${seed}`).toBeLessThan(0.02)
    }
  })

  // Every peak of the exact response at random positions: none above the bound, and hardly any above what was found.
  it('no peak anywhere is above the bound; nine of ten finds are within 0.1 dB of the highest, all within 1 dB', {
    timeout: 60000,
  }, () => {
    const short: number[] = []
    for (let seed = 1; seed <= 24; seed++) {
      const set = stableSet(seed)
      const { gain, bound } = largestGain(set)
      if (!Number.isFinite(bound)) continue
      const highest = highestPeak(set, seed)
      expect(highest, `seed ${seed}`).toBeLessThan(bound * (1 + 1e-6) + 1e-12)
      short.push(db(Math.max(1, highest / gain)))
    }
    short.sort((a, b) => a - b)
    expect(short.length).toBeGreaterThan(18)
    expect(short[Math.floor(0.9 * short.length)]).toBeLessThan(0.1)
    expect(short.at(-1)).toBeLessThan(1)
  })
})

/** A random set without shapers whose loop stays below 0.95. */
function stableSet(seed: number): ParameterSet {
  const set = randomSet(seed)
  return {
    ...set,
    input: { ...set.input, shaper: null },
    loop: { ...set.loop, feedback: Math.max(-0.95, Math.min(0.95, set.loop.feedback)), shaper: null },
    mix: { ...set.mix, shaper: null },
  }
}

function highestPeak(set: ParameterSet, seed: number): number {
  const r = random(1000 + seed)
  let highest = 0
  for (let i = 0; i < (set.sweep.rateHz === 0 ? 1 : 5); i++) {
    const held = freeze(set, set.sweep.rateHz === 0 ? set.sweep.startPhase : r.next())
    for (const extreme of frozenExtremes(held, { withinHz: 0.05 })) highest = Math.max(highest, 10 ** (extreme.db / 20))
    for (const { db: levels } of frozenResponse(held, [0, set.sampleRate / 2]))
      for (const level of levels) highest = Math.max(highest, 10 ** (level / 20))
  }
  return highest
}

describe('shapers', () => {
  const comb = combSet({ samples: 100, feedback: 0.9 })
  it('a ceiling at the output holds the level that the loop would bring', () => {
    const { peak } = levelFigures({ ...comb, mix: { ...comb.mix, shaper: { ...defaultShaper('hardClip'), ceiling: 0.5 } } })
    expect(peak.heldByShaper).toBe(true)
    expect(peak.db).toBeCloseTo(db(0.5), 9)
  })

  it('a clipper in a loop of gain 1.2 leaves no finite gain but a level: 1 + 1.2 in the line', () => {
    const { line } = levelFigures({ ...comb, loop: { ...comb.loop, feedback: 1.2, shaper: defaultShaper('hardClip') } })
    expect(line.worst).toBeNull()
    expect(line.db).toBeCloseTo(db(2.2), 6)
  })

  it('a dead zone counts by the gain of large signals, not by its slope of 0', () => {
    const { peak } = levelFigures({
      ...combSet({ samples: 20, wet: 0 }),
      input: { gainDb: 0, shaper: { ...defaultShaper('deadZone'), deadZone: 0.01 } },
    })
    expect(peak.worst?.gain).toBeCloseTo(1, 9)
    expect(peak.db).toBeCloseTo(db(0.99), 9)
  })

  it('a loop that diverges has no finite gain', () => {
    const { peak, line } = levelFigures(combSet({ samples: 100, feedback: 1 }))
    expect([peak.db, line.db, peak.l1, peak.anyMovement]).toEqual([null, null, null, null])
  })
})
