// A chunk cut at its update intervals: inside a run every read's delay is a straight line.
//
// Reads: voice v of channel c is c · MAX_VOICES + v; the loop of line c is LOOPS + c.
import { CHUNK } from './line.ts'

export const MAX_VOICES = 8
export const LOOPS = 2 * MAX_VOICES
export const READS = LOOPS + 2

export interface Runs {
  count: number
  /** First sample of each run in the chunk; starts[count] is the chunk's length. */
  readonly starts: Int32Array
  /** How far into its update interval each run begins, samples. */
  readonly into: Int32Array
  /** D of read r where run k's interval begins, ends[k · READS + r], and where it ends, READS further on. */
  readonly ends: Float64Array
  /** 1 over the length of an interval, or 0 where delays stand still in it. With a = ends[k · READS + r] and b the next, D at sample j of the
   * chunk is a + (b − a) · part · (into[k] + j − starts[k]). */
  part: number
}

export function createRuns(): Runs {
  return {
    count: 0,
    starts: new Int32Array(CHUNK + 1),
    into: new Int32Array(CHUNK),
    ends: new Float64Array(READS * (CHUNK + 1)),
    part: 0.5,
  }
}

/**
 * Index after the last sample, at most `end`, up to which read r stays between the same two samples as at sample j; both inside run k. Whole
 * numbers in and out, so that nothing is boxed.
 */
export function stretchEnd({ ends, part, starts, into }: Runs, r: number, k: number, j: number, end: number): number {
  const from = ends[k * READS + r]!
  const slope = (ends[(k + 1) * READS + r]! - from) * part
  const since = into[k]! - starts[k]!
  const whole = (from + slope * (since + j)) | 0
  if (((from + slope * (since + end - 1)) | 0) === whole) return end
  let stop = j + 1
  while (((from + slope * (since + stop)) | 0) === whole) stop++
  return stop
}
