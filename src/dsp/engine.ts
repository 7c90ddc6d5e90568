// The engine: the whole signal path of DESIGN 3 in double precision, block by block, for offline rendering and for the audio thread.
// After createEngine nothing here allocates, and nothing called while audio runs throws: what cannot be done is held and counted.

import type { Layout } from '../set/types.ts'
import { blendStraight, pathIsSilent, STRAIGHT } from './bypass.ts'
import { type Core, clearCore, flushStates } from './core.ts'
import { chunkRoom, runCore } from './corePass.ts'
import type { Engine, EngineCounters } from './engineState.ts'
import { CHUNK } from './line.ts'
import { endFade, loadAtOnce } from './liveChanges.ts'
import { advanceRamps, rampsMove, settleRamps } from './ramps.ts'
import { wrapPhase } from './sweep.ts'
import { jump, phaseAt, startPhase } from './trajectory.ts'

export type { BypassMode } from './bypass.ts'
export { createEngine, type DelayChange, type Engine, type EngineCounters, type EngineOptions } from './engineState.ts'
export { holdPosition, retargetEngine, setBypass, setDelayChange } from './liveChanges.ts'

/** A channel of audio in or out; samples are taken and given as they are, ±1 meaning full scale. */
export type Channel = Float32Array | Float64Array

/** Channels a layout takes in: one a line. */
export const inputChannels = (layout: Layout): 1 | 2 => (layout === 'stereo' ? 2 : 1)

/** Channels a layout gives. */
export const outputChannels = (layout: Layout): 1 | 2 => (layout === 'mono' ? 1 : 2)

/**
 * Runs `frames` samples: input[c][offset …] to output[c][offset …], which may be the same arrays. Any number of input channels: none is
 * silence, more than lines are averaged, fewer copied. Output channels past the layout's repeat its last; missing ones are not written.
 * The result does not depend on how a signal is cut into calls.
 */
export function processEngine(engine: Engine, input: readonly Channel[], output: readonly Channel[], frames: number, offset = 0): void {
  for (let done = 0; done < frames; ) {
    const n = Math.min(frames - done, room(engine))
    run(engine, input, output, offset + done, n)
    done += n
  }
}

/** Samples until something begins or ends: lines, ramps, fades, the grid on which dying states are flushed. */
function room(engine: Engine): number {
  const { core, idle, bypass, live, n } = engine
  let most = chunkRoom(core)
  if (engine.fading && idle) most = Math.min(most, chunkRoom(idle), engine.fadeLength - engine.fadeElapsed)
  if (rampsMove(bypass.ramps)) most = Math.min(most, bypass.ramps.length - bypass.ramps.elapsed)
  return live ? Math.min(most, CHUNK - (n % CHUNK)) : most
}

function run(engine: Engine, input: readonly Channel[], output: readonly Channel[], at: number, n: number): void {
  const { core, idle, bypass, straight } = engine
  const straightHeard = rampsMove(bypass.ramps) || bypass.ramps.target[STRAIGHT] !== 0
  const silent = pathIsSilent(bypass)
  const y = core.output
  if (straightHeard) for (let c = 0; c < 2; c++) route(input, core.settings.lines, c, straight[c]!, at, n)
  if (silent) {
    for (let c = 0; c < 2; c++) y[c]!.fill(0, 0, n)
  } else {
    runOne(core, input, at, engine.n, n)
    if (engine.fading && idle) {
      runOne(idle, input, at, engine.n, n)
      for (let c = 0; c < 2; c++) fadeInto(y[c]!, idle.output[c]!, engine.fadeElapsed, engine.fadeLength, n)
    }
  }
  if (straightHeard) for (let c = 0; c < 2; c++) blendStraight(bypass, y[c]!, straight[c]!, n)
  for (let c = 0; c < output.length; c++) engine.counters.nonFinite += give(y[Math.min(c, 1)]!, output[c]!, at, n)
  advance(engine, n)
}

