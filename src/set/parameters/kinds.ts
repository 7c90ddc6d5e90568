// The four kinds of parameter and what the table says about each.

interface Common {
  /** Path in the set file: "sweep.rateHz". */
  readonly path: string
  readonly label: string
  /** One sentence: what it does to the sound or the part. */
  readonly help: string
  /** Name in generated C, snake case. */
  readonly cName: string
}

export interface NumberParameter extends Common {
  readonly kind: 'number' | 'integer'
  /** "ms", "Hz", "dB", "°", "octaves", "B", "" … */
  readonly unit: string
  readonly min: number
  readonly max: number
  readonly default: number | null
  /** null in the file means "off" (filters) or "not measured". */
  readonly nullable?: boolean
  /** How a field's track and arrow keys move: equal ratios or equal differences. */
  readonly taper: 'linear' | 'log'
  /** The only values accepted, when not every integer in range is. */
  readonly values?: readonly number[]
  /** Values inside the range that are not accepted. */
  readonly except?: readonly number[]
  /** Where a log track starts when min is 0 or the useful part starts above min. */
  readonly trackMin?: number
  readonly trackMax?: number
}

export interface ChoiceParameter extends Common {
  readonly kind: 'choice'
  readonly options: readonly { readonly value: string; readonly label: string }[]
  readonly default: string | null
  /** Only a shaper's curve: null means the whole shaper is absent. */
  readonly nullable?: boolean
}

export interface BooleanParameter extends Common {
  readonly kind: 'boolean'
  readonly default: boolean
}

export interface TextParameter extends Common {
  readonly kind: 'text'
  readonly maxLength: number
  readonly default: string
}

export type Parameter = NumberParameter | ChoiceParameter | BooleanParameter | TextParameter
