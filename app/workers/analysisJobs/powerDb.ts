// A level from a complex gain.
import { decibels } from '../../../src/analysis/response.ts'

/** dB of re + j im. A pole on the unit circle gives no number: as high as a level can be. */
export function powerDb(re: number, im: number): number {
  const power = re * re + im * im
  return decibels(Number.isFinite(power) ? power : Number.POSITIVE_INFINITY)
}
