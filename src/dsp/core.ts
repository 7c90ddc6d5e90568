// One signal path with all its memory. The engine has two: a change that only a cross-fade can make is loaded into the idle one, on a
// copy of the other's memory, and both run while one fades into the other.

import { setTargets } from './gains.ts'
import { CHUNK, createLine, flushLine, lineLength } from './line.ts'
import { CORE_RAMPS, copyRamps, createRamps, type Ramps, SHAPER_VALUES, SHAPERS, settleRamps } from './ramps.ts'
import type { Read } from './reads.ts'
import { MAX_VOICES, READS } from './runs.ts'
import { createSettings, type Settings, takeStructure } from './settings.ts'
import { takeShaperValues } from './shaperPass.ts'
import { createTrajectory, jump, type Trajectory } from './trajectory.ts'

/** A channel of audio in or out; samples are taken and given as they are, ±1 meaning full scale. */
export type Channel = Float32Array | Float64Array

type Pair = readonly [Float64Array, Float64Array]

/** Memory of the recursive parts; one slot a line or output channel, two where a filter keeps two. */
interface States {
  readonly damping: Float64Array
  readonly lowCut: Float64Array
  readonly wetHighCut: Float64Array
  readonly wetLowCut: Float64Array
  /** Last input of shaper i of channel c at 2 i + c. */
  readonly shapers: Float64Array
  /** All-pass reads, one slot a read of the trajectory. */
  readonly reads: Float64Array
}

export interface Core {
  readonly fs: number
  readonly settings: Settings
  readonly ramps: Ramps
  readonly trajectory: Trajectory
  /** Samples a line keeps. */
  readonly length: number
  /** Where the next sample is written in every line, up to its end. */
  position: number
  readonly lines: Pair
  /**
   * u of each line: sample j of the chunk is u[c][uAt + j]. Where the dry path may be delayed u is kept like a line, and uAt is `position`;
   * else there is only the chunk, and uAt is 0.
   */
  readonly u: Pair
  uAt: number
  readonly keepsInput: boolean
  readonly states: States
  /** x of each line: sample j of the chunk is source[c][sourceAt + j]. */
  readonly source: [Channel, Channel]
  sourceAt: number
  /** A chunk each: s, w, wet and output by channel. */
  readonly loop: Pair
  readonly written: Pair
  readonly wet: Pair
  readonly output: Pair
  readonly read: Read
}

const pair = (length: number): Pair => [new Float64Array(length), new Float64Array(length)]

export interface CoreOptions {
  readonly fs: number
  /** Longest delay any read may have, samples. */
  readonly maxDelay: number
  /** Whether u is kept for a dry path that is delayed. */
  readonly keepsInput: boolean
}

export function createCore({ fs, maxDelay, keepsInput }: CoreOptions): Core {
  const length = lineLength(maxDelay)
  const trajectory = createTrajectory(fs)
  const states: States = {
    damping: new Float64Array(2),
    lowCut: new Float64Array(4),
    wetHighCut: new Float64Array(2),
    wetLowCut: new Float64Array(4),
    shapers: new Float64Array(6),
    reads: new Float64Array(READS),
  }
  const lines: Pair = [createLine(length), createLine(length)]
  const wet = pair(CHUNK)
  return {
    fs,
    settings: createSettings(fs, maxDelay),
    ramps: createRamps(fs, CORE_RAMPS),
    trajectory,
    length,
    position: length,
    lines,
    u: keepsInput ? [createLine(length), createLine(length)] : pair(CHUNK),
    uAt: keepsInput ? length : 0,
    keepsInput,
    states,
    source: [wet[0], wet[1]],
    sourceAt: 0,
    loop: pair(CHUNK),
    written: pair(CHUNK),
    wet,
    output: pair(CHUNK),
    read: { runs: trajectory.runs, read: 0, line: lines[0], at: 0, states: states.reads, out: wet[0] },
  }
}

