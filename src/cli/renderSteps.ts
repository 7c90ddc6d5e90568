// A render cut into steps, so that it can show how far it is and be interrupted. The engine's result does not depend on the cuts.

import { createEngine, engineCounters, outputChannels, processEngine } from '../dsp/engine.ts'
import { createShaper } from '../dsp/shaper.ts'
import { delayRange } from '../set/delayRange.ts'
import type { ParameterSet } from '../set/types.ts'

export interface RenderJob {
  readonly set: ParameterSet
  readonly input: readonly Float64Array[]
  /** Samples of silence after the input. */
  readonly tail: number
  readonly signal: AbortSignal
  readonly onStep: (framesDone: number) => void
}

/** Largest value a 32-bit float file holds. */
const LARGEST = 3.4028234663852886e38

/** The set's output, or the frame at which it grew past what a file holds. Throws when the signal is aborted. */
export async function renderInSteps({
  set,
  input,
  tail,
  signal,
  onStep,
}: RenderJob): Promise<Float64Array[] | { readonly divergedAt: number }> {
  const engine = createEngine(set, { live: false })
  const frames = (input[0] as Float64Array).length
  const output = Array.from({ length: outputChannels(set.layout) }, () => new Float64Array(frames + tail))
  const step = Math.ceil(set.sampleRate)
  const parts = [
    { from: 0, to: frames, input },
    { from: frames, to: frames + tail, input: [] },
  ]
  for (const part of parts) {
    for (let at = part.from; at < part.to; at += step) {
      const count = Math.min(step, part.to - at)
      processEngine(engine, part.input, output, count, at)
      if (engineCounters(engine).nonFinite > 0 || grown(output, at, count)) return { divergedAt: at }
      onStep(at + count)
      await new Promise((resolve) => setImmediate(resolve))
      signal.throwIfAborted()
    }
  }
  return output
}

const grown = (channels: readonly Float64Array[], from: number, count: number): boolean =>
  channels.some((channel) => channel.subarray(from, from + count).some((x) => !(Math.abs(x) <= LARGEST)))

/** The longest ring that `--tail ring` waits for, and how long it waits where the loop does not decay. */
export const LONGEST_RING_S = 60
export const ENDLESS_RING_S = 10

/**
 * Time in s after which what is left of the sound has fallen by 60 dB: the longest way to the output, and as many passes of the loop as |g| σ per pass needs
 * (σ the loop shaper's sector bound; reads and filters only take away).
 */
export function ringTailSeconds(set: ParameterSet): number {
  const { voices, loop } = delayRange(set)
  const through = Math.max(voices.maxSamples / set.sampleRate, set.mix.dryDelayMs / 1000)
  const perPass = Math.abs(set.loop.feedback) * (set.loop.shaper ? createShaper(set.loop.shaper).sectorBound : 1)
  if (perPass === 0) return through
  if (perPass >= 1) return ENDLESS_RING_S
  const passes = Math.log(1000) / -Math.log(perPass)
  return Math.min(LONGEST_RING_S, through + (passes * loop.maxSamples) / set.sampleRate)
}
