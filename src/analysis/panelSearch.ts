// Where over all knob positions a figure is worst. In a box of positions each parameter is put where the figure cannot get worse; where one position of the
// knobs does all of that, it is the worst of the box, exactly. Where one knob would have to stand in two places at once the figure there is a bound: the box
// is split, largest bound first, until the bound meets what was found (branch and bound).
import type { ParameterSet } from '../set/types.ts'
import { knotsIn, type Span } from './panelKnobs.ts'
import { type Direction, type KnobOptions, knobOptions, type Option } from './panelOptions.ts'
import { listedParts, type PanelBox, type PanelSpace, panelBox, setAt, withValue } from './panelSpace.ts'

export interface PanelFigure {
  /** Choices, switches and listed values it depends on: each value is looked at by itself. */
  readonly listed: readonly string[]
  /** How it moves with numbers, in a box; those left out do not concern it there. */
  readonly directions: (box: PanelBox) => Readonly<Record<string, Direction>>
  /** Numbers in which it is quasi-convex together. */
  readonly convex?: (box: PanelBox) => readonly string[]
  /** A bound this close to what was found is as good as met; one part in 10⁴ where absent. */
  readonly near?: number
  /** The figure: larger is worse. Never throws, whatever the place. */
  readonly worse: (set: ParameterSet, sampleRate: number) => number
}

export interface PanelFind {
  readonly positions: readonly number[]
  /** The figure there. */
  readonly value: number
  /** No position has a larger one; nothing is shown where `by` is `samples`. */
  readonly bound: number
  readonly by: 'corners' | 'intervals' | 'samples'
  /** Sets looked at. */
  readonly looks: number
  /** Knobs that change the figure there, ascending; the others stand where they stood. */
  readonly knobs: readonly number[]
  /** Worst places found, worst first, all different. */
  readonly places: readonly { readonly positions: readonly number[]; readonly value: number }[]
}

/** Boxes looked at before the rest is left with its bound; combinations of listed values, and corners of one box, before only some are looked at. */
const MOST_SPLITS = 300
const MOST_LISTED = 128
const MOST_CORNERS = 64
/** Sets looked at before a search ends: with its bound where every box was begun, as places tried where not. */
const MOST_LOOKS = 1500
const MET = 1e-4
/** Parts of a turn narrower than this are not split. */
const NARROW = 1e-7
const MOST_PLACES = 16

interface Looked {
  readonly spans: readonly Span[]
  readonly bound: number
  readonly picked: boolean
  /** Knob to split, or null where one position is the worst of the box. */
  readonly split: number | null
}

interface Search {
  readonly space: PanelSpace
  readonly figure: PanelFigure
  looks: number
  readonly knobs: Set<number>
  places: { readonly positions: readonly number[]; readonly value: number }[]
}

/** The largest figure there can be, and how well that is known: a search of which the place does not matter. */
export function* boundPanel(space: PanelSpace, figure: PanelFigure): Generator<void, Pick<PanelFind, 'bound' | 'by'>> {
  return yield* search(space, figure, false)
}

/** Searches all positions; gives way after every box. Deterministic. */
export const searchPanel = (space: PanelSpace, figure: PanelFigure): Generator<void, PanelFind> => search(space, figure, true)

function* search(space: PanelSpace, figure: PanelFigure, tidy: boolean): Generator<void, PanelFind> {
  const { boxes, all } = firstBoxes(space, figure.listed)
  const state: Search = { space, figure, looks: 0, knobs: new Set(), places: [] }
  const open: Looked[] = []
  for (const spans of boxes) {
    if (state.looks > MOST_LOOKS) break
    open.push(look(state, spans))
    yield
  }
  const begun = all && open.length === boxes.length
  const found = () => state.places[0]?.value ?? Number.NEGATIVE_INFINITY
  let splits = 0
  for (; splits < MOST_SPLITS && state.looks <= MOST_LOOKS; splits++) {
    const worst = open.reduce((a, b) => (b.bound > a.bound ? b : a))
    if (worst.split === null || met(figure, worst.bound, found())) break
    open.splice(open.indexOf(worst), 1)
    for (const spans of halves(state, worst, worst.split)) open.push(look(state, spans))
    yield
  }
  const bound = Math.max(found(), ...open.map((box) => box.bound))
  const picked = !begun || open.some((box) => box.picked)
  const exact = splits === 0 && met(figure, bound, found())
  const worst = state.places[0]?.positions ?? space.own
  const { positions, knobs } = tidy ? needed(state, worst, found()) : { positions: worst, knobs: [] }
  return {
    positions,
    value: found(),
    bound,
    by: picked ? 'samples' : exact ? 'corners' : 'intervals',
    looks: state.looks,
    knobs,
    places: state.places,
  }
}

/** The worst place with every knob that does not help it put back, and the knobs that change something there. */
function needed(search: Search, worst: readonly number[], value: number): { positions: readonly number[]; knobs: readonly number[] } {
  const { own } = search.space
  const at = (positions: readonly number[], k: number, position: number) => positions.map((old, i) => (i === k ? position : old))
  const asBad = (positions: readonly number[]) => valueAt(search, positions) >= value
  let positions = worst
  const turned = [...search.knobs].sort((a, b) => a - b)
  for (const k of turned) {
    const back = at(positions, k, own[k] as number)
    if (positions[k] !== own[k] && asBad(back)) positions = back
  }
  return { positions, knobs: turned.filter((k) => [0, 1, own[k] as number].some((end) => !asBad(at(positions, k, end)))) }
}

