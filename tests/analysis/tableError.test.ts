// Oracles: the bound of linear interpolation, h²/8 · max|f″| (FACTS 7: Stampfli 2017), a corner's own; a search over a fine grid; second differences.
import { describe, expect, it } from 'vitest'
import { tableError } from '../../src/analysis/tableError.ts'
import { steepestBend } from '../../src/analysis/tableErrorBend.ts'
import { createShaper } from '../../src/dsp/shaper.ts'
import { readShaperTable } from '../../src/dsp/shaperTable.ts'
import { defaultShaper } from '../../src/set/defaults.ts'
import type { Shaper } from '../../src/set/types.ts'
import { random } from '../dsp/sets.ts'

const CURVES = ['hardClip', 'arctan', 'tanh', 'cubic', 'diode', 'deadZone', 'drawn'] as const
const SEED = 20261201

function randomShaper(r: ReturnType<typeof random>): Shaper {
  const curve = r.of(CURVES)
  const logarithmic = (low: number, high: number) => low * (high / low) ** r.next()
  return {
    ...defaultShaper(curve),
    drive: logarithmic(0.1, 100),
    ceiling: r.between(0.2, 2),
    positive: logarithmic(0.1, 3),
    negative: logarithmic(0.1, 3),
    deadZone: r.between(0, 0.5),
    points: [
      [0, 0],
      [r.between(0.1, 0.4), r.between(0, 1)],
      [r.between(0.5, 0.8), r.between(-0.5, 1)],
      [r.between(0.9, 2), r.between(0, 1)],
    ],
    tableSize: Math.round(logarithmic(16, 8192)),
    tableRange: logarithmic(0.3, 8),
  }
}

describe('tableError', () => {
  it(`the largest error is never passed on a fine grid, and stays within the bound, seed ${SEED}`, () => {
    const r = random(SEED)
    for (let k = 0; k < 60; k++) {
      const p = randomShaper(r)
      const found = tableError(p)
      const { curve } = createShaper(p)
      let seen = 0
      for (let i = 0; i <= 20011; i++) {
        const x = p.tableRange * ((2 * i) / 20011 - 1)
        seen = Math.max(seen, Math.abs(readShaperTable(found.table, x) - curve(x)))
      }
      const what = JSON.stringify(p)
      expect(seen, what).toBeLessThanOrEqual(found.largest * (1 + 1e-6) + 1e-15)
      expect(found.largest, what).toBeLessThanOrEqual(found.bound * (1 + 1e-9) + 1e-15)
      expect(Math.abs(readShaperTable(found.table, found.at) - curve(found.at)), what).toBe(found.largest)
    }
  })

  it('a fine table of a smooth curve comes within a hundredth of its bound, and a quarter with half the interval', () => {
    for (const curve of ['tanh', 'arctan', 'diode'] as const) {
      const at = (tableSize: number) => tableError({ ...defaultShaper(curve), drive: 2, tableSize })
      expect(at(2048).largest / at(2048).bound).toBeGreaterThan(0.99)
      expect(at(1024).largest / at(2048).largest).toBeCloseTo(4, 1)
    }
  })

  it('max|f″| is that of second differences: 4/(3√3) for tanh, π · 9/(16√3) for arctangent, 4/3 for the cubic’s end', () => {
    const own = { tanh: 4 / (3 * Math.sqrt(3)), arctan: (Math.PI * 9) / (16 * Math.sqrt(3)), cubic: 4 / 3 } as const
    for (const curve of ['tanh', 'arctan', 'cubic', 'diode'] as const) {
      const p = defaultShaper(curve)
      const { curve: f } = createShaper(p)
      let seen = 0
      for (let x = 0.001; x < 1.5; x += 0.0005) seen = Math.max(seen, Math.abs(f(x + 1e-4) - 2 * f(x) + f(x - 1e-4)) / 1e-8)
      expect(steepestBend(p, 2) / seen).toBeCloseTo(1, 2)
      if (curve !== 'diode') expect(steepestBend(p, 2)).toBeCloseTo(own[curve], 12)
    }
    // The range may end before the strongest bend: the cubic's f″ = −8t/9 at 0.6.
    expect(steepestBend(defaultShaper('cubic'), 0.6)).toBeCloseTo((8 * 0.6) / 9, 12)
  })

  it('a corner in the middle of an interval errs by h/4 of its change of slope, on a point by nothing', () => {
    // Corner of a hard clip × 2 at x = 0.5.
    const clip = (tableSize: number) => tableError({ ...defaultShaper('hardClip'), drive: 2, tableSize, tableRange: 1 })
    const middle = clip(18)
    expect(middle).toMatchObject({ boundBy: 'corners', measure: 2 })
    expect(middle.largest).toBeCloseTo(((2 / 18) * 2) / 4, 14)
    expect(clip(16).largest).toBeLessThan(1e-15)
  })

  it('says what held ends lose, and that some curves have no end', () => {
    const beyond = (curve: Shaper['curve'], tableRange: number) => tableError({ ...defaultShaper(curve), tableRange }).beyond
    expect(beyond('tanh', 1)).toBeCloseTo(1 - Math.tanh(1), 14)
    expect(beyond('hardClip', 0.75)).toBeCloseTo(0.25, 14)
    expect(beyond('cubic', 2)).toBe(0)
    expect([beyond('diode', 1), beyond('deadZone', 1)]).toEqual([null, null])
  })
})
