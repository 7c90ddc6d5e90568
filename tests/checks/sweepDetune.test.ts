// sweep.detune. Oracle: FACTS 4 (computed there) and the table of DESIGN 5.
import { describe, expect, it } from 'vitest'
import { sweepDetune } from '../../src/checks/sweepDetune.ts'
import { withAt } from '../../src/set/path.ts'
import { expectMendsWork, expectWhole, run, swept } from './sweepSets.ts'

describe('sweep.detune', () => {
  // FACTS 4: 5 ms at 1 Hz bends +53.6 and −55.3 cents, 3 ms at 5 Hz +155.9 and −171.4.
  it('the figure is the larger side, past 50 cents near, a vibrato past 150', () => {
    const set = swept(10, 5, 1)
    const check = run(sweepDetune, set)
    expect(check.value).toBeCloseTo(55.3, 1)
    expect([check.status, check.limit, check.unit]).toEqual(['near', 50, 'cents'])
    expect(check.text).toBe('The sweep bends pitch by 53.6 cents up and 55.3 cents down.')
    expect(run(sweepDetune, { ...set, intent: 'vibrato' }).status).toBe('holds')
    expect(run(sweepDetune, { ...swept(10, 3, 5), intent: 'vibrato' }).status).toBe('near')
  })

  it('a set’s own limit counts', () => {
    const set = { ...swept(10, 5, 1), limits: { 'sweep.detune': 60 } }
    const check = run(sweepDetune, set)
    expect([check.status, check.limit]).toEqual(['holds', 60])
    expect(check.working.at(-1)?.source).toBe('the set’s own limit')
  })

  it('slope 1 stalls, above it runs backwards: both fail, whatever the limit', () => {
    const triangle = (depthMs: number) =>
      swept(20, depthMs, 20, (s) => {
        s.sweep.shape = 'triangle'
      })
    expect(run(sweepDetune, triangle(12.5))).toMatchObject({ status: 'fails', value: 'stalls' })
    expect(run(sweepDetune, { ...triangle(13), limits: { 'sweep.detune': 1e6 } })).toMatchObject({ status: 'fails', value: 'reversed' })
  })

  it('held between updates the read hops instead: near, and the working says how far', () => {
    const set = swept(20, 13, 20, (s) => {
      s.sweep.shape = 'triangle'
      s.sweep.updateEvery = 32
      s.sweep.between = 'hold'
    })
    const check = run(sweepDetune, set)
    expect(check).toMatchObject({ status: 'near', value: 'reversed' })
    // 4 · 13 ms · 20 Hz = 1.04 samples a sample, 32 samples an update.
    expect(check.working.map((step) => step.result)).toContain('33.28 samples a hop')
    // An update every sample holds nothing.
    expect(run(sweepDetune, withAt(set, 'sweep.updateEvery', 1)).status).toBe('fails')
  })

  it('every change it offers brings it inside', () => {
    expectMendsWork(sweepDetune, swept(10, 5, 1))
    expectMendsWork(sweepDetune, swept(20, 13, 30))
    for (const shape of ['square', 'rampDown'] as const) {
      const jumps = swept(10, 2, 0.5, (s) => {
        s.sweep.shape = shape
        s.sweep.edgeMs = 0
      })
      expect(run(sweepDetune, jumps).status).toBe('fails')
      expect(run(sweepDetune, jumps).mend?.map((m) => m.path)).toContain('sweep.edgeMs')
      expectMendsWork(sweepDetune, jumps)
    }
  })

  it('a sweep that stands bends nothing, drift says it is a bound', () => {
    expect(run(sweepDetune, swept(10, 5, 0))).toMatchObject({ status: 'holds', value: 0 })
    const drift = swept(10, 2, 3, (s) => {
      s.sweep.shape = 'drift'
    })
    expect(run(sweepDetune, drift).text).toMatch(/by at most/)
  })

  it('label of the table, a sentence, complete working, JSON without loss', () => {
    expectWhole(sweepDetune)
  })
})
