// What the tests of panel.box share: panels with planted corners, random ones, and the check drained.
import fc from 'fast-check'
import { panelBoxSteps } from '../../src/checks/panelBox.ts'
import type { CheckOptions } from '../../src/checks/registry.ts'
import type { Check, PanelWorst } from '../../src/checks/types.ts'
import { turnKnob } from '../../src/set/panel.ts'
import type { Knob, Move, ParameterSet } from '../../src/set/types.ts'
import { anySet } from '../set/anySet.ts'

export const move = (parameter: string, min: Move['min'], max: Move['max'], more: Partial<Move> = {}): Move => ({
  parameter,
  min,
  max,
  taper: 'linear',
  points: [],
  ...more,
})

export const knob = (name: string, moves: readonly Move[], position = 0.5, more: Partial<Knob> = {}): Knob => ({
  knob: name,
  position,
  steps: 0,
  smoothMs: 30,
  moves,
  ...more,
})

/** The set with a panel, every parameter where its knob says. */
export function withPanel(set: ParameterSet, panel: readonly Knob[]): ParameterSet {
  return panel.reduce((turned, { position }, k) => turnKnob(turned, k, position), { ...set, panel })
}

export function panelBox(set: ParameterSet, options: CheckOptions = { kinds: ['closed'] }): Check {
  const steps = panelBoxSteps(set, options)
  let step = steps.next()
  while (!step.done) step = steps.next()
  return step.value
}

export function drain<T>(steps: Generator<unknown, T>): T {
  let step = steps.next()
  while (!step.done) step = steps.next()
  return step.value
}

export function worstOf(check: Check, id: string): PanelWorst {
  const found = check.worst?.find((worst) => worst.id === id)
  if (!found) throw new Error(`panel.box has no entry for ${id}`)
  return found
}

export const turned = (set: ParameterSet, positions: readonly number[]): ParameterSet =>
  positions.reduce((moved, position, k) => turnKnob(moved, k, position), set)

/** Any valid set whose panel moves at least two parameters, some of them two on one knob. */
export const anyPanelSet: fc.Arbitrary<ParameterSet> = fc
  .tuple(anySet, fc.boolean())
  .filter(([{ panel }]) => panel.length >= 2)
  .map(([set, joined]) => {
    const [first, second, ...rest] = set.panel as [Knob, Knob, ...Knob[]]
    const panel = joined ? [{ ...first, moves: [...first.moves, ...second.moves] }, ...rest] : set.panel
    return { ...set, panel }
  })
