// The reading line above a plot while the sound moves it: renewed ten times a second, which is as fast as numbers are read.
import { onFrame } from '../state/frames.ts'

const EVERY_MS = 100

export interface ReadingLine {
  /** What the line says may have changed. */
  changed(): void
  stop(): void
}

/** Calls `write` soon after a change, not more often than ten times a second. */
export function readingLine(write: () => void): ReadingLine {
  let due = true
  let lastMs = Number.NEGATIVE_INFINITY
  const stop = onFrame((timeMs) => {
    if (!due || timeMs - lastMs < EVERY_MS) return
    due = false
    lastMs = timeMs
    write()
  })
  return {
    changed() {
      due = true
    },
    stop,
  }
}
