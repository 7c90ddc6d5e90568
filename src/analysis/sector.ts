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
export function shaperPeak(shaper: Shaper, level: number): number {
  const { curve } = createShaper(shaper)
  let peak = Math.max(Math.abs(curve(level)), Math.abs(curve(-level)))
  if (shaper.curve !== 'drawn') return peak
  for (const [t] of shaper.points) {
    for (const r of [(t * shaper.positive) / shaper.drive, (-t * shaper.negative) / shaper.drive]) {
      if (Math.abs(r) <= level) peak = Math.max(peak, Math.abs(curve(r)))
    }
  }
  return peak
}

/** Past this a level is not bounded in any useful sense: 120 dB over full scale. */
const UNBOUNDED = 1e6

/**
 * The smallest A with 1 + |g| ρ∞ sup{|shaper(r)| : |r| ≤ ‖f‖₁ ρ∞ A} ≤ A: with a line input within ±1 the line stays within ±A. null when there is none.
 * Found from below by repetition, which rises to the smallest solution. Source: DESIGN 5 (l∞ small gain; for convex reads it is tight).
 */
export function boundedLevel(
  shaper: Shaper,
  loop: { readonly feedback: number; readonly readPeak: number; readonly toneL1: number },
): number | null {
  const g = Math.abs(loop.feedback) * loop.readPeak
  const next = (level: number) => 1 + g * shaperPeak(shaper, loop.toneL1 * loop.readPeak * level)
  let level = 1
  for (let i = 0; i < 100000; i++) {
    const raised = next(level)
    if (!(raised <= UNBOUNDED)) return null
    if (raised <= level * (1 + 1e-13)) return raised
    level = raised
  }
  return null
}
