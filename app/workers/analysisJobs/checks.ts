// The checks of a set that follow from formulas: quick enough to follow a gesture.
import type { CheckId } from '../../../src/checks/limits.ts'
import { CHECKS, runChecks } from '../../../src/checks/registry.ts'
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

const SLOW: readonly CheckId[] = [...CHECKS.filter(({ kind }) => kind === 'rendered').map(({ id }) => id), 'panel.box']

export const checksJob = ({ set }: ChecksRequest): ChecksReply => ({ checks: runChecks(set, { kinds: ['closed'] }), slow: SLOW })
