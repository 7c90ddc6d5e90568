// The checks of a set that take rendering, and its panel's worst places: seconds, not milliseconds. Every one is handed over as soon as it is done.
import { labelOf } from '../../../src/checks/limits.ts'
import { panelBoxSteps } from '../../../src/checks/panelBox.ts'
import { CHECKS, checkInput } from '../../../src/checks/registry.ts'
import type { Check, CheckEntry, CheckInput, CheckSteps } from '../../../src/checks/types.ts'
import type { ParameterSet } from '../../../src/set/types.ts'

export interface LongChecksRequest {
  readonly set: ParameterSet
}

export interface LongChecksReply {
  readonly checks: readonly Check[]
}

/** The checks done so far, and how far the next one is, 0 to 1. */
export interface LongChecksProgress extends LongChecksReply {
  readonly label: string
  readonly total: number
  readonly part: number
}

const RENDERED: readonly CheckEntry[] = CHECKS.filter(({ kind }) => kind === 'rendered')

export function* longChecksJob({ set }: LongChecksRequest): Generator<LongChecksProgress, LongChecksReply> {
  const input = checkInput(set)
  const runs = [...RENDERED, { id: 'panel.box', run: panelBox } as const]
  const total = runs.length
  const checks: Check[] = []
  for (const { id, run } of runs) {
    const at = { label: labelOf(id), total, checks: [...checks] }
    yield { ...at, part: 0 }
    const steps = run(input) as CheckSteps
    let step = steps.next()
    for (; !step.done; step = steps.next()) yield { ...at, part: step.value }
    checks.push(step.value)
  }
  return { checks }
}

function* panelBox({ set }: CheckInput): CheckSteps {
  const steps = panelBoxSteps(set)
  let step = steps.next()
  for (; !step.done; step = steps.next()) yield (step.value.done + step.value.part) / step.value.total
  return step.value
}
