// The engine: the whole signal path of DESIGN 3 in double precision, block by block, for offline rendering and for the audio thread.
// After createEngine nothing here allocates, and nothing called while audio runs throws: what cannot be done is held and counted.

import type { Layout } from '../set/types.ts'
import { blendStraight, pathIsSilent, STRAIGHT } from './bypass.ts'
import { type Channel, type Core, clearCore, flushCore, LEAST } from './core.ts'
import { beginChunk, chunkRoom, endChunk, runCore } from './corePass.ts'
import type { Engine, EngineCounters } from './engineState.ts'
import { blend, runFading } from './fade.ts'
import { advanceLines, CHUNK, clearLines, flushLines } from './line.ts'
import { endFade, loadAtOnce } from './liveChanges.ts'
import { countNotFinite, mix, mixesPlainly, mixTo } from './mix.ts'
import { isOneVoice, oneVoice } from './oneVoice.ts'
import { advanceRamps, rampsMove, settleRamps } from './ramps.ts'
import { wrapPhase } from './sweep.ts'
import { phaseAt, startPhase } from './trajectory.ts'

export type { BypassMode } from './bypass.ts'
export type { Channel } from './core.ts'
export { createEngine, type DelayChange, type Engine, type EngineCounters, type EngineOptions } from './engineState.ts'
export { holdPosition, retargetEngine, setBypass, setDelayChange } from './liveChanges.ts'

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
  const { lines } = core.settings
  const straightHeard = rampsMove(bypass.ramps) || bypass.ramps.target[STRAIGHT] !== 0
  // Before anything is written: input and output may be the same arrays.
  if (straightHeard) for (let c = 0; c < 2; c++) takeStraight(engine, input, lines, c, at, n)
  if (!pathIsSilent(bypass)) {
    begin(engine, core, input, at, n)
    if (!straightHeard && !engine.fading && mixesPlainly(core)) {
      engine.counters.nonFinite += runPlainly(core, output, at, n)
      advance(engine, n)
      return
    }
    if (engine.fading && idle) {
      begin(engine, idle, input, at, n)
      runFading(idle, core, n, engine)
      mixAll(core, n)
      mixAll(idle, n)
      for (let c = 0; c < 2; c++) blend(core.output[c]!, 0, idle.output[c]!, n, engine)
    } else {
      runCore(core, n)
      mixAll(core, n)
    }
  }
  if (straightHeard) for (let c = 0; c < 2; c++) blendStraight(bypass, core.output[c]!, straight[c]!, n)
  for (let c = 0; c < output.length; c++) engine.counters.nonFinite += give(core.output[Math.min(c, 1)]!, output[c]!, at, n)
  advance(engine, n)
}

function begin(engine: Engine, core: Core, input: readonly Channel[], at: number, n: number): void {
  route(engine, core.source, input, core.settings.lines, at, n)
  core.sourceAt = input.length > 0 && input.length <= core.settings.lines ? at : 0
  beginChunk(core, engine.n, n)
}

/** A chunk straight to the output, where nothing comes after the mix. Returns how many samples are not finite. */
function runPlainly(core: Core, output: readonly Channel[], at: number, n: number): number {
  const { outputs } = core.settings
  let bad = 0
  if (isOneVoice(core, output)) {
    for (let c = 0; c < outputs; c++) bad += oneVoice(core, c, output[c]!, at)
  } else {
    runCore(core, n)
    for (let c = 0; c < output.length; c++) bad += mixTo(core, Math.min(c, outputs - 1), output[c]!, at, n, true)
  }
  endChunk(core, n)
  return bad
}

/** The mix of a core to its `output`, the second channel like the first where there is one, and the chunk's end. */
function mixAll(core: Core, n: number): void {
  for (let c = 0; c < core.settings.outputs; c++) mix(core, c, n)
  if (core.settings.outputs === 1) core.output[1].set(core.output[0])
  endChunk(core, n)
}

/** Sets x of both lines, for a layout of `count` lines: the input's own, the last one again where it has fewer, the mean of all where it has more. */
function route({ mean }: Engine, source: [Channel, Channel], input: readonly Channel[], count: number, at: number, n: number): void {
  if (input.length > 0 && input.length <= count) {
    for (let c = 0; c < 2; c++) source[c] = input[Math.min(c, input.length - 1)]!
    return
  }
  takeMean(input, mean, at, n)
  source[0] = mean
  source[1] = mean
}

/** Mean of all input channels, 0 without any. */
function takeMean(input: readonly Channel[], mean: Float64Array, at: number, n: number): void {
  const count = input.length
  mean.fill(0, 0, n)
  for (let i = 0; i < count; i++) add(input[i]!, at, mean, n)
  if (count > 1) for (let j = 0; j < n; j++) mean[j] = mean[j]! / count
}

function add(from: Channel, at: number, x: Float64Array, n: number): void {
  for (let j = 0; j < n; j++) x[j] = x[j]! + from[at + j]!
}

/** The input as it goes straight to output channel c, for layouts of one line (mean) or two. */
function takeStraight({ straight }: Engine, input: readonly Channel[], lines: number, c: number, at: number, n: number): void {
  const x = straight[c]!
  const count = input.length
  if (count === 0 || count > lines) {
    takeMean(input, x, at, n)
    return
  }
  x.fill(0, 0, n)
  add(input[Math.min(c, count - 1)]!, at, x, n)
}

/** Writes y out and returns how many of its samples are not finite. */
function give(y: Float64Array, to: Channel, at: number, n: number): number {
  for (let j = 0; j < n; j++) to[at + j] = y[j]!
  return countNotFinite(y, 0, n)
}

function advance(engine: Engine, n: number): void {
  const { bypass, core, live, lines } = engine
  engine.n += n
  if (!pathIsSilent(bypass)) advanceLines(lines, n, live ? 2 : core.settings.lines)
  if (live && engine.n % CHUNK === 0) {
    flushLines(lines, LEAST)
    flushCore(core)
    if (engine.fading && engine.idle) flushCore(engine.idle)
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
  clearLines(engine.lines)
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
  settleRamps(bypass.ramps)
  core.trajectory.heldDelays = 0
  if (idle) idle.trajectory.heldDelays = 0
  counters.nonFinite = 0
  counters.refusedValues = 0
}
