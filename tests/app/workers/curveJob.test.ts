// What the Curve plot is given. Oracles: the shaper's own exact curve, the analysis it is made from, symmetry.
import { describe, expect, it } from 'vitest'
import { curveJob } from '../../../app/workers/curveJob.ts'
import { foldedEnergy } from '../../../src/analysis/folded.ts'
import { tableError } from '../../../src/analysis/tableError.ts'
import { defaultShaper } from '../../../src/set/defaults.ts'
import type { Shaper } from '../../../src/set/types.ts'

const ask = (shaper: Shaper) => curveJob({ shaper, amplitude: 0.5, sampleRate: 48000, highest: 9 })

describe('transfer', () => {
  it('runs past full scale and table, through 0, and has no table error past the table', () => {
    const { transfer } = ask({ ...defaultShaper('tanh'), drive: 3, tableRange: 0.5 })
    expect(transfer.x[0]).toBeCloseTo(-1.12, 12)
    expect(transfer.x[300]).toBe(0)
    transfer.x.forEach((x, i) => {
      expect(transfer.y[i]).toBeCloseTo(Math.tanh(3 * x), 14)
      expect(Number.isNaN(transfer.error[i] as number)).toBe(Math.abs(x) > 0.5)
    })
  })

  it('what is drawn of the error comes to its largest value and never passes it, humps dense or sparse', () => {
    for (const tableSize of [16, 33, 256, 1024, 8192])
      for (const curve of ['tanh', 'hardClip', 'diode'] as const) {
        const shaper = { ...defaultShaper(curve), drive: 3, tableSize }
        const { error } = ask(shaper).transfer
        const { largest } = tableError(shaper)
        const drawn = error.reduce((most, value) => (Number.isNaN(value) ? most : Math.max(most, value)), 0)
        expect(drawn, `${curve}, ${tableSize}`).toBeLessThanOrEqual(largest * (1 + 1e-9))
        expect(drawn, `${curve}, ${tableSize}`).toBeGreaterThanOrEqual(0.97 * largest)
      }
  })

  it('table points are there while they can be told apart', () => {
    const points = (tableSize: number) => ask({ ...defaultShaper('tanh'), tableSize }).transfer.tableX.length
    expect([points(16), points(64), points(1024)]).toEqual([17, 65, 0])
  })
})

describe('against drive', () => {
  it('is at the drive itself what the checks say, and the same whatever the drive in force', () => {
    const shaper = { ...defaultShaper('tanh'), drive: 4, negative: 0.6 }
    const { own, against } = ask(shaper)
    expect(own.foldedDb[0]).toBeCloseTo(foldedEnergy(shaper, 0.5, 48000).db as number, 12)
    expect(ask({ ...shaper, drive: 2, tableSize: 64 }).against).toBe(against)
    expect(ask({ ...shaper, drive: 2, negative: 0.5 }).against).not.toBe(against)
  })

  it('like halves have neither even harmonics nor DC', () => {
    const { harmonics, dcDb } = ask(defaultShaper('arctan')).against
    expect(harmonics).toHaveLength(8)
    for (const even of [0, 2, 4, 6]) expect(harmonics[even]?.every(Number.isNaN)).toBe(true)
    expect(harmonics[1]?.some(Number.isNaN)).toBe(false)
    expect(dcDb.every(Number.isNaN)).toBe(true)
  })

  it('reaches to a drive outside the usual track', () => {
    const { drives } = ask({ ...defaultShaper('tanh'), drive: 200 }).against
    expect([drives[0], drives.at(-1)]).toEqual([0.1, 200])
  })
})
