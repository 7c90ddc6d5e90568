// Every state the sweep can stand in, as a path of one parameter, in as short a path as the set allows: lines that do not
// hear each other are walked together, and where all reads share one phase the path is s itself instead of the cycle.
//
// reads: [ loops, one a line | voices of channel 0 | voices of channel 1 ] of the lines and channels walked
import { delayAtShape, edge, frozenShapeValue, loopDelayAtShape, phaseOffset } from '../dsp/sweep.ts'
import { delayRange, smallestDelay } from '../set/delayRange.ts'
import type { ParameterSet } from '../set/types.ts'
import { sweepStands } from './levelsSet.ts'
import { shapeCorners } from './sweepSlope.ts'

export interface SweepPath {
  readonly set: ParameterSet
  readonly sampleRate: number
  /** Output channels of the set. */
  readonly outputs: number
  /** Output channels walked: 1 where the second has the same responses at other positions. */
  readonly walked: 1 | 2
  /** Lines walked with them. */
  readonly lines: 1 | 2
  /** Ends of the stretches on which every delay is smooth and runs one way, ascending. A single stop stands still. */
  readonly stops: readonly number[]
  /** A square or ramp without edges: delays jump at stops. */
  readonly leaps: boolean
  /** Phase offset of each read, cycles; null where the parameter is s. */
  readonly offsets: readonly number[] | null
}

/** The path of a set at `sampleRate`, Hz. Where nothing moves it is the start position alone. */
export function sweepPath(set: ParameterSet, sampleRate = set.sampleRate): SweepPath {
  const outputs = set.layout === 'mono' ? 1 : 2
  const stands = sweepStands(set)
  const apart = channelsApart(set)
  const inverted = set.mix.invertRight && set.mix.dry !== 0 && set.mix.wet !== 0
  const walked = outputs === 1 || (apart && !inverted && !stands) ? 1 : 2
  const lines = walked === 2 && set.layout === 'stereo' ? 2 : 1
  const leaps = edge(set.sweep) === 0 && ['square', 'rampUp', 'rampDown'].includes(set.sweep.shape)
  const offsets = readOffsets(set, lines, walked, apart && !stands)
  const rest = { set, sampleRate, lines, outputs, walked, leaps } as const
  if (stands) return { ...rest, stops: [set.sweep.startPhase], offsets }
  // A square without edges never stands between its ends.
  if (!(leaps && set.sweep.shape === 'square') && offsets.every((offset) => Number.isInteger(offset))) {
    const { minSweep, maxSweep } = delayRange(set, sampleRate)
    return { ...rest, stops: [minSweep, maxSweep], offsets: null }
  }
  const corners = shapeCorners(set.sweep)
  const phases = offsets.flatMap((offset) => corners.map((corner) => corner - offset - Math.floor(corner - offset)))
  const stops = [...new Set([0, ...phases, 1])].sort((a, b) => a - b)
  return { ...rest, stops, offsets }
}

/** Neither channel hears the other's sweep: each may be walked as if it had no phase against the other. */
function channelsApart({ layout, loop }: ParameterSet): boolean {
  if (layout === 'mono' || loop.feedback === 0) return true
  return layout === 'stereo' ? loop.crossFeed === 0 : loop.delay === 'fixed'
}

function readOffsets(set: ParameterSet, lines: number, channels: number, apart: boolean): number[] {
  const offset = (channel: number, voice: number) => phaseOffset(set, apart ? 0 : channel, voice)
  const loops = Array.from({ length: lines }, (_, channel) => (set.loop.delay === 'fixed' ? offset(0, 0) : offset(channel, 0)))
  const voices = Array.from({ length: channels * set.voices.count }, (_, i) =>
    offset(Math.floor(i / set.voices.count), i % set.voices.count),
  )
  return [...loops, ...voices]
}

/** Delays in samples, held at their limits, of every read where the path's parameter is t. */
export function pathDelays(path: SweepPath, t: number, delays: Float64Array): void {
  const { set, sampleRate, offsets, lines } = path
  const shape = (read: number) => (offsets === null ? t : frozenShapeValue(set.sweep, t + (offsets[read] as number)))
  const loopLimit = smallestDelay(set.loop.interpolation, 'loop')
  const voiceLimit = smallestDelay(set.line.interpolation, 'voice')
  for (let i = 0; i < lines; i++) delays[i] = Math.max(loopLimit, loopDelayAtShape(set, shape(i), sampleRate))
  for (let i = lines; i < delays.length; i++)
    delays[i] = Math.max(voiceLimit, delayAtShape(set, (i - lines) % set.voices.count, shape(i), sampleRate))
}

/** Number of reads: the length of `delays`. */
export const pathReads = (path: SweepPath): number => path.lines + path.walked * path.set.voices.count
