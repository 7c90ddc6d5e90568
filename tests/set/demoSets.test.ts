import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { runChecks, verdictOf } from '../../src/checks/registry.ts'
import { DEMO_SETS } from '../../src/set/demoSets.ts'
import { startingSet } from '../../src/set/intents.ts'
import { knobDisagreements, steppedPosition, turnKnob } from '../../src/set/panel.ts'
import { parseSet } from '../../src/set/parse.ts'
import { readSet } from '../../src/set/read.ts'
import type { Intent, ParameterSet } from '../../src/set/types.ts'
import { setProblems } from '../../src/set/validity.ts'
import { writeSet } from '../../src/set/write.ts'

const PUBLIC = new URL('../../public/', import.meta.url)
const text = (file: string) => readFileSync(new URL(file, PUBLIC), 'utf8')
const demo = (file: string): ParameterSet => {
  const result = readSet(text(file))
  if (!result.ok) throw new Error(result.problems[0]?.message)
  return result.value
}

/** Every corner of the knob box. */
function corners(set: ParameterSet): ParameterSet[] {
  return set.panel.reduce<ParameterSet[]>((sets, _, i) => sets.flatMap((one) => [turnKnob(one, i, 0), turnKnob(one, i, 1)]), [set])
}

describe('demo sets', () => {
  it('stand in public/sets, all of them and nothing else', () => {
    expect(
      readdirSync(new URL('sets', PUBLIC))
        .map((file) => `sets/${file}`)
        .sort(),
    ).toEqual(DEMO_SETS.map((one) => one.file).sort())
  })

  it.each(DEMO_SETS)('$name: valid, canonical, named as listed, says what it is for', ({ file, name }) => {
    const set = demo(file)
    expect(writeSet(set)).toBe(text(file))
    expect(set.name).toBe(name)
    expect(set.notes).toMatch(/^Ostler (two|four|six)-knob unit/)
  })

  it.each(DEMO_SETS)('$name: its knobs agree with its values and stand on their steps', ({ file }) => {
    const set = demo(file)
    expect(knobDisagreements(set)).toEqual([])
    for (const knob of set.panel) expect(steppedPosition(knob, knob.position)).toBeCloseTo(knob.position, 12)
  })

  it.each(DEMO_SETS)('$name: has as many knobs as the unit it is for', ({ file }) => {
    const { notes, panel } = demo(file)
    expect(['two', 'four', 'six'][panel.length / 2 - 1]).toBe(/Ostler (\w+)-knob/.exec(notes)?.[1])
  })

  it.each(DEMO_SETS)('$name: reads clear of the write point at every corner of its panel', ({ file }) => {
    const all = corners(demo(file))
    expect(all.length).toBeGreaterThanOrEqual(4)
    for (const set of all) expect(setProblems(set)).toEqual([])
  })

  it.each(DEMO_SETS)('$name: every check holds where the knobs stand, and none fails at any corner of the panel', ({ file }) => {
    expect(verdictOf(runChecks(demo(file)))).toBe('holds')
    for (const set of corners(demo(file))) {
      const failing = runChecks(set).filter((check) => check.status === 'fails')
      expect(failing.map((check) => `${check.id} at ${set.panel.map((knob) => knob.position).join(' ')}`)).toEqual([])
    }
  })

  it('cover the two-, four- and six-knob units and every intent they show', () => {
    const sets = DEMO_SETS.map(({ file }) => demo(file))
    expect(new Set(sets.map((set) => set.panel.length))).toEqual(new Set([2, 4, 6]))
    expect(sets.map((set) => set.intent)).toEqual(['chorus', 'flanger', 'comb', 'doubler', 'vibrato', 'flanger'])
  })

  it('"Three slow voices" is the printed set with a panel', () => {
    const result = parseSet({ format: 'combwright-set', version: 1 })
    if (!result.ok) throw new Error('defaults')
    const { panel: _, notes: __, ...printed } = result.value
    expect(demo('sets/three-slow-voices.set.json')).toMatchObject(printed)
  })
})

describe('starting sets', () => {
  it.each<Intent>(['chorus', 'flanger', 'vibrato', 'doubler', 'comb', 'other'])(
    '%s: valid, with a panel that agrees, fresh every time',
    (intent) => {
      const set = startingSet(intent)
      const result = readSet(writeSet(set))
      if (!result.ok) throw new Error(result.problems[0]?.message)
      expect(result.value).toEqual(set)
      expect(set.intent).toBe(intent)
      expect(set.panel.length).toBeGreaterThanOrEqual(2)
      expect(knobDisagreements(set)).toEqual([])
      for (const corner of corners(set)) expect(setProblems(corner)).toEqual([])
      expect(startingSet(intent).sweep).not.toBe(set.sweep)
    },
  )

  it('differ from each other', () => {
    const intents: readonly Intent[] = ['chorus', 'flanger', 'vibrato', 'doubler', 'comb', 'other']
    expect(new Set(intents.map((intent) => JSON.stringify({ ...startingSet(intent), intent, name: '', notes: '' }))).size).toBe(6)
  })
})
