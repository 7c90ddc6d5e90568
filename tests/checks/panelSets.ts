// What the tests of panel.box share: panels with planted corners, random ones, and the check drained.
import fc from 'fast-check'
import { panelBoxSteps } from '../../src/checks/panelBox.ts'
import type { CheckOptions } from '../../src/checks/registry.ts'
import type { Check, PanelWorst } from '../../src/checks/types.ts'
import { turnKnob } from '../../src/set/panel.ts'
import { isMovable } from '../../src/set/panelProblems.ts'
import type { NumberParameter } from '../../src/set/parameters/kinds.ts'
import { PARAMETERS, parameter } from '../../src/set/parameters.ts'
import { getAt } from '../../src/set/path.ts'
import type { Knob, Move, ParameterSet } from '../../src/set/types.ts'
import { type Random, random, randomSet } from '../dsp/sets.ts'

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

/** Parameters that concern more than levels come up more often. */
const OFTEN = ['line.baseMs', 'sweep.depthMs', 'sweep.depthOctaves', 'sweep.rateHz', 'voices.spreadMs', 'loop.feedback', 'sweep.edgeMs']
const MOVABLE = PARAMETERS.filter((row) => isMovable(row) && !row.path.includes('.shaper.')).map(({ path }) => path)

/** A random set with a panel of 2 to 6 moves, some of them two on one knob, of every taper, around the values that it has. */
export function randomPanelSet(seed: number): ParameterSet {
  const set = randomSet(seed)
  const r = random(seed ^ 0x5eed)
  const paths = new Set(Array.from({ length: r.integer(2, 6) }, () => (r.chance(0.6) ? r.of(OFTEN) : r.of(MOVABLE))))
  const moves = [...paths].map((path) => randomMove(set, path, r))
  const knobs: Knob[] = []
  for (let m = 0; m < moves.length; ) {
    const count = r.chance(0.3) ? 2 : 1
    knobs.push(knob(`K${knobs.length}`, moves.slice(m, m + count), r.next(), { steps: r.chance(0.5) ? 0 : 11 }))
    m += count
  }
  return { ...set, panel: knobs }
}

function randomMove(set: ParameterSet, path: string, r: Random): Move {
  const row = parameter(path)
  const points = [0, 0.2, 0.55, 1].map((x) => [x, r.next()] as const)
  const taper = r.chance(0.25) ? 'drawn' : 'linear'
  if (row.kind === 'choice') return move(path, r.of(row.options).value, r.of(row.options).value, { taper, points })
  if (row.kind === 'boolean') return move(path, r.chance(0.5), r.chance(0.5))
  const { min, max, values } = row as NumberParameter
  if (values) return move(path, r.of(values), r.of(values), { taper, points })
  const now = getAt(set, path)
  const around = typeof now === 'number' && now !== 0 ? now : min + (max - min) / 100
  const end = () => {
    const value = Math.min(max, Math.max(min, around * r.between(path === 'loop.feedback' ? -1.2 : 0.2, 1.3)))
    return row.kind === 'integer' ? Math.round(value) : value
  }
  const [from, to] = [end(), end()]
  return move(path, from, to, taper === 'linear' && from * to > 0 && r.chance(0.4) ? { taper: 'log' } : { taper, points })
}

export const anyPanelSet: fc.Arbitrary<ParameterSet> = fc.nat().map(randomPanelSet)
