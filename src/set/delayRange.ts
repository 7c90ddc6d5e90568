// How close to and how far behind the write point a set reads, in closed form.
import { sweepShapeValue } from './sweepShape.ts'
import type { Interpolation, ParameterSet } from './types.ts'

/** Tolerance, in samples, by which a read may seem closer than allowed because of rounding. */
export const CLOSE_TOLERANCE = 1e-9

/** The largest delay a line may be asked for, ms: what an untrusted file can make a reader allocate. */
export const MAX_DELAY_MS = 4000

const SMALLEST_VOICE: Readonly<Record<Interpolation, number>> = { nearest: 0, linear: 0, lagrange3: 1, hermite4: 1, allpass1: 0.5 }
const POINTS: Readonly<Record<Interpolation, number>> = { nearest: 1, linear: 2, lagrange3: 4, hermite4: 4, allpass1: 2 }

/**
 * Smallest delay, in samples, an interpolator can read. A voice reads after w[n] is written: nearest, linear 0; cubics 1; allpass1 0.5.
 * The loop reads before: one sample more. Source: DESIGN 3.
 */
export function smallestDelay(interpolation: Interpolation, where: 'voice' | 'loop'): number {
  return SMALLEST_VOICE[interpolation] + (where === 'loop' ? 1 : 0)
}

/** Points of the line an interpolator needs. */
export function interpolationPoints(interpolation: Interpolation): number {
  return POINTS[interpolation]
}

export interface SampleRange {
  readonly minSamples: number
  readonly maxSamples: number
}

export interface DelayRange {
  readonly voices: SampleRange
  readonly loop: SampleRange
  /** Smallest delay the voices' and the loop's interpolators may read, samples; anti-aliasing in the loop included. */
  readonly voiceLimitSamples: number
  readonly loopLimitSamples: number
  /** Smallest and largest s really reached by the voices. */
  readonly minSweep: number
  readonly maxSweep: number
}

/** One delay that is really reached and may be the smallest or largest: offset from base in ms, and s. */
export interface Corner {
  readonly offsetMs: number
  readonly sweep: number
}

/** Offset of voice v: evenly from −spreadMs/2 to +spreadMs/2; 0 for one voice. */
export function voiceOffsetMs(voices: ParameterSet['voices'], voice: number): number {
  return voices.count === 1 ? 0 : voices.spreadMs * (voice / (voices.count - 1) - 0.5)
}

/** τ in ms of base, offset and s by the set's law. */
export function delayMs(set: ParameterSet, { offsetMs, sweep }: Corner): number {
  const base = set.line.baseMs + offsetMs
  return set.sweep.law === 'time' ? base + set.sweep.depthMs * sweep : base * 2 ** (set.sweep.depthOctaves * sweep)
}

/** The corners of the voices' delays: moving, the outer offsets at both ends of s; standing (rate 0), every voice and channel where it stands. */
export function voiceCorners(set: ParameterSet): readonly Corner[] {
  const { count } = set.voices
  if (set.sweep.rateHz === 0) {
    const channels = set.layout === 'mono' ? 1 : 2
    return Array.from({ length: count * channels }, (_, i) => {
      const voice = i % count
      return { offsetMs: voiceOffsetMs(set.voices, voice), sweep: standingSweep(set, Math.floor(i / count), voice) }
    })
  }
  const ends = sweepEnds(set)
  const offsets = count === 1 ? [0] : [voiceOffsetMs(set.voices, 0), voiceOffsetMs(set.voices, count - 1)]
  return offsets.flatMap((offsetMs) => ends.map((sweep) => ({ offsetMs, sweep })))
}

/** The corners of the loop's delay: base alone when fixed, else voice 0's sweep of each line without its spread offset. */
export function loopCorners(set: ParameterSet): readonly Corner[] {
  if (set.loop.delay === 'fixed') return []
  if (set.sweep.rateHz !== 0) return sweepEnds(set).map((sweep) => ({ offsetMs: 0, sweep }))
  const lines = set.layout === 'stereo' ? 2 : 1
  return Array.from({ length: lines }, (_, channel) => ({ offsetMs: 0, sweep: standingSweep(set, channel, 0) }))
}

/**
 * Delays of a set over its whole sweep, in samples at `sampleRate` (Hz, default the set's). Closed form over s: every shape reaches ±1, a drawn one
 * its points; at rate 0 only the delays where the sweep stands. A delay may come out below its limit or below 0: validity.ts judges it.
 */
export function delayRange(set: ParameterSet, sampleRate = set.sampleRate): DelayRange {
  const corners = voiceCorners(set)
  const toSamples = (ms: number) => (ms * sampleRate) / 1000
  const range = (delays: readonly number[]): SampleRange => ({
    minSamples: toSamples(Math.min(...delays)),
    maxSamples: toSamples(Math.max(...delays)),
  })
  const sweeps = corners.map((corner) => corner.sweep)
  const loop = loopCorners(set)
  return {
    voices: range(corners.map((corner) => delayMs(set, corner))),
    loop: range(loop.length === 0 ? [set.line.baseMs] : loop.map((corner) => delayMs(set, corner))),
    voiceLimitSamples: smallestDelay(set.line.interpolation, 'voice'),
    loopLimitSamples: loopLimit(set),
    minSweep: Math.min(...sweeps),
    maxSweep: Math.max(...sweeps),
  }
}

/** An antiderivative shaper delays half a sample, which the loop's read gives back: it cannot come as close. */
function loopLimit(set: ParameterSet): number {
  return smallestDelay(set.loop.interpolation, 'loop') + (set.loop.shaper?.antialias === 'adaa1' ? 0.5 : 0)
}

function sweepEnds({ sweep }: ParameterSet): readonly [number, number] {
  if (sweep.shape !== 'drawn') return [-1, 1]
  const values = sweep.points.map(([, s]) => s)
  return values.length === 0 ? [0, 0] : [Math.min(...values), Math.max(...values)]
}

function standingSweep(set: ParameterSet, channel: number, voice: number): number {
  const { startPhase, stereoPhase } = set.sweep
  const { count, phaseSpread } = set.voices
  return sweepShapeValue(set.sweep, startPhase + (voice * phaseSpread) / (360 * count) + (channel * stereoPhase) / 360, voice)
}
