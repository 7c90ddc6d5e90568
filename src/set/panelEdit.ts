// Editing a panel: knobs and moves put in, taken out, changed. Functions from set to set; where it can be, what sounds stays what it was.
import { fieldEnds, isListed, movePosition, moveValue, steppedPosition, switchValues } from './panel.ts'
import { isMovable, moveProblems } from './panelProblems.ts'
import { KNOB_NAME, MAX_KNOBS, MAX_MOVES } from './parameters/panel.ts'
import { type Parameter, parameter } from './parameters.ts'
import { getAt, withAt } from './path.ts'
import type { Knob, Move, ParameterSet, Point } from './types.ts'
import { accepts, withoutNull } from './valueProblem.ts'

export { MAX_KNOBS, MAX_MOVES }

/** A move and where it stands in the panel. */
export interface MoveAt {
  readonly index: number
  readonly knob: Knob
  readonly at: number
  readonly move: Move
}

/** The move of the knob that moves a parameter, or null. */
export function moveOf(set: ParameterSet, path: string): MoveAt | null {
  for (const [index, knob] of set.panel.entries()) {
    const at = knob.moves.findIndex((move) => move.parameter === path)
    if (at >= 0) return { index, knob, at, move: knob.moves[at] as Move }
  }
  return null
}

/** The set with one more knob, last; a name already there gets a number. Throws RangeError for a panel that is full. */
export function addKnob(set: ParameterSet, knob: Knob): ParameterSet {
  if (set.panel.length >= MAX_KNOBS) throw new RangeError(`a panel has at most ${MAX_KNOBS} knobs`)
  return { ...set, panel: [...set.panel, { ...knob, knob: freeName(set, knob.knob) }] }
}

function freeName(set: ParameterSet, name: string): string {
  const taken = new Set(set.panel.map(({ knob }) => knob))
  for (let n = 1; ; n++) {
    const ending = n === 1 ? '' : ` ${n}`
    const candidate = name.slice(0, KNOB_NAME.maxLength - ending.length) + ending
    if (!taken.has(candidate)) return candidate
  }
}

export function removeKnob(set: ParameterSet, index: number): ParameterSet {
  knobAt(set, index)
  return { ...set, panel: set.panel.toSpliced(index, 1) }
}

/** Knob number `index` put at place `to` of the row. */
export function shiftKnob(set: ParameterSet, index: number, to: number): ParameterSet {
  const knob = knobAt(set, index)
  knobAt(set, to)
  return { ...set, panel: set.panel.toSpliced(index, 1).toSpliced(to, 0, knob) }
}

/** A knob's name, steps or smoothing replaced. */
export function changeKnob(set: ParameterSet, index: number, change: Partial<Pick<Knob, 'knob' | 'steps' | 'smoothMs' | 'moves'>>) {
  return withKnob(set, index, { ...knobAt(set, index), ...change })
}

/** The knob number `index` moves one more parameter. Throws RangeError for a knob that moves as many as it can. */
export function addMove(set: ParameterSet, index: number, move: Move): ParameterSet {
  const { moves } = knobAt(set, index)
  if (moves.length >= MAX_MOVES) throw new RangeError(`a knob moves at most ${MAX_MOVES} parameters`)
  return changeKnob(set, index, { moves: [...moves, move] })
}

/** A move taken off its knob; a knob that moves nothing any more goes with it. */
export function removeMove(set: ParameterSet, index: number, at: number): ParameterSet {
  const { moves } = knobAt(set, index)
  return moves.length === 1 ? removeKnob(set, index) : changeKnob(set, index, { moves: moves.toSpliced(at, 1) })
}

/** The set without the moves of shapers that are not there; itself when there are none. */
export function withoutAbsent(set: ParameterSet): ParameterSet {
  const isAbsent = ({ parameter: path }: Move) => getAt(set, path) === undefined
  if (!set.panel.some(({ moves }) => moves.some(isAbsent))) return set
  const panel = set.panel.map((knob) => ({ ...knob, moves: knob.moves.filter((move) => !isAbsent(move)) }))
  return { ...set, panel: panel.filter(({ moves }) => moves.length > 0) }
}

/**
 * A move changed. A knob that moves nothing else turns to where it gives the value the set has; where no position does, and for a knob that moves
 * more, the knob stays (or goes to its nearer end) and the parameter takes what the knob gives there.
 */
