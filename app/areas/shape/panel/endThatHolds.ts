// For a place of the panel that cannot sound: the end of one knob's move, closer, with which it can.
import type { Mend } from '../../../../src/checks/types.ts'
import { moveValue } from '../../../../src/set/panel.ts'
import { changeMove } from '../../../../src/set/panelEdit.ts'
import { type NumberParameter, parameter } from '../../../../src/set/parameters.ts'
import type { Move, ParameterSet } from '../../../../src/set/types.ts'
import { setProblems } from '../../../../src/set/validity.ts'
import { atPositions, knobName } from '../../../state/panel.ts'
import { valueWords } from './panelWords.ts'

export type EndOffer = Mend

/** The one that takes the least of its knob's turn away; null where no single end helps. */
export function endThatHolds(set: ParameterSet, positions: readonly number[]): EndOffer | null {
  const offers = set.panel.flatMap((knob, index) => {
    const position = positions[index]
    if (position !== 0 && position !== 1) return []
    return knob.moves.flatMap((move, at) => endOf(set, positions, index, at, move) ?? [])
  })
  const best = offers.sort((a, b) => a.lost - b.lost)[0]
  return best ? best.offer : null
}

interface Candidate {
  readonly offer: EndOffer
  /** Part of the turn that goes. */
  readonly lost: number
}

const HALVINGS = 20
/** The end is put on a grid of this many parts of the move's span, on the safe side. */
const GRID = 200

function endOf(set: ParameterSet, positions: readonly number[], index: number, at: number, move: Move): Candidate | null {
  if (typeof move.min !== 'number' || typeof move.max !== 'number' || move.taper === 'drawn') return null
  const row = parameter(move.parameter) as NumberParameter
  if (row.values) return null
  const atMax = positions[index] === 1
  const end = atMax ? 'max' : 'min'
  const ended = (value: number) => changeMove(set, index, at, { [end]: value })
  const sounds = (value: number) => setProblems(atPositions(ended(value), positions)).length === 0
  const valueAt = (part: number) => moveValue(move, atMax ? 1 - part : part) as number
  if (!sounds(valueAt(1))) return null
  let [bad, good] = [0, 1]
  for (let i = 0; i < HALVINGS; i++) {
    const middle = (bad + good) / 2
    if (sounds(valueAt(middle))) good = middle
    else bad = middle
  }
  const lost = Math.min(1, Math.ceil(good * GRID) / GRID)
  const value = row.kind === 'integer' ? valueAt(lost) : tidy(valueAt(lost), sounds)
  const label = `End ${knobName(set.panel[index] as ParameterSet['panel'][number], index)} at ${valueWords(move.parameter, value)}`
  return { lost, offer: { label, path: `panel[${index}].moves[${at}].${end}`, value } }
}

/** The value with as few digits as still sound. */
function tidy(value: number, sounds: (value: number) => boolean): number {
  for (const digits of [2, 3, 4]) {
    const short = Number(value.toPrecision(digits))
    if (sounds(short)) return short
  }
  return value
}
