// One chunk through one core: u, the lines, the voices, the mix.
import { type Core, settleCore } from './core.ts'
import { planRuns } from './delays.ts'
import { highPass, highPassMoving, lowPass, lowPassMoving } from './filterPasses.ts'
import { CHUNK, type Lines, shareLine } from './line.ts'
import { isLinearLoop, linearLoop } from './linearLoop.ts'
import { writeByPieces } from './loop.ts'
import {
  advanceRamps,
  FEEDBACK,
  INPUT_GAIN,
  INPUT_OPEN,
  rampsMove,
  SHAPER_VALUES,
  SHAPERS,
  scale,
  WET_HIGH_CUT,
  WET_LOW_CUT,
} from './ramps.ts'
import { addRead } from './reads.ts'
import { LOOPS, MAX_VOICES } from './runs.ts'
import { INPUT, LOOP } from './settings.ts'
import { shape, shapeMoving } from './shaperPass.ts'
import { switchLoops } from './trajectory.ts'

/** Samples that a chunk may have: to the end of the lines and of the ramps. */
export function chunkRoom({ lines, ramps }: Core): number {
  const room = Math.min(CHUNK, lines.w[0].length - lines.position)
  return rampsMove(ramps) ? Math.min(room, ramps.length - ramps.elapsed) : room
}

/** Begins a chunk of n samples, at most chunkRoom, at absolute sample `first`. */
export function beginChunk(core: Core, first: number, n: number): void {
  takeLoopOnOrOff(core)
  planRuns(core.trajectory, core.settings, first, n)
}

/** Runs the n samples of the chunk from `source` to the lines and to the wet of each channel. The mix follows, then endChunk. */
export function runCore(core: Core, n: number): void {
  const { settings, trajectory, lines } = core
  const moving = rampsMove(core.ramps)
  if (isLinearLoop(core, moving)) {
    for (let c = 0; c < settings.lines; c++) linearLoop(core, c)
  } else {
    for (let c = 0; c < settings.lines; c++) takeInput(core, c, lines.u[c]!, lines.uAt, n)
    if (trajectory.loops) writeByPieces(core, moving)
    else for (let c = 0; c < settings.lines; c++) writeInput(lines, c, n)
  }
  if (lines.keepsInput && settings.lines === 1) shareLine(lines, n)
  readWet(core, n)
}

/** w = u: a line without a loop. */
function writeInput({ w, u, uAt, position }: Lines, c: number, n: number): void {
  const line = w[c]!
  const from = u[c]!
  for (let j = 0; j < n; j++) line[position + j] = from[uAt + j]!
}

/** The wet of each channel, once the lines are written. */
export function readWet(core: Core, n: number): void {
  const moving = rampsMove(core.ramps)
  for (let c = 0; c < core.settings.outputs; c++) {
    readVoices(core, c, n)
    toneWet(core, c, n, moving)
  }
}

/** Moves the ramps on by the n samples of the chunk. */
export function endChunk(core: Core, n: number): void {
  if (!rampsMove(core.ramps)) return
  advanceRamps(core.ramps, n)
  if (!rampsMove(core.ramps)) settleCore(core)
}

/** A loop without feedback is not run; when it starts again its filters start from rest. */
function takeLoopOnOrOff({ settings, ramps, trajectory, states }: Core): void {
  const on = ramps.target[FEEDBACK] !== 0 || (rampsMove(ramps) && ramps.start[FEEDBACK] !== 0)
  if (trajectory.loops && !on) {
    states.damping.fill(0)
    states.lowCut.fill(0)
    states.shapers.fill(0, 2 * LOOP, 2 * LOOP + 2)
    states.reads.fill(0, LOOPS)
  }
  switchLoops(trajectory, settings, on)
}

/** u of line c from its source, to u[at …]. */
export function takeInput(core: Core, c: number, u: Float64Array, at: number, n: number): void {
  const { settings, ramps, states, sourceAt } = core
  const x = core.source[c]!
  for (let j = 0; j < n; j++) u[at + j] = x[sourceAt + j]!
  const shaper = settings.shapers[INPUT]!
  const moving = rampsMove(ramps)
  scale(u, at, n, ramps, INPUT_GAIN, moving)
  if (moving) shapeMoving(shaper, u, at, n, ramps, ramps.elapsed, SHAPERS + INPUT * SHAPER_VALUES, states.shapers, 2 * INPUT + c)
  else shape(shaper, u, at, n, states.shapers, 2 * INPUT + c)
  scale(u, at, n, ramps, INPUT_OPEN, moving)
}

/** Σ read of channel c. */
function readVoices({ settings, lines, read, wet }: Core, c: number, n: number): void {
  const m = wet[c]!
  m.fill(0, 0, n)
  read.line = lines.w[settings.lines === 2 ? c : 0]!
  read.at = lines.position
  read.out = m
  for (let v = 0; v < settings.voices.count; v++) {
    read.read = c * MAX_VOICES + v
    addRead(settings.voiceRead, read)
  }
}

/** m of channel c, but for V^(−1/2), which the mix brings in. */
function toneWet({ ramps, states, wet }: Core, c: number, n: number, moving: boolean): void {
  const m = wet[c]!
  if (moving) {
    lowPassMoving(m, 0, n, ramps, ramps.elapsed, WET_HIGH_CUT, states.wetHighCut, c)
    highPassMoving(m, 0, n, ramps, ramps.elapsed, WET_LOW_CUT, states.wetLowCut, 2 * c)
    return
  }
  if (ramps.target[WET_HIGH_CUT + 1]) lowPass(m, 0, n, ramps, WET_HIGH_CUT, states.wetHighCut, c)
  if (ramps.target[WET_LOW_CUT + 1]) highPass(m, 0, n, ramps, WET_LOW_CUT, states.wetLowCut, 2 * c)
}
