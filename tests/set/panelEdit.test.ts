import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { defaultSet, defaultShaper } from '../../src/set/defaults.ts'
import { knobDisagreements, knobForField, moveValue } from '../../src/set/panel.ts'
import {
  addKnob,
  addMove,
  changeKnob,
  changeMove,
  MAX_KNOBS,
  MAX_MOVES,
  moveForField,
  moveOf,
  removeKnob,
  removeMove,
  shiftKnob,
  standing,
  taperChange,
  withoutAbsent,
} from '../../src/set/panelEdit.ts'
import { isMovable } from '../../src/set/panelProblems.ts'
import { PARAMETERS } from '../../src/set/parameters.ts'
import { getAt, withAt } from '../../src/set/path.ts'
import type { Knob, ParameterSet } from '../../src/set/types.ts'
import { setProblems } from '../../src/set/validity.ts'

const knobOf = (set: ParameterSet, path: string): Knob => {
  const knob = knobForField(set, path)
  if (!knob) throw new Error(`no knob for ${path}`)
  return knob
}
const on = (...paths: string[]) => paths.reduce((set, path) => addKnob(set, knobOf(set, path)), defaultSet())
const names = (set: ParameterSet) => set.panel.map(({ knob }) => knob)

describe('knobs', () => {
  it('are put last, and a name already there gets a number', () => {
    const set = on('sweep.rateHz', 'mix.wet', 'mix.dry')
    expect(names(set)).toEqual(['Rate', 'Wet', 'Dry'])
    expect(names(addKnob(set, { ...knobOf(set, 'mix.dryDelayMs'), knob: 'Rate' }))).toEqual(['Rate', 'Wet', 'Dry', 'Rate 2'])
  })

  it('a long name is cut to make room for its number', () => {
    const long = { ...knobOf(defaultSet(), 'mix.wet'), knob: 'x'.repeat(40) }
    const set = addKnob(addKnob(defaultSet(), long), long)
    expect(names(set)[1]).toBe(`${'x'.repeat(38)} 2`)
  })

  it('are taken out and put elsewhere in the row', () => {
    const set = on('sweep.rateHz', 'mix.wet', 'mix.dry')
    expect(names(removeKnob(set, 1))).toEqual(['Rate', 'Dry'])
    expect(names(shiftKnob(set, 0, 2))).toEqual(['Wet', 'Dry', 'Rate'])
    expect(names(shiftKnob(set, 2, 0))).toEqual(['Dry', 'Rate', 'Wet'])
    expect(names(set)).toEqual(['Rate', 'Wet', 'Dry'])
  })

  it('there are no more than the file takes, and none where none is', () => {
    const full = { ...defaultSet(), panel: Array.from({ length: MAX_KNOBS }, () => knobOf(defaultSet(), 'mix.wet')) }
    expect(() => addKnob(full, knobOf(full, 'mix.wet'))).toThrow(RangeError)
    for (const act of [
      () => removeKnob(defaultSet(), 0),
      () => shiftKnob(on('mix.wet'), 0, 1),
      () => changeKnob(defaultSet(), 0, { steps: 2 }),
      () => standing(defaultSet(), 0),
    ])
      expect(act).toThrow(RangeError)
  })

  it('a change of name, steps or smoothing leaves the sound alone', () => {
    const set = on('mix.wet')
    const changed = changeKnob(set, 0, { knob: 'Blend', steps: 11, smoothMs: 200 })
    expect(changed.panel[0]).toMatchObject({ knob: 'Blend', steps: 11, smoothMs: 200, position: set.panel[0]?.position })
    expect(changed.mix).toBe(set.mix)
    // Oracle: 11 steps are tenths.
    expect(standing({ ...changed, panel: [{ ...(changed.panel[0] as Knob), position: 0.63 }] }, 0)).toBe(0.6)
  })
})

