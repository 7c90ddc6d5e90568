// A knob and the field it moves may part: a value typed that the knob cannot reach, a knob that moves more than that field, a step that lies beside
// the value. What the knob would give, and the ways to make both one again.

import { isSameValue, movePosition, moveValue, steppedPosition, turnKnob } from './panel.ts'
import { moveOf } from './panelEdit.ts'
import { getAt, withAt } from './path.ts'
import type { Move, ParameterSet } from './types.ts'

export interface Parted {
  readonly knob: string
  readonly index: number
  readonly parameter: string
  readonly stored: unknown
  /** What the knob gives where it stands, at the step nearest to it. */
  readonly gives: Move['min']
  /** Only because the value lies between two of the knob's steps. */
  readonly betweenSteps: boolean
}

/** How the field at a path differs from what its knob gives where it stands; null where both are one, or no knob moves it. */
export function parted(set: ParameterSet, path: string): Parted | null {
  const found = moveOf(set, path)
  if (!found) return null
  const { index, knob, move } = found
  const stored = getAt(set, path)
  const gives = moveValue(move, steppedPosition(knob, knob.position))
  if (isSameValue(stored, gives)) return null
  return { knob: knob.knob, index, parameter: path, stored, gives, betweenSteps: isSameValue(stored, moveValue(move, knob.position)) }
}

/**
 * The set with the knob of the field at `path` turned to where it gives the field's value, when that changes no other field: what a typed value
 * does. Else the set as it is.
 */
export function followField(set: ParameterSet, path: string): ParameterSet {
  const found = moveOf(set, path)
  if (!found) return set
  const { index, knob, move } = found
  const value = getAt(set, path)
  if (isSameValue(value, moveValue(move, knob.position))) return set
  const position = movePosition(move, value)
  if (position === null) return set
  const turned = turnKnob(set, index, position)
  const others = knob.moves.filter((other) => other !== move)
  if (others.some(({ parameter }) => !isSameValue(getAt(set, parameter), getAt(turned, parameter)))) return set
  return withAt(set, `panel[${index}].position`, position)
}

/** The field takes what its knob gives. */
export const takeFromKnob = (set: ParameterSet, { parameter, gives }: Parted): ParameterSet => withAt(set, parameter, gives)

/** The knob turned to where it gives the field's value, everything it moves with it; null where no other position does. */
export function turnToField(set: ParameterSet, { index, parameter, stored }: Parted): ParameterSet | null {
  const found = moveOf(set, parameter)
  const position = found && movePosition(found.move, stored)
  if (position === null || position === set.panel[index]?.position) return null
  return withAt(turnKnob(set, index, position), parameter, stored)
}

/** The end of the knob that lies nearer widened to the field's value, and a knob that moves nothing else turned there; null where it reaches. */
export function widenToField(set: ParameterSet, { index, parameter, stored }: Parted): ParameterSet | null {
  const found = moveOf(set, parameter)
  if (!found || typeof stored !== 'number' || movePosition(found.move, stored) !== null) return null
  const { knob, at, move } = found
  const [min, max] = [move.min as number, move.max as number]
  if (stored >= Math.min(min, max) && stored <= Math.max(min, max)) return null
  if (move.taper === 'log' && stored * min <= 0) return null
  const isMax = Math.abs(stored - max) <= Math.abs(stored - min)
  const widened = withAt(set, `panel[${index}].moves[${at}].${isMax ? 'max' : 'min'}`, stored)
  const position = movePosition({ ...move, [isMax ? 'max' : 'min']: stored }, stored)
  return knob.moves.length > 1 || position === null ? widened : withAt(widened, `panel[${index}].position`, position)
}
