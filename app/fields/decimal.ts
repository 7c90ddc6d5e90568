/** A plain decimal number with either minus sign, or null. */
export function decimalOf(text: string): number | null {
  const plain = text.replace('−', '-')
  return /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(plain) ? Number(plain) : null
}
