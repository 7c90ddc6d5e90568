// The sweep's shape for many phases at once: sweepShapeValue and frozenShapeValue of src/set and sweep.ts, with the choice of shape outside
// the loops. Each loop is a function of its own, small enough for the machine to inline the one value it calls: a number that a call returns
// is boxed otherwise, which allocates.
import { drawn, drift, rampUp, square, triangle } from '../set/sweepShape.ts'
import type { ParameterSet } from '../set/types.ts'

/**
 * In place: the unwrapped phases values[0 … count) become s in [−1, 1]. `frozen`: drift counts as the sine. Value i is of voice i mod `voices`.
 * values[count] holds the edge of squares and ramps (sweepEdge).
 */
export function shapeValues(sweep: ParameterSet['sweep'], values: Float64Array, count: number, voices: number, frozen: boolean): void {
  if (sweep.shape === 'drift' && !frozen) {
    driftValues(sweep, values, count, voices)
    return
  }
  for (let i = 0; i < count; i++) values[i] = values[i]! - Math.floor(values[i]!)
  if (sweep.shape === 'triangle') triangleValues(values, count)
  else if (sweep.shape === 'square') squareValues(values, count)
  else if (sweep.shape === 'rampUp') rampValues(values, count)
  else if (sweep.shape === 'rampDown') fallValues(values, count)
  else if (sweep.shape === 'drawn') drawnValues(sweep, values, count)
  else sineValues(values, count)
}

function sineValues(values: Float64Array, count: number): void {
  for (let i = 0; i < count; i++) values[i] = Math.sin(2 * Math.PI * values[i]!)
}

function triangleValues(values: Float64Array, count: number): void {
  for (let i = 0; i < count; i++) values[i] = triangle(values[i]!)
}

function squareValues(values: Float64Array, count: number): void {
  for (let i = 0; i < count; i++) values[i] = square(values[i]!, values[count]!)
}

function rampValues(values: Float64Array, count: number): void {
  for (let i = 0; i < count; i++) values[i] = rampUp(values[i]!, values[count]!)
}

function fallValues(values: Float64Array, count: number): void {
  rampValues(values, count)
  for (let i = 0; i < count; i++) values[i] = -values[i]!
}

function drawnValues({ points }: ParameterSet['sweep'], values: Float64Array, count: number): void {
  for (let i = 0; i < count; i++) values[i] = drawn(points, values[i]!)
}

function driftValues({ seed }: ParameterSet['sweep'], values: Float64Array, count: number, voices: number): void {
  for (let i = 0; i < count; i++) {
    const cycle = Math.floor(values[i]!)
    values[i] = drift(seed, i % voices, cycle, values[i]! - cycle)
  }
}
