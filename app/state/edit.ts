// Changing one field of the set: what a typed value would need besides, and how far a gesture may go.
// What sounds and is kept stays valid all the way: nothing here puts an invalid set into draft or document.
import { followField } from '../../src/set/panelSettle.ts'
import { parameter } from '../../src/set/parameters.ts'
import { getAt } from '../../src/set/path.ts'
import type { Problem } from '../../src/set/result.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { setProblems } from '../../src/set/validity.ts'
import { valueProblem } from '../../src/set/valueProblem.ts'
import { replaceField } from './companions.ts'
import { commit, committedSet } from './document.ts'
import { endGesture, tryOut, useDraft } from './draft.ts'
import { type Offer, offersFor } from './offers.ts'

export type Proposal =
  | { readonly ok: true; readonly set: ParameterSet }
  | { readonly ok: false; readonly problems: readonly Problem[]; readonly offers: readonly Offer[] }

/** What would come of replacing one field, its knob turned along with it where that moves nothing else; nothing is changed. A value that needs a second change comes back with offers. */
export function propose(path: string, value: unknown, from: ParameterSet = committedSet()): Proposal {
  const own = valueProblem(parameter(path), value)
  if (own) return { ok: false, problems: [own], offers: [] }
  return judge(followField(replaceField(from, path, value), path), path)
}

/** The same for a whole set that a field reached on its own way (first notch, drawn points). */
export function judge(set: ParameterSet, path: string): Proposal {
  const problems = setProblems(set)
  if (problems.length === 0) return { ok: true, set }
  return { ok: false, problems, offers: offersFor(set, path, problems) }
}

/** Name of the step for the history: "Base delay", "Loop shaper, drive". */
export function stepName(path: string): string {
  const { label } = parameter(path)
  const owner = /^(.*\.shaper)\.(?!curve$)/.exec(path)?.[1]
  return owner ? `${parameter(`${owner}.curve`).label}, ${label.toLowerCase()}` : label
}

/** One field replaced as one step of history, if what comes of it is valid. */
export function commitField(path: string, value: unknown): Proposal {
  endGesture()
  const proposal = propose(path, value)
  if (proposal.ok && !same(getAt(committedSet(), path), value)) commit(stepName(path), proposal.set)
  return proposal
}

export function commitOffer(path: string, offer: Offer): void {
  endGesture()
  commit(
    stepName(path),
    offer.changes.reduce((set, change) => followField(set, change.path), offer.set),
  )
}

/** Tries a value within a gesture. Where it would become invalid the field is held at the last value that is not; true when it was held. */
export function tryField(path: string, value: unknown): boolean {
  const gesture = stepName(path)
  if (useDraft.getState().gesture !== gesture) endGesture()
  const from = committedSet()
  const proposal = propose(path, value, from)
  if (proposal.ok) {
    tryOut(gesture, proposal.set)
    return false
  }
  const good = getAt(useDraft.getState().set ?? from, path)
  if (typeof good === 'number' && typeof value === 'number') {
    const held = propose(path, lastValid(path, good, value, from), from)
    if (held.ok) tryOut(gesture, held.set)
  }
  return true
}

/** Between a valid and an invalid value, the valid one nearest to the invalid, rounded towards the valid one to a millionth of their distance. */
function lastValid(path: string, valid: number, invalid: number, from: ParameterSet): number {
  let good = valid
  let bad = invalid
  for (let i = 0; i < 20; i++) {
    const middle = (good + bad) / 2
    if (propose(path, middle, from).ok) good = middle
    else bad = middle
  }
  return roundTowards(good, valid, invalid)
}

/** `good` with as few decimals as keep it within a two-hundredth of the way on the valid side. */
function roundTowards(good: number, valid: number, invalid: number): number {
  const span = Math.abs(invalid - valid)
  const down = invalid < valid
  for (let decimals = 0; decimals <= 9; decimals++) {
    const unit = 10 ** decimals
    const rounded = (down ? Math.ceil(good * unit) : Math.floor(good * unit)) / unit
    if (Math.abs(rounded - good) <= span / 200) return down ? Math.min(rounded, valid) : Math.max(rounded, valid)
  }
  return good
}

const same = (a: unknown, b: unknown) => a === b || JSON.stringify(a) === JSON.stringify(b)
