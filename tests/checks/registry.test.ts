import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { stability } from '../../src/analysis/stability.ts'
import { judge, LIMITS, labelOf, limitOf } from '../../src/checks/limits.ts'
import { loopMargin } from '../../src/checks/loopMargin.ts'
import { loopPoles } from '../../src/checks/loopPoles.ts'
import { loopRing } from '../../src/checks/loopRing.ts'
import { loopStability } from '../../src/checks/loopStability.ts'
import { runChecks, verdictOf } from '../../src/checks/registry.ts'
import type { Check } from '../../src/checks/types.ts'
import { CHECK_IDS } from '../../src/set/checkIds.ts'
import { defaultSet } from '../../src/set/defaults.ts'
import { loopSet } from '../analysis/loopSets.ts'
import { anySet } from '../set/anySet.ts'

describe('the table of limits', () => {
  it('has one row a check, in their order, each with a label and a source', () => {
    expect(LIMITS.map(({ id }) => id)).toEqual(CHECK_IDS)
    for (const { id, source } of LIMITS) {
      expect(labelOf(id)).toMatch(/^[A-Z]/)
      expect(source).not.toBe('')
    }
  })

  // DESIGN 5: ring > 3 s near; margin < 0.5 near, ≤ 0 fails; mono > 6 near, > 20 fails; fusion past 50 a note.
  it.each([
    ['loop.ring', 3, 'holds'],
    ['loop.ring', 3.01, 'near'],
    ['loop.margin', 0.5, 'holds'],
    ['loop.margin', 0.49, 'near'],
    ['loop.margin', 0, 'fails'],
    ['level.mono', 6.1, 'near'],
    ['level.mono', 20.1, 'fails'],
    ['sweep.fusion', 51, 'note'],
    ['sweep.detune', 50.1, 'near'],
    ['sweep.steps', -59, 'near'],
    ['sweep.steps', -39, 'fails'],
    ['target.load', 69, 'holds'],
    ['target.load', 71, 'near'],
    ['loop.ring', null, 'holds'],
  ] as const)('%s of %s %s', (id, value, status) => {
    expect(judge(limitOf(defaultSet(), id), value)).toBe(status)
  })

  it('a limit may depend on intent, format and headroom, and the set’s own replaces it', () => {
    const set = defaultSet()
    expect(limitOf({ ...set, intent: 'vibrato' }, 'sweep.detune').limit).toBe(150)
    expect(limitOf(set, 'number.noise').limit).toBe(-80)
    expect(limitOf({ ...set, target: { ...set.target, numberFormat: 'q31' } }, 'number.noise')).toMatchObject({ limit: -100, margin: 15 })
    expect(limitOf(set, 'level.peak').limit).toBe(set.target.headroomDb)
    expect(limitOf({ ...set, limits: { 'loop.ring': 1 } }, 'loop.ring')).toMatchObject({ limit: 1, own: true })
  })
})

describe('running the checks', () => {
  it('gives the checks of the sweep, the response and the loop, in the table’s order', () => {
    const ids = runChecks(defaultSet(), { kinds: ['closed'] }).map(({ id }) => id)
    const first = CHECK_IDS.slice(0, 8)
    expect(ids.slice(0, 8)).toEqual(first)
    expect(ids).toEqual(CHECK_IDS.filter((id) => ids.includes(id)))
  })

  it('judges at another rate when asked, and refuses one out of range', () => {
    const set = loopSet({ 'loop.feedback': 0.9 })
    const poles = (sampleRate?: number) => runChecks(set, { sampleRate, kinds: ['closed'] }).find(({ id }) => id === 'loop.poles')?.value
    expect(poles(96000)).toBeCloseTo(0.9 ** (1 / 1392), 14)
    expect(poles()).toBeCloseTo(0.9 ** (1 / 696), 14)
    expect(() => runChecks(set, { sampleRate: 400000 })).toThrow(RangeError)
  })

  it('the verdict is the worst status, a note weighs nothing', () => {
    const of = (...statuses: ('holds' | 'near' | 'fails' | 'note')[]) => verdictOf(statuses.map((status) => ({ status })))
    expect([of(), of('holds', 'note'), of('near', 'note', 'holds'), of('near', 'fails')]).toEqual(['holds', 'holds', 'near', 'fails'])
  })

  const finite = (value: unknown): boolean =>
    typeof value === 'number' ? Number.isFinite(value) : value === null || typeof value !== 'object' || Object.values(value).every(finite)
  const expectWhole = (check: Check) => {
    if (!finite(check)) throw new Error(`${check.id} has a figure that is not finite`)
    if (!check.text.endsWith('.')) throw new Error(`${check.id}: "${check.text}" is no sentence`)
  }

  it('any valid set is judged: finite figures, a sentence', () => {
    fc.assert(
      fc.property(anySet, (set) => runChecks(set).forEach(expectWhole)),
      { numRuns: 2, seed: 6 },
    )
  })

  it('any valid loop is judged: finite figures, a sentence, and the same word from both ends of a run', () => {
    fc.assert(
      fc.property(anySet, (set) => {
        const input = { set, sampleRate: set.sampleRate }
        for (const check of [loopRing, loopPoles, loopMargin, loopStability]) expectWhole(check(input))
        return loopStability(input).value === stability(set).word
      }),
      { numRuns: 150, seed: 6 },
    )
  })
})
