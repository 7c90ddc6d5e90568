// The loop shaper as a gain between bounds: |shaper(r)| ≤ σ |r|, what it can put out at most, and the level a loop with it stays below.
import { createShaper } from '../dsp/shaper.ts'
import type { Shaper } from '../set/types.ts'

export interface Sector {
  /** σ = sup |shaper(r)/r|; 1 without a shaper. */
  readonly bound: number
  /** Small-signal slope; 1 without. */
  readonly slope: number
  /** Whether shaper(r)/r can be negative (a drawn curve below 0): then every gain in [−σ, σ] may occur. */
  readonly bothSigns: boolean
}

/** Sector of the loop shaper. adaa1 keeps it: the mean of the curve between two values is at most σ times the mean of their sizes. */
export function sectorOf(shaper: Shaper | null): Sector {
  if (shaper === null) return { bound: 1, slope: 1, bothSigns: false }
  const { sectorBound, slopeAtZero } = createShaper(shaper)
  return { bound: sectorBound, slope: slopeAtZero, bothSigns: shaper.curve === 'drawn' && shaper.points.some(([, k]) => k < 0) }
}

/** sup |shaper(r)| over |r| ≤ level. Every curve but a drawn one grows with r. */
export const shaperPeak = (shaper: Shaper, level: number): number => peakOf(shaper)(level)

/** The same for many levels of one shaper. */
function peakOf(shaper: Shaper): (level: number) => number {
  const { curve } = createShaper(shaper)
  const ends = (level: number): number => Math.max(Math.abs(curve(level)), Math.abs(curve(-level)))
  if (shaper.curve !== 'drawn') return ends
  const bends = shaper.points
    .flatMap(([t]) => [(t * shaper.positive) / shaper.drive, (-t * shaper.negative) / shaper.drive])
    .map((r) => ({ size: Math.abs(r), value: Math.abs(curve(r)) }))
  return (level) => bends.reduce((peak, { size, value }) => (size <= level ? Math.max(peak, value) : peak), ends(level))
}

/** Past this a level is not bounded in any useful sense: 120 dB over full scale. */
const UNBOUNDED = 1e6
const SAME = 1e-13

/**
 * The smallest level A with input + gain · sup{|shaper(r)| : |r| ≤ passed · A} ≤ A: what an input within ±`input` leaves a loop with. null when there is none.
 * Found from below by repetition, which rises to it. Curves bend one way for r > 0: where two steps, drawn on as a straight line, end no further than that, the
 * rest between is left out; a dead zone, which only steepens, has no level once it rises as fast as A.
 */
export function heldLevel(shaper: Shaper, input: number, gain: number, passed: number): number | null {
  const peak = peakOf(shaper)
  const next = (level: number) => input + gain * peak(passed * level)
  let level = input
  for (let i = 0; i < 20000; i++) {
    const raised = next(level)
    if (!(raised <= UNBOUNDED)) return null
    if (raised <= level * (1 + SAME)) return raised
    const again = next(raised)
    const slope = (again - raised) / (raised - level)
    if (shaper.curve === 'deadZone' && slope >= 1) return null
    const ahead = shaper.curve === 'drawn' || slope >= 1 ? raised : raised + (again - raised) / (1 - slope)
    level = ahead > again && next(ahead) >= ahead * (1 - SAME) ? ahead : again
  }
  return null
}

/** With a line input within ±1 a loop with a shaper stays within ± this: 1 + |g| ρ∞ sup{|shaper(r)| : |r| ≤ ‖f‖₁ ρ∞ A} ≤ A. Source: DESIGN 5 (l∞ small gain; for convex reads it is tight). */
export const boundedLevel = (
  shaper: Shaper,
  loop: { readonly feedback: number; readonly readPeak: number; readonly toneL1: number },
): number | null => heldLevel(shaper, 1, Math.abs(loop.feedback) * loop.readPeak, loop.toneL1 * loop.readPeak)
