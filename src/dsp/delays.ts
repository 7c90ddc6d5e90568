// From the sweep's evaluations to runs: straight pieces of delay, or, while a read glides or has to be held at a limit, runs of one sample.
import { CLOSE_TOLERANCE } from '../set/delayRange.ts'
import { LOOPS, READS } from './runs.ts'
import type { Settings } from './settings.ts'
import { enterInterval, evaluate, rampsBetween, type Trajectory } from './trajectory.ts'

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
  let into = (first - t.interval) | 0
  let k = 0
  for (let j = 0; ; ) {
    starts[k] = j
    runs.into[k] = into
    j += every - into
    into = 0
    k++
    if (j >= n) break
    t.interval += every
    evaluate(t, s, ramps ? t.interval + every : t.interval, ends, (ramps ? k + 1 : k) * READS)
    if (!t.toInside) inside = false
  }
  if (ramps) copyUsed(t, ends, (k - 1) * READS, from, 0)
  copyUsed(t, ends, (ramps ? k : k - 1) * READS, to, 0)
  starts[k] = n
  runs.count = k
  // The interval is a power of two: multiplying by its inverse is as exact as dividing.
  runs.part = ramps ? 1 / every : 0
  if (t.gliding || !inside) breakRuns(t, s, n)
}

/** Copies the reads in use from one row of reads to another. */
function copyUsed({ used, usedCount }: Trajectory, from: Float64Array, f: number, to: Float64Array, o: number): void {
  for (let i = 0; i < usedCount; i++) to[o + used[i]!] = from[f + used[i]!]!
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
  t.gliding = t.offset.some(isLeft)
}

const isLeft = (offset: number): boolean => offset !== 0

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

/** Smallest delay at which the loop of line c reads in the chunk, samples: a run is smallest at one of its ends. */
export function smallestLoopDelay({ runs }: Trajectory, c: number): number {
  const r = LOOPS + c
  let smallest = Number.POSITIVE_INFINITY
  for (let k = 0; k < runs.count; k++) {
    const from = runs.ends[k * READS + r]!
    const slope = (runs.ends[(k + 1) * READS + r]! - from) * runs.part
    const into = runs.into[k]!
    smallest = Math.min(smallest, from + slope * into, from + slope * (into + runs.starts[k + 1]! - runs.starts[k]! - 1))
  }
  return smallest
}
