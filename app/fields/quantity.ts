// Values as fields show and speak them, and texts as fields read them.
import type { NumberParameter } from '../../src/set/parameters.ts'
import { formatQuantity } from '../../src/set/units.ts'

/** What a number field needs to know: a row of the parameter table, or something that looks like one. */
export type NumberSpec = Pick<
  NumberParameter,
  'kind' | 'label' | 'help' | 'unit' | 'min' | 'max' | 'nullable' | 'taper' | 'values' | 'trackMin' | 'trackMax'
>

/** Below this size a value of the unit shows at least so many decimals, so that its digits do not come and go while it moves. */
const TWO = { below: 10, decimals: 2 }
const PADDED: Readonly<Record<string, { readonly below: number; readonly decimals: number }>> = {
  ms: { below: 100, decimals: 2 },
  dB: { below: 100, decimals: 2 },
  cents: { below: 1000, decimals: 1 },
  Hz: TWO,
  s: TWO,
  octaves: TWO,
  '': TWO,
}

/** "3.50", "−6.00", "6 500", "12 000": four significant digits at most, thin spaces, a real minus sign. */
export function showNumber(value: number, { kind, unit }: Pick<NumberSpec, 'kind' | 'unit'>): string {
  const { number } = formatQuantity(value, unit)
  const padded = PADDED[unit]
  if (kind === 'integer' || !padded || Math.abs(value) >= padded.below || number.includes('e')) return number
  const decimals = number.split('.')[1]?.length ?? 0
  if (decimals >= padded.decimals) return number
  return `${decimals === 0 ? `${number}.` : number}${'0'.repeat(padded.decimals - decimals)}`
}

const SPACED = new Set(['°'])

/** Number and unit together: "3.50 ms", "90°", "0.62". */
export function showQuantity(value: number, spec: Pick<NumberSpec, 'kind' | 'unit'>): string {
  const number = showNumber(value, spec)
  if (spec.unit === '') return number
  return SPACED.has(spec.unit) ? `${number}${spec.unit}` : `${number}\u00a0${spec.unit}`
}

/** "3.50 ms" of a value that is no field. */
export const showIn = (value: number, unit: string): string => showQuantity(value, { kind: 'number', unit })

const SPOKEN: Readonly<Record<string, string>> = {
  ms: 'milliseconds',
  s: 'seconds',
  Hz: 'hertz',
  dB: 'decibels',
  '°': 'degrees',
  B: 'bytes',
}

/** What a screen reader says: "3.5 milliseconds", "off". */
export function speakQuantity(value: number | null, { unit }: Pick<NumberSpec, 'unit'>): string {
  if (value === null) return 'off'
  const number = formatQuantity(value, unit).number
  return unit === '' ? number : `${number} ${SPOKEN[unit] ?? unit}`
}
