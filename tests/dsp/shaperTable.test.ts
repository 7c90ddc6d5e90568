// Oracle: the shaper itself; FACTS 7 for a linearly read sine table (computed there).
import { describe, expect, it } from 'vitest'
import { createShaper } from '../../src/dsp/shaper.ts'
import { readShaperTable, shaperTable, tablePoint } from '../../src/dsp/shaperTable.ts'
import { defaultShaper } from '../../src/set/defaults.ts'
import type { Shaper } from '../../src/set/types.ts'

const CURVES = ['hardClip', 'arctan', 'tanh', 'cubic', 'diode', 'deadZone'] as const
const shaper = (curve: Shaper['curve'], change: Partial<Shaper> = {}): Shaper => ({
  ...defaultShaper(curve),
  drive: 3,
  ceiling: 0.8,
  positive: 0.9,
  negative: 0.5,
  deadZone: 0.2,
  ...change,
})

describe('shaperTable', () => {
  it.each(CURVES)('%s: exact at its points, over x itself with drive and ceiling in it', (curve) => {
    const p = shaper(curve, { tableSize: 64, tableRange: 1.5 })
    const table = shaperTable(p)
    const exact = createShaper(p).curve
    expect(table.values.length).toBe(65)
    for (let i = 0; i <= 64; i++) {
      expect(table.values[i]).toBe(exact(tablePoint(table, i)))
      expect(readShaperTable(table, tablePoint(table, i))).toBeCloseTo(exact(tablePoint(table, i)), 14)
    }
  })

  it('0 is exactly 0, whether a point stands there or not', () => {
    for (const curve of CURVES)
      for (const tableSize of [16, 17, 255, 1024]) {
        const table = shaperTable(shaper(curve, { tableSize, tableRange: 0.7 }))
        expect(Math.abs(readShaperTable(table, 0)), `${curve}, ${tableSize}`).toBe(0)
      }
  })

  it('an odd table of like halves is the curve’s own', () => {
    const p = shaper('tanh', { negative: 0.9, tableSize: 17 })
    const table = shaperTable(p)
    for (let i = 0; i <= 17; i++) expect(table.values[i]).toBeCloseTo(createShaper(p).curve(tablePoint(table, i)), 15)
  })

  it('ends are held', () => {
    const table = shaperTable(shaper('diode', { tableRange: 0.5 }))
    for (const x of [0.5, 0.6, 1e9, Number.POSITIVE_INFINITY]) expect(readShaperTable(table, x)).toBe(table.values.at(-1))
    for (const x of [-0.5, -0.6, -1e9, Number.NEGATIVE_INFINITY]) expect(readShaperTable(table, x)).toBe(table.values[0])
  })

  it('a sine table read the same way errs as FACTS 7 says', () => {
    for (const [points, error] of [
      [64, 1.2e-3],
      [256, 7.5e-5],
      [1024, 4.7e-6],
      [4096, 2.9e-7],
    ] as const) {
      const values = Float64Array.from({ length: points + 1 }, (_, i) => Math.sin((2 * Math.PI * i) / points - Math.PI))
      const table = { range: Math.PI, step: (2 * Math.PI) / points, values }
      let largest = 0
      for (let i = 0; i < points; i++) {
        const x = (i + 0.5) * table.step - Math.PI
        largest = Math.max(largest, Math.abs(readShaperTable(table, x) - Math.sin(x)))
      }
      expect(largest / error).toBeGreaterThan(0.97)
      expect(largest / error).toBeLessThan(1.03)
    }
  })
})
