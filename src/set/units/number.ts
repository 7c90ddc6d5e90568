// Reading a typed number: real minus sign, decimal point or comma, thin or plain spaces between thousands, exponent.

/** A decimal as typed, kept as text so that a power of ten shifts it without rounding: "2.5" ms ×10⁻³. */
export interface Decimal {
  readonly digits: string
  readonly exponent: number
}

export type NumberReading = { readonly decimal: Decimal; readonly rest: string } | { readonly reason: string; readonly hint: string }

const GROUPED = '\\d{1,3}(?:[ \\u2009\\u202F\\u00A0]\\d{3})+'
const NUMBER = new RegExp(`^([+\\-−]?)\\s*((?:${GROUPED}|\\d+)?)(?:([.,])(\\d*))?(?:[eE]([+\\-−]?\\d+))?`)

/** The number a text starts with and what follows it, trimmed; null when it starts with none. */
export function readNumber(text: string): NumberReading | null {
  const match = NUMBER.exec(text)
  const [all, sign, whole = '', point, fraction = '', exponent = '0'] = match ?? []
  if (all === undefined || whole + fraction === '') return null
  const rest = text.slice(all.length).trim()
  if (/^[.,]?\d/.test(rest) || /^[.,]/.test(rest)) return { reason: 'has more than one decimal sign', hint: 'write 1234.5 or 1234,5' }
  if (point === ',' && /^[1-9]\d{0,2}$/.test(whole) && fraction.length === 3)
    return { reason: `could mean ${whole}.${fraction} or ${whole}${fraction}`, hint: `write ${whole}.${fraction} or ${whole}${fraction}` }
  const digits = `${sign === '-' || sign === '−' ? '-' : ''}${whole.replace(/\D/g, '') || '0'}.${fraction || '0'}`
  return { decimal: { digits, exponent: Number(exponent.replace('−', '-')) }, rest }
}

/** decimal · 10^shift · factor, rounded once where factor is 1. */
export function decimalValue({ digits, exponent }: Decimal, shift = 0, factor = 1): number {
  return Number(`${digits}e${exponent + shift}`) * factor
}
