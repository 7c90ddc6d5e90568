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
  /** panel.box only: the worst place of each check it looked at, worst first. */
  readonly worst?: readonly PanelWorst[]
}

/** The worst place of one check over all knob positions. */
export interface PanelWorst {
  readonly id: CheckId
  readonly status: Status
  readonly value: CheckValue
  /** Parameter path to its value there, every parameter that the panel moves. */
  readonly at: { readonly [parameter: string]: number | string | boolean }
  /** Where each knob of the panel stands there, 0 to 1, in the panel's order. */
  readonly positions: readonly number[]
  /**
   * How it is known: corners of a monotone box, a bound over intervals, the worst of places tried (nothing is shown of those between), or, for what
   * must be rendered, the worst corners tried.
   */
  readonly by: 'corners' | 'intervals' | 'samples' | 'rendered corners'
  /** Where the worst place found need not be the worst there is: a figure that no position passes. */
  readonly bound?: CheckValue
  readonly text: string
}

/** What a check looks at. One object a run, so that checks which share a costly figure can key it on it. */
export interface CheckInput {
  readonly set: ParameterSet
  /** Hz: the rate judged at, the set's own unless `rate` says otherwise. */
  readonly sampleRate: number
  /** What loudness is measured on; the built-in plucked chords when absent. */
  readonly material?: CheckMaterial
}

export interface CheckMaterial {
  /** Named in the working. */
  readonly name: string
  /** Hz; resampled to the rate judged at. */
  readonly sampleRate: number
  readonly channels: readonly Float64Array[]
}

/** `closed`: from formulas, tens of milliseconds, followed while a gesture runs. `rendered`: from rendered samples, up to seconds. */
export type CheckKind = 'closed' | 'rendered'

/** What yields is the part done, 0 to 1: a long check gives way to messages, and may be dropped, between its steps. */
export type CheckSteps = Generator<number, Check>

export type CheckFunction = (input: CheckInput) => Check

/** What is judged, and how, without words: the `status` and `value` of the Check that the same input gives. */
export type Figure = Pick<Check, 'status' | 'value'>
export type FigureFunction = (input: CheckInput) => Figure

export interface CheckEntry {
  readonly id: CheckId
  readonly kind: CheckKind
  readonly run: CheckFunction | ((input: CheckInput) => CheckSteps)
}

/** How far a run is: `done` of `total` checks finished, `part` (0 to 1) of the one called `id`. */
export interface CheckProgress {
  readonly id: CheckId
  readonly done: number
  readonly total: number
  readonly part: number
}
