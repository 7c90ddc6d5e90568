// Where the sweep stands and what delay it gives every read: evaluated every `updateEvery` samples of absolute time, straight lines or
// steps between. delays.ts makes the single samples of it.
import { flatIndex } from '../set/flat.ts'
import { CHUNK } from './line.ts'
import { createRuns, LOOPS, MAX_VOICES, READS, type Runs } from './runs.ts'
import type { Settings } from './settings.ts'
import { shapeValues } from './shapeValues.ts'
import { wrapPhase } from './sweep.ts'

const RATE = flatIndex('sweep.rateHz')
const START_PHASE = flatIndex('sweep.startPhase')

export interface Trajectory {
  readonly fs: number
  /** D of each read at the last two times it was evaluated: the ends of the update interval, or where nothing ramps between, `to` alone. */
  readonly from: Float64Array
  readonly to: Float64Array
  /** Whether all of them are inside their limits. */
  fromInside: boolean
  toInside: boolean
  /** Sample at which the interval starts; −1: nothing evaluated yet. */
  interval: number
  /** What a glide still adds to each read's delay, samples. */
  readonly offset: Float64Array
  gliding: boolean
  /** Where each read stood before a change, NaN for those not in use. */
  readonly noted: Float64Array
  /** The unwrapped phase of voice 0 of channel 0 was `phase` at sample `since`, and grows by rate/fs from there unless held. */
  phase: number
  since: number
  held: boolean
  /** The phase last asked for. */
  readonly now: Float64Array
  /** Whether the loops are read. */
  loops: boolean
  /** The reads in use. */
  readonly used: Int32Array
  usedCount: number
  /** Samples for which some read was held at a limit. */
  heldDelays: number
  /** The chunk at hand in straight runs. */
  readonly runs: Runs
  /** Scratch: phase, then shape of every voice, and the edge. */
  readonly shapes: Float64Array
  /** Scratch: D of one read for each sample of the chunk. */
  readonly delays: Float64Array
}

export function createTrajectory(fs: number): Trajectory {
  return {
    fs,
    from: new Float64Array(READS),
    to: new Float64Array(READS),
    fromInside: true,
    toInside: true,
    interval: -1,
    offset: new Float64Array(READS),
    gliding: false,
    noted: new Float64Array(READS),
    phase: 0.5,
    since: 0,
    held: false,
    now: new Float64Array(1),
    loops: false,
    used: new Int32Array(READS),
    usedCount: 0,
    heldDelays: 0,
    runs: createRuns(),
    shapes: new Float64Array(2 * MAX_VOICES + 1),
    delays: new Float64Array(CHUNK),
  }
}

/** Unwrapped phase of voice 0 of channel 0 at sample n, in cycles. */
export function phaseAt(t: Trajectory, s: Settings, n: number): number {
  putPhase(t, s, n)
  return t.now[0]!
}

/** phaseAt into `now`: a number that is returned may be boxed, which allocates. */
function putPhase(t: Trajectory, s: Settings, n: number): void {
  t.now[0] = t.held ? t.phase : ((n - t.since) * s.sweep.rateHz) / t.fs + t.phase
}

/** Before a change is taken from `flat` at sample n: keeps the phase where it is through a new rate, and moves it with a new start. `s`: the old settings. */
export function keepPhase(t: Trajectory, s: Settings, n: number, flat: Float64Array): void {
  if (t.held) return
  const moved = flat[START_PHASE]! - s.sweep.startPhase
  if (moved !== 0 || flat[RATE]! !== s.sweep.rateHz) {
    t.phase = phaseAt(t, s, n) + moved
    t.since = n
  }
}

/** Stops the sweep at a position (cycles, its whole part is dropped), or with null lets it go on from there. */
export function holdPhase(t: Trajectory, s: Settings, n: number, position: number | null): void {
  const phase = phaseAt(t, s, n)
  // The whole part stays: drift goes on in the cycle it is in.
  t.phase = position === null ? phase : Math.floor(phase) + wrapPhase(position)
  t.since = n
  t.held = position !== null
}

/** Back to the start of the sweep, at sample 0. */
export function startPhase(t: Trajectory, s: Settings): void {
  t.phase = s.sweep.startPhase
  t.since = 0
}

/**
 * Evaluates D of every read, before glide and limits, at samples n, n + every … into `rows` rows of reads, the first beginning at `row`. Returns
 * whether all of them are inside their limits; fromInside and toInside are those of the last two rows ever evaluated.
 */
export function evaluate(t: Trajectory, s: Settings, n: number, every: number, rows: number, into: Float64Array, row: number): boolean {
  if (s.plainSine) {
    evaluateSine(t, s, n, every, rows, into, row)
    t.fromInside = rows > 1 || t.toInside
    t.toInside = true
    return true
  }
  let inside = true
  for (let i = 0; i < rows; i++) {
    t.fromInside = t.toInside
    t.toInside = evaluateShape(t, s, n + i * every, into, row + i * READS)
    if (!t.toInside) inside = false
  }
  return inside
}

/** Any shape, one row. Order of operations: sweepPhase. */
function evaluateShape(t: Trajectory, s: Settings, n: number, into: Float64Array, row: number): boolean {
  const { sweep, voices, outputs, lines, voicePhase, channelPhase } = s
  const { count } = voices
  const { shapes } = t
  putPhase(t, s, n)
  const phase = t.now[0]!
  for (let c = 0; c < outputs; c++) for (let v = 0; v < count; v++) shapes[c * count + v] = phase + voicePhase[v]! + channelPhase[c]!
  shapes[outputs * count] = s.edge
  shapeValues(sweep, shapes, outputs * count, count, t.held)
  for (let c = 0; c < outputs; c++) for (let v = 0; v < count; v++) putVoice(s, v, shapes, c * count + v, into, row + c * MAX_VOICES + v)
  if (t.loops) for (let c = 0; c < lines; c++) putLoop(s, shapes, c * count, into, row + LOOPS + c)
  let inside = true
  for (let i = 0; i < t.usedCount; i++) {
    const delay = into[row + t.used[i]!]!
    if (!(delay >= (t.used[i]! < LOOPS ? s.voiceLeast : s.loopLeast) && delay <= s.longest)) inside = false
  }
  return inside
}

