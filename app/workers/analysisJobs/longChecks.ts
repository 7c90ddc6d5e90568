// The checks of a set that take rendering, and its panel's worst places: seconds, not milliseconds. Every one is handed over as soon as it is done.
// What judges a panel is given by panelChecks.ts: a set without one does not need its code.
import { labelOf } from '../../../src/checks/limits.ts'
import { noPanel } from '../../../src/checks/panelBoxScope.ts'
import { CHECKS, checkInput } from '../../../src/checks/registry.ts'
import { finished } from '../../../src/checks/steps.ts'
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

type LongChecksJob = (request: LongChecksRequest) => Generator<LongChecksProgress, LongChecksReply>

export const longChecksWith = (panelBox: (input: CheckInput) => Check | CheckSteps): LongChecksJob =>
  function* ({ set }) {
    const input = checkInput(set)
    const runs = [...RENDERED, { id: 'panel.box', run: panelBox } as const]
    const total = runs.length
    const checks: Check[] = []
    for (const { id, run } of runs) {
      const at = { label: labelOf(id), total, checks: [...checks] }
      yield { ...at, part: 0 }
      checks.push(yield* finished(run(input), (part) => ({ ...at, part })))
    }
    return { checks }
  }

/** For sets whose panel moves nothing: done in one step. */
export const noPanelJob = longChecksWith(({ set }) => noPanel(set))
