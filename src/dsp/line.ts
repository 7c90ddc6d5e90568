// The memory of one channel. Every sample is written twice, `length` apart, so that the last `length` samples always stand in
// one piece and a read never wraps.
//
// samples: [ 0 … length − 1 | the same again ], `position` is where the next sample goes in the first half.
// Invariant: w[n − i] = samples[position + length − i] for 1 ≤ i ≤ length, with `position` that of n.

/** A line of `length` samples as the core keeps it: memory only; the position is the core's, one for all its lines. */
export function createLine(length: number): Float64Array {
  return new Float64Array(2 * length)
}

/** Samples a line needs for delays up to `maxDelay`: the oldest point of a cubic, and the chunk that is written ahead of its reads. */
export function lineLength(maxDelay: number): number {
  return (Math.ceil(maxDelay) | 0) + 4 + CHUNK
}

/** Most samples processed between two looks at what moves. Cuts never change a result; this only sizes the scratch memory. */
export const CHUNK = 128

/** Writes from[j … j + n) at `position` of the line, which must not pass the end of its first half. */
export function writeLine(line: Float64Array, position: number, from: Float64Array, j: number, n: number): void {
  const again = position + (line.length >> 1)
  for (let i = 0; i < n; i++) {
    const w = from[j + i]!
    line[position + i] = w
    line[again + i] = w
  }
}

/** Sets the last CHUNK samples before `position` to 0 where they are smaller than `least`. */
export function flushLine(line: Float64Array, position: number, least: number): void {
  const length = line.length >> 1
  for (let i = position + length - CHUNK; i < position + length; i++) {
    if (line[i] === 0 || Math.abs(line[i]!) >= least) continue
    line[i] = 0
    line[i >= length ? i - length : i + length] = 0
  }
}
