// The set as it is heard: the one shown, but for what still ramps towards it (a turned knob's smoothing).
import type { ParameterSet } from '../../src/set/types.ts'
import { currentSet, subscribeSet } from './current.ts'

type Ramped = (set: ParameterSet) => ParameterSet

let ramped: Ramped | null = null
const listeners = new Set<() => void>()

export const heardSet = (): ParameterSet => ramped?.(currentSet()) ?? currentSet()

/** What is heard of the set shown from now on, null for itself. Call it again whenever the ramp has moved. */
export function hear(next: Ramped | null): void {
  ramped = next
  for (const listener of listeners) listener()
}

/** Called whenever what is heard may have changed; returns the way to stop. */
export function subscribeHeard(listener: () => void): () => void {
  listeners.add(listener)
  const stop = subscribeSet(listener)
  return () => {
    listeners.delete(listener)
    stop()
  }
}
