// The delay of every read, sample by sample: the sweep evaluated every `updateEvery` samples of absolute time, straight lines or
// steps between, plus what a glide still has to go, held inside the limits of interpolator and line.
//
// Reads: voice v of channel c is c · MAX_VOICES + v; the loop of line c is LOOPS + c.
import { CLOSE_TOLERANCE, smallestDelay } from '../set/delayRange.ts'
import { flatIndex } from '../set/flat.ts'
import { CHUNK } from './line.ts'
import { MAX_VOICES, type Settings } from './settings.ts'
import { frozenShapeValue, sweepShapeValue, wrapPhase } from './sweep.ts'

export const LOOPS = 2 * MAX_VOICES
export const READS = LOOPS + 2

const RATE = flatIndex('sweep.rateHz')
const START_PHASE = flatIndex('sweep.startPhase')

export interface Trajectory {
  readonly fs: number
  /** D of each read for the chunk at hand, CHUNK a read. */
  readonly delays: Float64Array
  /** D of each read at the start of the update interval, and at its end. */
  readonly from: Float64Array
  readonly to: Float64Array
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
  longest: number
  /** Whether the loops are read at all. */
  loops: boolean
  /** Samples for which some read was held at a limit. */
  heldDelays: number
}

export function createTrajectory(fs: number, longest: number): Trajectory {
  return {
    fs,
    delays: new Float64Array(READS * CHUNK),
    from: new Float64Array(READS),
    to: new Float64Array(READS),
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

/** D of every read at sample n, before glide and limits. Order of operations: sweepPhase. */
function evaluate(t: Trajectory, s: Settings, n: number, into: Float64Array): void {
  const { sweep, outputs, lines } = s
  const { count } = s.voices
  const phase = phaseAt(t, s, n)
  for (let c = 0; c < outputs; c++) {
    for (let v = 0; v < count; v++) {
      const at = phase + s.voicePhase[v]! + s.channelPhase[c]!
      const shape = t.held ? frozenShapeValue(sweep, at) : sweepShapeValue(sweep, at, v)
      into[c * MAX_VOICES + v] = toSamples(t, s, s.centreMs[v]!, shape)
      if (v === 0 && c < lines) {
        const loop = s.loopMoves ? toSamples(t, s, s.baseMs, shape) : (s.baseMs * t.fs) / 1000
        into[LOOPS + c] = s.shapers[1]!.mean ? loop - 0.5 : loop
      }
    }
  }
}

function toSamples(t: Trajectory, s: Settings, centreMs: number, shape: number): number {
  const { law, depthMs, depthOctaves } = s.sweep
  const ms = law === 'time' ? centreMs + depthMs * shape : centreMs * 2 ** (depthOctaves * shape)
  return (ms * t.fs) / 1000
}

const rampsBetween = ({ sweep }: Settings): boolean => sweep.between === 'ramp' && sweep.updateEvery > 1

/** Makes `from` and `to` those of the update interval that holds sample n. */
function enterInterval(t: Trajectory, s: Settings, n: number): void {
  const every = s.sweep.updateEvery
  const start = n - (n % every)
  if (t.interval === start) return
  if (rampsBetween(s) && t.interval >= 0 && t.interval + every === start) t.from.set(t.to)
  else evaluate(t, s, start, t.from)
  if (rampsBetween(s)) evaluate(t, s, start + every, t.to)
  t.interval = start
}

/** D of read r at sample n of the interval entered, before glide and limits. */
function between(t: Trajectory, s: Settings, r: number, n: number): number {
  const from = t.from[r]!
  return rampsBetween(s) ? from + ((t.to[r]! - from) / s.sweep.updateEvery) * (n - t.interval) : from
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

/** Fills `delays` for the `n` samples from absolute sample `first` on. */
export function fillDelays(t: Trajectory, s: Settings, first: number, n: number): void {
  const every = s.sweep.updateEvery
  for (let j = 0; j < n; ) {
    enterInterval(t, s, first + j)
    const into = first + j - t.interval
    const run = Math.min(every - into, n - j)
    for (let c = 0; c < s.outputs; c++) {
      for (let v = 0; v < s.voices.count; v++) fillRun(t, s, c * MAX_VOICES + v, j, into, run)
    }
    if (t.loops) for (let c = 0; c < s.lines; c++) fillRun(t, s, LOOPS + c, j, into, run)
    j += run
  }
  if (t.gliding) t.gliding = t.offset.some(isLeft)
}

const isLeft = (offset: number): boolean => offset !== 0

/** `run` samples of read r from index j of the chunk, `into` samples into the update interval. */
function fillRun(t: Trajectory, s: Settings, r: number, j: number, into: number, run: number): void {
  const { delays } = t
  const at = r * CHUNK + j
  const start = t.from[r]!
  const slope = rampsBetween(s) ? (t.to[r]! - start) / s.sweep.updateEvery : 0
  for (let i = 0; i < run; i++) delays[at + i] = start + slope * (into + i)
  if (t.gliding) addGlide(t, r, at, run)
  const least = r < LOOPS ? smallestDelay(s.voiceRead, 'voice') : smallestDelay(s.loopRead, 'loop')
  // Straight lines stay between their ends; a glide's sum with one need not.
  const first = delays[at]!
  const last = delays[at + run - 1]!
  if (t.gliding || first < least || last < least || first > t.longest || last > t.longest) hold(t, at, run, least)
}

/** Part of the way that a glide goes in one sample, and the most it goes, samples a sample: half, so pitch bends by a fifth up or an octave down at most. */
const GLIDE_SECONDS = 0.05
const FASTEST_GLIDE = 0.5
/** What is left of a glide when it is over, samples. */
const GLIDE_END = 1e-7

function addGlide(t: Trajectory, r: number, at: number, run: number): void {
  const { delays, offset } = t
  const part = 1 / (GLIDE_SECONDS * t.fs)
  let left = offset[r]!
  for (let i = at; i < at + run; i++) {
    delays[i] = delays[i]! + left
    left -= Math.min(FASTEST_GLIDE, Math.max(-FASTEST_GLIDE, left * part))
    if (Math.abs(left) < GLIDE_END) left = 0
  }
  offset[r] = left
}

function hold(t: Trajectory, at: number, run: number, least: number): void {
  const { delays, longest } = t
  for (let i = at; i < at + run; i++) {
    const delay = delays[i]!
    if (delay >= least && delay <= longest) continue
    if (delay < least - CLOSE_TOLERANCE || delay > longest + CLOSE_TOLERANCE) t.heldDelays++
    delays[i] = delay < least ? least : longest
  }
}

/** Smallest delay of the loop reads among the first n of the chunk, samples; Infinity when no loop is read. */
export function smallestLoopDelay(t: Trajectory, lines: number, n: number): number {
  let smallest = Number.POSITIVE_INFINITY
  if (!t.loops) return smallest
  for (let c = 0; c < lines; c++) {
    const at = (LOOPS + c) * CHUNK
    for (let i = at; i < at + n; i++) if (t.delays[i]! < smallest) smallest = t.delays[i]!
  }
  return smallest
}
