// From the sweep's evaluations to runs: straight pieces of delay, or, while a read glides or has to be held at a limit, runs of one sample.
import { CLOSE_TOLERANCE } from '../set/delayRange.ts'
import { CHUNK } from './line.ts'
import { MAX_VOICES, type Settings } from './settings.ts'
import { enterInterval, LOOPS, rampsBetween, type Trajectory } from './trajectory.ts'

/** Cuts the `n` samples from absolute sample `first` on into runs, glides and limits in them. */
export function planRuns(t: Trajectory, s: Settings, first: number, n: number): void {
  const { runs } = t
  const every = s.sweep.updateEvery
  const ramps = rampsBetween(s)
  let inside = true
  let k = 0
  for (let j = 0; j < n; k++) {
    enterInterval(t, s, first + j)
    if (!(t.fromInside && t.toInside)) inside = false
    const into = first + j - t.interval
    runs.starts[k] = j
    runs.into[k] = into
    for (let c = 0; c < s.outputs; c++) for (let v = 0; v < s.voices.count; v++) takeRun(t, c * MAX_VOICES + v, k, ramps, every)
    if (t.loops) for (let c = 0; c < s.lines; c++) takeRun(t, LOOPS + c, k, ramps, every)
    j += Math.min(every - into, n - j)
  }
  runs.starts[k] = n
  runs.count = k
  if (t.gliding || !inside) breakRuns(t, s, n)
}

function takeRun({ runs, from, to }: Trajectory, r: number, k: number, ramps: boolean, every: number): void {
  const at = r * CHUNK + k
  const start = from[r]!
  const end = to[r]!
  runs.from[at] = ramps ? start : end
  runs.slope[at] = ramps ? (end - start) / every : 0
}

/** Makes every sample its own run, with what the glides add, held to the limits. */
function breakRuns(t: Trajectory, s: Settings, n: number): void {
  const { runs } = t
  for (let c = 0; c < s.outputs; c++) for (let v = 0; v < s.voices.count; v++) breakRead(t, c * MAX_VOICES + v, s.voiceLeast, n)
  if (t.loops) for (let c = 0; c < s.lines; c++) breakRead(t, LOOPS + c, s.loopLeast, n)
  else t.offset.fill(0, LOOPS)
  for (let j = 0; j < n; j++) {
    runs.starts[j] = j
    runs.into[j] = 0
  }
  runs.starts[n] = n
  runs.count = n
  t.gliding = t.offset.some(isLeft)
}

const isLeft = (offset: number): boolean => offset !== 0

function breakRead(t: Trajectory, r: number, least: number, n: number): void {
  const { runs, delays } = t
  const at = r * CHUNK
  for (let k = 0; k < runs.count; k++) {
    const from = runs.from[at + k]!
    const slope = runs.slope[at + k]!
    const into = runs.into[k]! - runs.starts[k]!
    for (let j = runs.starts[k]!; j < runs.starts[k + 1]!; j++) delays[j] = from + slope * (into + j)
  }
  addGlide(t, r, n)
  hold(t, n, least)
  for (let j = 0; j < n; j++) {
    runs.from[at + j] = delays[j]!
    runs.slope[at + j] = 0
  }
}

/** Part of the way that a glide goes in one sample, and the most it goes, samples a sample: half, so pitch bends by a fifth up or an octave down at most. */
const GLIDE_SECONDS = 0.05
const FASTEST_GLIDE = 0.5
/** What is left of a glide when it is over, samples. */
const GLIDE_END = 1e-7

function addGlide({ delays, offset, fs }: Trajectory, r: number, n: number): void {
  const part = 1 / (GLIDE_SECONDS * fs)
  let left = offset[r]!
  for (let j = 0; left !== 0 && j < n; j++) {
    delays[j] = delays[j]! + left
    left -= Math.min(FASTEST_GLIDE, Math.max(-FASTEST_GLIDE, left * part))
    if (Math.abs(left) < GLIDE_END) left = 0
  }
  offset[r] = left
}

function hold(t: Trajectory, n: number, least: number): void {
  const { delays, longest } = t
  for (let j = 0; j < n; j++) {
    const delay = delays[j]!
    if (delay >= least && delay <= longest) continue
    if (!(delay >= least - CLOSE_TOLERANCE && delay <= longest + CLOSE_TOLERANCE)) t.heldDelays++
    delays[j] = delay > longest ? longest : least
  }
}

/** Smallest delay at which the loop of line c reads in the chunk, samples: a run is smallest at one of its ends. */
export function smallestLoopDelay({ runs }: Trajectory, c: number): number {
  const at = (LOOPS + c) * CHUNK
  let smallest = Number.POSITIVE_INFINITY
  for (let k = 0; k < runs.count; k++) {
    const from = runs.from[at + k]!
    const slope = runs.slope[at + k]!
    const into = runs.into[k]!
    smallest = Math.min(smallest, from + slope * into, from + slope * (into + runs.starts[k + 1]! - runs.starts[k]! - 1))
  }
  return smallest
}
