// The first-order filters over a chunk, in place. Each comes as it stands and as it moves: with coefficient and amount running along
// their ramps, where amount 1 is the filter and amount 0 what went into it. Coefficients are looked up here: given as numbers to a function
// that the machine does not inline they would be boxed, which allocates.
import type { Ramps } from './ramps.ts'

/** y[n] = (1 − a) x[n] + a y[n−1]; a is the settled value of slot `c`, the state is y. */
export function lowPass(x: Float64Array, at: number, n: number, r: Ramps, c: number, states: Float64Array, s: number): void {
  const a = r.target[c]!
  const b = 1 - a
  let y = states[s]!
  for (let j = at; j < at + n; j++) {
    y = b * x[j]! + a * y
    x[j] = y
  }
  states[s] = y
}

/** y[n] = (1 + b)/2 (x[n] − x[n−1]) + b y[n−1]; b is the settled value of slot `c`, the states are x at `s` and y at `s + 1`. */
export function highPass(x: Float64Array, at: number, n: number, r: Ramps, c: number, states: Float64Array, s: number): void {
  const b = r.target[c]!
  const half = (1 + b) / 2
  let before = states[s]!
  let y = states[s + 1]!
  for (let j = at; j < at + n; j++) {
    const v = x[j]!
    y = half * (v - before) + b * y
    before = v
    x[j] = y
  }
  states[s] = before
  states[s + 1] = y
}

/** lowPass while the ramps move: coefficient at slot `c`, amount in the slot after it; `k` samples of the ramp before x[at]. */
export function lowPassMoving(
  x: Float64Array,
  at: number,
  n: number,
  r: Ramps,
  k: number,
  c: number,
  states: Float64Array,
  s: number,
): void {
  const { start, slope } = r
  let y = states[s]!
  for (let j = 0; j < n; j++) {
    const a = start[c]! + slope[c]! * (k + j)
    const amount = start[c + 1]! + slope[c + 1]! * (k + j)
    const v = x[at + j]!
    y = (1 - a) * v + a * y
    x[at + j] = (1 - amount) * v + amount * y
  }
  states[s] = y
}

/** highPass while the ramps move: slots and `k` as in lowPassMoving. */
export function highPassMoving(
  x: Float64Array,
  at: number,
  n: number,
  r: Ramps,
  k: number,
  c: number,
  states: Float64Array,
  s: number,
): void {
  const { start, slope } = r
  let before = states[s]!
  let y = states[s + 1]!
  for (let j = 0; j < n; j++) {
    const b = start[c]! + slope[c]! * (k + j)
    const amount = start[c + 1]! + slope[c + 1]! * (k + j)
    const v = x[at + j]!
    y = ((1 + b) / 2) * (v - before) + b * y
    before = v
    x[at + j] = (1 - amount) * v + amount * y
  }
  states[s] = before
  states[s + 1] = y
}
