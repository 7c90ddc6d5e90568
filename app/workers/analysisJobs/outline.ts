// A smooth outline around levels that jump from column to column.

/** Columns either side that an outline looks at: five together, wider than a tooth of four pixels. */
const WIDEN = 2

/**
 * The least (pick: Math.min) or most of each value and its neighbours, then the mean of those around it. Each of them counts the
 * value itself, so that the outline never cuts it off.
 */
export function outline(values: Float64Array, pick: (...values: number[]) => number, widen = WIDEN): Float64Array {
  const around = (of: Float64Array, i: number) => of.subarray(Math.max(0, i - widen), i + widen + 1)
  const wide = Float64Array.from(values, (_, i) => pick(...around(values, i)))
  return Float64Array.from(wide, (_, i) => around(wide, i).reduce((sum, value) => sum + value, 0) / around(wide, i).length)
}
