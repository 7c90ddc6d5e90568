// N = ‖R‖, the largest energy gain of the loop's read over this very sweep: measured by bisection where it moves fastest, then certified with a margin
// over whole cycles. A cycle that is no whole number of update intervals meets other fractions each time it comes round: several are certified.

import { sweepPhase } from '../dsp/sweep.ts'
import type { Interpolation, ParameterSet } from '../set/types.ts'
import { fillLoopDelays, loopMovement } from './movingRead.ts'
import { addAllpassRows, createAllpassTest } from './movingReadAllpass.ts'
import { addRows, createGramTest, finishGramTest } from './movingReadGram.ts'
import { shapeCorners } from './sweepSlope.ts'

export interface CertifiedNorm {
  /** Certified: the read raises no energy by more than this, margin included. */
  readonly norm: number
  /** N where it is largest, by bisection to 1e-9. */
  readonly measured: number
  /** Part of N − 1 added for alignments that were not tried. */
  readonly margin: number
  /** `cycles`: whole cycles were factored; `windows`: stretches about the steepest places, the cycle being too long. */
  readonly method: 'cycles' | 'windows'
  /** Cycles (or starting fractions) tried a line. */
  readonly alignments: number
  /** True when every cycle reads exactly like the first, so that one stands for all. */
  readonly repeats: boolean
}

/** Rows of R that one cycle may cost, and all cycles but the first together: 30 to 60 ns each. */
const BUDGET = 1_500_000
const MORE_CYCLES = 300_000
const MARGIN = 0.01
const BLOCK = 4096
/** Rows past a cycle's end, so that what its first rows share with the cycle before is seen too. */
const OVERLAP = 2048
/** Cycles tried where each meets other fractions: far apart, so that the fractions differ. */
const CYCLES = [0, 1, 3, 8, 21, 55, 144, 377]
const LONGEST_WINDOW = 65536
const MOST_WINDOWS = 48
/** Rows all windows together may cost; one a phase there always is. */
const WINDOW_ROWS = 500_000
/** Samples a unit will never run for (700 years), and up to which sample numbers stay exact. */
const LAST = 2 ** 50

interface Stretch {
  readonly channel: number
  readonly first: number
  readonly rows: number
}

export interface NormOptions {
  /** Rows of R that one cycle may cost: beyond, windows stand for it. */
  readonly budget?: number
  /** Only a norm below this is of use: null as soon as it is known not to be below, which is cheap. */
  readonly below?: number
}

/**
 * Certified norm of the loop's read over the sweep of `set` at `sampleRate` (Hz). 1 exactly when it stands still (the reads are passive: FACTS 3). null where it
 * cannot be decided (an all-pass read running backwards). `drift` is judged by the steepest cycle it can draw and by its first ones.
 */
export function certifiedNorm(
  set: ParameterSet,
  sampleRate = set.sampleRate,
  { budget = BUDGET, below = Number.POSITIVE_INFINITY }: NormOptions = {},
): CertifiedNorm | null {
  if (!loopMovement(set, sampleRate).moves) return { norm: 1, measured: 1, margin: 0, method: 'cycles', alignments: 1, repeats: true }
  if (set.sweep.shape !== 'drift') return normOfSweep(set, sampleRate, { budget, below })
  const limits = { budget: budget / 2, below }
  // A cosine from −1 to 1 in one cycle is a sine of half the rate.
  const steepest = normOfSweep({ ...set, sweep: { ...set.sweep, shape: 'sine', rateHz: set.sweep.rateHz / 2 } }, sampleRate, limits)
  const drawn = steepest && normOfSweep(set, sampleRate, limits, steepest.measured)
  return (
    drawn && { ...drawn, norm: Math.max(drawn.norm, steepest.norm), measured: Math.max(drawn.measured, steepest.measured), repeats: false }
  )
}

function normOfSweep(
  set: ParameterSet,
  sampleRate: number,
  { budget, below: limit }: Required<NormOptions>,
  known = 1,
): CertifiedNorm | null {
  const period = sampleRate / set.sweep.rateHz
  const repeats = Number.isInteger(period) && period % set.sweep.updateEvery === 0 && set.sweep.shape !== 'drift'
  const channels = set.layout === 'stereo' && set.sweep.stereoPhase % 360 !== 0 ? [0, 1] : [0]
  const rows = Math.ceil(period) + OVERLAP
  const whole = channels.length * rows <= budget ? 1 + Math.floor(Math.min(MORE_CYCLES, budget) / channels.length / rows) : 0
  const alignments = repeats ? 1 : CYCLES.length
  const windows = channels.flatMap((channel) => steepWindows(set, sampleRate, channel, repeats))
  let measured = known
  if (windows.some((window) => limit < Number.POSITIVE_INFINITY && !below(set, sampleRate, window, limit))) return null
  for (const window of windows) {
    const norm = normOfStretch(set, sampleRate, window, measured)
    if (norm === null) return null
    measured = norm
  }
  const raised = (norm: number) => norm + MARGIN * Math.max(norm - 1, 1e-7)
  if (raised(measured) >= limit) return null
  const certificate = { measured, margin: MARGIN, repeats }
  if (whole < 1) return { ...certificate, norm: raised(measured), method: 'windows', alignments }
  const tried = Math.min(alignments, whole)
  const cycles = CYCLES.slice(0, tried).map((k) => Math.floor(k * period))
  const stretches = channels.flatMap((channel) => cycles.map((first): Stretch => ({ channel, first, rows })))
  for (const stretch of stretches) {
    for (let attempt = 0; !below(set, sampleRate, stretch, raised(measured)); attempt++) {
      // Steeper somewhere than the windows showed: measure that cycle itself, which is dear and rare.
      const norm = attempt === 0 ? normOfStretch(set, sampleRate, stretch, measured) : null
      if (norm === null || raised(norm) >= limit) return null
      measured = norm
    }
  }
  return { ...certificate, measured, norm: raised(measured), method: 'cycles', alignments: tried }
}

