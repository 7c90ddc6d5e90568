import { describe, expect, it } from 'vitest'
import { axisColumns, columnPoints, frequencyAt } from '../../../app/plots/columns.ts'
import { traceJob } from '../../../app/workers/analysisJobs/trace.ts'
import { defaultSet, defaultShaper } from '../../../src/set/defaults.ts'
import type { ParameterSet } from '../../../src/set/types.ts'
import { comb, combDb } from './combs.ts'

const columns = axisColumns(48000, 700)
const points = columnPoints(columns)

describe('the trace of the response', () => {
  // Oracle: closed form of the feed-forward comb.
  it('holds the exact level at every point of its columns', () => {
    const { channels } = traceJob({ set: comb({ wet: 0.4 }), position: 0, columns })
    points.forEach((hz, i) => {
      expect(channels[0]?.db[i]).toBeCloseTo(combDb(hz, { wet: 0.4 }), 6)
    })
  })

  it('marks the notches of 1 ms at 500, 1500, 2500 Hz … and says that they come every 1000 Hz', () => {
    const { marks, spacingHz } = traceJob({ set: comb({ wet: 0.4 }), position: 0, columns })
    const notches = marks.filter(({ kind }) => kind === 'notch')
    expect(notches.slice(0, 3).map(({ frequencyHz }) => Math.round(frequencyHz * 10) / 10)).toEqual([500, 1500, 2500])
    for (const { db } of notches) expect(db).toBeCloseTo(20 * Math.log10(0.1), 4)
    expect(spacingHz).toBeCloseTo(1000, 1)
  })

  it('keeps labelled marks of a kind 40 pixels apart', () => {
    const { marks } = traceJob({ set: comb({ baseMs: 10, wet: 0.4 }), position: 0, columns })
    for (const kind of ['notch', 'peak'] as const) {
      const xs = marks.filter((mark) => mark.kind === kind && mark.labelled).map(({ frequencyHz }) => Math.log(frequencyHz / 20))
      const pixel = Math.log(1000) / columns.count
      xs.slice(1).forEach((x, i) => {
        expect((x - (xs[i] as number)) / pixel).toBeGreaterThanOrEqual(40)
      })
      expect(xs.length).toBeGreaterThan(3)
    }
  })

  // A 100 ms delay has 10 Hz teeth: from about 1 kHz on many to a pixel, where points alone would alias.
  it('spans notch to peak in every column that holds whole teeth', () => {
    const set = comb({ baseMs: 100, wet: 0.4 })
    const { channels, dense } = traceJob({ set, position: 0, columns })
    const [channel] = channels
    let whole = 0
    for (let i = 0; i < columns.count; i++) {
      const from = frequencyAt(columns, i / columns.count)
      const to = frequencyAt(columns, (i + 1) / columns.count)
      if (to - from < 10) continue
      whole += 1
      expect(channel?.low[i]).toBeCloseTo(20 * Math.log10(0.1), 3)
      expect(channel?.high[i]).toBeCloseTo(20 * Math.log10(0.9), 3)
    }
    expect(whole).toBeGreaterThan(200)
    expect(dense).toBeLessThan(columns.count / 2)
  })

  it('draws the dense part as outlines that no column leaves, the rest as a line', () => {
    const { channels, bands, dense } = traceJob({
      set: { ...defaultSet(), voices: { count: 3, phaseSpread: 360, spreadMs: 4 } },
      position: 0.3,
      columns,
    })
    expect(bands[0]?.low).toHaveLength(columns.count - dense)
    channels.forEach(({ low, high }, c) => {
      const from = columns.count - (bands[c]?.low.length ?? 0)
      // A dashed line is given up sooner than a solid one.
      if (c === 1) expect(from).toBeLessThan(dense)
      for (let i = from; i < columns.count; i++) {
        expect(bands[c]?.low[i - from]).toBeLessThanOrEqual((low[i] as number) + 1e-9)
        expect(bands[c]?.high[i - from]).toBeGreaterThanOrEqual((high[i] as number) - 1e-9)
      }
    })
    const few = traceJob({ set: comb(), position: 0, columns })
    expect(few.dense).toBe(columns.count)
    expect(few.bands[0]?.low).toHaveLength(0)
  })

  it('tells a second channel that differs from one that does not', () => {
    const set = defaultSet()
    const apart = { ...set, layout: 'stereo' as const, sweep: { ...set.sweep, stereoPhase: 90 } }
    const together = { ...apart, sweep: { ...apart.sweep, stereoPhase: 0 } }
    expect(traceJob({ set: apart, position: 0.1, columns }).differs).toBe(true)
    expect(traceJob({ set: together, position: 0.1, columns }).differs).toBe(false)
    expect(traceJob({ set: comb(), position: 0.1, columns }).differs).toBe(false)
  })

  it('says what its levels stand for: small signals, a drift taken as a sine, a loop that builds up', () => {
    const of = (set: ParameterSet) => {
      const { smallSignal, drifts, unstable } = traceJob({ set, position: 0, columns })
      return { smallSignal, drifts, unstable }
    }
    const loop = (feedback: number) => ({ ...comb(), loop: { ...comb().loop, feedback } })
    expect(of(loop(0.9))).toEqual({ smallSignal: false, drifts: false, unstable: false })
    expect(of(loop(-1.05)).unstable).toBe(true)
    expect(of({ ...comb(), mix: { ...comb().mix, shaper: defaultShaper('tanh') } }).smallSignal).toBe(true)
    expect(of({ ...comb(), sweep: { ...comb().sweep, shape: 'drift' } }).drifts).toBe(true)
  })

  it('goes on where a set rings at the limit: levels stay numbers', () => {
    const set = { ...comb(), loop: { ...comb().loop, feedback: 1, delay: 'fixed' as const, interpolation: 'nearest' as const } }
    for (const { low, high } of traceJob({ set, position: 0, columns }).channels) {
      expect([...low, ...high].every(Number.isFinite)).toBe(true)
    }
  })
})
