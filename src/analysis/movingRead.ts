// How the loop's read moves: over which delays and how fast, and the delay sample by sample as the engine reads it.
import { loopDelaySamples, sweepPhase } from '../dsp/sweep.ts'
import { delayRange, smallestDelay } from '../set/delayRange.ts'
import type { ParameterSet } from '../set/types.ts'
import { sweepDetune } from './detune.ts'

export interface LoopMovement {
  readonly moves: boolean
  /** ε = max |D[n+1] − D[n]| of the delay really read, samples a sample: update interval, ramp or hold, edges and drawn corners included. */
  readonly epsilon: number
  /** Smallest and largest delay read, samples; half a sample less than asked for where an adaa1 shaper adds it. */
  readonly minSamples: number
  readonly maxSamples: number
}

/**
 * Movement of the loop's read in closed form. ε is the largest chord of the sweep over one update interval, at every alignment: itself with `hold`,
 * divided by the interval with `ramp`. `drift` counts by its bound, from −1 to 1 in one cycle. sampleRate in Hz.
 */
export function loopMovement(set: ParameterSet, sampleRate = set.sampleRate): LoopMovement {
  const half = set.loop.shaper?.antialias === 'adaa1' ? 0.5 : 0
  const least = smallestDelay(set.loop.interpolation, 'loop')
  const { minSamples, maxSamples } = delayRange(set, sampleRate).loop
  const range = { minSamples: Math.max(least, minSamples - half), maxSamples: Math.max(least, maxSamples - half) }
  if (set.loop.delay === 'fixed') return { moves: false, epsilon: 0, ...range }
  // One voice has no spread offset: its chord is the loop's.
  const { hopSamples } = sweepDetune({ ...set, voices: { ...set.voices, count: 1 } }, sampleRate)
  const epsilon = set.sweep.between === 'hold' ? hopSamples : hopSamples / set.sweep.updateEvery
  return { moves: epsilon > 0, epsilon, ...range }
}

/**
 * D[first … first + out.length) of the loop of `channel`, samples: evaluated at multiples of the update interval of absolute time, straight lines or
 * steps between (DESIGN 3), held at the interpolator's limit.
 */
export function fillLoopDelays(
  set: ParameterSet,
  sampleRate: number,
  { channel, first }: { readonly channel: number; readonly first: number },
  out: Float64Array,
): void {
  const { updateEvery: every, between } = set.sweep
  const least = smallestDelay(set.loop.interpolation, 'loop')
  const at = (n: number) => loopDelaySamples(set, sweepPhase(set, n, channel, 0, sampleRate), sampleRate)
  const ramps = between === 'ramp' && every > 1
  for (let i = 0; i < out.length; ) {
    const n = first + i
    const start = n - (n % every)
    const from = at(start)
    const slope = ramps ? (at(start + every) - from) / every : 0
    for (let j = n - start; j < every && i < out.length; j++, i++) out[i] = Math.max(least, from + slope * j)
  }
}
