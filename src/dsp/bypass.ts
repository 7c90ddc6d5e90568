// Bypass as the finished unit would do it. `hard`: the input goes straight through and the effect stops, empty, its sweep running on.
// `tails`: the input goes straight through and no longer reaches the line, whose tail rings out. `wetOnly`: the dry path is shut.
// Everything fades over the time of a ramp.
import { aimRamps, createRamps, holdRamps, type Ramps, rampsMove } from './ramps.ts'

export type BypassMode = 'off' | 'hard' | 'tails' | 'wetOnly'

/** Gain of the input straight to the output, and of what the core gives. */
export const STRAIGHT = 0
export const PATH = 1

export interface Bypass {
  mode: BypassMode
  readonly ramps: Ramps
  /** 1, or 0 while the input is kept from the line, or the dry path is shut; the core ramps there. */
  inputOpen: number
  dryOpen: number
}

export function createBypass(fs: number): Bypass {
  const ramps = createRamps(fs, 2)
  ramps.target[PATH] = 1
  ramps.start[PATH] = 1
  return { mode: 'off', ramps, inputOpen: 1, dryOpen: 1 }
}

/** Aims everything at a mode; the core's ramps are the caller's to aim. */
export function aimBypass(bypass: Bypass, mode: BypassMode): void {
  bypass.mode = mode
  // Behind a hard bypass too: the line is empty when the effect comes back, and its input must not begin with a step.
  bypass.inputOpen = mode === 'tails' || mode === 'hard' ? 0 : 1
  bypass.dryOpen = mode === 'wetOnly' ? 0 : 1
  const { ramps } = bypass
  holdRamps(ramps)
  ramps.target[STRAIGHT] = mode === 'hard' || mode === 'tails' ? 1 : 0
  ramps.target[PATH] = mode === 'hard' ? 0 : 1
  aimRamps(ramps)
}

/** Whether the core is not heard at all. */
export function pathIsSilent({ mode, ramps }: Bypass): boolean {
  return mode === 'hard' && !rampsMove(ramps)
}

/** y = path · y + straight · x over n samples, in place; behind a silent path y is not looked at. */
export function blendStraight({ ramps }: Bypass, y: Float64Array, x: Float64Array, n: number): void {
  const { start, slope, elapsed, target } = ramps
  if (!rampsMove(ramps)) {
    const wet = target[PATH] === 1
    for (let j = 0; j < n; j++) y[j] = wet ? y[j]! + x[j]! : x[j]!
    return
  }
  for (let j = 0; j < n; j++) {
    const path = start[PATH]! + slope[PATH]! * (elapsed + j)
    const straight = start[STRAIGHT]! + slope[STRAIGHT]! * (elapsed + j)
    y[j] = path * y[j]! + straight * x[j]!
  }
}
