// What ties the fields of a move to the panel: every edit one named step, refused with its reason and with ways to have it.
import { changeMove, taperChange } from '../../../../src/set/panelEdit.ts'
import { type NumberParameter, parameter } from '../../../../src/set/parameters.ts'
import type { Problem } from '../../../../src/set/result.ts'
import type { Move, ParameterSet } from '../../../../src/set/types.ts'
import type { Binding, Refusal, Way } from '../../../fields/binding.ts'
import { trackHigh, trackLow } from '../../../fields/taper.ts'
import { committedSet } from '../../../state/document.ts'
import { dropGesture, endGesture } from '../../../state/draft.ts'
import { commitPanel, panelEditProblems, tryPanel } from '../../../state/panel.ts'
import { parameterLabel, valueWords, whyNotPanel } from './panelWords.ts'

export interface MovePlace {
  readonly index: number
  readonly at: number
  readonly knob: string
}

const stepOf = ({ knob, index, at }: MovePlace): string => {
  const move = committedSet().panel[index]?.moves[at]
  return move ? `${knob}, ${parameterLabel(move.parameter).toLowerCase()}` : knob
}

/** A change of a move, as one step; null when it stands. */
export function changeAsStep(place: MovePlace, change: Partial<Move>): Refusal {
  const edit = (set: ParameterSet) => changeMove(set, place.index, place.at, change)
  const [problem] = commitPanel(stepOf(place), edit)
  return problem ? { why: whyNotPanel(problem, edit(committedSet())), ways: waysFor(place, change, problem) } : null
}

/** A change of a move within a gesture; why it was held, null when it was not. */
export function tryChange(place: MovePlace, change: Partial<Move>): string | null {
  const edit = (set: ParameterSet) => changeMove(set, place.index, place.at, change)
  const [problem] = tryPanel(stepOf(place), edit)
  return problem ? `Held: ${whyNotPanel(problem, edit(committedSet()))}` : null
}

/** One end of a move, typed with its unit or dragged. */
export const endActs = (place: MovePlace, end: 'min' | 'max'): Omit<Binding<number | null>, 'value'> => ({
  attempt: (value) => (value === null ? null : tryChange(place, { [end]: value })),
  settle: endGesture,
  drop: dropGesture,
  apply: (value) => (value === null ? null : changeAsStep(place, { [end]: value })),
})

export function chooseTaper(place: MovePlace, taper: Move['taper']): Refusal {
  const move = committedSet().panel[place.index]?.moves[place.at]
  return move ? changeAsStep(place, taperChange(move, taper)) : null
}

/** Changes beside the refused one that make it possible, each tried. */
function waysFor(place: MovePlace, change: Partial<Move>, problem: Problem): readonly Way[] {
  const move = committedSet().panel[place.index]?.moves[place.at]
  if (!move || !problem.path.endsWith('.taper')) return []
  const wanted: Move = { ...move, ...change }
  const ends = ratioEnds(wanted)
  const tries: readonly (readonly [string, Partial<Move>])[] = [
    ...(ends
      ? [[`Also ${ends.end === 'min' ? 'start' : 'end'} at ${valueWords(move.parameter, ends.value)}`, { [ends.end]: ends.value }] as const]
      : []),
    ['Use a linear taper', { taper: 'linear' }],
  ]
  return tries
    .map(([label, beside]) => ({ label, all: { ...change, ...beside } }))
    .filter(({ all }) => panelEditProblems(changeMove(committedSet(), place.index, place.at, all)).length === 0)
    .filter(({ all }) => !Object.entries(all).every(([key, value]) => move[key as keyof Move] === value))
    .map(({ label, all }) => ({ label, take: () => void changeAsStep(place, all) }))
}

/** The end that has to leave zero, and where to: the start of the field's useful ratios, on the side of the other end. */
function ratioEnds({ parameter: path, min, max }: Move): { readonly end: 'min' | 'max'; readonly value: number } | null {
  if (typeof min !== 'number' || typeof max !== 'number' || (min === 0 && max === 0)) return null
  const row = parameter(path) as NumberParameter
  const end = Math.abs(min) <= Math.abs(max) ? 'min' : 'max'
  const other = end === 'min' ? max : min
  const low = trackLow(row) > 0 ? trackLow(row) : Number((trackHigh(row) / 100).toPrecision(1))
  const value = Math.sign(other) * Math.min(low, Math.abs(other))
  return { end, value }
}
