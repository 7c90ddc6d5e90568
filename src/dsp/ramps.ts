// Values that may move from sample to sample: gains, filter coefficients and amounts, shaper gains. A live change sets targets, and
// all of them run there in straight lines over the same 20 ms. The value of a sample is a closed form of the samples since the change,
// so that block cuts do not matter; settled values are exactly the targets.

export const INPUT_GAIN = 0
/** 1 while the input reaches the line, 0 while bypass keeps it away. */
export const INPUT_OPEN = 1
export const FEEDBACK = 2
export const CROSS_FEED = 3
export const DRY = 4
/** Wet gain of output channel 0 and, the sign of invertRight in it, channel 1. */
export const WET = 5
export const OUTPUT_GAIN = 7
/** Per filter a coefficient and, in the next slot, the amount of it that is heard: 0 off, 1 on. */
export const DAMPING = 8
export const LOW_CUT = 10
export const WET_HIGH_CUT = 12
export const WET_LOW_CUT = 14
/** Per shaper SHAPER_VALUES slots: drive, ceiling, positive, negative, deadZone. */
export const SHAPERS = 16
export const SHAPER_VALUES = 5
export const CORE_RAMPS = SHAPERS + 3 * SHAPER_VALUES

/** Time every ramp and cross-fade takes, in seconds: short enough to follow a hand, long enough not to click. */
export const RAMP_SECONDS = 0.02

export interface Ramps {
  readonly start: Float64Array
  readonly target: Float64Array
  readonly slope: Float64Array
  /** Samples since the ramps began; `length` when settled. */
  elapsed: number
  readonly length: number
}

/** `count` values, settled at 0. */
export function createRamps(fs: number, count: number): Ramps {
  const length = rampLength(fs)
  return { start: new Float64Array(count), target: new Float64Array(count), slope: new Float64Array(count), elapsed: length, length }
}

/** Samples of a ramp or cross-fade. */
export const rampLength = (fs: number): number => Math.max(1, Math.round(RAMP_SECONDS * fs))

export const rampsMove = (r: Ramps): boolean => r.elapsed < r.length

/** Makes where each value stands its start. Set targets after it, then aimRamps. */
export function holdRamps(r: Ramps): void {
  for (let i = 0; i < r.start.length; i++) r.start[i] = r.elapsed < r.length ? r.start[i]! + r.slope[i]! * r.elapsed : r.target[i]!
}

/** Starts all values towards their targets. */
export function aimRamps(r: Ramps): void {
  for (let i = 0; i < r.start.length; i++) r.slope[i] = (r.target[i]! - r.start[i]!) / r.length
  r.elapsed = 0
}

/** Puts one value at its target now, leaving the others on their way. */
export function snapRamp(r: Ramps, i: number): void {
  r.start[i] = r.target[i]!
  r.slope[i] = 0
}

/** Puts all values at their targets. */
export function settleRamps(r: Ramps): void {
  r.elapsed = r.length
  for (let i = 0; i < r.start.length; i++) snapRamp(r, i)
}

/** Moves on by n samples, at most as many as are left. */
export function advanceRamps(r: Ramps, n: number): void {
  r.elapsed += n
  if (r.elapsed >= r.length) settleRamps(r)
}

export function copyRamps(to: Ramps, from: Ramps): void {
  to.start.set(from.start)
  to.target.set(from.target)
  to.slope.set(from.slope)
  to.elapsed = from.elapsed
}

/** x[at … at + n) · the value at slot `i`, in place; `moving` while the ramps move. */
export function scale(x: Float64Array, at: number, n: number, { target, start, slope, elapsed }: Ramps, i: number, moving: boolean): void {
  if (moving) {
    for (let j = 0; j < n; j++) x[at + j] = x[at + j]! * (start[i]! + slope[i]! * (elapsed + j))
  } else if (target[i] !== 1) {
    const gain = target[i]!
    for (let j = at; j < at + n; j++) x[j] = x[j]! * gain
  }
}
