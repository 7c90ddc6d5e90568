// A check's figure and limit as they stand in its row.
import type { Check, CheckValue } from '../../../../src/checks/types.ts'
import { formatQuantity } from '../../../../src/set/units.ts'

/** "4.2 dB", "proven", "1 – 6 ms"; empty where the value is a list to be read in the working. */
export function checkFigure({ value, unit }: Pick<Check, 'value' | 'unit'>): string {
  if (value === null) return 'none'
  if (typeof value === 'number') return withUnit(value, unit)
  if (typeof value === 'string') return value
  if (typeof value === 'boolean') return value ? 'yes' : 'no'
  return spanOf(value, unit)
}

/** "limit 3 s"; empty where nothing is judged. */
export function checkLimit({ limit, unit }: Pick<Check, 'limit' | 'unit'>): string {
  if (limit === null) return ''
  return `limit ${typeof limit === 'number' ? withUnit(limit, unit) : limit}`
}

function withUnit(value: number, unit: string): string {
  const { number } = formatQuantity(value, unit)
  return unit === '' ? number : `${number} ${unit}`
}

/** A value with a smallest and a largest figure reads as their span. */
function spanOf(value: Exclude<CheckValue, number | string | boolean | null>, unit: string): string {
  const numbers = Object.values(value).filter((part) => typeof part === 'number')
  if (Array.isArray(value) || numbers.length !== 2) return ''
  const [low, high] = numbers as [number, number]
  return `${formatQuantity(low, unit).number} – ${withUnit(high, unit)}`
}
