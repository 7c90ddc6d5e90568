// Peaks of what goes into the effect and what comes out of it, gathered between two reports, and the window the scope shows.
// layout of both rings: newest frame at (at − 1) mod SCOPE_FRAMES; both are written together, so input and output stay aligned.
import { SCOPE_FRAMES } from './messages.ts'

export interface Meters {
  /** Largest |x| since the last report: input left, right, output left, right. */
  readonly peaks: Float64Array
  /** Output samples beyond full scale since start. */
  overs: number
  readonly scopeIn: Float32Array
  readonly scopeOut: Float32Array
  at: number
}

export function createMeters(): Meters {
  return { peaks: new Float64Array(4), overs: 0, scopeIn: new Float32Array(SCOPE_FRAMES), scopeOut: new Float32Array(SCOPE_FRAMES), at: 0 }
}

export function meterInput(meters: Meters, left: Float64Array, right: Float64Array, frames: number): void {
  takePeak(meters.peaks, 0, left, frames)
  takePeak(meters.peaks, 1, right, frames)
  const { scopeIn, at } = meters
  for (let i = 0; i < frames; i++) scopeIn[(at + i) % SCOPE_FRAMES] = left[i] as number
}

/** Call after meterInput with the same frames. */
export function meterOutput(meters: Meters, left: Float64Array, right: Float64Array, frames: number): void {
  takePeak(meters.peaks, 2, left, frames)
  takePeak(meters.peaks, 3, right, frames)
  const { scopeOut, at } = meters
  for (let i = 0; i < frames; i++) {
    scopeOut[(at + i) % SCOPE_FRAMES] = left[i] as number
    if (Math.abs(left[i] as number) > 1 || Math.abs(right[i] as number) > 1) meters.overs += 1
  }
  meters.at = (at + frames) % SCOPE_FRAMES
}

/** Copies both windows, oldest frame first, into `report` from `at` on; input first. */
export function copyScope(meters: Meters, report: Float64Array, at: number): void {
  for (let i = 0; i < SCOPE_FRAMES; i++) {
    const from = (meters.at + i) % SCOPE_FRAMES
    report[at + i] = meters.scopeIn[from] as number
    report[at + SCOPE_FRAMES + i] = meters.scopeOut[from] as number
  }
}

function takePeak(peaks: Float64Array, at: number, samples: Float64Array, frames: number): void {
  let peak = peaks[at] as number
  for (let i = 0; i < frames; i++) {
    const x = Math.abs(samples[i] as number)
    if (x > peak) peak = x
  }
  peaks[at] = peak
}
