// Reads of a line, run by run: inside a run the delay is a straight line, and the read is added to `out`. One plain loop an
// interpolator, because this is where the time goes. The divisions of D are those of splitDelay; the weights are those of tapsOf, in
// forms that take fewer operations and give the same bits however a run is cut.
//
// While a delay stays between the same two samples, what is read are samples that follow one another: a run is cut where that ends, and
// each sample is fetched once and handed on. x0 is the newest point, at I − 1, x3 the oldest.
import type { Interpolation } from '../set/types.ts'
import { READS, type Runs, stretchEnd } from './runs.ts'

export interface Read {
  readonly runs: Runs
  /** Which read of the runs, and slot of `states`. */
  read: number
  /** A line's memory. */
  line: Float64Array
  /** Index in `line` of the chunk's first sample; older samples stand below. */
  at: number
  /** Memory of recursive reads. */
  readonly states: Float64Array
  out: Float64Array
}

/** Adds the whole chunk's read to `out`. */
export function addRead(kind: Interpolation, r: Read): void {
  const { count, starts } = r.runs
  for (let k = 0; k < count; k++) addPiece(kind, r, k, starts[k]!, starts[k + 1]!)
}

/** Adds the read of samples `first` to `end` of the chunk, inside run k, to `out`. Cubics and allpass: DESIGN 3. */
export function addPiece(kind: Interpolation, r: Read, k: number, first: number, end: number): void {
  if (kind === 'lagrange3') addLagrange3(r, k, first, end)
  else if (kind === 'linear') addLinear(r, k, first, end)
  else if (kind === 'hermite4') addHermite4(r, k, first, end)
  else if (kind === 'nearest') addNearest(r, k, first, end)
  else addAllpass1(r, k, first, end)
}

function addNearest({ runs, read, line, at, out }: Read, k: number, first: number, end: number): void {
  const from = runs.ends[k * READS + read]!
  const slope = (runs.ends[(k + 1) * READS + read]! - from) * runs.part
  const into = runs.into[k]! - runs.starts[k]!
  for (let j = first; j < end; j++) {
    const whole = (from + slope * (into + j) + 0.5) | 0
    out[j] = out[j]! + line[at + j - whole]!
  }
}

function addLinear({ runs, read, line, at, out }: Read, k: number, first: number, end: number): void {
  const from = runs.ends[k * READS + read]!
  const slope = (runs.ends[(k + 1) * READS + read]! - from) * runs.part
  const into = runs.into[k]! - runs.starts[k]!
  for (let j = first; j < end; ) {
    const whole = (from + slope * (into + j)) | 0
    const stop = stretchEnd(runs, read, k, j, end)
    let i = at + j - whole
    let x2 = line[i - 1]!
    for (; j < stop; j++) {
      const f = from + slope * (into + j) - whole
      const x1 = line[i]!
      i = (i + 1) | 0
      out[j] = out[j]! + (x1 + f * (x2 - x1))
      x2 = x1
    }
  }
}

/** Newton's form: x1 + f (e + (f − 1)/2 (dd + (f + 1)/3 ddd)) with the first, second and third differences around x1 and x2. */
function addLagrange3({ runs, read, line, at, out }: Read, k: number, first: number, end: number): void {
  const from = runs.ends[k * READS + read]!
  const slope = (runs.ends[(k + 1) * READS + read]! - from) * runs.part
  const into = runs.into[k]! - runs.starts[k]!
  for (let j = first; j < end; ) {
    const whole = (from + slope * (into + j)) | 0
    const stop = stretchEnd(runs, read, k, j, end)
    let i = at + j - whole
    let x1 = line[i]!
    const x2 = line[i - 1]!
    let e = x2 - x1
    let older = line[i - 2]! - x2 - e
    // Two samples a turn, so that the points need not be moved along.
    for (; j < stop - 1; j += 2) {
      let f = from + slope * (into + j) - whole
      const x0 = line[i + 1]!
      const newer = x1 - x0
      const dd = e - newer
      out[j] = out[j]! + (x1 + f * (e + 0.5 * (f - 1) * (dd + (1 / 3) * (f + 1) * (older - dd))))
      f = from + slope * (into + j + 1) - whole
      i = (i + 2) | 0
      x1 = line[i]!
      e = x0 - x1
      older = newer - e
      out[j + 1] = out[j + 1]! + (x0 + f * (newer + 0.5 * (f - 1) * (older + (1 / 3) * (f + 1) * (dd - older))))
    }
    if (j < stop) {
      const f = from + slope * (into + j) - whole
      const dd = e - (x1 - line[i + 1]!)
      out[j] = out[j]! + (x1 + f * (e + 0.5 * (f - 1) * (dd + (1 / 3) * (f + 1) * (older - dd))))
      j++
    }
  }
}

/** Catmull-Rom: x1 + f (m + f (c2 + f c3)), m the slope at x1, and c2 such that the curve reaches x2 at f = 1. */
function addHermite4({ runs, read, line, at, out }: Read, k: number, first: number, end: number): void {
  const from = runs.ends[k * READS + read]!
  const slope = (runs.ends[(k + 1) * READS + read]! - from) * runs.part
  const into = runs.into[k]! - runs.starts[k]!
  for (let j = first; j < end; ) {
    const whole = (from + slope * (into + j)) | 0
    const stop = stretchEnd(runs, read, k, j, end)
    let i = at + j - whole
    let x1 = line[i]!
    let x2 = line[i - 1]!
    let e = x2 - x1
    let oldest = line[i - 2]! - x2
    for (; j < stop; j++) {
      const f = from + slope * (into + j) - whole
      i = (i + 1) | 0
      const x0 = line[i]!
      const newer = x1 - x0
      const m = 0.5 * (e + newer)
      const c3 = 0.5 * (oldest + newer) - e
      out[j] = out[j]! + (x1 + f * (m + f * (e - m - c3 + f * c3)))
      x2 = x1
      x1 = x0
      oldest = e
      e = newer
    }
  }
}

function addAllpass1({ runs, read, line, at, states, out }: Read, k: number, first: number, end: number): void {
  const from = runs.ends[k * READS + read]!
  const slope = (runs.ends[(k + 1) * READS + read]! - from) * runs.part
  const into = runs.into[k]! - runs.starts[k]!
  let y = states[read]!
  for (let j = first; j < end; j++) {
    const delay = from + slope * (into + j)
    const whole = (delay - 0.5) | 0
    const part = delay - whole
    const eta = (1 - part) / (1 + part)
    const i = at + j - whole
    y = eta * (line[i]! - y) + line[i - 1]!
    out[j] = out[j]! + y
  }
  states[read] = y
}
