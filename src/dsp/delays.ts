// From the sweep's evaluations to runs: straight pieces of delay, or, while a read glides or has to be held at a limit, runs of one sample.
import { CLOSE_TOLERANCE } from '../set/delayRange.ts'
import { LOOPS, READS } from './runs.ts'
import type { Settings } from './settings.ts'
import { copyUsed, enterInterval, evaluate, rampsBetween, type Trajectory } from './trajectory.ts'

/** Cuts the `n` samples from absolute sample `first` on into runs, glides and limits in them. */
export function planRuns(t: Trajectory, s: Settings, first: number, n: number): void {
  const { runs, from, to } = t
  const { ends, starts } = runs
  const every = s.sweep.updateEvery
  const ramps = rampsBetween(s)
  enterInterval(t, s, first)
  copyUsed(t, ramps ? from : to, 0, ends, 0)
  copyUsed(t, to, 0, ends, READS)
  let inside = t.fromInside && t.toInside
  const into = (first - t.interval) | 0
  const count = ((into + n - 1) / every + 1) | 0
  if (count > 1) {
    // Where delays ramp, row k + 1 is where run k ends; where they stand, row k is where it stands.
    const next = t.interval + every
    if (!evaluate(t, s, ramps ? next + every : next, every, count - 1, ends, (ramps ? 2 : 1) * READS)) inside = false
    if (!ramps) t.fromInside = t.toInside
    t.interval += (count - 1) * every
    if (ramps) copyUsed(t, ends, (count - 1) * READS, from, 0)
    copyUsed(t, ends, (ramps ? count : count - 1) * READS, to, 0)
  }
  for (let k = 1; k < count; k++) {
    starts[k] = k * every - into
    runs.into[k] = 0
  }
  starts[0] = 0
  runs.into[0] = into
  starts[count] = n
  runs.count = count
  // The interval is a power of two: multiplying by its inverse is as exact as dividing.
  runs.part = ramps ? 1 / every : 0
  if (t.gliding || !inside) breakRuns(t, s, n)
}

/** Makes every sample its own run, with what the glides add, held to the limits. */
function breakRuns(t: Trajectory, s: Settings, n: number): void {
  const { runs, used } = t
  for (let i = 0; i < t.usedCount; i++) breakRead(t, s, used[i]!, n)
  if (!t.loops) t.offset.fill(0, LOOPS)
  for (let j = 0; j < n; j++) {
    runs.starts[j] = j
    runs.into[j] = 0
  }
  runs.starts[n] = n
  runs.count = n
  runs.part = 0
  t.gliding = false
  for (let r = 0; r < READS; r++) if (t.offset[r] !== 0) t.gliding = true
}

function breakRead(t: Trajectory, s: Settings, r: number, n: number): void {
  const { runs, delays } = t
  for (let k = 0; k < runs.count; k++) {
    const from = runs.ends[k * READS + r]!
    const slope = (runs.ends[(k + 1) * READS + r]! - from) * runs.part
    const into = runs.into[k]! - runs.starts[k]!
    for (let j = runs.starts[k]!; j < runs.starts[k + 1]!; j++) delays[j] = from + slope * (into + j)
  }
  addGlide(t, r, n)
  hold(t, s.longest, n, r < LOOPS ? s.voiceLeast : s.loopLeast)
  for (let j = 0; j < n; j++) runs.ends[j * READS + r] = delays[j]!
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

function hold(t: Trajectory, longest: number, n: number, least: number): void {
  const { delays } = t
  for (let j = 0; j < n; j++) {
    const delay = delays[j]!
    if (delay >= least && delay <= longest) continue
    if (!(delay >= least - CLOSE_TOLERANCE && delay <= longest + CLOSE_TOLERANCE)) t.heldDelays++
    delays[j] = delay > longest ? longest : least
  }
}

/**
 * Largest whole number of samples, at least 1, by which even the newest point of every loop read of line c in the chunk stays behind; a `cubic` takes
 * one that is nearer. A run is smallest at one of its ends. No fractions in or out: those may be boxed, which allocates.
 */
export function loopReach({ runs }: Trajectory, c: number, cubic: boolean): number {
  const { ends, part, starts, into, count } = runs
  let smallest = Number.POSITIVE_INFINITY
  for (let k = 0; k < count; k++) {
    const from = ends[k * READS + LOOPS + c]!
    const slope = (ends[(k + 1) * READS + LOOPS + c]! - from) * part
    const last = into[k]! + starts[k + 1]! - starts[k]! - 1
    smallest = Math.min(smallest, from + slope * into[k]!, from + slope * last)
  }
  return Math.max(1, smallest - (cubic ? 1 : 0.5)) | 0
}
