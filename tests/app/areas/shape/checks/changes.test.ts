import { describe, expect, it } from 'vitest'
import { changesOf, differs, RATES, ratesWith } from '../../../../../app/areas/shape/checks/rates/changes.ts'
import type { RatedCheck } from '../../../../../app/workers/analysisJobs/rates.ts'

const margin: RatedCheck = { id: 'loop.margin', label: 'Loop gain margin', status: 'holds', value: 4.15, limit: 0, unit: 'dB' }
const ring: RatedCheck = { id: 'loop.ring', label: 'Longest ring', status: 'holds', value: 0.5, limit: 3, unit: 's' }
const range: RatedCheck = {
  id: 'sweep.range',
  label: 'Delay range',
  status: 'holds',
  value: { smallestMs: 1, largestMs: 6, needed: 292 },
  limit: 0.02,
  unit: 'ms',
}

describe('what another rate changes', () => {
  it('is a status, or a figure that differs noticeably: 0.3 dB, 2 %', () => {
    expect(differs(margin, { ...margin, value: 4.3 })).toBe(false)
    expect(differs(margin, { ...margin, value: 4.5 })).toBe(true)
    expect(differs(margin, { ...margin, status: 'near' })).toBe(true)
    expect(differs(ring, { ...ring, value: 0.505 })).toBe(false)
    expect(differs(ring, { ...ring, value: 0.52 })).toBe(true)
    expect(differs(ring, { ...ring, value: null })).toBe(true)
  })

  it('is nothing where the figure reads the same, whatever else the value holds', () => {
    expect(differs(range, { ...range, value: { smallestMs: 1, largestMs: 6, needed: 1160 } })).toBe(false)
    expect(differs(range, { ...range, value: { smallestMs: 1.2, largestMs: 6, needed: 292 } })).toBe(true)
  })

  it('lists those checks with a cell a rate, and names the others', () => {
    const { rows, same } = changesOf(
      [
        { rate: 32000, checks: [{ ...margin, status: 'near', value: 0.2 }, ring] },
        { rate: 48000, checks: [margin, ring] },
        { rate: 96000, checks: [ring] },
      ],
      48000,
    )
    expect(same).toEqual(['Longest ring'])
    expect(rows).toEqual([
      {
        id: 'loop.margin',
        label: 'Loop gain margin',
        cells: [{ status: 'near', figure: '0.2 dB' }, { status: 'holds', figure: '4.15 dB' }, null],
      },
    ])
  })
})

describe('the rates looked at', () => {
  it('are the usual six and the set’s own, rising', () => {
    expect(ratesWith(48000)).toEqual(RATES)
    expect(ratesWith(50000)).toEqual([32000, 44100, 48000, 50000, 88200, 96000, 192000])
  })
})
