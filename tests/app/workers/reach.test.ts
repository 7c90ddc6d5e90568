import { describe, expect, it } from 'vitest'
import { axisColumns } from '../../../app/plots/columns.ts'
import { type Reach, reachJob } from '../../../app/workers/analysisJobs/reach.ts'
import { traceJob } from '../../../app/workers/analysisJobs/trace.ts'
import { defaultSet } from '../../../src/set/defaults.ts'
import type { ParameterSet } from '../../../src/set/types.ts'
import { comb, combDb } from './combs.ts'

const columns = axisColumns(48000, 700)

function reachOf(set: ParameterSet): { reach: Reach; slices: number } {
  const steps = reachJob({ set, columns })
  let slices = 0
  for (;;) {
    const step = steps.next()
    if (step.done) return { reach: step.value, slices }
    slices += 1
  }
}

const chorus = defaultSet()

describe('the reach of the response over the sweep', () => {
  it('is computed in slices', () => {
    expect(reachOf(comb({ depthMs: 0.5 })).slices).toBeGreaterThan(5)
  })

  it.each([
    ['a chorus of three voices', chorus],
    ['a comb that sweeps', comb({ baseMs: 3, depthMs: 2 })],
    ['a long comb that hardly sweeps', comb({ baseMs: 100, depthMs: 0.05 })],
  ])('holds the response of every position but for one level in 200, by half a decibel: %s', (_, set) => {
    const { reach } = reachOf(set)
    let outside = 0
    let all = 0
    for (const position of [0, 0.11, 0.37, 0.5, 0.82])
      for (const { low, high } of traceJob({ set, position, columns }).channels)
        for (let i = 0; i < columns.count; i++) {
          all += 2
          // Bottoms of notches below −30 dB are points no sampling meets.
          if ((low[i] as number) > -30 && (low[i] as number) < (reach.low[i] as number) - 0.5) outside += 1
          if ((high[i] as number) > (reach.high[i] as number) + 0.5) outside += 1
        }
    expect(outside / all).toBeLessThan(1 / 200)
  })

  // Oracle: closed form; a sweep over a whole turn of phase passes both ends, dry + wet and |dry − wet|.
  it('reaches from notch to peak where the sweep turns the phase once', () => {
    const set = comb({ baseMs: 3, depthMs: 2, wet: 0.4 })
    const { reach } = reachOf(set)
    const from = Math.ceil((Math.log(1000 / 20) / Math.log(1000)) * columns.count)
    // `nearest` reads whole samples: at 1 to 2 kHz phase comes within 0.07 rad of the ends.
    const to = Math.floor((Math.log(2000 / 20) / Math.log(1000)) * columns.count)
    for (let i = from; i < to; i++) {
      expect(reach.high[i]).toBeGreaterThan(20 * Math.log10(0.9) - 0.1)
      expect(reach.high[i]).toBeLessThanOrEqual(20 * Math.log10(0.9) + 1e-6)
      expect(reach.low[i]).toBeLessThan(20 * Math.log10(0.1) + 2)
      expect(reach.low[i]).toBeGreaterThanOrEqual(20 * Math.log10(0.1) - 1e-6)
    }
  })

  it('is the response itself where the sweep stands', () => {
    const { reach } = reachOf(comb())
    const middle = Math.floor(columns.count / 4)
    const hz = 20 * 1000 ** ((middle + 0.5) / columns.count)
    expect((reach.low[middle] as number) + (reach.high[middle] as number)).toBeCloseTo(2 * combDb(hz), 2)
  })
})
