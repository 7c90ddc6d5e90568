// The frozen response as the engine plays it: an impulse small enough for the shapers' slope to be all there is, and its transform.
import { createEngine, holdPosition, inputChannels, outputChannels, processEngine } from '../../src/dsp/engine.ts'
import { renderSet } from '../../src/dsp/render.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { realFft, type Spectrum } from '../../src/signal/fft.ts'

/** Shapers bend 1e-7 by less than 1e-14 of itself. */
const IMPULSE = 1e-7

/** Spectra of the channels' impulse responses over `frames` samples, a power of two, the impulse in every input; sweep standing at its start. */
export function standingSpectra(set: ParameterSet, frames: number): Spectrum[] {
  const impulse = new Float64Array(frames)
  impulse[0] = IMPULSE
  const input = Array.from({ length: inputChannels(set.layout) }, () => impulse)
  return renderSet({ ...set, sweep: { ...set.sweep, rateHz: 0 } }, input).map((y) => realFft(y.map((v) => v / IMPULSE)))
}

/** The same with the running engine's sweep held at `position`. */
export function heldSpectra(set: ParameterSet, position: number, frames: number): Spectrum[] {
  const engine = createEngine(set)
  holdPosition(engine, position)
  const outputs = () => Array.from({ length: outputChannels(set.layout) }, () => new Float64Array(frames))
  // The hold is reached by a glide.
  processEngine(engine, [], outputs(), frames)
  const impulse = new Float64Array(frames)
  impulse[0] = IMPULSE
  const output = outputs()
  processEngine(
    engine,
    Array.from({ length: inputChannels(set.layout) }, () => impulse),
    output,
    frames,
  )
  return output.map((y) => realFft(y.map((v) => v / IMPULSE)))
}

/** Frequencies of the bins of `frames` samples, thinned to every `every`th. */
export function binFrequencies(frames: number, sampleRate: number, every: number): Float64Array {
  return Float64Array.from({ length: Math.floor(frames / 2 / every) + 1 }, (_, i) => (i * every * sampleRate) / frames)
}