/** Below this the live engine takes a value of line or filters for 0: −600 dB; denormal numbers, which are slow, begin at −6150 dB. */
const LEAST = 1e-30

/** Sets the last CHUNK samples of the lines and the recursive parts' memory to 0 where they have nearly died. */
export function flushCore({ lines, position, settings, states }: Core): void {
  for (let c = 0; c < settings.lines; c++) flushLine(lines[c]!, position, LEAST)
  flushSlots(states.damping)
  flushSlots(states.lowCut)
  flushSlots(states.wetHighCut)
  flushSlots(states.wetLowCut)
  flushSlots(states.reads)
}

function flushSlots(states: Float64Array): void {
  for (let i = 0; i < states.length; i++) if (Math.abs(states[i]!) < LEAST) states[i] = 0
}

/** Silence: lines and filters empty. Settings, ramps and phase stay. */
export function clearCore({ lines, u, states }: Core): void {
  for (let c = 0; c < 2; c++) {
    lines[c]!.fill(0)
    u[c]!.fill(0)
  }
  states.damping.fill(0)
  states.lowCut.fill(0)
  states.wetHighCut.fill(0)
  states.wetLowCut.fill(0)
  states.shapers.fill(0)
  states.reads.fill(0)
}

/** Loads everything of a flat set at once: ramps at their targets, delays where they belong. Memory and phase stay. */
export function loadCore(core: Core, flat: Float64Array, inputOpen: number, dryOpen: number): void {
  takeStructure(core.settings, flat)
  setTargets(core.ramps, flat, core.fs, inputOpen, dryOpen)
  settleCore(core)
  jump(core.trajectory, core.settings)
}

/** Ends all ramps at their targets. */
export function settleCore({ settings, ramps }: Core): void {
  settleRamps(ramps)
  for (let i = 0; i < settings.shapers.length; i++) takeShaperValues(settings.shapers[i]!, ramps, SHAPERS + SHAPER_VALUES * i, 0)
}

/** Copies another core's memory and motion, not its settings. */
export function copyMemory(to: Core, from: Core): void {
  to.position = from.position
  to.uAt = from.uAt
  copyRamps(to.ramps, from.ramps)
  for (let c = 0; c < 2; c++) {
    to.lines[c]!.set(from.lines[c]!)
    to.u[c]!.set(from.u[c]!)
  }
  to.states.damping.set(from.states.damping)
  to.states.lowCut.set(from.states.lowCut)
  to.states.wetHighCut.set(from.states.wetHighCut)
  to.states.wetLowCut.set(from.states.wetLowCut)
  to.states.shapers.set(from.states.shapers)
  to.states.reads.set(from.states.reads)
  to.trajectory.phase = from.trajectory.phase
  to.trajectory.since = from.trajectory.since
  to.trajectory.held = from.trajectory.held
}

/** Makes memory copied from a core of another layout fit: one line becomes two alike, two become one by their mean, as inputs do. */
export function fitMemory({ settings, lines, u, states }: Core, linesBefore: number, outputsBefore: number): void {
  if (linesBefore < settings.lines) {
    lines[1].set(lines[0])
    u[1].set(u[0])
    copySlots(states.damping, 1)
    copySlots(states.lowCut, 2)
  } else if (linesBefore > settings.lines) {
    meanInto(lines[0], lines[1])
    meanInto(u[0], u[1])
  }
  if (outputsBefore < settings.outputs) {
    copySlots(states.wetHighCut, 1)
    copySlots(states.wetLowCut, 2)
    states.reads.copyWithin(MAX_VOICES, 0, MAX_VOICES)
    for (let i = 0; i < settings.shapers.length; i++) states.shapers[2 * i + 1] = states.shapers[2 * i]!
  }
}

/** The first `n` slots again for the second channel. */
function copySlots(states: Float64Array, n: number): void {
  states.copyWithin(n, 0, n)
}

function meanInto(a: Float64Array, b: Float64Array): void {
  for (let i = 0; i < a.length; i++) a[i] = (a[i]! + b[i]!) / 2
}
