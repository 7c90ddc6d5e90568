// A drawn point in words: its numbers under their names, and what they mean.
import type { PointRule } from '../../../src/set/drawnPoints.ts'
import type { Point } from '../../../src/set/types.ts'
import { formatQuantity } from '../../../src/set/units.ts'

/** "phase 0.25 · s −0.5 · 4.75 ms" */
export function pointWords(point: Point, { xName, yName }: Pick<PointRule, 'xName' | 'yName'>, meaning?: (point: Point) => string): string {
  const means = meaning?.(point) ?? ''
  return `${xName} ${short(point[0])} · ${yName} ${short(point[1])}${means === '' ? '' : ` · ${means}`}`
}

/** Three decimals at most. */
export const short = (value: number): string => formatQuantity(Number(value.toFixed(3)), '').number
