// response.extremes. Oracle: FACTS 1 closed forms at both ends of a sweep.
import { describe, expect, it } from 'vitest'
import { responseExtremes } from '../../src/checks/responseExtremes.ts'
import { combSet } from '../analysis/combs.ts'
import { changedSet } from '../dsp/sets.ts'

const run = (set: Parameters<typeof responseExtremes>[0]['set'], sampleRate = set.sampleRate) => responseExtremes({ set, sampleRate })

interface Value {
  readonly notches: { readonly fewest: number; readonly most: number; readonly furthestDb: number | null }
  readonly peaks: { readonly fewest: number; readonly most: number; readonly furthestDb: number | null }
  readonly firstNotchHz: readonly (number | null)[]
  readonly firstPeakHz: readonly (number | null)[]
}

describe('response.extremes', () => {
  it('1 ms ± 0.5 ms of equal parts: counts, first frequencies and levels of both ends', () => {
    const set = changedSet((s) => {
      s.layout = 'mono'
      s.voices.count = 1
      s.line.baseMs = 1
      s.line.interpolation = 'linear'
      s.sweep.depthMs = 0.5
      s.mix.dry = 1
      s.mix.wet = 0.5
    })
    const { status, value, unit } = run(set)
    const { notches, peaks, firstNotchHz, firstPeakHz } = value as unknown as Value
    expect([status, unit]).toEqual(['holds', 'Hz'])
    // 72 and 24 samples at 48 kHz: teeth 666.7 and 2000 Hz apart; up to 20 kHz that is 30 or 10 notches and 30 or 10 peaks.
    expect(notches).toMatchObject({ fewest: 10, most: 30 })
    expect(peaks).toMatchObject({ fewest: 10, most: 30 })
    expect(notches.furthestDb).toBeCloseTo(20 * Math.log10(0.5), 6)
    expect(peaks.furthestDb).toBeCloseTo(20 * Math.log10(1.5), 6)
    expect(firstNotchHz[0]).toBeCloseTo(1000 / 3, 3)
    expect(firstNotchHz[1]).toBeCloseTo(1000, 3)
    expect(firstPeakHz[0]).toBeCloseTo(2000 / 3, 3)
    expect(firstPeakHz[1]).toBeCloseTo(2000, 3)
  })

  it('names the figures in a sentence', () => {
    const { text } = run(combSet({ samples: 48, dry: 1, wet: 1 }))
    expect(text).toBe('First notch at 500 Hz, first peak at 1\u2009000 Hz, deepest notch a full null, highest peak 6.02 dB.')
  })

  it('where one end has none it says so', () => {
    const set = changedSet((s) => {
      s.layout = 'mono'
      s.voices.count = 1
      s.line.baseMs = 1
      s.line.interpolation = 'linear'
      s.sweep.depthMs = 1
    })
    expect(run(set).text).toMatch(/^First notch at 250 Hz at the largest delay and none at the other end/)
  })

  it('nothing to comb is no matter for a vibrato and unusual for a flanger', () => {
    const wet = combSet({ samples: 48, dry: 0 })
    expect(run({ ...wet, intent: 'vibrato' })).toMatchObject({ status: 'holds', text: 'There are no notches and no peaks.' })
    expect(run({ ...wet, intent: 'flanger' }).status).toBe('note')
    expect(run({ ...wet, intent: 'comb' }).status).toBe('note')
  })

  it('looks no further than half the rate', () => {
    const { working, value } = run(combSet({ samples: 48 }), 8000)
    expect((value as unknown as Value).notches.most).toBe(4)
    expect(working[0]?.result).toMatch(/up to 4\u2009000 Hz/)
  })

  it('complete working, JSON without loss', () => {
    const found = run(changedSet(() => {}))
    expect(found.working.length).toBe(3)
    for (const step of found.working) for (const part of Object.values(step)) expect(part.length).toBeGreaterThan(0)
    expect(JSON.parse(JSON.stringify(found))).toEqual(found)
  })
})
