import { describe, expect, it } from 'vitest'
import { axisColumns, columnPoints } from '../../../app/plots/columns.ts'
import { loopAxis } from '../../../app/plots/loop/loop.ts'
import { loopCursorWords, loopRestWords, loopTable } from '../../../app/plots/loop/loopWords.ts'
import { loopJob, loopReachJob } from '../../../app/workers/analysisJobs/loop.ts'
import { defaultShaper } from '../../../src/set/defaults.ts'
import type { ParameterSet } from '../../../src/set/types.ts'
import { comb } from './combs.ts'

const columns = axisColumns(48000, 400)

function ringing(loop: Partial<ParameterSet['loop']>, sweep = { baseMs: 5, depthMs: 0 }): ParameterSet {
  const set = comb(sweep)
  return { ...set, loop: { ...set.loop, feedback: 0.7, delay: 'moving', interpolation: 'linear', ...loop } }
}

describe('the open loop', () => {
  // Oracle: a whole delay loses nothing, so |g A F| is |g| times the one-pole (1−a)/|1 − a e^−jω|, a = exp(−2π f/fs).
  it('is the feedback times the damping filter', () => {
    const { lines } = loopJob({ set: ringing({ dampingHz: 4000 }), position: 0, columns })
    const a = Math.exp((-2 * Math.PI * 4000) / 48000)
    columnPoints(columns).forEach((hz, i) => {
      const w = (2 * Math.PI * hz) / 48000
      const gain = (0.7 * (1 - a)) / Math.hypot(1 - a * Math.cos(w), a * Math.sin(w))
      expect(lines[0]?.[i]).toBeCloseTo(20 * Math.log10(gain), 8)
    })
  })

  it('counts a shaper by its largest gain, so that 0 dB is the limit', () => {
    const { lines } = loopJob({ set: ringing({ shaper: { ...defaultShaper('hardClip'), drive: 2 } }), position: 0, columns })
    expect(lines[0]?.[0]).toBeCloseTo(20 * Math.log10(1.4), 8)
  })

  // Oracle: poles of 1 − g z^−M stand at radius g^(1/M), at multiples of fs/M; 60 dB decay −3 τ / log10 g (Schroeder). M = 240.
  it('has the poles and the ring time of the feedback comb', () => {
    const { poles, largest } = loopJob({ set: ringing({}), position: 0, columns })
    expect(largest?.radius).toBeCloseTo(0.7 ** (1 / 240), 10)
    expect(largest?.ringSeconds).toBeCloseTo((-3 * 0.005) / Math.log10(0.7), 8)
    expect(poles.slice(0, 3).map(({ frequencyHz }) => Math.round(frequencyHz * 1e6) / 1e6)).toEqual([200, 400, 600])
    for (const { db } of poles) expect(db).toBeCloseTo(20 * Math.log10(0.7), 1)
  })

  it('is empty without feedback, and says so', () => {
    const trace = loopJob({ set: ringing({ feedback: 0 }), position: 0, columns })
    expect(trace.largest).toBeNull()
    expect(loopRestWords(trace, loopReachJob({ set: ringing({ feedback: 0 }), columns }))).toBe('no feedback')
    expect(loopTable(trace, null).rows).toEqual([])
    expect(loopCursorWords(trace, 1000)).toBe('no feedback')
  })

  it('reads a level between its points as the curve runs', () => {
    const trace = loopJob({ set: ringing({}), position: 0, columns })
    expect(loopCursorWords(trace, 1268)).toBe('1\u2009268 Hz · \u22123.1 dB · D♯6 +32 ct')
  })
})

describe('the open loop wherever the sweep stands', () => {
  // Oracle: linear interpolation loses most half-way between samples, cos(π f/fs), and nothing at whole samples.
  it('spans what the read’s fraction makes of it', () => {
    const { low, high } = loopReachJob({ set: ringing({}, { baseMs: 5, depthMs: 1 }), columns })
    const hz = columnPoints(columns)
    low.forEach((db, i) => {
      expect(high[i]).toBeCloseTo(20 * Math.log10(0.7), 6)
      expect(db).toBeCloseTo(20 * Math.log10(0.7 * Math.cos((Math.PI * (hz[2 * i + 1] as number)) / 48000)), 6)
    })
  })

  it('is the loop itself where the sweep stands still', () => {
    const set = ringing({ delay: 'fixed' }, { baseMs: 5.01, depthMs: 2 })
    const { low, high } = loopReachJob({ set, columns })
    const { lines } = loopJob({ set, position: 0.4, columns })
    low.forEach((db, i) => {
      expect([db, high[i]]).toEqual([lines[0]?.[2 * i + 1], lines[0]?.[2 * i + 1]])
    })
  })

  it('says how far below or above the limit it comes at most', () => {
    const words = (feedback: number) => {
      const set = ringing({ feedback })
      return loopRestWords(loopJob({ set, position: 0, columns }), loopReachJob({ set, columns }))
    }
    expect(words(0.62)).toMatch(/ · 4\.2 dB below the limit$/)
    expect(words(-1.1)).toMatch(/^largest pole 1\.000\d+ · does not die away · 0\.8 dB above the limit$/)
    expect(words(1)).toMatch(/ · at the limit$/)
  })
})

describe('the axis of the loop plot', () => {
  it('always shows the limit, with room above', () => {
    expect(loopAxis(-24, -4.2)).toEqual({ minDb: -30, maxDb: 12 })
    expect(loopAxis(-400, 9)).toEqual({ minDb: -36, maxDb: 12 })
    expect(loopAxis(-3, -3)).toEqual({ minDb: -18, maxDb: 12 })
  })
})
