// The checks of a set that take rendering: seconds, not milliseconds. Every one is handed over as soon as it is done.
import { labelOf } from '../../../src/checks/limits.ts'
import { CHECKS, checkInput } from '../../../src/checks/registry.ts'
import type { Check, CheckEntry, CheckProgress, CheckSteps } from '../../../src/checks/types.ts'
import type { ParameterSet } from '../../../src/set/types.ts'

export interface LongChecksRequest {
  readonly set: ParameterSet
}

export interface LongChecksProgress extends CheckProgress {
  readonly label: string
  /** Those done so far. */
  readonly checks: readonly Check[]
}

export interface LongChecksReply {
  readonly checks: readonly Check[]
}

const RENDERED: readonly CheckEntry[] = CHECKS.filter(({ kind }) => kind === 'rendered')

export function* longChecksJob({ set }: LongChecksRequest): Generator<LongChecksProgress, LongChecksReply> {
  const input = checkInput(set)
  const total = RENDERED.length
  const checks: Check[] = []
  for (const { id, run } of RENDERED) {
    const at = { id, label: labelOf(id), done: checks.length, total, checks: [...checks] }
    yield { ...at, part: 0 }
    const steps = run(input) as CheckSteps
    let step = steps.next()
    for (; !step.done; step = steps.next()) yield { ...at, part: step.value }
    checks.push(step.value)
  }
  return { checks }
}
