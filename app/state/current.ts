// The set that sounds and shows: the draft while a gesture runs, else the committed one.
import { create } from 'zustand'
import type { ParameterSet } from '../../src/set/types.ts'
import { committedSet, useDocument } from './document.ts'
import { useDraft } from './draft.ts'

interface CurrentState {
  readonly set: ParameterSet
  /** True while a gesture runs: equal loudness and slow checks wait for its end. */
  readonly inGesture: boolean
}

const read = (): CurrentState => {
  const { set } = useDraft.getState()
  return { set: set ?? committedSet(), inGesture: set !== null }
}

export const useCurrent = create<CurrentState>()(read)

function follow() {
  const next = read()
  const now = useCurrent.getState()
  if (next.set !== now.set || next.inGesture !== now.inGesture) useCurrent.setState(next)
}
useDocument.subscribe(follow)
useDraft.subscribe(follow)

export const currentSet = (): ParameterSet => useCurrent.getState().set

/** Called with the set whenever it changes; returns the way to stop. */
export function subscribeSet(listener: (set: ParameterSet) => void): () => void {
  return useCurrent.subscribe((now, before) => {
    if (now.set !== before.set) listener(now.set)
  })
}
