// The table that twins and C read in place of a shaper's exact curve. It is a table of shaper(x) over x itself, drive and ceiling
// included: one look-up does the whole shaper, and a range of 1 covers full scale whatever the drive.
import type { Shaper } from '../set/types.ts'
import { CHUNK } from './line.ts'
import { applyShaper } from './shaper.ts'

export interface ShaperTable {
  /** The table runs over −range … +range of x. */
  readonly range: number
  /** Width of an interval of x, 2 · range/intervals. */
  readonly step: number
  /** shaper(x) at x = −range + i · step, i = 0 … intervals. */
  readonly values: Float64Array
}

/** x of point i. The middle point of an even table is exactly 0, and points mirror exactly. */
export const tablePoint = ({ range, values }: ShaperTable, i: number): number =>
  (range * (2 * i - (values.length - 1))) / (values.length - 1)

/**
 * tableSize + 1 exact values in double precision. 0 is exactly 0: a point of an even table; in an odd one the two points beside it are made
 * opposite (half their difference), which is their own value wherever the shaper's halves are alike. The twins round these to their format.
 */
export function shaperTable(p: Shaper): ShaperTable {
  const { tableSize, tableRange } = p
  const values = new Float64Array(tableSize + 1)
  const table = { range: tableRange, step: (2 * tableRange) / tableSize, values }
  for (let i = 0; i <= tableSize; i++) values[i] = tablePoint(table, i)
  for (let at = 0; at <= tableSize; at += CHUNK) applyShaper(p, values, at, Math.min(CHUNK, tableSize + 1 - at))
  if (tableSize % 2 === 0) values[tableSize / 2] = 0
  else {
    const below = (tableSize - 1) / 2
    const half = (values[below + 1]! - values[below]!) / 2
    values[below] = -half
    values[below + 1] = half
  }
  return table
}

/** The table at x: linear between its points, its ends held beyond them. */
export function readShaperTable(table: ShaperTable, x: number): number {
  const { range, values } = table
  const intervals = values.length - 1
  if (!(x > -range)) return values[0]!
  if (x >= range) return values[intervals]!
  const place = ((x / range + 1) * intervals) / 2
  const i = Math.min(intervals - 1, Math.floor(place))
  return values[i]! + (values[i + 1]! - values[i]!) * (place - i)
}
