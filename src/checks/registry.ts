// Which checks exist, what each costs, and how they are run.
import type { ParameterSet } from '../set/types.ts'
import { CLOSED_CHECKS } from './closedChecks.ts'
import { type CheckOptions, checkInput } from './input.ts'
import { levelDc } from './levelDc.ts'
import { levelLoudness } from './levelLoudness.ts'
import { LIMITS } from './limits.ts'
import { finished } from './steps.ts'
import { sweepSteps } from './sweepSteps.ts'
import type { Check, CheckEntry, CheckProgress, Verdict } from './types.ts'

export { type CheckOptions, checkInput } from './input.ts'

const RENDERED: readonly CheckEntry[] = [
  { id: 'sweep.steps', kind: 'rendered', run: sweepSteps },
  { id: 'level.dc', kind: 'rendered', run: levelDc },
  { id: 'level.loudness', kind: 'rendered', run: levelLoudness },
]

const row = new Map<string, number>(LIMITS.map(({ id }, i) => [id, i]))

/** Every check of one set at one place of its knobs, in the order of the table of limits. panel.box stands beside them: it runs these at other places. */
export const CHECKS: readonly CheckEntry[] = [...CLOSED_CHECKS, ...RENDERED].sort((a, b) => (row.get(a.id) ?? 0) - (row.get(b.id) ?? 0))

/** Runs the checks of a valid set step by step, yielding how far they are; returns them in the table's order. Throws RangeError for a rate out of range. */
export function* checkSteps(set: ParameterSet, options: CheckOptions = {}): Generator<CheckProgress, Check[]> {
  const input = checkInput(set, options)
  const entries = CHECKS.filter(({ kind }) => options.kinds?.includes(kind) ?? true)
  const checks: Check[] = []
  for (const { id, run } of entries) {
    const at = { id, done: checks.length, total: entries.length }
    yield { ...at, part: 0 }
    checks.push(yield* finished(run(input), (part) => ({ ...at, part })))
  }
  return checks
}

/** All checks at once. */
export function runChecks(set: ParameterSet, options: CheckOptions = {}): Check[] {
  const steps = checkSteps(set, options)
  let step = steps.next()
  while (!step.done) step = steps.next()
  return step.value
}

/** The worst status of all checks; a note weighs nothing. */
export function verdictOf(checks: readonly Pick<Check, 'status'>[]): Verdict {
  if (checks.some((c) => c.status === 'fails')) return 'fails'
  return checks.some((c) => c.status === 'near') ? 'near' : 'holds'
}
