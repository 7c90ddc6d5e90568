// What can be said of a loop from its gains alone, wherever its delay stands: bounds that move one way with every parameter, so that one corner of a box of
// knob positions speaks for all of it. The checks' own figures, pole radii above all, do not.
import type { Interpolation, ParameterSet } from '../set/types.ts'
import { freeze } from './frozen.ts'
import { bisect } from './loopSearch.ts'
import { loopMovement } from './movingRead.ts'
import { MOVING_CONSTANT, MOVING_LIMIT, READ_PEAK, toneL1, toneMax } from './norms.ts'
import { slopeBound } from './panelSweepBounds.ts'
import { boundedLevel, sectorOf } from './sector.ts'

export interface LoopBounds {
  /** G = |g| σ max|F|: no frozen loop gain is larger, since no held read passes more than 1. */
  readonly gain: number
  /** The smaller of γ∞ and γ2, or G where the loop stands still: below 1 the loop is proven. */
  readonly certified: number
  readonly moves: boolean
  /** The line's level where a shaper holds it; null where nothing does. */
  readonly level: number | null
}

/**
 * Bounds of a set at `sampleRate` in Hz, valid or not: a read that comes too close is held. Tens of microseconds. `steepest`: the read's speed by the sweep's steepest
 * place instead of its steepest chord.
 */
export function loopBounds(set: ParameterSet, sampleRate: number, steepest = false): LoopBounds {
  const { loop } = set
  const { tone } = freeze(set, 0, sampleRate).loop
  const { moves, epsilon } = steepest ? steepestMovement(set, sampleRate) : loopMovement(set, sampleRate)
  const feedback = Math.abs(loop.feedback)
  const sector = sectorOf(loop.shaper)
  const gain = feedback * sector.bound * toneMax(tone)
  const readPeak = READ_PEAK[loop.interpolation]
  const l1 = toneL1(tone)
  const constant = epsilon <= MOVING_LIMIT ? MOVING_CONSTANT[loop.interpolation] : null
  const energy = !moves ? gain : constant === null ? Number.POSITIVE_INFINITY : gain * Math.sqrt(1 + constant * epsilon)
  const certified = Math.min(feedback * sector.bound * readPeak * l1, energy)
  const level = loop.shaper && certified >= 1 ? boundedLevel(loop.shaper, { feedback, readPeak, toneL1: l1 }) : null
  return { gain, certified, moves, level }
}

/** With `hold` a read moves by a whole update's way at once. */
function steepestMovement(set: ParameterSet, sampleRate: number): { readonly moves: boolean; readonly epsilon: number } {
  if (set.loop.delay === 'fixed') return { moves: false, epsilon: 0 }
  const epsilon = slopeBound(set, sampleRate, false) * (set.sweep.between === 'hold' ? set.sweep.updateEvery : 1)
  return { moves: epsilon > 0, epsilon }
}

/** How far beyond D the last tap of a read can lie, samples: |A(z)| ≤ |z|^−(D + this) for |z| ≤ 1, by the maximum principle, as |A| ≤ 1 on the circle. */
const BEYOND: Readonly<Record<Exclude<Interpolation, 'allpass1'>, number>> = { nearest: 0.5, linear: 1, lagrange3: 2, hermite4: 2 }

/**
 * ln r of a radius no pole lies outside of, whatever the phases: with ρ = 1/r, |g| σ₀ ρ^(D + beyond) · LP(ρ) · HP(ρ) = 1, where LP(ρ) = (1−a)/(1−aρ) and
 * HP(ρ) = max((1+b)(1+ρ)/(2(1+bρ)), (1+b)(ρ−1)/(2(1−bρ))) are the largest the filters have on that circle; all-pass reads count by
 * ρ^(D−½) (ρ−⅓)/(1−ρ/3). null without a loop for small signals; Infinity where |g| σ₀ ≥ 1. Crossed lines do no more: the matrix has norm 1.
 */
export function poleBound(set: ParameterSet, sampleRate: number): number | null {
  const { loop } = freeze(set, 0, sampleRate)
  const gain = Math.abs(loop.gain * loop.slope.slope)
  if (gain === 0) return null
  if (gain >= 1) return Number.POSITIVE_INFINITY
  // (1 + 1/z)/2 of an averaging shaper passes no more than ρ.
  const delay = loopMovement(set, sampleRate).maxSamples + (loop.slope.averaged ? 1 : 0)
  const { lowPass: a, highPass: b } = loop.tone
  const kind = set.loop.interpolation
  const read = (x: number): number => {
    if (kind !== 'allpass1') return (delay + BEYOND[kind]) * x
    const rho = Math.exp(x)
    return (delay - 0.5) * x + Math.log((rho - 1 / 3) / (1 - rho / 3))
  }
  const low = (x: number): number => (a === null ? 0 : Math.log((1 - a) / (1 - a * Math.exp(x))))
  const high = (x: number): number => {
    if (b === null) return 0
    const rho = Math.exp(x)
    const nyquist = ((1 + b) * (1 + rho)) / (2 * (1 + b * rho))
    return Math.log(Math.max(nyquist, ((1 + b) * (rho - 1)) / (2 * (1 - b * rho))))
  }
  const total = (x: number): number => Math.log(gain) + read(x) + low(x) + high(x)
  // Short of the filters' own poles and of the all-pass read's.
  const poles = [
    ...(a === null ? [] : [-Math.log(a)]),
    ...(b === null ? [] : [-Math.log(b)]),
    ...(kind === 'allpass1' ? [Math.log(3)] : []),
  ]
  const end = Math.min(-Math.log(gain) / Math.max(0.5, delay - 0.5), ...poles.map((x) => x * (1 - 1e-12)))
  if (!(total(end) >= 0)) return -end
  return -bisect((x) => total(x) < 0, 0, end, 60)
}
