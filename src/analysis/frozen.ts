// A set with its sweep held: every number a frozen response, pole or extreme is computed from. Shapers count by
// their small-signal slope. Delays that would read closer than their interpolator allows are held at the limit,
// as the engine holds them, and named in `held`.
//
//   w = (I − loop.gain · F X diag(A_loop))⁻¹ u        u = inputGain · x        X = [[1−k, k], [k, 1−k]]
//   y_c = outputGain · (dry · d_c + wet_c · W · Σ_v A_cv · w_line)             d = u or w, dryDelay samples ago
import { highPassCoefficient, onePoleCoefficient } from '../dsp/filters.ts'
import { createShaper } from '../dsp/shaper.ts'
import { delayAtShape, frozenShapeValue, loopDelayAtShape, phaseOffset } from '../dsp/sweep.ts'
import { CLOSE_TOLERANCE, smallestDelay } from '../set/delayRange.ts'
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
export interface HeldDelay extends ReadPlace {
  readonly where: 'voice' | 'loop'
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
        const delay = frozenVoiceDelay(set, position, { channel, voice }, sampleRate)
        return hold(set.line.interpolation, { where: 'voice', channel, voice }, delay, held)
      }),
    }),
  )
  const reads = Array.from({ length: lines }, (_, channel) => {
    const delay = frozenLoopDelay(set, position, channel, sampleRate)
    return hold(set.loop.interpolation, { where: 'loop', channel, voice: 0 }, delay, held)
  })
  // A loop without feedback reads nothing that is heard.
  const heard = held.filter((read) => read.where === 'voice' || set.loop.feedback !== 0)
  return {
    sampleRate,
    position,
    lines,
    channels,
    loop: {
      gain: set.loop.feedback,
      crossFeed: lines === 2 ? set.loop.crossFeed : 0,
      slope: slopeOf(set.loop.shaper),
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
    held: heard,
  }
}

/** Delay in samples that one voice asks for at a held position, before any limit. */
export function frozenVoiceDelay(set: ParameterSet, position: number, { channel, voice }: ReadPlace, sampleRate: number): number {
  const s = frozenShapeValue(set.sweep, position + phaseOffset(set, channel, voice))
  return delayAtShape(set, voice, s, sampleRate)
}

/** Delay in samples that the loop of one line asks for at a held position, before any limit; half a sample less with an averaging shaper. */
export function frozenLoopDelay(set: ParameterSet, position: number, channel: number, sampleRate: number): number {
  return loopDelayAtShape(set, frozenShapeValue(set.sweep, position + phaseOffset(set, channel, 0)), sampleRate)
}

export interface ReadPlace {
  readonly channel: number
  readonly voice: number
}

function hold(kind: Interpolation, place: ReadPlace & Pick<HeldDelay, 'where'>, delaySamples: number, held: HeldDelay[]): FrozenRead {
  const limitSamples = smallestDelay(kind, place.where)
  if (delaySamples < limitSamples - CLOSE_TOLERANCE) held.push({ ...place, delaySamples, limitSamples })
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
