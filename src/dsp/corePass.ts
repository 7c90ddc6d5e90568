// One chunk through one core: u, the lines, the voices, the mix.
import { type Channel, type Core, settleCore } from './core.ts'
import { planRuns } from './delays.ts'
import { highPass, highPassMoving, lowPass, lowPassMoving } from './filterPasses.ts'
import { CHUNK, rewindLine, writeLine } from './line.ts'
import { isLinearLoop, linearLoop } from './linearLoop.ts'
import { writeByPieces } from './loop.ts'
import {
  advanceRamps,
  DRY,
  FEEDBACK,
  INPUT_GAIN,
  INPUT_OPEN,
  OUTPUT_GAIN,
  type Ramps,
  rampsMove,
  SHAPER_VALUES,
  SHAPERS,
  WET,
  WET_HIGH_CUT,
  WET_LOW_CUT,
} from './ramps.ts'
import { addRead } from './reads.ts'
import { LOOPS, MAX_VOICES } from './runs.ts'
import { INPUT, LOOP, OUTPUT, type Settings } from './settings.ts'
import { shape, shapeMoving } from './shaperPass.ts'
import { switchLoops } from './trajectory.ts'

/** Samples that a chunk may have: to the end of the lines and of the ramps. */
export function chunkRoom({ lines, position, ramps }: Core): number {
  const room = Math.min(CHUNK, lines[0].length - position)
  return rampsMove(ramps) ? Math.min(room, ramps.length - ramps.elapsed) : room
}

/**
 * Runs n samples, at most chunkRoom, from absolute sample `first` on: from `source` to the lines and to the wet of each channel. The mix
 * follows, then endChunk.
 */
export function runCore(core: Core, first: number, n: number): void {
  const { settings, ramps, trajectory } = core
  const moving = rampsMove(ramps)
  takeLoopOnOrOff(core, moving)
  planRuns(trajectory, settings, first, n)
  if (isLinearLoop(core, moving)) {
    for (let c = 0; c < settings.lines; c++) linearLoop(core, c)
  } else {
    for (let c = 0; c < settings.lines; c++) takeInput(core, c, n, moving)
    if (trajectory.loops) writeByPieces(core, moving)
    else for (let c = 0; c < settings.lines; c++) writeLine(core.lines[c]!, core.position, core.input[c]!, 0, n)
  }
  if (core.keepsDry) for (let c = 0; c < settings.lines; c++) writeLine(core.dryLines[c]!, core.position, core.input[c]!, 0, n)
  for (let c = 0; c < settings.outputs; c++) {
    readVoices(core, c, n)
    toneWet(core, c, n, moving)
  }
}

/** Moves on by the n samples of the chunk. */
export function endChunk(core: Core, n: number): void {
  core.position += n
  if (core.position === core.lines[0].length) rewind(core)
  if (!rampsMove(core.ramps)) return
  advanceRamps(core.ramps, n)
  if (!rampsMove(core.ramps)) settleCore(core)
}

function rewind(core: Core): void {
  for (let c = 0; c < 2; c++) {
    rewindLine(core.lines[c]!, core.length)
    if (core.keepsDry) rewindLine(core.dryLines[c]!, core.length)
  }
  core.position = core.length
}

/** A loop without feedback is not run; when it starts again its filters start from rest. */
function takeLoopOnOrOff({ settings, ramps, trajectory, states }: Core, moving: boolean): void {
  const on = ramps.target[FEEDBACK] !== 0 || (moving && ramps.start[FEEDBACK] !== 0)
  if (trajectory.loops && !on) {
    states.damping.fill(0)
    states.lowCut.fill(0)
    states.shapers.fill(0, 2 * LOOP, 2 * LOOP + 2)
    states.reads.fill(0, LOOPS)
  }
  switchLoops(trajectory, settings, on)
}

/** u of line c from its source. */
function takeInput(core: Core, c: number, n: number, moving: boolean): void {
  const { settings, ramps, states, sourceAt } = core
  const x = core.source[c]!
  const u = core.input[c]!
  for (let j = 0; j < n; j++) u[j] = x[sourceAt + j]!
  const shaper = settings.shapers[INPUT]!
  scale(u, n, ramps, INPUT_GAIN, moving)
  if (moving) shapeMoving(shaper, u, 0, n, ramps, ramps.elapsed, SHAPERS + INPUT * SHAPER_VALUES, states.shapers, 2 * INPUT + c)
  else shape(shaper, u, 0, n, states.shapers, 2 * INPUT + c)
  scale(u, n, ramps, INPUT_OPEN, moving)
}

