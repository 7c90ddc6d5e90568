// Checks that take long, drained on the command line with a bar on a terminal.
import type { CheckProgress } from '../checks/types.ts'
import { startProgress } from './progress.ts'

/** Fineness of the bar. */
const PARTS = 1000

/** Runs steps to their end, showing under `label` how far they are. */
export function runSteps<T>(label: string, steps: Generator<CheckProgress, T>): T {
  const progress = startProgress(label, PARTS)
  try {
    let step = steps.next()
    for (; !step.done; step = steps.next()) {
      const { done, part, total } = step.value
      progress.update(Math.floor(((done + part) / total) * PARTS))
    }
    return step.value
  } finally {
    progress.stop()
  }
}
