// Which places of one knob's stretch can be the worst, from how the figure moves with each parameter that the knob moves.
import { moveValue } from '../set/panel.ts'
import type { Knob, Move } from '../set/types.ts'
import { isListed, isStraight, knotsIn, moveRange, type Reached, type Span, type Value } from './panelKnobs.ts'

/**
 * How a figure moves with one parameter over a whole box, the others held anywhere in it. `rises`: never falls as the parameter grows. `falls`: never rises.
 * `ends`: largest at one of the range's ends (quasi-convex). `any`: nothing is known.
 */
export type Direction = 'rises' | 'falls' | 'ends' | 'any'

/** One choice for one knob. */
export interface Option {
  /** Index of the knob. */
  readonly knob: number
  readonly values: readonly (readonly [path: string, value: Value])[]
  /** Position that gives these values, or the nearest to them. */
  readonly position: number
  /** Whether it gives all of them: a bound may take each parameter where it is worst, though one knob cannot. */
  readonly real: boolean
}

export interface KnobOptions {
  readonly options: readonly Option[]
  /** True where nothing was known of a parameter, and places were only picked. */
  readonly picked: boolean
}

/** Places tried between the ends of a stretch of which nothing is known. */
const BETWEEN = [0.25, 0.5, 0.75]

/**
 * The options of one knob over `span`; empty where it does not concern the figure. `convex`: parameters in which the figure is quasi-convex together, so that on a
 * straight line through them it is largest at an end.
 */
export function knobOptions(
  { knob, index }: { readonly knob: Knob; readonly index: number },
  span: Span,
  directions: Readonly<Record<string, Direction>>,
  convex: readonly string[] = [],
): KnobOptions {
  const moves = knob.moves.filter((move) => !isListed(move.parameter) && directions[move.parameter] !== undefined && !stands(move, span))
  if (moves.length === 0) return { options: [], picked: false }
  const knots = [span.from, ...moves.flatMap((move) => knotsIn(move, span)), span.to]
  if (moves.some((move) => directions[move.parameter] === 'any')) {
    const width = span.to - span.from
    return { options: placed(index, moves, [...knots, ...BETWEEN.map((t) => span.from + width * t)]), picked: true }
  }
  const separate = combinations(moves, span, directions, knots).map((option) => ({ ...option, knob: index }))
  if (separate.every(({ real }) => real)) return { options: separate, picked: false }
  const together = moves.every((move) => convex.includes(move.parameter) && isStraight(move))
  return { options: together ? placed(index, moves, knots) : separate, picked: false }
}

function stands(move: Move, span: Span): boolean {
  const { low, high } = moveRange(move, span)
  return low.value === high.value
}

const placed = (knob: number, moves: readonly Move[], positions: readonly number[]): Option[] =>
  [...new Set(positions)].map((position) => ({ knob, values: valuesOf(moves, position), position, real: true }))

const valuesOf = (moves: readonly Move[], position: number): [string, Value][] =>
  moves.map((move) => [move.parameter, moveValue(move, position)])

/** Every parameter at an end where it can be worst, each by itself. */
function combinations(
  moves: readonly Move[],
  span: Span,
  directions: Readonly<Record<string, Direction>>,
  knots: readonly number[],
): Omit<Option, 'knob'>[] {
  const ends = moves.map((move): Reached[] => {
    const { low, high } = moveRange(move, span)
    const direction = directions[move.parameter]
    return direction === 'rises' ? [high] : direction === 'falls' ? [low] : [low, high]
  })
  const products = ends.reduce<Reached[][]>((sofar, own) => sofar.flatMap((chosen) => own.map((end) => [...chosen, end])), [[]])
  return products.map((chosen) => {
    const values = chosen.map(({ value }, i): [string, Value] => [(moves[i] as Move).parameter, value])
    const gives = (position: number) => moves.every((move, i) => moveValue(move, position) === chosen[i]?.value)
    const position = [...chosen.map((end) => end.position), ...knots].find(gives)
    return { values, position: position ?? (chosen[0] as Reached).position, real: position !== undefined }
  })
}
