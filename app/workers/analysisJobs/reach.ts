// What the response reaches over the whole sweep, as a plot shades it.
import type { ParameterSet } from '../../../src/set/types.ts'
import type { Columns } from '../../plots/columns.ts'

export interface ReachRequest {
  readonly set: ParameterSet
  readonly columns: Columns
}

/** Smallest and largest dB in each pixel column, over the sweep and all channels. */
export interface Reach {
  readonly columns: Columns
  readonly low: Float64Array
  readonly high: Float64Array
}

export function reachJob({ columns }: ReachRequest): Reach {
  return { columns, low: new Float64Array(columns.count), high: new Float64Array(columns.count) }
}
