// How far the sweep bends pitch. The delay really read is a chord of the sweep: it is evaluated every K samples and, with
// `ramp`, runs straight between two evaluations. Its slope is (τ(t + h) − τ(t))/h, h = K/fs, over every alignment of the
// updates with the cycle, so that edges shorter than h count by what is read of them. With `hold` the delay stands and
// hops by the same amounts: pitch is not bent between hops, the same slope is what the ear gets as their mean.
import { sweepShapeValue } from '../dsp/sweep.ts'
import { delayMs, voiceOffsetMs } from '../set/delayRange.ts'
import type { ParameterSet } from '../set/types.ts'
import { largestBetween } from './peakSearch.ts'
import { shapeCorners } from './sweepSlope.ts'
import { centsOfSlope } from './sweepTable.ts'

export interface SweepDetune {
  /** Larger of upCents and −downCents; null where the read stalls or runs backwards. */
  readonly maxCents: number | null
  /** Sharpest, ≥ 0: the delay falling fastest. */
  readonly upCents: number
  /** Flattest, ≤ 0: the delay growing fastest; null from slope 1 on. */
  readonly downCents: number | null
  /** Largest and smallest dτ/dt, seconds a second. */
  readonly maxSlope: number
  readonly minSlope: number
  /** `stalls` at slope 1, `reversed` past it. */
  readonly motion: 'plays' | 'stalls' | 'reversed'
  /** Time between evaluations of the delay, K/fs, s. */
  readonly updateSeconds: number
  /** Largest change of the delay from one evaluation to the next, samples. */
  readonly hopSamples: number
}

/** Cycles: past the rounding of a phase, and nothing against the shortest chord. */
const HAIR = 1e-15
/** A slope this close to 1 stands still but for rounding. */
const STALL_TOLERANCE = 1e-9

/**
 * Largest and smallest slope of the delay really read, and the cents they bend. The voice with the longest base moves most
 * (ratio law); `drift` counts by its bound, two neighbouring values at −1 and 1, which is a sine of half the rate.
 * Formula: 1200 log2(1 − dτ/dt); J. O. Smith, PASP, "Time-Varying Delay-Line Reads".
 */
export function sweepDetune(set: ParameterSet, sampleRate = set.sampleRate): SweepDetune {
  const updateSeconds = set.sweep.updateEvery / sampleRate
  const { rise, fall } = chordsMs(set, updateSeconds)
  const maxSlope = rise / 1000 / updateSeconds
  const minSlope = 0 - fall / 1000 / updateSeconds
  const motion = maxSlope > 1 + STALL_TOLERANCE ? 'reversed' : maxSlope >= 1 - STALL_TOLERANCE ? 'stalls' : 'plays'
  const upCents = centsOfSlope(minSlope) ?? 0
  const downCents = motion === 'plays' ? centsOfSlope(maxSlope) : null
  return {
    maxCents: downCents === null ? null : Math.max(upCents, -downCents),
    upCents,
    downCents,
    maxSlope,
    minSlope,
    motion,
    updateSeconds,
    hopSamples: (Math.max(rise, fall) / 1000) * sampleRate,
  }
}

/** Largest rise and fall of τ, ms, over `seconds` of the sweep. Both ≥ 0. */
function chordsMs(set: ParameterSet, seconds: number): { rise: number; fall: number } {
  const sweep = set.sweep.shape === 'drift' ? ({ ...set.sweep, shape: 'sine', rateHz: set.sweep.rateHz / 2 } as const) : set.sweep
  const span = sweep.rateHz * seconds
  if (span === 0) return { rise: 0, fall: 0 }
  const offsetMs = voiceOffsetMs(set.voices, set.voices.count - 1)
  const at = (phi: number) => delayMs(set, { offsetMs, sweep: sweepShapeValue(sweep, phi) })
  const chord = (phi: number) => at(phi + span) - at(phi)
  // Between these phases neither end of the chord meets a corner.
  const corners = shapeCorners(sweep).flatMap((corner) => [corner, corner - span])
  const stops = corners.map((phi) => phi - Math.floor(phi)).sort((a, b) => a - b)
  // Straight pieces of a time sweep make straight chords: largest at an end.
  const straight = sweep.law === 'time' && sweep.shape !== 'sine'
  const largest = (f: (phi: number) => number, low: number, high: number) =>
    straight ? Math.max(f(low), f(high)) : largestBetween(f, low, high)
  let rise = 0
  let fall = 0
  stops.forEach((from, i) => {
    const to = stops[i + 1] ?? (stops[0] as number) + 1
    // A hair inside: at a jump the value on the corner is that of one side only.
    const hair = Math.min(HAIR, (to - from) / 4)
    rise = Math.max(rise, largest(chord, from + hair, to - hair))
    fall = Math.max(
      fall,
      largest((phi) => -chord(phi), from + hair, to - hair),
    )
  })
  return { rise, fall }
}
