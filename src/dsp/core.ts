// One signal path but for its lines. The engine has two on the same lines: a change that only a cross-fade can make is loaded into the idle
// one, and both run while one fades into the other.
import { setTargets } from './gains.ts'
import { CHUNK, type Lines, type Pair, pair } from './line.ts'
import { CORE_RAMPS, copyRamps, createRamps, type Ramps, SHAPER_VALUES, SHAPERS, settleRamps } from './ramps.ts'
import type { Read } from './reads.ts'
import { LOOPS, MAX_VOICES, READS } from './runs.ts'
import { createSettings, OUTPUT, type Settings, takeStructure } from './settings.ts'
import { takeShaperValues } from './shaperPass.ts'
import { createTrajectory, jump, type Trajectory } from './trajectory.ts'

/** A channel of audio in or out; samples are taken and given as they are, ±1 meaning full scale. */
export type Channel = Float32Array | Float64Array

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
  readonly lines: Lines
  readonly states: States
  /** x of each line: sample j of the chunk is source[c][sourceAt + j]. */
  readonly source: [Channel, Channel]
  sourceAt: number
  /** A chunk each: u of a core that fades out, s, g X s, wet and output by channel. */
  readonly taken: Pair
  readonly loop: Pair
  readonly fed: Pair
  readonly wet: Pair
  readonly output: Pair
  readonly read: Read
}

/** `maxDelay`: the longest delay any read may have, samples. */
export function createCore(fs: number, maxDelay: number, lines: Lines): Core {
  const trajectory = createTrajectory(fs)
  const states: States = {
    damping: new Float64Array(2),
    lowCut: new Float64Array(4),
    wetHighCut: new Float64Array(2),
    wetLowCut: new Float64Array(4),
    shapers: new Float64Array(6),
    reads: new Float64Array(READS),
  }
  const wet = pair(CHUNK)
  return {
    fs,
    settings: createSettings(fs, maxDelay),
    ramps: createRamps(fs, CORE_RAMPS),
    trajectory,
    lines,
    states,
    source: [wet[0], wet[1]],
    sourceAt: 0,
    taken: pair(CHUNK),
    loop: pair(CHUNK),
    fed: pair(CHUNK),
    wet,
    output: pair(CHUNK),
    read: { runs: trajectory.runs, read: 0, line: lines.w[0], at: 0, states: states.reads, out: wet[0] },
  }
}

/** Below this the live engine takes a value of line or filters for 0: −600 dB; denormal numbers, which are slow, begin at −6150 dB. */
export const LEAST = 1e-30

/** Sets the recursive parts' memory to 0 where it has nearly died. */
export function flushCore({ states }: Core): void {
  flushSlots(states.damping)
  flushSlots(states.lowCut)
  flushSlots(states.wetHighCut)
  flushSlots(states.wetLowCut)
  flushSlots(states.reads)
}

function flushSlots(states: Float64Array): void {
  for (let i = 0; i < states.length; i++) if (Math.abs(states[i]!) < LEAST) states[i] = 0
}

/** Filters at rest. Settings, ramps and phase stay. */
export function clearCore({ states }: Core): void {
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

/** Copies what another core's recursive parts remember, and its motion, not its settings. */
export function copyStates(to: Core, from: Core): void {
  copyRamps(to.ramps, from.ramps)
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

/** Makes states copied from a core of another layout fit: what is new begins like the first channel. */
export function fitStates({ settings, states }: Core, linesBefore: number, outputsBefore: number): void {
  if (linesBefore < settings.lines) {
    states.damping.copyWithin(1, 0, 1)
    states.lowCut.copyWithin(2, 0, 2)
    states.reads[LOOPS + 1] = states.reads[LOOPS]!
    for (let i = 0; i < OUTPUT; i++) states.shapers[2 * i + 1] = states.shapers[2 * i]!
  }
  if (outputsBefore < settings.outputs) {
    states.wetHighCut.copyWithin(1, 0, 1)
    states.wetLowCut.copyWithin(2, 0, 2)
    states.reads.copyWithin(MAX_VOICES, 0, MAX_VOICES)
    states.shapers[2 * OUTPUT + 1] = states.shapers[2 * OUTPUT]!
  }
}
