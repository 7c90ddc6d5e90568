// What a stretch of a knob's turn makes of the parameters it moves. A turn passes through everything between its steps while it is smoothed,
// so a knob counts as continuous whatever its steps; choices, switches and listed values change at single places of the turn.
import { moveValue } from '../set/panel.ts'
import type { NumberParameter } from '../set/parameters/kinds.ts'
import { parameter } from '../set/parameters.ts'
import type { Move, Point } from '../set/types.ts'

export type Value = number | string | boolean

/** A stretch of a knob's turn, both ends included, in [0, 1]. */
export interface Span {
  readonly from: number
  readonly to: number
}

export interface Reached {
  readonly value: number
  readonly position: number
}

/** What lies nearer than this to the place where a choice changes is not looked at: a billionth of the turn. */
const SLIVER = 1e-9

/** Choices, switches and parameters with listed values: those that jump. Whole numbers between limits count as numbers. */
export function isListed(path: string): boolean {
  const row = parameter(path)
  return row.kind === 'choice' || row.kind === 'boolean' || (row.kind === 'integer' && row.values !== undefined)
}

/** Places strictly inside `span` where the move's taper bends. */
export function knotsIn({ taper, points }: Move, { from, to }: Span): number[] {
  return taper === 'drawn' ? points.map(([x]) => x).filter((x) => x > from && x < to) : []
}

/** Smallest and largest value of a number that is moved, over `span`, each with a position that gives it. Every taper runs one way between its points. */
export function moveRange(move: Move, span: Span): { readonly low: Reached; readonly high: Reached } {
  let low: Reached = { value: Number.POSITIVE_INFINITY, position: span.from }
  let high: Reached = { value: Number.NEGATIVE_INFINITY, position: span.from }
  for (const position of [span.from, ...knotsIn(move, span), span.to]) {
    const value = moveValue(move, position) as number
    if (value < low.value) low = { value, position }
    if (value > high.value) high = { value, position }
  }
  return { low, high }
}

/** Whether the value is a straight line of the position between the taper's points. */
export const isStraight = (move: Move): boolean => move.taper !== 'log' && parameter(move.parameter).kind === 'number'

/** The stretches of the turn on which a listed parameter keeps one value, ascending. */
export function listedSpans(move: Move): Span[] {
  const count = listedCount(move)
  const knots: readonly number[] = [0, ...knotsIn(move, { from: 0, to: 1 }), 1]
  const part = (position: number) => partOfTurn(move, position)
  const breaks = knots.flatMap((x1, i) => {
    const x0 = knots[i - 1]
    if (x0 === undefined) return [x1]
    const [t0, t1] = [part(x0), part(x1)]
    const crossed: number[] = []
    for (let k = 1; k < count; k++) {
      const share = (k / count - t0) / (t1 - t0)
      if (share > 0 && share < 1) crossed.push(x0 + (x1 - x0) * share)
    }
    return [...crossed.sort((a, b) => a - b), x1]
  })
  return joined(move, breaks)
}

function joined(move: Move, breaks: readonly number[]): Span[] {
  const spans: Span[] = []
  const add = (from: number, to: number) => {
    const value = moveValue(move, (from + to) / 2)
    const start = moveValue(move, from) === value ? from : from + SLIVER
    const end = moveValue(move, to) === value ? to : to - SLIVER
    const last = spans.at(-1)
    if (end < start) return
    if (last !== undefined && last.to === start && moveValue(move, last.to) === value)
      spans[spans.length - 1] = { from: last.from, to: end }
    else spans.push({ from: start, to: end })
  }
  breaks.forEach((at, i) => {
    const before = breaks[i - 1]
    if (before !== undefined && at > before) add(before, at)
    // A value that stands at one place of the turn only: where a drawn taper just touches it.
    if (!spans.some(({ from, to }) => from <= at && at <= to) && !startsAt(move, at, breaks[i + 1])) spans.push({ from: at, to: at })
  })
  return spans
}

const startsAt = (move: Move, at: number, next: number | undefined): boolean =>
  next !== undefined && next > at && moveValue(move, at) === moveValue(move, (at + next) / 2)

function listedCount({ parameter: path, min, max }: Move): number {
  const row = parameter(path)
  if (row.kind === 'boolean') return min === max ? 1 : 2
  const all: readonly unknown[] = row.kind === 'choice' ? row.options.map(({ value }) => value) : ((row as NumberParameter).values ?? [])
  return Math.abs(all.indexOf(min) - all.indexOf(max)) + 1
}

/** The part t of the way from min to max at a position, from a number that is moved the same way. */
function partOfTurn({ taper, points }: Move, position: number): number {
  const plain: Move = {
    parameter: 'mix.wet',
    min: 0,
    max: 1,
    taper: taper === 'log' ? 'linear' : taper,
    points: points as readonly Point[],
  }
  return moveValue(plain, position) as number
}
