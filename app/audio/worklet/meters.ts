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
  takePeaks(meters.peaks, 0, left, right, frames)
  writeRing(meters.scopeIn, meters.at, left, frames)
}

/** Call after meterInput with the same frames. */
export function meterOutput(meters: Meters, left: Float64Array, right: Float64Array, frames: number): void {
  const { peaks } = meters
  takePeaks(peaks, 2, left, right, frames)
  // Only a report period that has passed full scale is worth counting in.
  if ((peaks[2] as number) > 1 || (peaks[3] as number) > 1) countOvers(meters, left, right, frames)
  writeRing(meters.scopeOut, meters.at, left, frames)
  meters.at = (meters.at + frames) % SCOPE_FRAMES
}

/** Copies both windows, oldest frame first, into `report` from `at` on; input first. */
export function copyScope(meters: Meters, report: Float64Array, at: number): void {
  readRing(meters.scopeIn, meters.at, report, at)
  readRing(meters.scopeOut, meters.at, report, at + SCOPE_FRAMES)
}

/** `frames` at most SCOPE_FRAMES. */
function writeRing(ring: Float32Array, at: number, samples: Float64Array, frames: number): void {
  const first = Math.min(frames, SCOPE_FRAMES - at)
  for (let i = 0; i < first; i++) ring[at + i] = samples[i] as number
  for (let i = first; i < frames; i++) ring[i - first] = samples[i] as number
}

function readRing(ring: Float32Array, from: number, out: Float64Array, at: number): void {
  const first = SCOPE_FRAMES - from
  for (let i = 0; i < first; i++) out[at + i] = ring[from + i] as number
  for (let i = 0; i < from; i++) out[at + first + i] = ring[i] as number
}

function takePeaks(peaks: Float64Array, at: number, left: Float64Array, right: Float64Array, frames: number): void {
  let l = peaks[at] as number
  let r = peaks[at + 1] as number
  for (let i = 0; i < frames; i++) {
    l = Math.max(l, Math.abs(left[i] as number))
    r = Math.max(r, Math.abs(right[i] as number))
  }
  peaks[at] = l
  peaks[at + 1] = r
}

function countOvers(meters: Meters, left: Float64Array, right: Float64Array, frames: number): void {
  for (let i = 0; i < frames; i++) {
    if (Math.abs(left[i] as number) > 1 || Math.abs(right[i] as number) > 1) meters.overs += 1
  }
}
