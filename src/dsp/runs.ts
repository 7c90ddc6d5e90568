// A chunk cut at its update intervals: inside a run every read's delay is a straight line.
import { CHUNK } from './line.ts'

export interface Runs {
  count: number
  /** First sample of each run in the chunk; starts[count] is the chunk's length. */
  readonly starts: Int32Array
  /** How far into its update interval each run begins, samples. */
  readonly into: Int32Array
  /** D of read r in run k at sample j of the chunk: from[r · CHUNK + k] + slope[r · CHUNK + k] · (into[k] + j − starts[k]). */
  readonly from: Float64Array
  readonly slope: Float64Array
}

export function createRuns(reads: number): Runs {
  return {
    count: 0,
    starts: new Int32Array(CHUNK + 1),
    into: new Int32Array(CHUNK),
    from: new Float64Array(reads * CHUNK),
    slope: new Float64Array(reads * CHUNK),
  }
}
