// A shaper over a chunk, in place, with the memory that antiderivative anti-aliasing needs.
import type { Shaper } from '../set/types.ts'
import { type Ramps, SHAPER_VALUES } from './ramps.ts'
import { applyShaper, halvesMean } from './shaper.ts'
import { createMeanCell } from './shaperMeans.ts'

/** The engine's own copy of a shaper: `on` false is none. Its five numbers follow the ramps. */
export type EngineShaper = {
  -readonly [K in 'curve' | 'drive' | 'ceiling' | 'positive' | 'negative' | 'deadZone' | 'points']: Shaper[K]
} & {
  on: boolean
  /** adaa1: play the mean between neighbouring inputs. */
  mean: boolean
}

/** x[at …] = shaper(x[at …]); `states[s]` is the input before x[at], used and kept only by the mean. */
export function shape(p: EngineShaper, x: Float64Array, at: number, n: number, states: Float64Array, s: number): void {
  if (!p.on) return
  if (p.mean) shapeByMean(p, x, at, n, states, s)
  else applyShaper(p, x, at, n)
}

function shapeByMean(p: EngineShaper, x: Float64Array, at: number, n: number, states: Float64Array, s: number): void {
  const { drive, ceiling } = p
  let before = states[s]!
  for (let j = at; j < at + n; j++) {
    const v = x[j]!
    cell[0] = drive * before
    cell[1] = drive * v
    halvesMean(p, cell)
    x[j] = ceiling * cell[2]!
    before = v
  }
  states[s] = before
}

const cell = createMeanCell()

/** shape while the ramps move: the shaper's values start at slot `c`; `k` samples of the ramp before x[at]. */
export function shapeMoving(
  p: EngineShaper,
  x: Float64Array,
  at: number,
  n: number,
  r: Ramps,
  k: number,
  c: number,
  states: Float64Array,
  s: number,
): void {
  if (!p.on) return
  for (let j = 0; j < n; j++) {
    takeShaperValues(p, r, c, k + j)
    shape(p, x, at + j, 1, states, s)
  }
}

/** Sets the shaper's numbers to where the ramps stand `k` samples after they began. */
export function takeShaperValues(p: EngineShaper, { start, slope }: Ramps, c: number, k: number): void {
  p.drive = start[c]! + slope[c]! * k
  p.ceiling = start[c + 1]! + slope[c + 1]! * k
  p.positive = start[c + 2]! + slope[c + 2]! * k
  p.negative = start[c + 3]! + slope[c + 3]! * k
  p.deadZone = start[c + 4]! + slope[c + SHAPER_VALUES - 1]! * k
}
