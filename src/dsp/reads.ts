// Reads of a line, a chunk at a time: for each of `n` samples the line is read at its own delay and added to `out`. One plain loop an
// interpolator, because this is where the time goes. The divisions of D are those of splitDelay, the weights those of tapsOf in an
// order that takes fewer operations.
//
// `line` a line's memory, `at` the index of its sample n in the second half, `delays` D in samples from index `d`, held inside the
// interpolator's and the line's limits before. Points are newest at the highest index.
import type { Interpolation } from '../set/types.ts'

export interface Read {
  line: Float64Array
  /** Index in `line` of the first sample's n. */
  at: number
  delays: Float64Array
  /** Index in `delays` of the first sample's D. */
  d: number
  /** Memory of recursive reads, one slot a read. */
  states: Float64Array
  /** This read's slot. */
  state: number
  out: Float64Array
  /** Index in `out` of the first sample. */
  o: number
}

export function addRead(kind: Interpolation, r: Read, n: number): void {
  if (kind === 'lagrange3') addLagrange3(r, n)
  else if (kind === 'linear') addLinear(r, n)
  else if (kind === 'hermite4') addHermite4(r, n)
  else if (kind === 'nearest') addNearest(r, n)
  else addAllpass1(r, n)
}

function addNearest({ line, at, delays, d, out, o }: Read, n: number): void {
  for (let j = 0; j < n; j++) {
    out[o + j] = out[o + j]! + line[at + j - ((delays[d + j]! + 0.5) | 0)]!
  }
}

function addLinear({ line, at, delays, d, out, o }: Read, n: number): void {
  for (let j = 0; j < n; j++) {
    const delay = delays[d + j]!
    const whole = delay | 0
    const f = delay - whole
    const i = at + j - whole
    const y0 = line[i]!
    out[o + j] = out[o + j]! + (y0 + f * (line[i - 1]! - y0))
  }
}

function addLagrange3({ line, at, delays, d, out, o }: Read, n: number): void {
  for (let j = 0; j < n; j++) {
    const delay = delays[d + j]!
    const whole = delay | 0
    const f = delay - whole
    const i = at + j - whole
    const f1 = f - 1
    const f2 = f - 2
    const g1 = f + 1
    // The four products of Lagrange's formula, paired by what they share: f(f−1) in the outer taps, (f+1)(f−2) in the inner.
    const outer = f * f1 * (g1 * line[i - 2]! - f2 * line[i + 1]!)
    const inner = g1 * f2 * (f1 * line[i]! - f * line[i - 1]!)
    out[o + j] = out[o + j]! + (outer * (1 / 6) + inner * 0.5)
  }
}

function addHermite4({ line, at, delays, d, out, o }: Read, n: number): void {
  for (let j = 0; j < n; j++) {
    const delay = delays[d + j]!
    const whole = delay | 0
    const f = delay - whole
    const i = at + j - whole
    const y0 = line[i + 1]!
    const y1 = line[i]!
    const y2 = line[i - 1]!
    const y3 = line[i - 2]!
    const c1 = 0.5 * (y2 - y0)
    const c2 = y0 - 2.5 * y1 + 2 * y2 - 0.5 * y3
    const c3 = 0.5 * (y3 - y0) + 1.5 * (y1 - y2)
    out[o + j] = out[o + j]! + (((c3 * f + c2) * f + c1) * f + y1)
  }
}

function addAllpass1({ line, at, delays, d, states, state, out, o }: Read, n: number): void {
  let y = states[state]!
  for (let j = 0; j < n; j++) {
    const delay = delays[d + j]!
    const whole = (delay - 0.5) | 0
    const part = delay - whole
    const eta = (1 - part) / (1 + part)
    const i = at + j - whole
    y = eta * (line[i]! - y) + line[i - 1]!
    out[o + j] = out[o + j]! + y
  }
  states[state] = y
}