const met = ({ near }: PanelFigure, bound: number, found: number): boolean =>
  bound <= found + (near ?? MET * Math.max(1e-3, Math.abs(found)))

/** One box a combination of listed values; where there are too many, every value of each knob with the others where they stand. */
function firstBoxes(space: PanelSpace, listed: readonly string[]): { readonly boxes: readonly (readonly Span[])[]; readonly all: boolean } {
  const parts = listedParts(space, listed)
  const count = parts.reduce((product, own) => product * own.length, 1)
  if (count <= MOST_LISTED) {
    const boxes = parts.reduce<Span[][]>((sofar, own) => sofar.flatMap((spans) => own.map((span) => [...spans, span])), [[]])
    return { boxes, all: true }
  }
  const standing = parts.map((own, k) => own.find((span) => contains(span, space.own[k] as number)) ?? (own[0] as Span))
  const turned = parts.flatMap((own, k) => own.map((span) => standing.map((other, i) => (i === k ? span : other))))
  return { boxes: turned.slice(0, MOST_LISTED), all: false }
}

const contains = ({ from, to }: Span, position: number): boolean => position >= from && position <= to
const width = ({ from, to }: Span): number => to - from

function look(search: Search, spans: readonly Span[]): Looked {
  const { space, figure } = search
  const box = panelBox(space, spans, figure.listed)
  const directions = figure.directions(box)
  const convex = figure.convex?.(box)
  const knobs = space.knobs.map((knob, index) => knobOptions({ knob, index }, spans[index] as Span, directions, convex))
  knobs.forEach(({ options }, k) => {
    if (options.length > 0 || width(spans[k] as Span) < 1) search.knobs.add(k)
  })
  const { worst, whole } = worstCorner(search, box, knobs)
  const loose = worst.choice.filter((option) => !option.real).map((option) => option.knob)
  const widest = loose.sort((a, b) => width(spans[b] as Span) - width(spans[a] as Span))[0]
  const split = widest !== undefined && width(spans[widest] as Span) > NARROW ? widest : null
  return { spans, bound: worst.value, picked: !whole || knobs.some(({ picked }) => picked), split }
}

interface Corner {
  readonly choice: readonly Option[]
  readonly value: number
}

/** The corner of a box where the figure is largest. `whole`: every corner that can be was looked at. */
function worstCorner(search: Search, box: PanelBox, knobs: readonly KnobOptions[]): { readonly worst: Corner; readonly whole: boolean } {
  const turned = knobs.map(({ options }) => options).filter((options) => options.length > 0)
  const larger = (a: Corner, b: Corner): Corner => (b.value > a.value ? b : a)
  const count = turned.reduce((product, options) => product * options.length, 1)
  if (count <= MOST_CORNERS) {
    const choices = turned.reduce<Option[][]>((sofar, own) => sofar.flatMap((chosen) => own.map((option) => [...chosen, option])), [[]])
    return { worst: choices.map((choice) => corner(search, box, choice)).reduce(larger), whole: true }
  }
  // Knob after knob to its worst option, twice round.
  let worst = corner(
    search,
    box,
    turned.map((options) => options[0] as Option),
  )
  for (const i of [...turned.keys(), ...turned.keys()]) {
    const { choice } = worst
    const others = (turned[i] as readonly Option[]).filter((option) => option !== choice[i])
    worst = others
      .map((option) =>
        corner(
          search,
          box,
          choice.map((old, j) => (j === i ? option : old)),
        ),
      )
      .reduce(larger, worst)
  }
  return { worst, whole: false }
}

/** The figure at a corner. Where the knobs can stand there, or else where they come nearest, is kept as a place. */
function corner(search: Search, box: PanelBox, choice: readonly Option[]): Corner {
  const { space, figure } = search
  const set = choice.flatMap(({ values }) => values).reduce((moved, [path, value]) => withValue(moved, path, value), box.set)
  const value = figure.worse(set, space.sampleRate)
  search.looks++
  const positions = box.spans.map((span, k) => Math.min(span.to, Math.max(span.from, space.own[k] as number)))
  for (const option of choice) positions[option.knob] = option.position
  keep(search, positions, choice.every((option) => option.real) ? value : valueAt(search, positions))
  return { choice, value }
}

function valueAt(search: Search, positions: readonly number[]): number {
  const { space, figure } = search
  search.looks++
  return figure.worse(setAt(space, positions), space.sampleRate)
}

function keep(search: Search, positions: readonly number[], value: number): void {
  const { places } = search
  const last = places.at(-1)
  if (places.length === MOST_PLACES && last !== undefined && value <= last.value) return
  if (places.some((place) => place.positions.every((position, k) => position === positions[k]))) return
  const after = places.findIndex((place) => place.value < value)
  places.splice(after < 0 ? places.length : after, 0, { positions, value })
  if (places.length > MOST_PLACES) places.pop()
}

/** Both halves of a box, cut at the middle bend of the taper where there is one. */
function halves({ space }: Search, { spans }: Looked, knob: number): Span[][] {
  const span = spans[knob] as Span
  const knots = (space.knobs[knob]?.moves ?? []).flatMap((move) => knotsIn(move, span)).sort((a, b) => a - b)
  const at = knots[Math.floor(knots.length / 2)] ?? (span.from + span.to) / 2
  return [
    { from: span.from, to: at },
    { from: at, to: span.to },
  ].map((half) => spans.map((other, k) => (k === knob ? half : other)))
}
