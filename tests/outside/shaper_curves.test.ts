// Oracle: numpy's FFT of the curve at 2^17 phases, numpy.interp for tables, scipy.optimize.newton for the diode.
import { describe, expect, it } from 'vitest'
import { foldedEnergy } from '../../src/analysis/folded.ts'
import { drivenSine } from '../../src/analysis/harmonics.ts'
import { tableError } from '../../src/analysis/tableError.ts'
import { defaultShaper } from '../../src/set/defaults.ts'
import type { Shaper } from '../../src/set/types.ts'
import { itIsMadeAgain, reference } from './reference.ts'

interface Row {
  readonly shaper: Partial<Shaper> & Pick<Shaper, 'curve'>
  readonly amplitude: number
  readonly dc: number
  readonly harmonics: number[]
  readonly folded: number
  readonly foldedMeans?: number
  readonly tables: { readonly size: number; readonly range: number; readonly largest: number }[]
}

const rows = reference<Row[]>('shaper_curves').map((row) => {
  const shaper: Shaper = { ...defaultShaper(row.shaper.curve), ...row.shaper }
  return [`${shaper.curve} × ${shaper.drive}, limits ${shaper.positive} and ${shaper.negative}`, shaper, row] as const
})

describe.each(rows)('%s', (_, shaper, row) => {
  it('harmonics and DC are those of the long FFT, which itself folds corners by some 1e-9', () => {
    const { amplitudes } = drivenSine(shaper, row.amplitude, 10)
    expect(Math.abs((amplitudes[0] as number) - row.dc)).toBeLessThan(1e-8)
    row.harmonics.forEach((c, k) => {
      expect(Math.abs((amplitudes[k + 1] as number) - c), `harmonic ${k + 1}`).toBeLessThan(1e-8)
    })
  })

  it('what folds of 5 kHz at 48 kHz is the rest of that FFT', () => {
    const { db } = foldedEnergy(shaper, row.amplitude, 48000)
    // A cubic that is not driven to its end makes a third harmonic and nothing else: what is left there is rounding.
    if (row.folded < -280) {
      expect(db).toBe(-400)
      return
    }
    expect(db).toBeCloseTo(row.folded, 3)
    const means = foldedEnergy({ ...shaper, antialias: 'adaa1' }, row.amplitude, 48000).db as number
    if (row.foldedMeans !== undefined) expect(means).toBeCloseTo(row.foldedMeans, 3)
    expect(means).toBeLessThan(row.folded)
  })

  it('the table’s largest error is that of numpy.interp, no less and within the bound', () => {
    for (const { size, range, largest } of row.tables) {
      const found = tableError({ ...shaper, tableSize: size, tableRange: range })
      expect(found.largest).toBeGreaterThanOrEqual(largest * (1 - 1e-9))
      // numpy's grid passes the very place by up to half its step: of a corner that is a thousandth of an interval or so.
      expect(found.largest).toBeLessThan(largest * 1.01 + 1e-15)
      expect(found.largest).toBeLessThanOrEqual(found.bound * (1 + 1e-9))
    }
  })
})

itIsMadeAgain('shaper_curves', 1e-9)