function runOne(core: Core, input: readonly Channel[], at: number, first: number, n: number): void {
  for (let c = 0; c < core.settings.lines; c++) route(input, core.settings.lines, c, core.input[c]!, at, n)
  runCore(core, first, n)
}

/** x of channel `c` of `channels`: the input's own, the last one again where it has fewer, the mean of all where it has more. */
function route(input: readonly Channel[], channels: number, c: number, x: Float64Array, at: number, n: number): void {
  const count = input.length
  if (count === 0) {
    x.fill(0, 0, n)
    return
  }
  const mean = count > channels
  take(input[mean ? 0 : Math.min(c, count - 1)]!, at, x, n)
  if (!mean) return
  for (let i = 1; i < count; i++) add(input[i]!, at, x, n)
  for (let j = 0; j < n; j++) x[j] = x[j]! / count
}

function take(from: Channel, at: number, x: Float64Array, n: number): void {
  for (let j = 0; j < n; j++) x[j] = from[at + j]!
}

function add(from: Channel, at: number, x: Float64Array, n: number): void {
  for (let j = 0; j < n; j++) x[j] = x[j]! + from[at + j]!
}

/** y = old + (y − old) t, t from 0 to 1 over the fade. The two are alike enough for equal gain. */
function fadeInto(y: Float64Array, old: Float64Array, elapsed: number, length: number, n: number): void {
  for (let j = 0; j < n; j++) {
    const t = (elapsed + j) / length
    y[j] = (1 - t) * old[j]! + t * y[j]!
  }
}

/** Writes y out and returns how many of its samples were not finite. */
function give(y: Float64Array, to: Channel, at: number, n: number): number {
  let bad = 0
  for (let j = 0; j < n; j++) {
    const v = y[j]!
    if (!(Math.abs(v) < Number.POSITIVE_INFINITY)) bad++
    to[at + j] = v
  }
  return bad
}

function advance(engine: Engine, n: number): void {
  const { bypass, core, live } = engine
  engine.n += n
  if (live && engine.n % CHUNK === 0) {
    flushStates(core)
    if (engine.fading && engine.idle) flushStates(engine.idle)
  }
  if (rampsMove(bypass.ramps)) {
    advanceRamps(bypass.ramps, n)
    if (pathIsSilent(bypass)) stop(engine)
  }
  if (engine.fading) {
    engine.fadeElapsed += n
    if (engine.fadeElapsed >= engine.fadeLength) endFade(engine)
  }
}

/** Behind a hard bypass: all changes at their end, memory empty, so that nothing old sounds when the effect comes back. */
function stop(engine: Engine): void {
  engine.fading = false
  engine.pending = false
  loadAtOnce(engine)
  clearCore(engine.core)
}

/** Position of channel 0's voice 0 in its cycle at the next sample, 0 to 1. */
export function sweepPosition({ core, n }: Engine): number {
  return wrapPhase(phaseAt(core.trajectory, core.settings, n))
}

/** The engine's counts since it was made or reset; always the same object. */
export function engineCounters({ core, idle, counters }: Engine): Readonly<EngineCounters> {
  counters.heldDelays = core.trajectory.heldDelays + (idle ? idle.trajectory.heldDelays : 0)
  return counters
}

/**
 * As after switching on: memory empty, sweep at its start, every change under way at its end, counts 0. The set as edited, the bypass and
 * a held position stay.
 */
export function resetEngine(engine: Engine): void {
  const { core, idle, bypass, counters } = engine
  engine.n = 0
  stop(engine)
  if (!core.trajectory.held) startPhase(core.trajectory, core.settings)
  jump(core.trajectory)
  settleRamps(bypass.ramps)
  core.trajectory.heldDelays = 0
  if (idle) idle.trajectory.heldDelays = 0
  counters.nonFinite = 0
  counters.refusedValues = 0
}
