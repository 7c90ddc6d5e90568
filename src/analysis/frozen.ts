// A set with its sweep held: every number a frozen response, pole or extreme is computed from. Shapers count by
// their small-signal slope. Delays that would read closer than their interpolator allows are held at the limit,
// as the engine holds them, and named in `held`.
//
//   w = (I − loop.gain · F X diag(A_loop))⁻¹ u        u = inputGain · x        X = [[1−k, k], [k, 1−k]]
//   y_c = outputGain · (dry · d_c + wet_c · W · Σ_v A_cv · w_line)             d = u or w, dryDelay samples ago
import { highPassCoefficient, onePoleCoefficient } from '../dsp/filters.ts'
import { createShaper } from '../dsp/shaper.ts'
import { frozenShapeValue } from '../dsp/sweep.ts'
import { smallestDelay } from '../set/delayRange.ts'
import type { Interpolation, ParameterSet, Shaper } from '../set/types.ts'
import { type FrozenRead, frozenRead } from './frozenRead.ts'

/** A first-order pair: low-pass (1−a)/(1−a z⁻¹) and high-pass (1+b)/2 · (1−z⁻¹)/(1−b z⁻¹); null is off. */
export interface FrozenTone {
  readonly lowPass: number | null
  readonly highPass: number | null
}

/** A shaper by its slope at 0 (1 without a shaper); `averaged` adds the (1 + z⁻¹)/2 of first-order anti-aliasing. */
export interface FrozenSlope {
  readonly slope: number
  readonly averaged: boolean
}

export interface FrozenLoop {
  /** Feedback g as set; the small-signal loop gain is gain · slope.slope · A · F. */
  readonly gain: number
  /** k in [0, 1]; 0 with one line. */
  readonly crossFeed: number
  readonly slope: FrozenSlope
  readonly tone: FrozenTone
  /** One a line. With an averaging shaper the read is already shortened by half a sample. */
  readonly reads: readonly FrozenRead[]
}

export interface FrozenChannel {
  /** Line this output reads. */
  readonly line: number
  readonly voices: readonly FrozenRead[]
  /** wet · V^(−1/2), sign of the second channel included. */
  readonly wet: number
}

/** A read closer than its interpolator allows: held at `limitSamples`. */
export interface HeldDelay {
  readonly where: 'voice' | 'loop'
  readonly channel: number
  readonly voice: number
  readonly delaySamples: number
  readonly limitSamples: number
}

export interface Frozen {
  readonly sampleRate: number
  /** Sweep position of voice 0 of channel 0, 0 to 1. */
  readonly position: number
  readonly lines: number
  readonly channels: readonly FrozenChannel[]
  readonly loop: FrozenLoop
  /** Linear. */
  readonly inputGain: number
  readonly input: FrozenSlope
  readonly dry: number
  readonly dryTap: 'input' | 'line'
  /** Whole samples. */
  readonly dryDelay: number
  readonly wetTone: FrozenTone
  /** Linear. */
  readonly outputGain: number
  readonly output: FrozenSlope
  /** True where any shaper is in the path: the response then holds for small signals only. */
  readonly smallSignal: boolean
  readonly held: readonly HeldDelay[]
}

/** 1e-9 samples below the limit are rounding, not reading too close. */
const HELD_TOLERANCE = 1e-9

/**
 * Every delay, coefficient and gain of `set` with the sweep held at `position`: φ of voice v, channel c is
 * position + v · phaseSpread/(360 V) + c · stereoPhase/360; drift moves as a sine. position in [0, 1];
 * sampleRate > 0, in Hz, the set's own by default. Throws RangeError outside.
 */