/** A stretch that exceeds the norm known by less than this part of N − 1 is left to the margin: bisecting is dear. */
const WORTH_BISECTING = 1e-3
/** Part of N − 1 to which N is bisected. */
const BISECTED = 1e-7

/** Norm over a stretch if it exceeds `known` noticeably, by bisection from above (a certified figure); `known` if it does not; null past 64. */
function normOfStretch(set: ParameterSet, sampleRate: number, stretch: Stretch, known: number): number | null {
  if (below(set, sampleRate, stretch, known + WORTH_BISECTING * (known - 1) + 1e-9)) return known
  let low = known
  // Most sweeps stay below 1 + 0.6 ε (ANALYSIS_NOTES); what does not is caught up with.
  let high = Math.max(1 + 1.25 * (known - 1), 1 + Math.min(0.25, 0.6 * loopMovement(set, sampleRate).epsilon))
  while (!below(set, sampleRate, stretch, high)) {
    low = high
    high = 1 + 2 * (high - 1)
    if (high > 64) return null
  }
  while (high - low > Math.max(1e-12, BISECTED * (high - 1))) {
    const middle = (low + high) / 2
    if (below(set, sampleRate, stretch, middle)) high = middle
    else low = middle
  }
  return high
}

const block = new Float64Array(BLOCK)

/** Whether R over these rows has a norm below t. */
function below(set: ParameterSet, sampleRate: number, { channel, first, rows }: Stretch, t: number): boolean {
  const kind: Interpolation = set.loop.interpolation
  const { minSamples, maxSamples } = loopMovement(set, sampleRate)
  const allpass = kind === 'allpass1' ? createAllpassTest(t) : null
  const gram = kind === 'allpass1' ? null : createGramTest(kind, t, { shortest: minSamples, longest: maxSamples })
  for (let done = 0; done < rows; done += BLOCK) {
    const count = Math.min(BLOCK, rows - done)
    fillLoopDelays(set, sampleRate, { channel, first: first + done }, block)
    if (allpass && !addAllpassRows(allpass, first + done, block, count)) return false
    if (gram && !addRows(gram, first + done, block, count)) return false
  }
  return gram === null || finishGramTest(gram, first + rows)
}

/** Stretches about the steepest rise and fall of the delay and about every corner of the shape, at several starting fractions. */
function steepWindows(set: ParameterSet, sampleRate: number, channel: number, repeats: boolean): Stretch[] {
  const period = sampleRate / set.sweep.rateHz
  const { epsilon } = loopMovement(set, sampleRate)
  // Long enough for the read to pass every fraction a few times.
  const rows = Math.ceil(Math.min(Math.max(1024, 4 / epsilon), LONGEST_WINDOW, period + OVERLAP))
  const offset = sweepPhase(set, 0, channel, 0, sampleRate)
  const phases = [...steepestPhases(set, sampleRate, channel), ...shapeCorners(set.sweep).map((corner) => corner - offset)]
  const cycles = repeats ? [0] : CYCLES
  const each = Math.max(1, Math.floor(Math.min(MOST_WINDOWS, WINDOW_ROWS / rows) / phases.length))
  return phases.flatMap((phase) =>
    cycles.slice(0, each).map((cycle): Stretch => {
      const centre = (phase - Math.floor(phase) + cycle) * period
      return { channel, first: Math.min(LAST, Math.max(0, Math.floor(centre - rows / 2))), rows }
    }),
  )
}

/** Parts of the first cycle, from its start, at which the delay rises and falls fastest. */
function steepestPhases(set: ParameterSet, sampleRate: number, channel: number): number[] {
  const period = sampleRate / set.sweep.rateHz
  const points = 1024
  const delays = new Float64Array(1)
  let rise = { at: 0, change: 0 }
  let fall = { at: 0, change: 0 }
  let before = Number.NaN
  for (let i = 0; i <= points; i++) {
    const at = i / points
    fillLoopDelays(set, sampleRate, { channel, first: Math.floor(at * period) }, delays)
    const change = (delays[0] as number) - before
    if (change > rise.change) rise = { at: at - 0.5 / points, change }
    if (change < fall.change) fall = { at: at - 0.5 / points, change }
    before = delays[0] as number
  }
  return [rise.at, fall.at]
}
