// How the loop's figures are written.
import { formatQuantity } from '../set/units.ts'

/** Less of a level than anyone hears, measures or computes. */
const NOTHING_DB = 1e-4

/** "14.5 ms", "0.97": four significant digits. */
export function quantity(value: number, unit = ''): string {
  const { number } = formatQuantity(unit === 'dB' && Math.abs(value) < NOTHING_DB ? 0 : value, unit)
  return unit === '' ? number : `${number} ${unit}`
}

/** A gain or radius with enough digits to tell it from 1: "0.999983", "1.0004"; four significant ones otherwise. */
export function nearOne(value: number): string {
  const away = Math.abs(value - 1)
  if (away === 0 || away >= 0.01) return quantity(value)
  const decimals = Math.min(15, 3 - Math.floor(Math.log10(away)))
  // Towards the side of 1 the value is on: rounding must not turn "below 1" into "1".
  return value.toFixed(decimals).replace(/0+$/, '')
}

/** Delays in samples as "14.5 ms", two of them as "14.5 and 12.1 ms". */
export function delaysText(delaysSamples: readonly number[], sampleRate: number): string {
  const texts = delaysSamples.map((samples) => formatQuantity((samples * 1000) / sampleRate, 'ms').number)
  return `${[...new Set(texts)].join(' and ')} ms`
}

/** "1 cycle", "1 763 samples". */
export const counted = (count: number, noun: string): string => `${quantity(count)} ${noun}${count === 1 ? '' : 's'}`

/** −20 log10 of a gain, dB; null for 0. */
export const marginDb = (gain: number): number | null => (gain > 0 ? -20 * Math.log10(gain) : null)