export function freeze(set: ParameterSet, position: number, sampleRate = set.sampleRate): Frozen {
  if (!(position >= 0 && position <= 1)) throw new RangeError(`position must be in [0, 1], got ${position}`)
  if (!(sampleRate > 0 && Number.isFinite(sampleRate))) throw new RangeError(`sampleRate must be above 0 Hz, got ${sampleRate}`)
  const lines = set.layout === 'stereo' ? 2 : 1
  const outputs = set.layout === 'mono' ? 1 : 2
  const held: HeldDelay[] = []
  const count = set.voices.count
  const sign = (channel: number) => (channel === 1 && set.mix.invertRight ? -1 : 1)
  const channels = Array.from(
    { length: outputs },
    (_, channel): FrozenChannel => ({
      line: lines === 2 ? channel : 0,
      wet: (sign(channel) * set.mix.wet) / Math.sqrt(count),
      voices: Array.from({ length: count }, (_, voice) => {
        const delay = (frozenDelayMs(set, position, channel, voice) * sampleRate) / 1000
        return hold(set.line.interpolation, 'voice', channel, voice, delay, held)
      }),
    }),
  )
  const loopSlope = slopeOf(set.loop.shaper)
  const reads = Array.from({ length: lines }, (_, channel) => {
    const delay = (frozenLoopDelayMs(set, position, channel) * sampleRate) / 1000
    return hold(set.loop.interpolation, 'loop', channel, 0, delay - (loopSlope.averaged ? 0.5 : 0), held)
  })
  return {
    sampleRate,
    position,
    lines,
    channels,
    loop: {
      gain: set.loop.feedback,
      crossFeed: lines === 2 ? set.loop.crossFeed : 0,
      slope: loopSlope,
      tone: toneOf(set.loop.dampingHz, set.loop.lowCutHz, sampleRate),
      reads,
    },
    inputGain: 10 ** (set.input.gainDb / 20),
    input: slopeOf(set.input.shaper),
    dry: set.mix.dry,
    dryTap: set.mix.dryTap,
    dryDelay: Math.floor((set.mix.dryDelayMs * sampleRate) / 1000 + 0.5),
    wetTone: toneOf(set.mix.wetHighCutHz, set.mix.wetLowCutHz, sampleRate),
    outputGain: 10 ** (set.mix.outputGainDb / 20),
    output: slopeOf(set.mix.shaper),
    smallSignal: set.input.shaper !== null || set.loop.shaper !== null || set.mix.shaper !== null,
    held,
  }
}

/** Delay offset of one voice, ms: evenly from −spreadMs/2 to +spreadMs/2, 0 for one voice. */
export function voiceOffsetMs(set: ParameterSet, voice: number): number {
  const { count, spreadMs } = set.voices
  return count > 1 ? spreadMs * (voice / (count - 1) - 0.5) : 0
}

/** Delay in ms where the sweep's value is s in [−1, 1], around a base of `baseMs` (law time or ratio). */
export function delayMsAtShape(set: ParameterSet, baseMs: number, s: number): number {
  return set.sweep.law === 'time' ? baseMs + set.sweep.depthMs * s : baseMs * 2 ** (set.sweep.depthOctaves * s)
}

/** Delay of one voice at a held position, ms, before any limit. */
export function frozenDelayMs(set: ParameterSet, position: number, channel: number, voice: number): number {
  const { count, phaseSpread } = set.voices
  const turns = position + (voice * phaseSpread) / (360 * count) + (channel * set.sweep.stereoPhase) / 360
  const s = frozenShapeValue(set.sweep, turns - Math.floor(turns))
  return delayMsAtShape(set, set.line.baseMs + voiceOffsetMs(set, voice), s)
}

/** Delay of the loop of one line at a held position, ms, before any limit. */
export function frozenLoopDelayMs(set: ParameterSet, position: number, channel: number): number {
  if (set.loop.delay === 'fixed') return set.line.baseMs
  const turns = position + (channel * set.sweep.stereoPhase) / 360
  return delayMsAtShape(set, set.line.baseMs, frozenShapeValue(set.sweep, turns - Math.floor(turns)))
}

function hold(
  kind: Interpolation,
  where: 'voice' | 'loop',
  channel: number,
  voice: number,
  delaySamples: number,
  held: HeldDelay[],
): FrozenRead {
  const limitSamples = smallestDelay(kind, where)
  if (delaySamples < limitSamples - HELD_TOLERANCE) held.push({ where, channel, voice, delaySamples, limitSamples })
  return frozenRead(kind, Math.max(delaySamples, limitSamples))
}

function toneOf(lowPassHz: number | null, highPassHz: number | null, sampleRate: number): FrozenTone {
  return {
    lowPass: lowPassHz === null ? null : onePoleCoefficient(lowPassHz, sampleRate),
    highPass: highPassHz === null ? null : highPassCoefficient(highPassHz, sampleRate),
  }
}

function slopeOf(shaper: Shaper | null): FrozenSlope {
  if (shaper === null) return { slope: 1, averaged: false }
  return { slope: createShaper(shaper).slopeAtZero, averaged: shaper.antialias === 'adaa1' }
}
