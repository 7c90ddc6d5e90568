// Numbers and frequencies as plots write them: real minus sign, thin space in thousands, note with cents.
import { nearestNote } from '../../src/signal/note.ts'

const MINUS = '\u2212'
const THIN = '\u2009'

/** A number with so many decimals: "1 268", "−9.8". `signed` puts a plus before what is above 0. */
export function decimal(value: number, digits: number, signed = false): string {
  const size = Math.abs(value).toFixed(digits)
  const zero = Number(size) === 0
  const [whole = '', part] = size.split('.')
  const grouped = whole.length > 3 ? whole.replace(/\B(?=(\d{3})+$)/g, THIN) : whole
  const sign = zero ? '' : value < 0 ? MINUS : signed ? '+' : ''
  return `${sign}${grouped}${part === undefined ? '' : `.${part}`}`
}

/** A frequency with about four digits: "96.8", "1 268". */
export function hertz(hz: number): string {
  return decimal(hz, hz < 100 ? 1 : 0)
}

/** "−9.8 dB"; a null is "below −200 dB". */
export function decibel(db: number): string {
  return db < -200 ? `below ${MINUS}200 dB` : `${decimal(db, 1, true)} dB`
}

/** "D♯6 +33 ct". */
export function noteWords(hz: number): string {
  const { name, octave, cents } = nearestNote(hz)
  return `${name}${String(octave).replace('-', MINUS)} ${decimal(cents, 0, true)} ct`
}

/** Milliseconds with as many digits as mean something: "5.21 ms", "0.052 ms". */
export function milliseconds(ms: number): string {
  return `${decimal(ms, Math.abs(ms) < 0.0995 ? 3 : Math.abs(ms) < 100 ? 2 : 1)} ms`
}

/** Cents: one decimal below 100. */
export function cents(value: number): string {
  return `${decimal(value, Math.abs(value) < 100 ? 1 : 0, true)} cents`
}

/** A time in s or ms, three digits: "0.42 s", "8.3 ms". */
export function duration(seconds: number): string {
  if (seconds < 0.1) return `${decimal(seconds * 1000, seconds < 0.01 ? 1 : 0)} ms`
  return `${decimal(seconds, seconds < 10 ? 2 : 1)} s`
}

/** A pole's radius with two digits of its distance from 1, which is what counts: "0.9981", "0.999983". */
export function radius(value: number): string {
  const digits = value === 1 ? 3 : Math.max(3, Math.min(7, 1 - Math.floor(Math.log10(Math.abs(1 - value)))))
  return decimal(value, digits)
}
