// All checks of a set.
import { runChecks, verdictOf } from '../../../src/checks/registry.ts'
import type { Check, Verdict } from '../../../src/checks/types.ts'
import type { ParameterSet } from '../../../src/set/types.ts'

export interface ChecksRequest {
  readonly set: ParameterSet
}

export interface ChecksReply {
  readonly checks: readonly Check[]
  readonly verdict: Verdict
}

export function checksJob({ set }: ChecksRequest): ChecksReply {
  const checks = runChecks(set)
  return { checks, verdict: verdictOf(checks) }
}
