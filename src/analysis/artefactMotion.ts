// A set's sweep and reads as the engine makes them, apart from the rest of the path: any place of the sweep at once, on any line.
import { planRuns } from '../dsp/delays.ts'
import { CHUNK } from '../dsp/line.ts'
import { addRead, type Read } from '../dsp/reads.ts'
import { READS, type Runs } from '../dsp/runs.ts'
import { createSettings, type Settings, takeStructure } from '../dsp/settings.ts'
import { createTrajectory, jump, switchLoops, type Trajectory } from '../dsp/trajectory.ts'
import { delayRange } from '../set/delayRange.ts'
import { flatten } from '../set/flat.ts'
import type { Between, Interpolation, ParameterSet } from '../set/types.ts'

/** How often the delay is evaluated, and what happens between. */
export interface Updates {
  readonly every: number
  readonly between: Between
}

export interface Motion {
  readonly updates: Updates
  readonly settings: Settings
  readonly trajectory: Trajectory
  readonly states: Float64Array
  /** Samples by which a held delay is late in the mean. The sweep runs that much ahead, so that lateness alone counts as no artefact. */
  readonly ahead: number
}

/** Channel 0 of `set` at `sampleRate`, with other updates; with the loop's read or without. */
export function createMotion(set: ParameterSet, sampleRate: number, updates: Updates, loop: boolean): Motion {
  const sweep = { ...set.sweep, updateEvery: updates.every, between: updates.between }
  const { voices, loop: looped } = delayRange(set, sampleRate)
  const settings = createSettings(sampleRate, Math.ceil(Math.max(voices.maxSamples, looped.maxSamples)) + 1)
  takeStructure(settings, flatten({ ...set, layout: 'mono', sweep }))
  const trajectory = createTrajectory(sampleRate)
  jump(trajectory, settings)
  switchLoops(trajectory, settings, loop)
  const ahead = updates.between === 'hold' ? (updates.every - 1) / 2 : 0
  return { updates, settings, trajectory, states: new Float64Array(READS), ahead }
}

/** A multiple of every update interval: stretches begin there, in the time of their own sweep. */
const ORIGIN = 4096

/** Puts the sweep where voice 0 of channel 0 has phase `phase`, cycles, at sample 0 of a stretch. What runs next may begin up to ORIGIN samples sooner. */
export function startMotion(motion: Motion, phase: number): void {
  const { trajectory, settings, ahead } = motion
  trajectory.since = ORIGIN
  trajectory.phase = phase + (ahead * settings.sweep.rateHz) / trajectory.fs
  jump(trajectory, settings)
  motion.states.fill(0)
}

/** A line, and which of its samples is sample 0 of the stretch once `shift` whole samples are taken off every delay. */
export interface StretchLine {
  readonly samples: Float64Array
  readonly at: number
  readonly shift: number
}

/** Read r of a motion by `kind`, added to `out`; or, without a line, its delays written there. */
export interface MotionRead {
  readonly r: number
  readonly kind: Interpolation
  readonly line: StretchLine | null
  readonly out: Float64Array
}

/** Does `reads` for samples first … first + length of the stretch that startMotion began; one after the other, `first` going on from the last. */
export function runMotion(motion: Motion, reads: readonly MotionRead[], first: number, length: number): void {
  const { trajectory, settings } = motion
  for (let done = 0; done < length; done += CHUNK) {
    const n = Math.min(CHUNK, length - done)
    planRuns(trajectory, settings, ORIGIN + first + done, n)
    for (const read of reads) {
      const out = read.out.subarray(done, done + n)
      if (read.line === null) fillDelays(trajectory.runs, read.r, out)
      else addShifted(motion, read, read.line, first + done, out)
    }
  }
}

function fillDelays(runs: Runs, r: number, out: Float64Array): void {
  for (let k = 0; k < runs.count; k++) {
    const from = runs.ends[k * READS + r] as number
    const slope = ((runs.ends[(k + 1) * READS + r] as number) - from) * runs.part
    const [start, end] = [runs.starts[k] as number, runs.starts[k + 1] as number]
    const into = (runs.into[k] as number) - start
    for (let j = start; j < end; j++) out[j] = from + slope * (into + j)
  }
}

function addShifted({ trajectory, states }: Motion, { r, kind }: MotionRead, line: StretchLine, first: number, out: Float64Array): void {
  const { runs } = trajectory
  const move = (by: number) => {
    for (let k = 0; k <= runs.count; k++) runs.ends[k * READS + r] = (runs.ends[k * READS + r] as number) + by
  }
  move(-line.shift)
  const read: Read = { runs, read: r, line: line.samples, at: line.at + first, states, out }
  addRead(kind, read)
  move(line.shift)
}