describe('moves', () => {
  const rows = PARAMETERS.filter((p) => isMovable(p) && p.path !== 'loop.shaper.curve')
  const whole = ['input.shaper', 'loop.shaper', 'mix.shaper'].reduce((set, owner) => withAt(set, owner, defaultShaper('tanh')), {
    ...defaultSet(),
    loop: { ...defaultSet().loop, dampingHz: 3000, lowCutHz: 40 },
    mix: { ...defaultSet().mix, wetLowCutHz: 90, wetHighCutHz: 9000 },
  } as ParameterSet)

  it('are found by their parameter', () => {
    expect(moveOf(on('sweep.rateHz', 'mix.wet'), 'mix.wet')).toMatchObject({ index: 1, at: 0, knob: { knob: 'Wet' } })
    expect(moveOf(defaultSet(), 'mix.wet')).toBeNull()
  })

  it('of any field, put on a knob that stands anywhere, give there the value that the field has', () => {
    fc.assert(
      fc.property(fc.constantFrom(...rows), fc.double({ min: 0, max: 1, noNaN: true }), (row, position) => {
        const move = moveForField(whole, row.path, position)
        if (!move) throw new Error('no move')
        const set = { ...whole, panel: [{ knob: 'K', position, steps: 0, smoothMs: 0, moves: [move] }] }
        expect(setProblems(set)).toEqual([])
        const stored = getAt(whole, row.path)
        const given = moveValue(move, position)
        if (typeof stored === 'number') expect(Math.abs((given as number) - stored)).toBeLessThanOrEqual(1e-9 * (1 + Math.abs(stored)))
        else expect(given).toBe(stored)
      }),
      { numRuns: 600 },
    )
  })

  it('of what is off, absent or fixed when the unit is built are none', () => {
    for (const path of ['loop.dampingHz', 'loop.shaper.drive', 'sampleRate', 'target.part'])
      expect(moveForField(defaultSet(), path, 0.5)).toBeNull()
  })

  it('are added up to what a knob can move; the last one taken off takes its knob along', () => {
    const set = on('mix.wet')
    const both = addMove(set, 0, moveForField(set, 'mix.dry', set.panel[0]?.position as number) as Knob['moves'][number])
    expect(both.panel[0]?.moves.map(({ parameter }) => parameter)).toEqual(['mix.wet', 'mix.dry'])
    expect(knobDisagreements(both)).toEqual([])
    expect(removeMove(both, 0, 0).panel[0]?.moves.map(({ parameter }) => parameter)).toEqual(['mix.dry'])
    expect(removeMove(set, 0, 0).panel).toEqual([])
    const [move] = both.panel[0]?.moves ?? []
    const full = changeKnob(both, 0, { moves: Array.from({ length: MAX_MOVES }, () => move as Knob['moves'][number]) })
    expect(() => addMove(full, 0, move as Knob['moves'][number])).toThrow(RangeError)
  })

  it('changed on a knob of their own turn it to where it gives the value there is', () => {
    const changed = changeMove(on('mix.wet'), 0, 0, { min: 0, max: 2 })
    // Oracle: 0.7071 of 0 to 2 is 0.35355 of the turn.
    expect(changed.panel[0]?.position).toBeCloseTo(0.35355, 12)
    expect(changed.mix.wet).toBe(0.7071)
  })

  it('that end before the value there is take it to the end', () => {
    const changed = changeMove(on('mix.wet'), 0, 0, { min: 0, max: 0.5 })
    expect([changed.panel[0]?.position, changed.mix.wet]).toEqual([1, 0.5])
    const reversed = changeMove(on('mix.wet'), 0, 0, { min: 0.5, max: 0 })
    expect([reversed.panel[0]?.position, reversed.mix.wet]).toEqual([0, 0.5])
  })

  it('changed to what cannot stand are left to be refused', () => {
    const changed = changeMove(on('sweep.rateHz'), 0, 0, { min: 0, taper: 'log' })
    expect(changed.panel[0]?.position).toBe(on('sweep.rateHz').panel[0]?.position)
    expect(setProblems(changed).map(({ path }) => path)).toEqual(['panel[0].moves[0].taper'])
  })

  it('changed on a knob with others leave it standing and take the value it gives', () => {
    const set = { ...on('mix.wet'), mix: { ...defaultSet().mix, wet: 0.5 } }
    const panel = [
      {
        knob: 'K',
        position: 0.5,
        steps: 0,
        smoothMs: 0,
        moves: [moveForField(set, 'mix.wet', 0.5), moveForField(set, 'mix.dry', 0.5)] as Knob['moves'],
      },
    ]
    const changed = changeMove({ ...set, panel }, 0, 0, { min: 0, max: 3 })
    expect([changed.panel[0]?.position, changed.mix.wet, changed.mix.dry]).toEqual([0.5, 1.5, 0.7071])
  })

  it('of a shaper that went go with it, and a knob that moved nothing else', () => {
    const shaped = withAt(defaultSet(), 'loop.shaper', defaultShaper('tanh'))
    const set = ['loop.shaper.drive', 'mix.wet'].reduce((to, path) => addKnob(to, knobOf(to, path)), shaped)
    const both = addMove(set, 1, moveForField(set, 'loop.shaper.ceiling', 0.5) as Knob['moves'][number])
    expect(withoutAbsent(both)).toBe(both)
    const rid = withoutAbsent(withAt(both, 'loop.shaper', null))
    expect(rid.panel.map(({ moves }) => moves.map(({ parameter }) => parameter))).toEqual([['mix.wet']])
    expect(setProblems(rid)).toEqual([])
  })

  it('drawn from a log taper start on its curve: the middle of 1 to 100 is 10, 9 of 99 parts', () => {
    const log = { parameter: 'sweep.rateHz', min: 1, max: 100, taper: 'log', points: [] } as const
    const { taper, points } = taperChange(log, 'drawn')
    expect(taper).toBe('drawn')
    expect(points.find(([x]) => x === 0.5)?.[1]).toBeCloseTo(9 / 99, 4)
    expect([points[0], points.at(-1)]).toEqual([
      [0, 0],
      [1, 1],
    ])
    expect(taperChange({ ...log, points }, 'linear')).toEqual({ taper: 'linear', points })
  })
})
