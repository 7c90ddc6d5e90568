// All places the knobs of a set can stand: the set at any of them, and boxes of them, in which every parameter that is moved has a range.
import { moveValue } from '../set/panel.ts'
import { withAt } from '../set/path.ts'
import type { Knob, Move, ParameterSet } from '../set/types.ts'
import { isListed, listedSpans, moveRange, type Span, type Value } from './panelKnobs.ts'

export interface PanelSpace {
  /** The set with every knob's moves applied where the knob stands. */
  readonly set: ParameterSet
  readonly sampleRate: number
  readonly knobs: readonly Knob[]
  /** Where the knobs stand. */
  readonly own: readonly number[]
}

/** A stretch of turn for every knob, and what it makes of the parameters. */
export interface PanelBox {
  readonly spans: readonly Span[]
  /** Choices, switches and listed values that concern the figure are those of the box; numbers are some of the box's. */
  readonly set: ParameterSet
  /** Smallest and largest value of a number anywhere in the box; twice its own where nothing moves it. */
  readonly range: (path: string) => readonly [number, number]
}

export function panelSpace(set: ParameterSet, sampleRate = set.sampleRate): PanelSpace {
  const knobs = set.panel
  const own = knobs.map(({ position }) => position)
  const bare = { set, sampleRate, knobs, own }
  return { ...bare, set: setAt(bare, own) }
}

/** The set with all knobs at `positions`: their moves applied, the panel left as it is. */
export function setAt({ set, knobs }: Pick<PanelSpace, 'set' | 'knobs'>, positions: readonly number[]): ParameterSet {
  return knobs.reduce((turned, { moves }, k) => moves.reduce((moved, move) => assign(moved, move, positions[k] as number), turned), set)
}

const assign = (set: ParameterSet, move: Move, position: number): ParameterSet => withValue(set, move.parameter, moveValue(move, position))

export const withValue = (set: ParameterSet, path: string, value: Value): ParameterSet => withAt(set, path, value)

/** Value of every parameter that is moved, with the knobs at `positions`. */
export function valuesAt({ knobs }: Pick<PanelSpace, 'knobs'>, positions: readonly number[]): Record<string, Value> {
  return Object.fromEntries(knobs.flatMap(({ moves }, k) => moves.map((move) => [move.parameter, moveValue(move, positions[k] as number)])))
}

/** The box over `spans`. `listed`: parameters that jump and concern the figure; each keeps one value in a span. */
export function panelBox({ set, knobs }: PanelSpace, spans: readonly Span[], listed: readonly string[]): PanelBox {
  const ranges = new Map<string, readonly [number, number]>()
  let fixed = set
  knobs.forEach(({ moves }, k) => {
    const span = spans[k] as Span
    for (const move of moves) {
      if (!isListed(move.parameter)) {
        const { low, high } = moveRange(move, span)
        ranges.set(move.parameter, [low.value, high.value])
      } else if (listed.includes(move.parameter)) fixed = assign(fixed, move, (span.from + span.to) / 2)
    }
  })
  const range = (path: string): readonly [number, number] => {
    const known = ranges.get(path)
    if (known) return known
    const value = numberAt(fixed, path)
    return [value, value]
  }
  return { spans, set: fixed, range }
}

function numberAt(set: ParameterSet, path: string): number {
  let at: unknown = set
  for (const key of path.split('.')) at = (at as Record<string, unknown> | null | undefined)?.[key]
  return typeof at === 'number' ? at : 0
}

/** The stretches of each knob's turn in which every parameter of `listed` that it moves keeps one value. */
export function listedParts({ knobs }: PanelSpace, listed: readonly string[]): Span[][] {
  return knobs.map(({ moves }) =>
    moves
      .filter((move) => isListed(move.parameter) && listed.includes(move.parameter) && move.min !== move.max)
      .map(listedSpans)
      .reduce<Span[]>((parts, more) => parts.flatMap((a) => more.flatMap((b) => overlap(a, b))), [{ from: 0, to: 1 }]),
  )
}

function overlap(a: Span, b: Span): Span[] {
  const both = { from: Math.max(a.from, b.from), to: Math.min(a.to, b.to) }
  return both.from <= both.to ? [both] : []
}
