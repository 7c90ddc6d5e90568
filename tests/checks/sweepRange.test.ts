// sweep.range. Oracle: smallest delays of DESIGN 3.
import { describe, expect, it } from 'vitest'
import { sweepRange } from '../../src/checks/sweepRange.ts'
import { changedSet } from '../dsp/sets.ts'
import { expectMendsWork, expectWhole, run, swept } from './sweepSets.ts'

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

  it('label of the table, a sentence, complete working, JSON without loss', () => {
    expectWhole(sweepRange)
  })
})
