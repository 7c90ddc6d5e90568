// One cell between two samples of |H|²: whether it holds a notch or a peak, and where exactly. What lies between is
// foretold by the cubic through both values and slopes; a cell it fits badly is halved.
import { type Transfer, transferAt } from './transfer.ts'

export type ExtremeKind = 'notch' | 'peak'

/** |H|² and its derivative by ω at ω rad/sample. */
export interface PowerSample {
  readonly omega: number
  readonly power: number
  readonly slope: number
}

export interface FoundExtreme {
  readonly kind: ExtremeKind
  readonly omega: number
  readonly power: number
}

/** A search along one channel: finds go to `found` in rising frequency. */
export interface Search {
  readonly transfer: Transfer
  readonly channel: number
  readonly out: Float64Array
  /** Where a search for a root ends, rad/sample. */
  readonly tolerance: number
  readonly found: FoundExtreme[]
}

/** Departure from the cubic, as part of the larger end, above which a cell is halved. */
export const SPLIT_AT = 0.02
const DEEPEST = 12

/** Looks into the cell from a to b; `halve` where the neighbourhood showed that a cubic fits badly. */
export function searchCell(search: Search, a: PowerSample, b: PowerSample, halve: boolean, depth = 0): void {
  if (depth < DEEPEST && (halve || hidesPair(a, b))) {
    const middle = samplePower(search, (a.omega + b.omega) / 2)
    const again = departsFromCubic(a, middle, b)
    searchCell(search, a, middle, again, depth + 1)
    searchCell(search, middle, b, again, depth + 1)
    return
  }
  if (!turns(a, b)) return
  search.found.push({ kind: a.slope > 0 ? 'peak' : 'notch', ...rootBetween(search, a, b) })
}

export function samplePower({ transfer, channel, out }: Search, omega: number): PowerSample {
  transferAt(transfer, omega, out, channel)
  return powerSample(out, channel, omega)
}

/** |H|² and its slope from H and dH/dω of one channel. */
export function powerSample(out: Float64Array, channel: number, omega: number): PowerSample {
  const re = out[4 * channel] as number
  const im = out[4 * channel + 1] as number
  return { omega, power: re * re + im * im, slope: 2 * (re * (out[4 * channel + 2] as number) + im * (out[4 * channel + 3] as number)) }
}

/**
 * Whether the middle of a and b lies off the cubic through both by more than SPLIT_AT, and 1/|H|² too: near a null the one is
 * a plain curve, near a sharp resonance the other.
 */
export function departsFromCubic(a: PowerSample, middle: PowerSample, b: PowerSample): boolean {
  const eighth = (b.omega - a.omega) / 8
  const foretold = (a.power + b.power) / 2 + eighth * (a.slope - b.slope)
  if (Math.abs(middle.power - foretold) <= SPLIT_AT * Math.max(a.power, b.power)) return false
  const ra = 1 / a.power
  const rb = 1 / b.power
  const inverse = (ra + rb) / 2 - eighth * (a.slope * ra * ra - b.slope * rb * rb)
  return !(Math.abs(1 / middle.power - inverse) <= SPLIT_AT * Math.max(ra, rb))
}

/** The slope changes sign from a to b; zero at a belongs to the cell before. */
export function turns(a: PowerSample, b: PowerSample): boolean {
  return a.slope > 0 ? b.slope <= 0 : a.slope < 0 && b.slope >= 0
}

/** The cubic's slope crosses, or nearly touches, zero twice inside a cell whose ends slope the same way. */
export function hidesPair(a: PowerSample, b: PowerSample): boolean {
  if (!(a.slope * b.slope > 0)) return false
  const { linear, square } = slopeParabola(a, b)
  const vertex = -linear / (2 * square)
  if (!(vertex > 0 && vertex < 1)) return false
  return (a.slope + (linear * vertex) / 2) / a.slope < 0.1
}

/** Slope along the cell, t from 0 to 1: a.slope + linear·t + square·t², its mean the rise from a to b. */
function slopeParabola(a: PowerSample, b: PowerSample): { linear: number; square: number } {
  const mean = (b.power - a.power) / (b.omega - a.omega)
  return { linear: 6 * mean - 4 * a.slope - 2 * b.slope, square: 3 * (a.slope + b.slope) - 6 * mean }
}

/** Where the parabola of slopes is zero, or the chord's zero when rounding spoils it. */
function foretoldRoot(a: PowerSample, b: PowerSample): number {
  const { linear, square } = slopeParabola(a, b)
  const width = b.omega - a.omega
  const spread = Math.sqrt(Math.max(0, linear * linear - 4 * square * a.slope))
  const q = -0.5 * (linear + (linear < 0 ? -spread : spread))
  for (const t of [a.slope / q, q / square]) if (t > 0 && t < 1) return a.omega + t * width
  return a.omega + (width * a.slope) / (a.slope - b.slope)
}

/** Root of the slope in a bracket: two steps by the cubic, then Illinois; a guess next to an end probes just past it, which closes the bracket. */
function rootBetween(search: Search, from: PowerSample, to: PowerSample): PowerSample {
  const { tolerance } = search
  let a = from
  let b = to
  let weightA = 1
  let weightB = 1
  let moved: 'a' | 'b' | null = null
  for (let i = 0; i < 80 && b.omega - a.omega > tolerance; i++) {
    const chord = a.omega + ((b.omega - a.omega) * weightA * a.slope) / (weightA * a.slope - weightB * b.slope)
    const guess = i < 2 ? foretoldRoot(a, b) : chord
    const next = samplePower(search, Math.min(Math.max(guess, a.omega + tolerance / 2), b.omega - tolerance / 2))
    if (next.slope === 0) return next
    if (next.slope > 0 === from.slope > 0) {
      if (moved === 'a') weightB /= 2
      weightA = 1
      moved = 'a'
      a = next
    } else {
      if (moved === 'b') weightA /= 2
      weightB = 1
      moved = 'b'
      b = next
    }
  }
  // The slope is straight over so narrow a bracket; what is left of the error would fill a null's depth.
  return samplePower(search, a.omega + ((b.omega - a.omega) * a.slope) / (a.slope - b.slope))
}
