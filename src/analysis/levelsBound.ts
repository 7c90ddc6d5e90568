// How large |H| can be at one frequency, wherever the sweep is held: the passive reads count as 1 with any phase (|A| ≤ 1, FACTS 3). Filters turn
// slowly with frequency, so that this bound has no teeth, and its largest value is soon found.
//
//   |w| ≤ 1/(1 − |L|), |L| = |g| σ |F|            the cross-feed matrix has rows that sum to 1, so two lines do no more
//   |H| ≤ |dry| (· |w| from the line) + |wet| √V |F_wet| |w|
//
// One voice that reads with its loop keeps phase with it: b z + d over z = e/(1 − c e), |e| ≤ 1, a disc about c̄/(1 − |c|²) of radius 1/(1 − |c|²), so that
// |H| ≤ |d + b c̄/(1 − |c|²)| + |b|/(1 − |c|²), which is reached where the sweep passes that phase.

import { dual } from './dual.ts'
import { chainAt, type FilterChain, loopChain, outerChain, wetChain } from './filterChain.ts'
import type { Frozen } from './frozen.ts'

export interface FrequencyBound {
  readonly frozen: Frozen
  readonly channel: number
  /** Voice and loop read one delay the same way. */
  readonly together: boolean
  readonly chains: { readonly loop: FilterChain; readonly wet: FilterChain; readonly outer: FilterChain }
}

export function frequencyBound(frozen: Frozen, channel: number, together: boolean): FrequencyBound {
  return { frozen, channel, together, chains: { loop: loopChain(frozen), wet: wetChain(frozen), outer: outerChain(frozen) } }
}

const loop = dual()
const wet = dual()
const outer = dual()

/** The bound on |H| at ω rad/sample; Infinity where |L| ≥ 1. */
export function boundAt({ frozen, channel, together, chains }: FrequencyBound, omega: number): number {
  const er = Math.cos(omega)
  const ei = -Math.sin(omega)
  chainAt(chains.loop, er, ei, loop)
  chainAt(chains.wet, er, ei, wet)
  chainAt(chains.outer, er, ei, outer)
  const around = Math.hypot(loop[0] as number, loop[1] as number)
  if (around >= 1) return Number.POSITIVE_INFINITY
  const gain = Math.hypot(outer[0] as number, outer[1] as number)
  const voices = frozen.channels[channel]?.voices.length ?? 1
  const through = (frozen.channels[channel]?.wet ?? 0) * voices
  if (together) return gain * discBound(frozen, through)
  const line = 1 / (1 - around)
  const dry = Math.abs(frozen.dry) * (frozen.dryTap === 'line' ? line : 1)
  return gain * (dry + Math.abs(through) * Math.hypot(wet[0] as number, wet[1] as number) * line)
}

/** Together nothing but g stands in the loop: c is real. */
function discBound({ dry, dryTap, loop: { gain: c } }: Frozen, through: number): number {
  const b = dryTap === 'line' ? through + dry * c : through
  const spread = 1 - c * c
  return Math.abs(dry + (b * c) / spread) + Math.abs(b) / spread
}

/** The largest bound over [0, π] and where it is: 0 and π, and 128 frequencies of equal ratio and as many of equal distance between, the best of them refined. */
export function largestBound(bound: FrequencyBound): { readonly omega: number; readonly value: number } {
  let best = { omega: 0, value: boundAt(bound, 0) }
  const visit = (omega: number) => {
    const value = boundAt(bound, omega)
    if (value > best.value) best = { omega, value }
  }
  visit(Math.PI)
  if (!hasFilters(bound)) return best
  for (let i = 1; i < 128; i++) visit(1e-4 * (Math.PI / 1e-4) ** (i / 128))
  for (let i = 1; i < 128; i++) visit((Math.PI * i) / 128)
  // Two neighbours on either side of the best, halved until nothing is left between.
  for (let width = best.omega * 0.1 + 1e-6; width > best.omega * 1e-7 + 1e-12; width /= 2) {
    const { omega } = best
    visit(Math.max(0, omega - width))
    visit(Math.min(Math.PI, omega + width))
  }
  return best
}

export function hasFilters({ chains }: FrequencyBound): boolean {
  return Object.values(chains).some(({ tone, averages }) => tone.lowPass !== null || tone.highPass !== null || averages > 0)
}