/** x · the value at slot `i`, in place. */
function scale(x: Float64Array, n: number, { target, start, slope, elapsed }: Ramps, i: number, moving: boolean): void {
  if (moving) {
    for (let j = 0; j < n; j++) x[j] = x[j]! * (start[i]! + slope[i]! * (elapsed + j))
  } else if (target[i] !== 1) {
    const gain = target[i]!
    for (let j = 0; j < n; j++) x[j] = x[j]! * gain
  }
}

/** Σ read of channel c. */
function readVoices({ settings, lines, position, read, wet }: Core, c: number, n: number): void {
  const m = wet[c]!
  m.fill(0, 0, n)
  read.line = lines[settings.lines === 2 ? c : 0]!
  read.at = position
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
  if (ramps.target[WET_HIGH_CUT + 1]) lowPass(m, 0, n, ramps.target[WET_HIGH_CUT]!, states.wetHighCut, c)
  if (ramps.target[WET_LOW_CUT + 1]) highPass(m, 0, n, ramps.target[WET_LOW_CUT]!, states.wetLowCut, 2 * c)
}

/** y of channel c, outputGain · outputShaper(dry · d ± wet · m), into `output`. */
export function mix(core: Core, c: number, n: number): void {
  const { settings, ramps, states } = core
  const { start, slope, elapsed } = ramps
  const y = core.output[c]!
  const shaper = settings.shapers[OUTPUT]!
  const moving = rampsMove(ramps)
  if (moving) {
    const d = dryOf(core, c)
    const at = dryAt(core)
    const m = core.wet[c]!
    for (let j = 0; j < n; j++) {
      const dry = start[DRY]! + slope[DRY]! * (elapsed + j)
      const wet = start[WET + c]! + slope[WET + c]! * (elapsed + j)
      y[j] = dry * d[at + j]! + wet * (settings.voiceScale * m[j]!)
    }
    shapeMoving(shaper, y, 0, n, ramps, elapsed, SHAPERS + OUTPUT * SHAPER_VALUES, states.shapers, 2 * OUTPUT + c)
  } else {
    mixTo(core, c, y, 0, n, false)
    shape(shaper, y, 0, n, states.shapers, 2 * OUTPUT + c)
  }
  scale(y, n, ramps, OUTPUT_GAIN, moving)
}

/** Whether mixTo gives y as it is to be heard. */
export function mixesPlainly({ settings, ramps }: Core): boolean {
  return !rampsMove(ramps) && !settings.shapers[OUTPUT]!.on
}

/** dry · d ± wet · m of channel c, times outputGain if `gained`, while no ramp moves. Returns how many samples are not finite. */
export function mixTo(core: Core, c: number, y: Channel, yAt: number, n: number, gained: boolean): number {
  const { settings, ramps } = core
  const d = dryOf(core, c)
  const at = dryAt(core)
  const m = core.wet[c]!
  const gain = gained ? ramps.target[OUTPUT_GAIN]! : 1
  const dry = gain * ramps.target[DRY]!
  const wet = gain * ramps.target[WET + c]! * settings.voiceScale
  let bad = 0
  let j = 0
  // Two samples a turn: the turn itself costs as much as a sample.
  for (; j < n - 1; j += 2) {
    const v = dry * d[at + j]! + wet * m[j]!
    const next = dry * d[at + j + 1]! + wet * m[j + 1]!
    if (!(Math.abs(v) + Math.abs(next) < Number.POSITIVE_INFINITY)) bad += notFinite(v) + notFinite(next)
    y[yAt + j] = v
    y[yAt + j + 1] = next
  }
  if (j < n) {
    const v = dry * d[at + j]! + wet * m[j]!
    bad += notFinite(v)
    y[yAt + j] = v
  }
  return bad
}

const notFinite = (v: number): number => (Math.abs(v) < Number.POSITIVE_INFINITY ? 0 : 1)

/** Where the dry signal of channel c stands, and the index there of the chunk's first sample. */
function dryOf({ settings, lines, dryLines, input }: Core, c: number): Float64Array {
  const line = settings.lines === 2 ? c : 0
  if (settings.dryFromLine) return lines[line]!
  return dryDelay(settings) === 0 ? input[line]! : dryLines[line]!
}

function dryAt({ settings, position }: Core): number {
  const delay = dryDelay(settings)
  return delay === 0 && !settings.dryFromLine ? 0 : position - delay
}

/** Dry delay in whole samples, rounded half up, at most `longest`. */
function dryDelay({ dryDelayMs, fs, longest }: Settings): number {
  return Math.min(Math.floor((dryDelayMs * fs) / 1000 + 0.5), Math.floor(longest)) | 0
}
