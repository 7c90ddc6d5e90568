import { describe, expect, it } from 'vitest'
import { axisColumns, columnPoints, frequencyAt, partOf } from '../../../app/plots/columns.ts'
import { evenSplits, frequencyLabel, frequencySplits } from '../../../app/plots/host/axes.ts'
import { sliderKey } from '../../../app/plots/host/slider.ts'
import { levelRange } from '../../../app/plots/levels.ts'

describe('the frequency axis', () => {
  it('goes from 20 Hz to 20 kHz, but not past half the rate', () => {
    expect(axisColumns(48000, 700)).toEqual({ lowHz: 20, highHz: 20000, count: 700 })
    expect(axisColumns(32000, 700).highHz).toBe(16000)
  })

  it('has two points a column, in even ratios, ends included', () => {
    const columns = axisColumns(48000, 10)
    const points = columnPoints(columns)
    expect(points).toHaveLength(21)
    expect([points[0], points[20]]).toEqual([20, 20000])
    for (let i = 1; i < 21; i++) expect((points[i] as number) / (points[i - 1] as number)).toBeCloseTo(1000 ** (1 / 20), 12)
  })

  it('finds the place of a frequency and the frequency of a place', () => {
    const columns = axisColumns(48000, 700)
    expect(partOf(columns, Math.sqrt(20 * 20000))).toBeCloseTo(0.5, 12)
    expect(frequencyAt(columns, partOf(columns, 1268))).toBeCloseTo(1268, 9)
  })

  it('labels 1, 2, 5 in each decade, fewer where it is short', () => {
    expect(frequencySplits(20, 20000, 700)).toEqual([20, 50, 100, 200, 500, 1000, 2000, 5000, 10000, 20000])
    expect(frequencySplits(20, 20000, 150)).toEqual([100, 1000, 10000])
    expect([50, 1000, 20000].map(frequencyLabel)).toEqual(['50', '1 k', '20 k'])
  })
})

describe('even axes', () => {
  it('step by 1, 2 or 5, or by given steps, so that labels have room', () => {
    expect(evenSplits(0.4, 6.6, 165, 36)).toEqual([2, 4, 6])
    expect(evenSplits(-24, 12, 245, 30, [1, 3, 6, 12])).toEqual([-24, -18, -12, -6, 0, 6, 12])
    expect(evenSplits(-0.3, 0.3, 200, 60)).toEqual([-0.2, 0, 0.2])
  })
})

describe('the level axis', () => {
  it('steps by 6 dB around what is shown, with room for the marks', () => {
    expect(levelRange(-16.9, 8.3)).toEqual({ minDb: -24, maxDb: 18 })
  })

  it('cuts deep notches off 42 dB below its top and never shows less than 24 dB', () => {
    expect(levelRange(-400, 3)).toEqual({ minDb: -30, maxDb: 12 })
    expect(levelRange(-1, 1)).toEqual({ minDb: -12, maxDb: 12 })
  })

  it('cuts off what a loop at its limit makes of its peaks, so that 0 dB stays in sight', () => {
    expect(levelRange(-6, 400)).toEqual({ minDb: -12, maxDb: 36 })
  })
})

describe('a slider’s keys', () => {
  it('move by 0.01 with arrows, 0.1 with Page, to the ends with Home and End, within 0 to 1', () => {
    expect(sliderKey('ArrowRight', 0.38)).toBe(0.39)
    expect(sliderKey('ArrowDown', 0.38)).toBe(0.37)
    expect(sliderKey('PageUp', 0.95)).toBe(1)
    expect(sliderKey('PageDown', 0.38)).toBe(0.28)
    expect(sliderKey('Home', 0.38)).toBe(0)
    expect(sliderKey('End', 0.38)).toBe(1)
    expect(sliderKey('a', 0.38)).toBeNull()
  })
})
