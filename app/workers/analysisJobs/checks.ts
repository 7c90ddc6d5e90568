// The checks of a set that follow from formulas: quick enough to follow a gesture.
import { CLOSED_CHECKS } from '../../../src/checks/closedChecks.ts'
import { checkInput } from '../../../src/checks/input.ts'
import type { CheckId } from '../../../src/checks/limits.ts'
import type { Check } from '../../../src/checks/types.ts'
import type { ParameterSet } from '../../../src/set/types.ts'

export interface ChecksRequest {
  readonly set: ParameterSet
}

export interface ChecksReply {
  readonly checks: readonly Check[]
  /** The others, which take longer. */
  readonly slow: readonly CheckId[]
}

/** By name: their code comes later than this. */
const SLOW: readonly CheckId[] = ['sweep.steps', 'level.dc', 'level.loudness', 'panel.box']

export function checksJob({ set }: ChecksRequest): ChecksReply {
  const input = checkInput(set)
  return { checks: CLOSED_CHECKS.map(({ run }) => run(input)), slow: SLOW }
}
