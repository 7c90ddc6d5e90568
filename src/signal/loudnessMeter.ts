// Running loudness for the audio thread: K-weighted mean square over the last seconds, without gates.
//
// layout: energies is a ring of bins of binFrames samples each; `at` is the bin being filled, `filled` counts finished ones. A value speaks
// for whole bins only, so it is at most one bin (50 ms) old. Nothing is allocated after creation; nothing throws while fed.
import { createKFilter, type KFilter, weighEnergy } from './kWeighting.ts'
import { channelWeights, meanSquareToLufs } from './loudness.ts'

const BINS_PER_SECOND = 20

export interface LoudnessMeter {
  readonly filters: readonly KFilter[]
  readonly weights: Float64Array
  readonly energies: Float64Array
  readonly binFrames: number
  filled: number
  at: number
  framesInBin: number
}

export interface LoudnessMeterOptions {
  /** Hz, 4000 to 768000. */
  readonly sampleRate: number
  /** Channels fed, 1 to 64. */
  readonly channels: number
  /** Length of the window in s, 0.1 to 60; 3 (EBU short-term) by default, 0.4 is momentary. */
  readonly windowSeconds?: number
}

/** A meter that has heard nothing. Throws RangeError outside the ranges given. */
export function createLoudnessMeter({ sampleRate, channels, windowSeconds = 3 }: LoudnessMeterOptions): LoudnessMeter {
  if (!(Number.isInteger(channels) && channels >= 1 && channels <= 64)) throw new RangeError(`channels must be 1 to 64, got ${channels}`)
  if (!(windowSeconds >= 0.1 && windowSeconds <= 60)) throw new RangeError(`windowSeconds must be 0.1 to 60, got ${windowSeconds}`)
  return {
    filters: Array.from({ length: channels }, () => createKFilter(sampleRate)),
    weights: Float64Array.from(channelWeights(channels)),
    // One more than the window: the bin being filled does not count yet.
    energies: new Float64Array(Math.round(windowSeconds * BINS_PER_SECOND) + 1),
    binFrames: Math.round(sampleRate / BINS_PER_SECOND),
    filled: 0,
    at: 0,
    framesInBin: 0,
  }
}

/** Forgets everything heard. */
export function resetLoudnessMeter(meter: LoudnessMeter): void {
  for (let c = 0; c < meter.filters.length; c++) {
    const { state, energy } = meter.filters[c] as KFilter
    state.fill(0)
    energy.fill(0)
  }
  meter.energies.fill(0)
  meter.filled = 0
  meter.at = 0
  meter.framesInBin = 0
}

/** Hears frames [offset, offset + frames) of `input`; channels beyond the meter's are left out, missing ones are silent. */
export function feedLoudnessMeter(meter: LoudnessMeter, input: readonly (Float64Array | Float32Array)[], frames: number, offset = 0): void {
  const { energies, weights, filters } = meter
  const end = offset + frames
  let from = offset
  while (from < end) {
    const to = Math.min(end, from + meter.binFrames - meter.framesInBin)
    for (let c = 0; c < filters.length; c++) {
      const x = input[c]
      if (x === undefined) continue
      const filter = filters[c] as KFilter
      weighEnergy(filter, x, from, to)
      const energy = filter.energy[0] as number
      settle(filter.state)
      if (energy < Number.POSITIVE_INFINITY) energies[meter.at] = (energies[meter.at] as number) + (weights[c] as number) * energy
    }
    meter.framesInBin += to - from
    from = to
    if (meter.framesInBin === meter.binFrames) nextBin(meter)
  }
}

/** Loudness in LUFS of what was heard within the window; of less while the window is not yet full, −Infinity before the first 50 ms and for silence. */
export function meteredLoudness(meter: LoudnessMeter): number {
  const { energies, at, filled } = meter
  let sum = 0
  for (let i = 1; i <= filled; i++) sum += energies[(at - i + energies.length) % energies.length] as number
  return filled > 0 ? meanSquareToLufs(sum / (filled * meter.binFrames)) : Number.NEGATIVE_INFINITY
}

function nextBin(meter: LoudnessMeter): void {
  meter.at = (meter.at + 1) % meter.energies.length
  meter.energies[meter.at] = 0
  meter.framesInBin = 0
  if (meter.filled < meter.energies.length - 1) meter.filled++
}

/** A run-away input must not silence the meter for ever, and decaying memory must not reach subnormal numbers, which are slow. */
function settle(state: Float64Array): void {
  for (let i = 0; i < state.length; i++) {
    const s = Math.abs(state[i] as number)
    if (!(s > 1e-30 && s < 1e30)) state[i] = 0
  }
}
