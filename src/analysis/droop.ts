// How much treble an interpolated read loses: at one frequency, the least |A| over the fractions of a sample that the sweep really reaches.
import { delayAtShape, loopDelayAtShape } from '../dsp/sweep.ts'
import { delayRange, smallestDelay, voiceCorners } from '../set/delayRange.ts'
import type { Interpolation, ParameterSet } from '../set/types.ts'
import { toDb } from '../signal/levels.ts'
import { frozenRead } from './frozenRead.ts'
import { largestBetween } from './peakSearch.ts'

export interface ReadDroop {
  readonly kind: Interpolation
  /** Largest loss, dB ≥ 0. */
  readonly lossDb: number
  /** A delay at which it is lost, samples. */
  readonly delaySamples: number
  /** Smallest and largest fraction of a sample reached; 0 and 1 when all are. */
  readonly fractions: readonly [number, number]
}

export interface Droop {
  /** Hz: min(10 kHz, 0.4 fs). */
  readonly frequencyHz: number
  readonly voices: ReadDroop
  /** null without feedback. */
  readonly loop: ReadDroop | null
}

export const droopFrequencyHz = (sampleRate: number): number => Math.min(10000, 0.4 * sampleRate)

/** A whole delay loses nothing; rounding says otherwise by about this. */
const ROUNDING_DB = 1e-12

/**
 * −20 log10 |A(e^{jω})|, dB, of one read of `delay` samples by `kind`: 0 where it loses nothing. linear at half a sample: |A| = cos(ω/2) (J. O. Smith,
 * PASP, "Linear Interpolation"); nearest reads a sample as it is, allpass1 has |A| = 1.
 */
export function readLossDb(kind: Interpolation, delay: number, omega: number): number {
  if (kind === 'nearest' || kind === 'allpass1') return 0
  let [re, im] = [0, 0]
  for (const [k, tap] of frozenRead(kind, delay).taps.entries()) {
    re += tap * Math.cos(k * omega)
    im -= tap * Math.sin(k * omega)
  }
  const loss = 0 - toDb(Math.hypot(re, im))
  return Math.abs(loss) < ROUNDING_DB ? 0 : loss
}

/**
 * The worst interpolation loss of voices and loop over the sweep, at {@link droopFrequencyHz} of `sampleRate` (Hz, the set's by default). A delay that stands
 * has one fraction; one that moves every fraction between its ends; a square without an edge those of its two ends.
 */
export function droop(set: ParameterSet, sampleRate = set.sampleRate): Droop {
  const frequencyHz = droopFrequencyHz(sampleRate)
  const omega = (2 * Math.PI * frequencyHz) / sampleRate
  const voices = worstOf(set.line.interpolation, 'voice', voiceSpans(set, sampleRate), omega)
  const loop = set.loop.feedback === 0 ? null : worstOf(set.loop.interpolation, 'loop', loopSpans(set, sampleRate), omega)
  return { frequencyHz, voices, loop }
}

/** Delays a read goes through, samples. */
type Span = readonly [number, number]

function voiceSpans(set: ParameterSet, fs: number): Span[] {
  // Standing, every voice and channel is a corner of its own.
  if (set.sweep.rateHz === 0) return voiceCorners(set).map(({ offsetMs, sweep }) => still(delayOfCorner(set, offsetMs, sweep, fs)))
  const ends = sweepEndsOf(set, fs)
  return Array.from({ length: set.voices.count }, (_, v) => ends.map((s) => delayAtShape(set, v, s, fs))).flatMap((delays) =>
    spans(set, delays),
  )
}

function loopSpans(set: ParameterSet, fs: number): Span[] {
  if (set.loop.delay === 'fixed') return [still(loopDelayAtShape(set, 0, fs))]
  const half = set.loop.shaper?.antialias === 'adaa1' ? 0.5 : 0
  if (set.sweep.rateHz === 0) {
    const { minSamples, maxSamples } = delayRange(set, fs).loop
    return [still(minSamples - half), still(maxSamples - half)]
  }
  return spans(
    set,
    sweepEndsOf(set, fs).map((s) => loopDelayAtShape(set, s, fs)),
  )
}

const still = (delay: number): Span => [delay, delay]

function delayOfCorner(set: ParameterSet, offsetMs: number, s: number, fs: number): number {
  const one = { ...set, line: { ...set.line, baseMs: set.line.baseMs + offsetMs }, voices: { ...set.voices, count: 1 } }
  return delayAtShape(one, 0, s, fs)
}

function sweepEndsOf(set: ParameterSet, fs: number): readonly number[] {
  const { minSweep, maxSweep } = delayRange(set, fs)
  return [minSweep, maxSweep]
}

function spans({ sweep }: ParameterSet, delays: readonly number[]): Span[] {
  if (sweep.shape === 'square' && sweep.edgeMs === 0) return delays.map(still)
  return [[Math.min(...delays), Math.max(...delays)]]
}

function worstOf(kind: Interpolation, where: 'voice' | 'loop', reached: readonly Span[], omega: number): ReadDroop {
  const least = smallestDelay(kind, where)
  let worst = { lossDb: -1, delaySamples: least }
  let [low, high] = [1, 0]
  for (const [a, b] of reached) {
    for (const [from, to] of unitSpans(Math.max(least, a), Math.max(least, b))) {
      const whole = Math.floor(from)
      low = Math.min(low, from - whole)
      high = Math.max(high, to - whole)
      const loss = (delay: number) => readLossDb(kind, delay, omega)
      // Each interpolator loses most at half a sample, less to both sides.
      const middle = Math.min(to, Math.max(from, whole + 0.5))
      const lossDb = Math.max(loss(middle), largestBetween(loss, from, to))
      if (lossDb > worst.lossDb) worst = { lossDb, delaySamples: middle }
    }
  }
  return { kind, ...worst, fractions: [low, high] }
}

/** The span cut at whole samples, as far as one sample: further on the fractions come again. */
function unitSpans(from: number, to: number): Span[] {
  const next = Math.floor(from) + 1
  if (to <= next) return [[from, to]]
  return to - from >= 1
    ? [[next, next + 1]]
    : [
        [from, next],
        [next, to],
      ]
}
