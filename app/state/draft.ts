// What a gesture (scrub, drag, held key, knob turn) is trying. It sounds and shows at once but is no history;
// the end of the gesture commits one named step, Escape drops it.
import { create } from 'zustand'
import type { ParameterSet } from '../../src/set/types.ts'
import { commit, committedSet } from './document.ts'

export interface DraftState {
  readonly set: ParameterSet | null
  readonly gesture: string | null
}

export const useDraft = create<DraftState>()(() => ({ set: null, gesture: null }))

/** Tries `set` within a gesture named for the history ("Base delay"); starts the gesture when none runs. */
export function tryOut(gesture: string, set: ParameterSet): void {
  useDraft.setState({ set, gesture: useDraft.getState().gesture ?? gesture })
}

/** Ends the gesture and commits what it tried, if it differs. */
export function endGesture(): void {
  const { set, gesture } = useDraft.getState()
  if (set === null) return
  useDraft.setState({ set: null, gesture: null })
  if (JSON.stringify(set) !== JSON.stringify(committedSet())) commit(gesture ?? 'Change', set)
}

export function dropGesture(): void {
  if (useDraft.getState().set !== null) useDraft.setState({ set: null, gesture: null })
}
