// When what is drawn has been of an older set for a while, it pales until the new figures are there.
import type { ParameterSet } from '../../src/set/types.ts'
import { currentSet, subscribeSet } from '../state/current.ts'
import { onFrame } from '../state/frames.ts'

/** Shorter delays would make every gesture flicker. */
const AFTER_MS = 300

/** What a plot says before its first figures, and its legend while older ones stand. */
export const COMPUTED = 'being computed'
export const RENEWED = ` (${COMPUTED})`

export interface Staleness {
  isStale(): boolean
  /** Figures of this set are drawn from now on. */
  shows(set: ParameterSet): void
  stop(): void
}

/** Calls `onPale` when what is shown has become stale. */
export function staleness(onPale: () => void): Staleness {
  let shown: ParameterSet | null = null
  let changedMs = 0
  let stale = false
  const stopSet = subscribeSet(() => {
    changedMs = performance.now()
  })
  const stopFrames = onFrame((timeMs) => {
    if (stale || shown === null || shown === currentSet() || timeMs - changedMs < AFTER_MS) return
    stale = true
    onPale()
  })
  return {
    isStale: () => stale,
    shows(set) {
      shown = set
      stale = false
    },
    stop() {
      stopSet()
      stopFrames()
    },
  }
}
