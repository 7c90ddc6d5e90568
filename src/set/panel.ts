// Knobs: what a position makes of the parameters a knob moves, and the way back.
import { isMovable } from './panelProblems.ts'
import type { NumberParameter, Parameter } from './parameters/kinds.ts'
import { parameter } from './parameters.ts'
import { getAt, withAt } from './path.ts'
import type { Knob, Move, ParameterSet, Point } from './types.ts'
import { accepts, withoutNull } from './valueProblem.ts'

type Value = number | string | boolean

/**
 * Value of a moved parameter with the knob at `position`, 0 to 1: linear min + (max − min) t, log min (max/min)^t; a drawn taper bends position to t first.
 * Whole-number parameters round to the nearest; those with listed values, choices and switches divide the turn evenly among the values from min to max,
 * in the table's order. Throws RangeError for a position outside 0 to 1.
 */
export function moveValue(move: Move, position: number): Value {
  if (!(position >= 0 && position <= 1)) throw new RangeError(`position must be 0 to 1, got ${position}`)
  const t = move.taper === 'drawn' ? bent(move.points, position) : position
  const row = parameter(move.parameter)
  const list = listed(row, move)
  if (list) return list[Math.min(Math.floor(t * list.length), list.length - 1)] as Value
  const value = between(move, t)
  return row.kind === 'integer' ? Math.round(value) : value
}

function between({ min, max, taper }: Move, t: number): number {
  const [from, to] = [min as number, max as number]
  // The ends are exact and nothing lies past them, whatever the power rounds to.
  if (t === 0 || t === 1) return t === 0 ? from : to
  const value = taper === 'log' ? from * (to / from) ** t : from + (to - from) * t
  return Math.min(Math.max(from, to), Math.max(Math.min(from, to), value))
}

/** The values a switch-like move steps through, or null for a continuous one. */
function listed(row: Parameter, { min, max }: Move): readonly Value[] | null {
  const all = switchValues(row)
  if (!all) return null
  const [from, to] = [all.indexOf(min), all.indexOf(max)]
  return from <= to ? all.slice(from, to + 1) : all.slice(to, from + 1).reverse()
}

/** The values of a switch-like parameter in the table's order, or null for a continuous one. */
export function switchValues(row: Parameter): readonly Value[] | null {
  if (row.kind === 'choice') return row.options.map((option) => option.value)
  if (row.kind === 'boolean') return [false, true]
  return (row as NumberParameter).values ?? null
}

export const isListed = (row: Parameter): boolean => switchValues(row) !== null

/** Straight lines through the taper's points, its ends held. */
function bent(points: readonly Point[], x: number): number {
  const next = points.findIndex(([px]) => px > x)
  if (next === 0) return (points[0] as Point)[1]
  const [x0, y0] = (next < 0 ? points.at(-1) : points[next - 1]) as Point
  if (next < 0) return y0
  const [x1, y1] = points[next] as Point
  return y0 + ((y1 - y0) * (x - x0)) / (x1 - x0)
}

/** First position at which the move gives `value` (for a listed value the middle of its part of the turn), or null when no position does. */
export function movePosition(move: Move, value: unknown): number | null {
  const t = untapered(move, value)
  if (t === null || move.taper !== 'drawn') return t
  return unbent(move.points, t)
}

function untapered(move: Move, value: unknown): number | null {
  const list = listed(parameter(move.parameter), move)
  if (list) return list.includes(value as Value) ? (list.indexOf(value as Value) + 0.5) / list.length : null
  const [from, to] = [move.min as number, move.max as number]
  if (typeof value !== 'number' || value < Math.min(from, to) || value > Math.max(from, to)) return null
  if (from === to || value === from) return 0
  if (value === to) return 1
  const t = move.taper === 'log' ? Math.log(value / from) / Math.log(to / from) : (value - from) / (to - from)
  return Math.min(1, Math.max(0, t))
}

function unbent(points: readonly Point[], t: number): number | null {
  const [firstX, firstY] = points[0] as Point
  if (firstY === t) return 0
  let [x0, y0] = [firstX, firstY]
  for (const [x1, y1] of points.slice(1)) {
    if ((t - y0) * (t - y1) <= 0 && y1 !== y0) return x0 + ((x1 - x0) * (t - y0)) / (y1 - y0)
    ;[x0, y0] = [x1, y1]
  }
  return null
}

/** A position as the unit tells it apart: the nearest of `steps` evenly spaced ones, or itself when continuous. */
export function steppedPosition({ steps }: Pick<Knob, 'steps'>, position: number): number {
  return steps < 2 ? position : Math.round(position * (steps - 1)) / (steps - 1)
}

/** The set with knob number `index` turned to `position`: the position kept, every move applied. Throws RangeError for a knob that is not there. */
export function turnKnob(set: ParameterSet, index: number, position: number): ParameterSet {
  const knob = set.panel[index]
  if (!knob) throw new RangeError(`knob must be 0 to ${set.panel.length - 1}, got ${index}`)
  const panel = set.panel.map((other, i) => (i === index ? { ...other, position } : other))
  return knob.moves.reduce<ParameterSet>((moved, move) => withAt(moved, move.parameter, moveValue(move, position)), { ...set, panel })
}

export interface Disagreement {
  readonly knob: string
  readonly parameter: string
  readonly stored: unknown
  readonly atKnob: Value
}

/** Equal, numbers within one part in 10⁹. */
export function isSameValue(a: unknown, b: unknown): boolean {
  if (typeof a !== 'number' || typeof b !== 'number') return a === b
  return Math.abs(a - b) <= 1e-9 * Math.max(Math.abs(a), Math.abs(b))
}

/** Moves whose knob, where it stands, would give another value than the set has: numbers by more than one part in 10⁹. */
export function knobDisagreements(set: ParameterSet): readonly Disagreement[] {
  return set.panel.flatMap((knob) =>
    knob.moves.flatMap((move): Disagreement[] => {
      const stored = getAt(set, move.parameter)
      const atKnob = moveValue(move, knob.position)
      return isSameValue(stored, atKnob) ? [] : [{ knob: knob.knob, parameter: move.parameter, stored, atKnob }]
    }),
  )
}

/**
 * A continuous knob for a field from where it stands: over the useful part of the field's range, widened to the present value, at the position that
 * gives it. null where a knob cannot move the field, or it is off and has no value to stand at.
 */
export function knobForField(set: ParameterSet, path: string): Knob | null {
  const row = parameter(path)
  const value = getAt(set, path)
  if (!isMovable(row) || !accepts(withoutNull(row), value)) return null
  const move: Move = { parameter: path, points: [], ...fieldEnds(row, value as Value) }
  return { knob: row.label, position: movePosition(move, value) ?? 0, steps: 0, smoothMs: 30, moves: [move] }
}

/** Ends and taper over the useful part of a field's range, widened to its value. */
export function fieldEnds(row: Parameter, value: Value): Pick<Move, 'min' | 'max' | 'taper'> {
  const list = switchValues(row)
  if (list) return { min: list[0] as Value, max: list.at(-1) as Value, taper: 'linear' }
  const { min, max, trackMin = min, trackMax = max, taper } = row as NumberParameter
  const [from, to] = [Math.min(trackMin, value as number), Math.max(trackMax, value as number)]
  return { min: from, max: to, taper: taper === 'log' && from > 0 ? 'log' : 'linear' }
}
