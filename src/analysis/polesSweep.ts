// The largest pole over the sweep, certified where it is largest, and whether every frozen position is stable.
import type { ParameterSet } from '../set/types.ts'
import type { FrozenLoop } from './frozen.ts'
import { largestCrossing } from './loopCrossing.ts'
import { loopParts, pairModulusEquation } from './loopPair.ts'
import { type LoopSweep, loopSweep, worstPlace } from './loopSweep.ts'
import { loopMovement } from './movingRead.ts'
import { lineMax, toneMax } from './norms.ts'
import { type LargestPole, largestPoleOfLoop } from './poles.ts'
import { modulusEquation } from './polesNewton.ts'
import { largestPoleOfPair } from './polesPair.ts'
import { pairPolesOutside } from './polesPairWinding.ts'

export interface SweptPole extends LargestPole {
  /** Delays of the loop's reads at the worst place, samples, one a line (one for lines that read alike). */
  readonly delaysSamples: readonly number[]
  /** The loop frozen there. */
  readonly loop: FrozenLoop
  /** Position of the cycle, where that is what was walked. */
  readonly position: number | null
}

/** A pole this much inside, as ln r times the delay, is told from one on the circle; nearer, rounding decides. */
const CIRCLE = 1e-12

/** Place of the sweep where the largest pole is largest. */
function worstPole(sweep: LoopSweep, sampleRate: number, slope: number | undefined): number {
  const score = (loop: FrozenLoop) => largestPoleOfLoop(loop, sampleRate, { slope, quick: true })?.lnRadius ?? Number.NEGATIVE_INFINITY
  return worstPlace(sweep, score, { estimate: radiusEstimate(slope) }).place
}

/** Largest pole radius over the whole sweep, the shaper counted at its small-signal slope (or `slope`); null without a loop. */
export function sweptPole(set: ParameterSet, sampleRate = set.sampleRate, slope?: number): SweptPole | null {
  const sweep = loopSweep(set, sampleRate)
  const place = worstPole(sweep, sampleRate, slope)
  const loop = sweep.at(place)
  const pole = largestPoleOfLoop(loop, sampleRate, { slope, certify: true })
  if (pole === null) return null
  const lnBound = Math.max(pole.lnBound, highestBound(sweep, slope))
  return {
    ...pole,
    lnBound,
    bound: Math.exp(lnBound),
    loop,
    delaysSamples: loop.reads.map((read) => read.delaySamples),
    position: sweep.over === 'position' ? place : null,
  }
}

/** Crossed lines: the bound where it is highest over the sweep, unless that place was searched through and holds less. */
function highestBound(sweep: LoopSweep, slope: number | undefined): number {
  if (sweep.over !== 'position') return Number.NEGATIVE_INFINITY
  const { place } = worstPlace(sweep, radiusEstimate(slope))
  const { pair } = loopParts(sweep.at(place), slope)
  const found = pair && largestPoleOfPair(pair)
  return found ? found.bound : Number.NEGATIVE_INFINITY
}

/** ln of about the largest radius: where the bound is 1 at the angles at which the filters pass most. For choosing positions of crossed lines. */
function radiusEstimate(slope: number | undefined): (loop: FrozenLoop) => number {
  let angles: number[] | null = null
  return (loop) => {
    const { lines, pair } = loopParts(loop, slope)
    const [line] = pair?.lines ?? lines
    if (line === undefined || line.gain === 0) return Number.NEGATIVE_INFINITY
    // The filters are the same everywhere; the interpolator's loss only grows with the angle.
    angles ??= [1e-3 / line.delay, lineMax(line).theta, Math.PI]
    const start = Math.log(Math.abs(line.gain)) / line.delay
    const at = (theta: number) => (pair ? pairModulusEquation(pair, theta, start) : modulusEquation(line, theta, start))
    return Math.max(...angles.map((theta) => at(theta) ?? Number.NEGATIVE_INFINITY))
  }
}

/** Whether that pole lies inside the unit circle, by more than rounding. */
export function isInside(pole: SweptPole | null): boolean {
  return pole === null || pole.lnRadius * Math.max(1, ...pole.delaysSamples) < -CIRCLE
}

/**
 * |g| · slope · max|A F| over frequency and sweep, linear; of two lines the larger, which bounds both (X has norm 1). The averaging of an adaa1 shaper is left
 * out: it is part of the shaper, and no gain can be counted on there.
 */
export function sweptGain(set: ParameterSet, sampleRate: number, slope: number): number {
  const { moves, minSamples, maxSamples } = loopMovement(set, sampleRate)
  const sweep = loopSweep(set, sampleRate)
  const kind = set.loop.interpolation
  // At a whole delay, and of an all-pass read anywhere, |A| is 1.
  if (kind === 'nearest' || kind === 'allpass1' || (moves && Math.ceil(minSamples) <= maxSamples))
    return Math.abs(set.loop.feedback) * slope * toneMax(sweep.at(sweep.from).tone)
  return worstPlace(sweep, (loop) => loopMax(loop, slope)).score
}

function loopMax(loop: FrozenLoop, slope: number): number {
  const { lines } = loopParts({ ...loop, crossFeed: 0, slope: { slope, averaged: false } }, slope)
  return Math.max(...lines.map((line) => lineMax(line).value))
}

/**
 * Whether every frozen position is stable for every shaper gain in [0, slope] ([−slope, slope] with bothSigns). Crossed lines whose gain is not below 1
 * are decided only without a shaper (one gain), by counting; with one they are not called stable.
 */
export function everyPositionStable(
  set: ParameterSet,
  sampleRate: number,
  { slope, bothSigns, oneGain }: { readonly slope: number; readonly bothSigns: boolean; readonly oneGain: boolean },
): boolean {
  if (sweptGain(set, sampleRate, slope) < 1) return true
  const sweep = loopSweep(set, sampleRate)
  return oneGain ? stableAtGain(set, sampleRate, sweep, slope) : stableUpToGain(sweep, slope, bothSigns)
}

function stableAtGain(set: ParameterSet, sampleRate: number, sweep: LoopSweep, slope: number): boolean {
  const score = (loop: FrozenLoop) => {
    const pole = largestPoleOfLoop(loop, sampleRate, { slope, quick: true })
    return pole === null ? Number.NEGATIVE_INFINITY : pole.lnRadius * Math.max(...loop.reads.map((read) => read.delaySamples))
  }
  const worst = worstPlace(sweep, score, { enough: -CIRCLE, estimate: radiusEstimate(slope) })
  if (worst.score > -CIRCLE) return false
  const { pair } = loopParts(sweep.at(worst.place), slope)
  if (pair !== null) return pairPolesOutside(pair, 0) === 0
  return isInside(sweptPole(set, sampleRate, slope))
}

function stableUpToGain(sweep: LoopSweep, slope: number, bothSigns: boolean): boolean {
  const score = (loop: FrozenLoop) => {
    const { lines, pair } = loopParts(loop, slope)
    if (pair !== null) return Number.POSITIVE_INFINITY
    const signs = bothSigns ? [1, -1] : [1]
    return Math.max(...lines.flatMap((line) => signs.map((sign) => largestCrossing({ ...line, gain: line.gain * sign }))))
  }
  return worstPlace(sweep, score, { enough: 1 - CIRCLE }).score < 1 - CIRCLE
}
