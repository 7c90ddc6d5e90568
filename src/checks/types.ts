// One judged statement about a set. What the page lists and the `check` command prints.
import type { ParameterSet } from '../set/types.ts'
import type { CheckId } from './limits.ts'

/** `holds` inside the limit, `near` within the margin, `fails` outside, `note` unusual but not wrong. */
export type Status = 'holds' | 'near' | 'fails' | 'note'
export type Verdict = 'holds' | 'near' | 'fails'

/** One line of working: the formula, the numbers put in, what came out, and where the formula is from. */
export interface WorkingStep {
  readonly formula: string
  readonly numbers: string
  readonly result: string
  readonly source: string
}

/** A change of one field that would raise the status: a button's label, the field's path in the set file, the value that reaches it. */
export interface Mend {
  readonly label: string
  readonly path: string
  readonly value: number | string | boolean | null
}

/** JSON-safe: a figure that does not exist is null, never NaN or infinite. */
export type CheckValue = number | string | boolean | null | readonly CheckValue[] | { readonly [key: string]: CheckValue }

export interface Check {
  readonly id: CheckId
  readonly status: Status
  readonly value: CheckValue
  readonly limit: number | string | null
  /** "dB", "s", "ms", "cents", "" … */
  readonly unit: string
  /** Sentence case, plain words: "Stability under the sweep". */
  readonly label: string
  /** One sentence with the figure in it. */
  readonly text: string
  readonly working: readonly WorkingStep[]
  readonly mend?: readonly Mend[]
}

/** What a check looks at. One object a run, so that checks which share a costly figure can key it on it. */
export interface CheckInput {
  readonly set: ParameterSet
  /** Hz: the rate judged at, the set's own unless `rate` says otherwise. */
  readonly sampleRate: number
}

export type CheckFunction = (input: CheckInput) => Check
