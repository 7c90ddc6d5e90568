// sweep.range, sweep.detune and sweep.fusion. Oracles: the table of DESIGN 5, FACTS 3 and 4, smallest delays of DESIGN 3.
import { describe, expect, it } from 'vitest'
import { limitOf } from '../../src/checks/limits.ts'
import { sweepDetune } from '../../src/checks/sweepDetune.ts'
import { sweepFusion } from '../../src/checks/sweepFusion.ts'
import { sweepRange } from '../../src/checks/sweepRange.ts'
import type { Check, CheckFunction } from '../../src/checks/types.ts'
import { withAt } from '../../src/set/path.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { changedSet } from '../dsp/sets.ts'

const run = (check: CheckFunction, set: ParameterSet, sampleRate = set.sampleRate): Check => check({ set, sampleRate })

/** One voice of base ± depth ms, moving at rate Hz. */
const swept = (baseMs: number, depthMs: number, rateHz: number, change: Parameters<typeof changedSet>[0] = () => {}) =>
  changedSet((s) => {
    s.voices.count = 1
    s.line.baseMs = baseMs
    s.sweep.depthMs = depthMs
    s.sweep.rateHz = rateHz
    s.sweep.updateEvery = 1
    change(s)
  })

/** Applying any of the offered changes must bring the check to where it is no longer judged. */
function expectMendsWork(check: CheckFunction, set: ParameterSet, wanted: readonly string[] = ['holds']): void {
  const { mend } = run(check, set)
  expect(mend?.length).toBeGreaterThan(0)
  for (const { path, value } of mend ?? []) expect(wanted, `${path} ${value}`).toContain(run(check, withAt(set, path, value)).status)
}

describe('sweep.range', () => {
  // One sample is 1/48 ms. Smallest delays: linear 0, Lagrange 1, all-pass ½ outside the loop, one more inside.
  it.each([
    ['linear', 2.5, 'near', 0],
    ['linear', 2.53, 'holds', 1.44],
    ['lagrange3', 2.53, 'near', 0.44],
    ['lagrange3', 2.55, 'holds', 1.4],
    ['lagrange3', 2.51, 'fails', -0.52],
    ['allpass1', 2.51, 'near', -0.02],
    ['allpass1', 2.512, 'near', 0.076],
  ] as const)('%s read at base %f ms, depth 2.5 ms: %s', (interpolation, baseMs, status, room) => {
    const check = run(
      sweepRange,
      swept(baseMs, 2.5, 1, (s) => {
        s.line.interpolation = interpolation
      }),
    )
    expect((check.value as { roomSamples: number }).roomSamples).toBeCloseTo(room, 6)
    expect(check.status).toBe(room < 0 ? 'fails' : status)
  })

  it('the loop needs a sample more, but only where it is heard', () => {
    const loop = (feedback: number) =>
      swept(2.53, 2.5, 1, (s) => {
        s.line.interpolation = 'linear'
        s.loop.feedback = feedback
      })
    expect(run(sweepRange, loop(0)).status).toBe('holds')
    const check = run(sweepRange, loop(0.5))
    expect(check.status).toBe('near')
    expect(check.text).toMatch(/the loop’s linear read has 0\.44 samples of room/)
    expect(check.limit).toBeCloseTo(1 / 48, 12)
  })

  it('values in ms, delays of voices and loop together', () => {
    const { value, unit } = run(
      sweepRange,
      changedSet(() => {}),
    )
    expect(value).toEqual({ smallestMs: 7.5, largestMs: 16.5, roomSamples: 359 })
    expect(unit).toBe('ms')
  })

  it('a longer line than any may be fails', () => {
    const long = swept(500, 1, 1, (s) => {
      s.sweep.law = 'ratio'
      s.sweep.depthOctaves = 4
    })
    expect(run(sweepRange, long).status).toBe('fails')
  })

  it('the base it offers is enough', () => {
    for (const law of ['time', 'ratio'] as const) {
      const close = swept(0.5, 0.5, 1, (s) => {
        s.sweep.law = law
        s.sweep.depthOctaves = 4.5
      })
      expect(run(sweepRange, close).status).not.toBe('holds')
      expectMendsWork(sweepRange, close)
    }
  })

  it('judged at the rate asked for', () => {
    const set = swept(2.53, 2.5, 1)
    expect(run(sweepRange, set).status).toBe('near')
    expect(run(sweepRange, set, 192000).status).toBe('holds')
  })
})

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
})

describe('sweep.fusion', () => {
  it('the longest delay of any voice; past 50 ms a note, never worse', () => {
    expect(
      run(
        sweepFusion,
        changedSet(() => {}),
      ),
    ).toMatchObject({ status: 'holds', value: 16.5, limit: 50, unit: 'ms' })
    const late = run(sweepFusion, swept(300, 1, 1))
    expect(late).toMatchObject({ status: 'note', value: 301 })
    expect(late.text).toMatch(/sound of its own/)
    expect(run(sweepFusion, swept(49, 1, 1)).status).toBe('holds')
  })

  it('a set’s own limit counts', () => {
    const set = { ...swept(30, 1, 1), limits: { 'sweep.fusion': 20 } }
    expect(run(sweepFusion, set)).toMatchObject({ status: 'note', limit: 20 })
  })
})

describe('every one of them', () => {
  it.each([sweepRange, sweepDetune, sweepFusion])('%o: label of the table, a sentence, complete working, JSON without loss', (check) => {
    for (const set of [changedSet(() => {}), swept(0.1, 0.1, 30), swept(400, 90, 0)]) {
      const found = run(check, set)
      expect(found.label).toBe(limitOf(set, found.id).row.label)
      expect(found.text).toMatch(/^[A-Z].*\.$/)
      expect(found.working.length).toBeGreaterThan(0)
      for (const step of found.working) for (const part of Object.values(step)) expect(part.length).toBeGreaterThan(0)
      expect(JSON.parse(JSON.stringify(found))).toEqual(found)
    }
  })
})
