// The memory of one channel: one piece in which the writing walks up. At the end the samples still needed are moved back to the start, so
// that no read or write ever wraps. The moves cost less than one copied sample for each written.
//
// samples: [ what is still needed … | written later … ], `position` is where the next sample goes; it is the core's, one for all its lines.
// Invariant: w[n − i] = samples[position − i] for 1 ≤ i ≤ length, with `position` that of n.

/**
 * Most samples processed between two looks at what moves; cuts never change a result. Also how often a live engine looks for values that have
 * nearly died: what decays slowly does not come near denormal numbers in between, and what decays fast is through them at once.
 */
export const CHUNK = 1024

/** Samples a line must keep for delays up to `maxDelay`: the oldest point of a cubic too. */
export function lineLength(maxDelay: number): number {
  return (Math.ceil(maxDelay) | 0) + 4
}

/** Memory of a line that keeps `length` samples. Writing begins at `length`. */
export function createLine(length: number): Float64Array {
  return new Float64Array(length + Math.max(length, 4 * CHUNK))
}

/** Moves the last `length` samples before the end to the start, from where writing goes on at `length`. */
export function rewindLine(line: Float64Array, length: number): void {
  line.copyWithin(0, line.length - length)
}

/** Writes from[j … j + n) at `position` of the line, which must have room for them. */
export function writeLine(line: Float64Array, position: number, from: Float64Array, j: number, n: number): void {
  for (let i = 0; i < n; i++) line[position + i] = from[j + i]!
}

/**
 * Sets the last CHUNK samples before `position` to 0 where they are smaller than `least`, if the last of them is: a line that sounds is left in
 * peace.
 */
export function flushLine(line: Float64Array, position: number, least: number): void {
  if (Math.abs(line[position - 1]!) >= least) return
  for (let i = Math.max(0, position - CHUNK); i < position; i++) if (Math.abs(line[i]!) < least) line[i] = 0
}
