// The same set judged at other sample rates: first, everywhere, what follows from formulas; then what takes rendering, rate by rate.
import { CHECKS, checkInput } from '../../../src/checks/registry.ts'
import { finished } from '../../../src/checks/steps.ts'
import type { Check, CheckEntry, CheckInput, CheckKind } from '../../../src/checks/types.ts'
import type { ParameterSet } from '../../../src/set/types.ts'

export interface RatesRequest {
  readonly set: ParameterSet
  /** Hz. */
  readonly rates: readonly number[]
}

/** A check at one rate, without its words. */
export type RatedCheck = Pick<Check, 'id' | 'label' | 'status' | 'value' | 'limit' | 'unit'>

export interface Rated {
  readonly rate: number
  /** In the table's order; those still to come are missing, and so are those that this rate makes impossible. */
  readonly checks: readonly RatedCheck[]
}

export interface RatesReply {
  readonly rated: readonly Rated[]
}

export interface RatesProgress extends RatesReply {
  /** The rate being worked on, Hz. */
  readonly rate: number
  /** Of everything, 0 to 1. */
  readonly part: number
}

/** The formulas' part of the whole, about. */
const CLOSED_PART = 0.1

export function* ratesJob({ set, rates }: RatesRequest): Generator<RatesProgress, RatesReply> {
  const inputs = rates.map((sampleRate) => checkInput(set, { sampleRate }))
  let rated: readonly Rated[] = rates.map((rate) => ({ rate, checks: [] }))
  const passes: readonly { readonly kind: CheckKind; readonly from: number; readonly to: number }[] = [
    { kind: 'closed', from: 0, to: CLOSED_PART },
    { kind: 'rendered', from: CLOSED_PART, to: 1 },
  ]
  for (const { kind, from, to } of passes) {
    const entries = CHECKS.filter((entry) => entry.kind === kind)
    const steps = entries.length * inputs.length
    let done = 0
    for (const [i, input] of inputs.entries()) {
      const rate = input.sampleRate
      for (const entry of entries) {
        const at = (part: number): RatesProgress => ({ rated, rate, part: from + ((to - from) * (done + part)) / steps })
        yield at(0)
        const check = yield* attempt(entry, input, at)
        if (check) rated = rated.with(i, { rate, checks: [...(rated[i] as Rated).checks, withoutWords(check)] })
        done += 1
      }
    }
  }
  return { rated: rated.map(({ rate, checks }) => ({ rate, checks: inTableOrder(checks) })) }
}

/** null where the set cannot run at this rate: it would read ahead of what is written. */
function* attempt({ run }: CheckEntry, input: CheckInput, at: (part: number) => RatesProgress): Generator<RatesProgress, Check | null> {
  try {
    return yield* finished(run(input), at)
  } catch (error) {
    if (error instanceof RangeError) return null
    throw error
  }
}

const withoutWords = ({ id, label, status, value, limit, unit }: Check): RatedCheck => ({ id, label, status, value, limit, unit })

const ROW = new Map(CHECKS.map(({ id }, i) => [id, i]))
const inTableOrder = (checks: readonly RatedCheck[]) => [...checks].sort((a, b) => (ROW.get(a.id) ?? 0) - (ROW.get(b.id) ?? 0))
