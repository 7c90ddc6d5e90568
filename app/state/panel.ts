// Playing and editing the panel. A turn is a gesture: heard at once, one step of history named for the knob when it ends. Nothing here puts an
// invalid set into draft or document: a knob turned through a place that cannot sound is held before it.
import { steppedPosition, turnKnob } from '../../src/set/panel.ts'
import { KNOB_NAME, KNOB_POSITION, KNOB_SMOOTH, KNOB_STEPS } from '../../src/set/parameters/panel.ts'
import type { Problem } from '../../src/set/result.ts'
import type { Knob, ParameterSet } from '../../src/set/types.ts'
import { setProblems } from '../../src/set/validity.ts'
import { valueProblem } from '../../src/set/valueProblem.ts'
import { commit, committedSet } from './document.ts'
import { endGesture, tryOut, useDraft } from './draft.ts'
import { rampTurn } from './panelRamp.ts'

/** What a knob is called in the history, in messages and when it is spoken. */
export const knobName = ({ knob }: Pick<Knob, 'knob'>, index: number): string => (knob.trim() === '' ? `Knob ${index + 1}` : knob)

/** Problems of a set whose panel was edited: the knobs' own fields, then those between fields. */
export function panelEditProblems(set: ParameterSet): readonly Problem[] {
  const own = set.panel.flatMap((knob, index) =>
    [KNOB_NAME, KNOB_POSITION, KNOB_STEPS, KNOB_SMOOTH].map((row) =>
      valueProblem(row, knob[row.path as keyof Knob], `panel[${index}].${row.path}`),
    ),
  )
  const found = own.filter((problem) => problem !== null)
  return found.length > 0 ? found : setProblems(set)
}

/** An edit of the panel as one named step, when what comes of it is valid; else its problems. */
export function commitPanel(name: string, edit: (set: ParameterSet) => ParameterSet): readonly Problem[] {
  endGesture()
  const next = edit(committedSet())
  const problems = panelEditProblems(next)
  if (problems.length === 0 && JSON.stringify(next) !== JSON.stringify(committedSet())) commit(name, next)
  return problems
}

/** Tries an edit within a gesture; where it would not be valid what was tried last stands, and its problems come back. */
export function tryPanel(name: string, edit: (set: ParameterSet) => ParameterSet): readonly Problem[] {
  if (useDraft.getState().gesture !== name) endGesture()
  const next = edit(committedSet())
  const problems = panelEditProblems(next)
  if (problems.length === 0) tryOut(name, next)
  return problems
}

let turning = -1

/** Turns a knob within a gesture, to the nearest step it has. Problems of the place it was held before; empty when it was not held. */
export function tryTurn(index: number, position: number): readonly Problem[] {
  const name = knobName(knobAt(index), index)
  if (turning !== index || useDraft.getState().gesture !== name) endGesture()
  turning = index
  const from = committedSet()
  const before = (useDraft.getState().set ?? from).panel[index]?.position ?? position
  const wanted = steppedPosition(knobAt(index), position)
  const problems = setProblems(turnKnob(from, index, wanted))
  const reached = problems.length === 0 ? wanted : lastGood(from, index, before, wanted)
  if (reached !== null) {
    rampTurn(index, before)
    tryOut(name, turnKnob(from, index, reached))
  }
  return problems
}

/** The place nearest to `bad`, on the way to it from `good`, that can sound; null when `good` cannot either. */
function lastGood(set: ParameterSet, index: number, good: number, bad: number): number | null {
  const sounds = (position: number) => setProblems(turnKnob(set, index, position)).length === 0
  if (!sounds(good)) return null
  const { steps } = set.panel[index] as Knob
  const halvings = steps < 2 ? 20 : Math.ceil(Math.log2(steps)) + 1
  let reached = good
  let beyond = bad
  for (let i = 0; i < halvings; i++) {
    const middle = steppedPosition({ steps }, (reached + beyond) / 2)
    if (sounds(middle)) reached = middle
    else beyond = middle
  }
  return reached
}

/** A knob turned to a typed position as one step. */
export function commitTurn(index: number, position: number): readonly Problem[] {
  const name = knobName(knobAt(index), index)
  return commitPanel(name, (set) => turnKnob(set, index, steppedPosition(knobAt(index), position)))
}

/** Every knob put where it stands in `positions`, as one step; problems when that place cannot sound. */
export function goToPositions(name: string, positions: readonly number[]): readonly Problem[] {
  return commitPanel(name, (set) => atPositions(set, positions))
}

/** The set with every knob at its place of `positions`; those without one stay. */
export function atPositions(set: ParameterSet, positions: readonly number[]): ParameterSet {
  return set.panel.reduce((turned, { position }, index) => turnKnob(turned, index, positions[index] ?? position), set)
}

function knobAt(index: number): Knob {
  const knob = committedSet().panel[index]
  if (!knob) throw new RangeError(`knob must be 0 to ${committedSet().panel.length - 1}, got ${index}`)
  return knob
}
