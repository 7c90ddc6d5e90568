// Checks of which nothing is known but what they depend on: places are tried, and said to be no more than that.
import { isListed, knotsIn, listedSpans } from '../analysis/panelKnobs.ts'
import type { Knob, Move, ParameterSet } from '../set/types.ts'
import type { CheckId } from './limits.ts'
import { limitOf } from './limits.ts'
import { type PanelFinding, type PanelJudge, type PanelLook, type Positions, rankOf } from './panelBoxLook.ts'
import type { CheckEntry, Figure } from './types.ts'

/** Places tried at most. */
const MOST_TRIED = 24
/** Knobs whose ends are all combined. */
const MOST_COMBINED = 3

/** Parameters a check depends on; every one where it is not listed. */
const CONCERNS: Partial<Record<CheckId, RegExp>> = {
  'tone.droop': /^line\.|^sweep\.|^voices\.|^loop\.(feedback|delay|interpolation)$/,
  'shaper.alias': /\.shaper\./,
}

function concerns(set: ParameterSet, id: CheckId, parameter: string): boolean {
  if (id === 'level.mono' && set.layout === 'mono') return false
  // A shaper hears what its input brings; the loop's is heard only with feedback.
  if (id === 'shaper.alias' && parameter === 'input.gainDb') return set.input.shaper !== null
  if (id === 'shaper.alias' && parameter === 'loop.feedback') return set.loop.shaper !== null
  return CONCERNS[id]?.test(parameter) ?? true
}

/** Knobs that may concern a check. */
export function concernedKnobs(set: ParameterSet, id: CheckId): number[] {
  return [...set.panel.keys()].filter((k) => set.panel[k]?.moves.some(({ parameter }) => concerns(set, id, parameter)))
}

/**
 * Where every knob stands; for few knobs every combination of their ends, all ends together; each knob at its ends, in the middle, at every value of a choice that it
 * moves and at every point of a drawn taper. In this order, the last ones dropped.
 */
export function triedPlaces(panel: readonly Knob[], own: Positions, knobs: readonly number[]): Positions[] {
  const at = (turned: ReadonlyMap<number, number>): Positions => own.map((position, k) => turned.get(k) ?? position)
  const together = [0, 1].map((end) => at(new Map(knobs.map((k) => [k, end]))))
  const count = knobs.length <= MOST_COMBINED ? 2 ** knobs.length : 0
  const combined = Array.from({ length: count }, (_, i) => at(new Map(knobs.map((k, bit) => [k, (i >> bit) & 1]))))
  const single = [0, 1, 0.5].flatMap((end) => knobs.map((k) => at(new Map([[k, end]]))))
  const between = knobs.flatMap((k) => (panel[k]?.moves ?? []).flatMap(placesOf).map((place) => at(new Map([[k, place]]))))
  const seen = new Set<string>()
  return [own, ...combined, ...together, ...single, ...between]
    .filter((place) => !seen.has(place.join()) && seen.add(place.join()))
    .slice(0, MOST_TRIED)
}

/** Places of a turn between its ends where a move does something of its own. */
const placesOf = (move: Move): number[] =>
  isListed(move.parameter) ? listedSpans(move).map(({ from, to }) => (from + to) / 2) : knotsIn(move, { from: 0, to: 1 })

/** Worse first by status, then by how far the figure lies on the wrong side. */
function badness({ space }: PanelLook, { id }: CheckEntry, { status, value }: Figure): number {
  const { row } = limitOf(space.set, id)
  const size = typeof value === 'number' ? (row.sense === 'atLeast' ? -value : value) : 0
  return rankOf(status) * 1e6 + Math.max(-4e5, Math.min(4e5, size))
}

export const panelTried: PanelJudge = function* (look, entry): Generator<void, PanelFinding> {
  const { space } = look
  const knobs = concernedKnobs(space.set, entry.id)
  const places = triedPlaces(space.knobs, space.own, knobs)
  let worst = { positions: space.own, badness: Number.NEGATIVE_INFINITY }
  for (const positions of places) {
    const here = badness(look, entry, look.figureAt(entry, positions))
    if (here > worst.badness) worst = { positions, badness: here }
    yield
  }
  const found = { positions: worst.positions, knobs, looks: places.length }
  if (knobs.length === 0)
    return { ...found, by: 'corners', formula: 'the same at all positions', source: 'no knob moves what it depends on' }
  return {
    ...found,
    by: 'samples',
    bound: null,
    formula: 'tried where the knobs stand, at their ends, in the middle, at every choice and where tapers bend',
    source: 'no argument: nothing is shown of the places between',
  }
}
