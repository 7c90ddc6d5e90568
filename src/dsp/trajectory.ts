// Where the sweep stands and what delay it gives every read: evaluated every `updateEvery` samples of absolute time, straight lines or
// steps between. delays.ts makes the single samples of it.
//
// Reads: voice v of channel c is c · MAX_VOICES + v; the loop of line c is LOOPS + c.
import { flatIndex } from '../set/flat.ts'
import { CHUNK } from './line.ts'
import { createRuns, type Runs } from './runs.ts'
import { MAX_VOICES, type Settings } from './settings.ts'
import { frozenShapeValue, sweepShapeValue, wrapPhase } from './sweep.ts'

export const LOOPS = 2 * MAX_VOICES
export const READS = LOOPS + 2

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
  /** Largest delay the line can give, samples. */
  readonly longest: number
  /** Whether the loops are read; their limits count only then. */
  loops: boolean
  /** Samples for which some read was held at a limit. */
  heldDelays: number
  /** The chunk at hand in straight runs. */
  readonly runs: Runs
  /** Scratch: D of one read for each sample of the chunk. */
  readonly delays: Float64Array
}

export function createTrajectory(fs: number, longest: number): Trajectory {
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
    longest,
    loops: false,
    heldDelays: 0,
    runs: createRuns(READS),
    delays: new Float64Array(CHUNK),
  }
}

/** Unwrapped phase of voice 0 of channel 0 at sample n, in cycles. */
export function phaseAt(t: Trajectory, s: Settings, n: number): number {
  return t.held ? t.phase : ((n - t.since) * s.sweep.rateHz) / t.fs + t.phase
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

/** Evaluates D of every read at sample n, before glide and limits, into `to`, after moving that to `from`. Order of operations: sweepPhase. */
function evaluate(t: Trajectory, s: Settings, n: number): void {
  const { sweep, voices, outputs, lines, centreMs, voicePhase, channelPhase } = s
  const { from, to } = t
  const { count } = voices
  const phase = phaseAt(t, s, n)
  let inside = true
  for (let c = 0; c < outputs; c++) {
    for (let v = 0; v < count; v++) {
      const at = phase + voicePhase[v]! + channelPhase[c]!
      const shape = t.held ? frozenShapeValue(sweep, at) : sweepShapeValue(sweep, at, v)
      const r = c * MAX_VOICES + v
      const delay = toSamples(t, s, centreMs[v]!, shape)
      from[r] = to[r]!
      to[r] = delay
      if (!(delay >= s.voiceLeast && delay <= t.longest)) inside = false
      if (v === 0 && c < lines) {
        const loop = (s.loopMoves ? toSamples(t, s, s.baseMs, shape) : (s.baseMs * t.fs) / 1000) - s.loopLess
        from[LOOPS + c] = to[LOOPS + c]!
        to[LOOPS + c] = loop
        if (t.loops && !(loop >= s.loopLeast && loop <= t.longest)) inside = false
      }
    }
  }
  t.fromInside = t.toInside
  t.toInside = inside
}

function toSamples(t: Trajectory, s: Settings, centreMs: number, shape: number): number {
  const { law, depthMs, depthOctaves } = s.sweep
  const ms = law === 'time' ? centreMs + depthMs * shape : centreMs * 2 ** (depthOctaves * shape)
  return (ms * t.fs) / 1000
}

export const rampsBetween = ({ sweep }: Settings): boolean => sweep.between === 'ramp' && sweep.updateEvery > 1

/** Evaluates what the update interval that holds sample n needs. */
export function enterInterval(t: Trajectory, s: Settings, n: number): void {
  const every = s.sweep.updateEvery
  const start = n - (n % every)
  if (t.interval === start) return
  if (!rampsBetween(s)) {
    evaluate(t, s, start)
    t.fromInside = t.toInside
  } else {
    if (t.interval < 0 || t.interval + every !== start) evaluate(t, s, start)
    evaluate(t, s, start + every)
  }
  t.interval = start
}

/** Whether the loops are read from the next chunk on. */
export function switchLoops(t: Trajectory, on: boolean): void {
  if (on === t.loops) return
  t.loops = on
  // What was evaluated did not heed the loops' limits.
  t.interval = -1
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
  for (let r = 0; r < READS; r++) if (inUse(s, r)) t.noted[r] = between(t, s, r, n) + t.offset[r]!
}

/** After a change of settings or phase at sample n: evaluates afresh, and lets every read glide there from `noted`, or jump where that has none. */
export function glideFrom(t: Trajectory, s: Settings, n: number, noted: Float64Array): void {
  jump(t)
  enterInterval(t, s, n)
  for (let r = 0; r < READS; r++) {
    if (!inUse(s, r) || Number.isNaN(noted[r])) continue
    t.offset[r] = noted[r]! - between(t, s, r, n)
    if (t.offset[r] !== 0) t.gliding = true
  }
}

/** After a change of settings or phase: evaluates afresh at the next chunk, every read at once where it belongs. */
export function jump(t: Trajectory): void {
  t.interval = -1
  t.offset.fill(0)
  t.gliding = false
}

function inUse(s: Settings, r: number): boolean {
  if (r >= LOOPS) return r - LOOPS < s.lines
  return r % MAX_VOICES < s.voices.count && (r < MAX_VOICES || s.outputs === 2)
}
