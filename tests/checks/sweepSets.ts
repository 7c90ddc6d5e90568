// What the tests of sweep.range, sweep.detune and sweep.fusion share.
import { expect } from 'vitest'
import { limitOf } from '../../src/checks/limits.ts'
import type { Check, CheckFunction } from '../../src/checks/types.ts'
import { withAt } from '../../src/set/path.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { changedSet } from '../dsp/sets.ts'

export const run = (check: CheckFunction, set: ParameterSet, sampleRate = set.sampleRate): Check => check({ set, sampleRate })

/** One voice of base ± depth ms, moving at rate Hz. */
export const swept = (baseMs: number, depthMs: number, rateHz: number, change: Parameters<typeof changedSet>[0] = () => {}) =>
  changedSet((s) => {
    s.voices.count = 1
    s.line.baseMs = baseMs
    s.sweep.depthMs = depthMs
    s.sweep.rateHz = rateHz
    s.sweep.updateEvery = 1
    change(s)
  })

/** Applying any of the offered changes must bring the check to where it is no longer judged. */
export function expectMendsWork(check: CheckFunction, set: ParameterSet, wanted: readonly string[] = ['holds']): void {
  const { mend } = run(check, set)
  expect(mend?.length).toBeGreaterThan(0)
  for (const { path, value } of mend ?? []) expect(wanted, `${path} ${value}`).toContain(run(check, withAt(set, path, value)).status)
}

/** The label of the table, a sentence, complete working, JSON without loss. */
export function expectWhole(check: CheckFunction): void {
  for (const set of [changedSet(() => {}), swept(0.1, 0.1, 30), swept(400, 90, 0)]) {
    const found = run(check, set)
    expect(found.label).toBe(limitOf(set, found.id).row.label)
    expect(found.text).toMatch(/^[A-Z].*\.$/)
    expect(found.working.length).toBeGreaterThan(0)
    for (const step of found.working) for (const part of Object.values(step)) expect(part.length).toBeGreaterThan(0)
    expect(JSON.parse(JSON.stringify(found))).toEqual(found)
  }
}
