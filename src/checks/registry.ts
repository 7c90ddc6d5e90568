// Which checks exist and in which order they run.
import type { ParameterSet } from '../set/types.ts'
import { LIMITS } from './limits.ts'
import { loopMargin } from './loopMargin.ts'
import { loopPoles } from './loopPoles.ts'
import { loopRing } from './loopRing.ts'
import { loopStability } from './loopStability.ts'
import { responseExtremes } from './responseExtremes.ts'
import { sweepDetune } from './sweepDetune.ts'
import { sweepFusion } from './sweepFusion.ts'
import { sweepRange } from './sweepRange.ts'
import type { Check, CheckFunction, CheckInput, Verdict } from './types.ts'

const CHECKS: readonly CheckFunction[] = [
  loopStability,
  loopMargin,
  loopPoles,
  loopRing,
  responseExtremes,
  sweepRange,
  sweepDetune,
  sweepFusion,
]

/** All checks of a valid set, in the table's order. sampleRate in Hz, 8000 to 192000; the set's own when absent. */
export function runChecks(set: ParameterSet, options: { readonly sampleRate?: number } = {}): Check[] {
  const input: CheckInput = { set, sampleRate: options.sampleRate ?? set.sampleRate }
  if (!(input.sampleRate >= 8000 && input.sampleRate <= 192000))
    throw new RangeError(`sampleRate must be 8000 to 192000 Hz, got ${input.sampleRate}`)
  const order = new Map<string, number>(LIMITS.map((row, i) => [row.id, i]))
  return CHECKS.map((check) => check(input)).sort((a, b) => (order.get(a.id) ?? 0) - (order.get(b.id) ?? 0))
}

/** The worst status of all checks; a note weighs nothing. */
export function verdictOf(checks: readonly Pick<Check, 'status'>[]): Verdict {
  if (checks.some((c) => c.status === 'fails')) return 'fails'
  return checks.some((c) => c.status === 'near') ? 'near' : 'holds'
}