export function changeMove(set: ParameterSet, index: number, at: number, change: Partial<Move>): ParameterSet {
  const knob = knobAt(set, index)
  const move: Move = { ...(knob.moves[at] as Move), ...change }
  const changed = changeKnob(set, index, { moves: knob.moves.with(at, move) })
  // A move that cannot stand gives no value; whoever judges the set says why.
  if (moveProblems(move, '').length > 0) return changed
  const stored = getAt(set, move.parameter)
  const alone = knob.moves.length === 1
  const position = alone ? movePosition(move, stored) : null
  if (position !== null) return withAt(changed, `panel[${index}].position`, position)
  const stands = alone ? nearerEnd(move, stored, knob.position) : knob.position
  return withAt(withAt(changed, `panel[${index}].position`, stands), move.parameter, moveValue(move, stands))
}

function nearerEnd(move: Move, stored: unknown, otherwise: number): number {
  if (typeof stored !== 'number' || typeof move.min !== 'number' || typeof move.max !== 'number') return otherwise
  if (stored >= Math.min(move.min, move.max) && stored <= Math.max(move.min, move.max)) return otherwise
  return Math.abs(stored - move.min) < Math.abs(stored - move.max) ? 0 : 1
}

/** A move's taper with what it needs: a drawn one starts from the curve there was. */
export function taperChange(move: Move, taper: Move['taper']): Pick<Move, 'taper' | 'points'> {
  if (taper !== 'drawn' || move.points.length >= 2) return { taper, points: move.points }
  const count = move.taper === 'log' ? 9 : 3
  const points = Array.from({ length: count }, (_, i): Point => {
    const x = i / (count - 1)
    return [x, move.taper === 'log' ? logPart(move, x) : x]
  })
  return { taper, points }
}

const logPart = (move: Move, x: number) => {
  const [from, to] = [move.min as number, move.max as number]
  return from === to ? x : Number((((from * (to / from) ** x - from) / (to - from)) as number).toFixed(4))
}

/**
 * A move for a field on a knob that stands at `position`: over the useful part of the field's range, cut at one end so that the knob gives the
 * value the field has. null where a knob cannot move the field, or it is off.
 */
export function moveForField(set: ParameterSet, path: string, position: number): Move | null {
  const row = parameter(path)
  const value = getAt(set, path)
  if (!isMovable(row) || !accepts(withoutNull(row), value)) return null
  const whole: Move = { parameter: path, points: [], ...fieldEnds(row, value as Move['min']) }
  if (isListed(row)) return listedThrough(row, whole, value, position)
  return through(row, whole, value as number, position)
}

function through(row: Parameter, move: Move, value: number, position: number): Move {
  const log = move.taper === 'log'
  const to = (x: number) => (log ? Math.log(x) : x)
  const from = (x: number) => (log ? Math.exp(x) : x)
  const [min, max, v] = [to(move.min as number), to(move.max as number), to(value)]
  const keepsMin = min + (max - min) * position >= v && position > 0
  const end = from(keepsMin ? min + (v - min) / position : (v - position * max) / (1 - position || 1))
  const tidy = row.kind === 'integer' ? Math.round(end) : Number(end.toPrecision(12))
  if (position === 0 || position === 1) return { ...move, [position === 0 ? 'min' : 'max']: value }
  return { ...move, [keepsMin ? 'max' : 'min']: tidy }
}

/** The longest run of the listed values whose part of the turn at `position` is `value`. */
function listedThrough(row: Parameter, move: Move, value: unknown, position: number): Move {
  const all = switchValues(row) as readonly Move['min'][]
  for (let length = all.length; length > 1; length--)
    for (let start = 0; start + length <= all.length; start++) {
      const tried = { ...move, min: all[start] as Move['min'], max: all[start + length - 1] as Move['min'] }
      if (moveValue(tried, position) === value) return tried
    }
  return { ...move, min: value as Move['min'], max: value as Move['min'] }
}

/** Where knob number `index` stands as the unit tells it apart. */
export function standing(set: ParameterSet, index: number): number {
  const knob = knobAt(set, index)
  return steppedPosition(knob, knob.position)
}

function withKnob(set: ParameterSet, index: number, knob: Knob): ParameterSet {
  return { ...set, panel: set.panel.with(index, knob) }
}

function knobAt(set: ParameterSet, index: number): Knob {
  const knob = set.panel[index]
  if (!knob) throw new RangeError(`knob must be 0 to ${set.panel.length - 1}, got ${index}`)
  return knob
}