/** D of voice v where its shape is shapes[i]. */
function putVoice({ sweep, centreMs, fs }: Settings, v: number, shapes: Float64Array, i: number, into: Float64Array, at: number): void {
  const { law, depthMs, depthOctaves } = sweep
  const ms = law === 'time' ? centreMs[v]! + depthMs * shapes[i]! : centreMs[v]! * 2 ** (depthOctaves * shapes[i]!)
  into[at] = (ms * fs) / 1000
}

/** D of a loop where voice 0's shape is shapes[i]. */
function putLoop(
  { sweep, baseMs, fs, loopMoves, loopLess }: Settings,
  shapes: Float64Array,
  i: number,
  into: Float64Array,
  at: number,
): void {
  const { law, depthMs, depthOctaves } = sweep
  let ms = baseMs
  if (loopMoves) ms = law === 'time' ? baseMs + depthMs * shapes[i]! : baseMs * 2 ** (depthOctaves * shapes[i]!)
  into[at] = (ms * fs) / 1000 - loopLess
}

/** The sine: see sine.ts. */
function evaluateSine(t: Trajectory, s: Settings, n: number, every: number, rows: number, into: Float64Array, row: number): void {
  const { used, usedCount } = t
  const { centre, inSine, inCosine, cosine: needed } = s.sineTables
  const perSample = t.held ? 0 : s.sweep.rateHz / t.fs
  for (let i = 0; i < rows; i++) {
    // Of the absolute sample, so that cuts do not matter.
    const phase = (n + i * every - t.since) * perSample + t.phase
    const angle = 2 * Math.PI * (phase - Math.floor(phase))
    const sine = Math.sin(angle)
    const cosine = needed ? Math.cos(angle) : 0
    const at = row + i * READS
    for (let k = 0; k < usedCount; k++) {
      const r = used[k]!
      into[at + r] = centre[r]! + inSine[r]! * sine + inCosine[r]! * cosine
    }
  }
}

export const rampsBetween = ({ sweep }: Settings): boolean => sweep.between === 'ramp' && sweep.updateEvery > 1

/** Evaluates what the update interval that holds sample n needs. */
export function enterInterval(t: Trajectory, s: Settings, n: number): void {
  const every = s.sweep.updateEvery
  const start = n - (n % every)
  if (t.interval === start) return
  if (!rampsBetween(s)) {
    evaluate(t, s, start, every, 1, t.to, 0)
    t.fromInside = t.toInside
  } else {
    if (t.interval >= 0 && t.interval + every === start) copyUsed(t, t.to, 0, t.from, 0)
    else evaluate(t, s, start, every, 1, t.from, 0)
    evaluate(t, s, start + every, every, 1, t.to, 0)
  }
  t.interval = start
}

/** Copies the reads in use from one row of reads to another. */
export function copyUsed({ used, usedCount }: Trajectory, from: Float64Array, f: number, to: Float64Array, o: number): void {
  for (let i = 0; i < usedCount; i++) to[o + used[i]!] = from[f + used[i]!]!
}

/** Whether the loops are read from the next chunk on. */
export function switchLoops(t: Trajectory, s: Settings, on: boolean): void {
  if (on === t.loops) return
  t.loops = on
  listReads(t, s)
  // The reads that come in were not evaluated.
  t.interval = -1
}

/** Lists the reads in use: voices of every channel, and the loops when they are on. */
export function listReads(t: Trajectory, s: Settings): void {
  let count = 0
  for (let c = 0; c < s.outputs; c++) for (let v = 0; v < s.voices.count; v++) t.used[count++] = c * MAX_VOICES + v
  if (t.loops) for (let c = 0; c < s.lines; c++) t.used[count++] = LOOPS + c
  t.usedCount = count
}

/** D of read r at sample n of the interval entered, before glide and limits. */
function between(t: Trajectory, s: Settings, r: number, n: number): number {
  if (!rampsBetween(s)) return t.to[r]!
  return t.from[r]! + ((t.to[r]! - t.from[r]!) / s.sweep.updateEvery) * (n - t.interval)
}

/** Notes where every read in use stands at sample n, glide included: what a change that follows is to glide from. */
export function noteDelays(t: Trajectory, s: Settings, n: number): void {
  enterInterval(t, s, n)
  t.noted.fill(Number.NaN)
  for (let i = 0; i < t.usedCount; i++) {
    const r = t.used[i]!
    t.noted[r] = between(t, s, r, n) + t.offset[r]!
  }
}

/** After a change of settings or phase at sample n: evaluates afresh, and lets every read glide there from `noted`, or jump where that has none. */
export function glideFrom(t: Trajectory, s: Settings, n: number, noted: Float64Array): void {
  jump(t, s)
  enterInterval(t, s, n)
  for (let i = 0; i < t.usedCount; i++) {
    const r = t.used[i]!
    if (Number.isNaN(noted[r])) continue
    t.offset[r] = noted[r]! - between(t, s, r, n)
    if (t.offset[r] !== 0) t.gliding = true
  }
}

/** After a change of settings or phase: evaluates afresh at the next chunk, every read at once where it belongs. */
export function jump(t: Trajectory, s: Settings): void {
  listReads(t, s)
  t.interval = -1
  t.offset.fill(0)
  t.gliding = false
}
