// One chunk through one core: u, the lines, the voices, the mix.
import type { Core } from './core.ts'
import { settleCore } from './core.ts'
import { planRuns } from './delays.ts'
import { highPass, highPassMoving, lowPass, lowPassMoving } from './filterPasses.ts'
import { CHUNK, writeLine } from './line.ts'
import { writeLines } from './loop.ts'
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
import { INPUT, LOOP, MAX_VOICES, OUTPUT } from './settings.ts'
import { shape, shapeMoving } from './shaperPass.ts'
import { LOOPS, switchLoops } from './trajectory.ts'

/** Samples that a chunk may have: to the end of the lines' first half and of the ramps. */
export function chunkRoom({ length, position, ramps }: Core): number {
  const room = Math.min(CHUNK, length - position)
  return rampsMove(ramps) ? Math.min(room, ramps.length - ramps.elapsed) : room
}

/** Runs n samples, at most chunkRoom, from absolute sample `first` on. Reads x of each line from `input`, leaves y of each channel in `output`. */
export function runCore(core: Core, first: number, n: number): void {
  const { settings, ramps, trajectory } = core
  const moving = rampsMove(ramps)
  takeLoopOnOrOff(core, moving)
  planRuns(trajectory, settings, first, n)
  for (let c = 0; c < settings.lines; c++) takeInput(core, c, n, moving)
  writeLines(core, n, moving)
  for (let c = 0; c < settings.outputs; c++) {
    readVoices(core, c, n)
    toneWet(core, c, n, moving)
    mix(core, c, n, moving)
  }
  if (settings.outputs === 1) core.output[1].set(core.output[0])
  core.position = (core.position + n) % core.length
  if (moving) {
    advanceRamps(ramps, n)
    if (!rampsMove(ramps)) settleCore(core)
  }
}

/** A loop without feedback is not run; when it starts again its filters start from rest. */
function takeLoopOnOrOff({ ramps, trajectory, states }: Core, moving: boolean): void {
  const on = ramps.target[FEEDBACK] !== 0 || (moving && ramps.start[FEEDBACK] !== 0)
  if (trajectory.loops && !on) {
    states.damping.fill(0)
    states.lowCut.fill(0)
    states.shapers.fill(0, 2 * LOOP, 2 * LOOP + 2)
    states.reads.fill(0, LOOPS)
  }
  switchLoops(trajectory, on)
}

/** u of line c from its x, in place. */
function takeInput({ settings, ramps, states, input, dryLines, keepsDry, position }: Core, c: number, n: number, moving: boolean): void {
  const u = input[c]!
  const shaper = settings.shapers[INPUT]!
  scale(u, n, ramps, INPUT_GAIN, moving)
  if (moving) shapeMoving(shaper, u, 0, n, ramps, ramps.elapsed, SHAPERS + INPUT * SHAPER_VALUES, states.shapers, 2 * INPUT + c)
  else shape(shaper, u, 0, n, states.shapers, 2 * INPUT + c)
  scale(u, n, ramps, INPUT_OPEN, moving)
  if (keepsDry) writeLine(dryLines[c]!, position, u, 0, n, 0)
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

/** m of channel c before its tone: V^(−1/2) Σ read. */
function readVoices({ settings, lines, position, length, read, wet }: Core, c: number, n: number): void {
  const m = wet[c]!
  m.fill(0, 0, n)
  read.line = lines[settings.lines === 2 ? c : 0]!
  read.at = position + length
  read.out = m
  for (let v = 0; v < settings.voices.count; v++) {
    read.read = c * MAX_VOICES + v
    addRead(settings.voiceRead, read)
  }
  if (settings.voices.count > 1) {
    const gain = settings.voiceScale
    for (let j = 0; j < n; j++) m[j] = m[j]! * gain
  }
}

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

/** y of channel c: outputGain · outputShaper(dry · d ± wet · m). */
function mix(core: Core, c: number, n: number, moving: boolean): void {
  const { settings, ramps, states, wet, output } = core
  const { target, start, slope, elapsed } = ramps
  const line = settings.lines === 2 ? c : 0
  const delay = dryDelay(core)
  const now = !settings.dryFromLine && delay === 0
  const d = now ? core.input[line]! : (settings.dryFromLine ? core.lines : core.dryLines)[line]!
  const at = now ? 0 : core.position + core.length - delay
  const m = wet[c]!
  const y = output[c]!
  let dryGain = target[DRY]!
  let wetGain = target[WET + c]!
  for (let j = 0; j < n; j++) {
    if (moving) {
      dryGain = start[DRY]! + slope[DRY]! * (elapsed + j)
      wetGain = start[WET + c]! + slope[WET + c]! * (elapsed + j)
    }
    y[j] = dryGain * d[at + j]! + wetGain * m[j]!
  }
  const shaper = settings.shapers[OUTPUT]!
  if (moving) shapeMoving(shaper, y, 0, n, ramps, elapsed, SHAPERS + OUTPUT * SHAPER_VALUES, states.shapers, 2 * OUTPUT + c)
  else shape(shaper, y, 0, n, states.shapers, 2 * OUTPUT + c)
  scale(y, n, ramps, OUTPUT_GAIN, moving)
}

/** Dry delay in whole samples, rounded half up, at most as long as the line. */
function dryDelay({ settings, fs, trajectory }: Core): number {
  return Math.min(Math.floor((settings.dryDelayMs * fs) / 1000 + 0.5), Math.floor(trajectory.longest))
}
