// Loudness by ITU-R BS.1770-5 Annex 1: L = −0.691 + 10 log10 Σ G_i z_i, z_i the mean square of K-weighted channel i; momentary and
// short-term windows by EBU Tech 3341. Sources as in FACTS 9. Running measure for the audio thread: loudnessMeter.ts.
import { createKFilter, type KFilter, weightedEnergy } from './kWeighting.ts'

const OFFSET_DB = -0.691
const ABSOLUTE_GATE_LUFS = -70
const RELATIVE_GATE_LU = -10
// Blocks start every 100 ms; a gating block and the momentary window last 4 of them, the short-term window 30.
const HOPS_PER_SECOND = 10
const GATING_HOPS = 4
const SHORT_TERM_HOPS = 30

type Channels = readonly (Float64Array | Float32Array)[]

/**
 * Channel weights G_i of BS.1770: 1 for left, right, centre; 1.41 for surrounds; 0 for the low-frequency channel. Order for five: L R C Ls Rs,
 * for six: L R C LFE Ls Rs; any other count weighs every channel 1.
 */
export function channelWeights(count: number): readonly number[] {
  if (count === 5) return [1, 1, 1, 1.41, 1.41]
  if (count === 6) return [1, 1, 1, 0, 1.41, 1.41]
  return Array.from({ length: count }, () => 1)
}

/** −0.691 + 10 log10 of a weighted mean square; −Infinity for 0. */
export function meanSquareToLufs(z: number): number {
  return OFFSET_DB + 10 * Math.log10(z)
}

/**
 * Gated loudness of the whole in LUFS: 400 ms blocks every 100 ms, those above −70 LUFS kept, then those above their mean − 10 LU. channels: 1 or more of one
 * length, full scale 1; sampleRate in Hz, 4000 to 768000. A signal under 400 ms is one block of its own length. −Infinity when nothing passes the gate.
 */
export function integratedLoudness(channels: Channels, sampleRate: number, weights = channelWeights(channels.length)): number {
  const steps = integratedLoudnessSteps(channels, sampleRate, weights)
  let step = steps.next()
  while (!step.done) step = steps.next()
  return step.value
}

/** The same in steps of 100 ms of signal; yields the part done, 0 to 1. */
export function* integratedLoudnessSteps(
  channels: Channels,
  sampleRate: number,
  weights = channelWeights(channels.length),
): Generator<number, number> {
  const frames = channels[0]?.length ?? 0
  const whole = hopEdges(frames, sampleRate)
  const short = whole.length <= GATING_HOPS
  const edges = short ? [0, frames] : whole
  const energies = yield* hopEnergySteps(channels, sampleRate, weights, edges)
  const z = short ? energies.map((e) => e / frames) : meanSquares(energies, edges, GATING_HOPS)
  const audible = z.filter((v) => meanSquareToLufs(v) > ABSOLUTE_GATE_LUFS)
  const gate = meanSquareToLufs(mean(audible)) + RELATIVE_GATE_LU
  return meanSquareToLufs(mean(audible.filter((v) => meanSquareToLufs(v) > gate)))
}

/** Momentary loudness (400 ms) in LUFS at 0.4 s, 0.5 s, …; empty for less than 400 ms. */
export function momentaryLoudness(channels: Channels, sampleRate: number, weights = channelWeights(channels.length)): Float64Array {
  return windowMeanSquares(channels, sampleRate, weights, GATING_HOPS).map(meanSquareToLufs)
}

/** Short-term loudness (3 s) in LUFS at 3 s, 3.1 s, …; empty for less than 3 s. */
export function shortTermLoudness(channels: Channels, sampleRate: number, weights = channelWeights(channels.length)): Float64Array {
  return windowMeanSquares(channels, sampleRate, weights, SHORT_TERM_HOPS).map(meanSquareToLufs)
}

/** Σ G_i z_i of every window of `hops` × 100 ms, one each 100 ms. Edges fall on whole samples, so a window's own length divides. */
function windowMeanSquares(channels: Channels, sampleRate: number, weights: readonly number[], hops: number): Float64Array {
  const edges = hopEdges(channels[0]?.length ?? 0, sampleRate)
  const steps = hopEnergySteps(channels, sampleRate, weights, edges)
  let step = steps.next()
  while (!step.done) step = steps.next()
  return meanSquares(step.value, edges, hops)
}

/** Ends of the hops of 100 ms that fit, from 0. */
function hopEdges(frames: number, sampleRate: number): number[] {
  const edges: number[] = []
  for (let j = 0, edge = 0; edge <= frames; edge = Math.round((++j * sampleRate) / HOPS_PER_SECOND)) edges.push(edge)
  return edges
}

function meanSquares(energies: Float64Array, edges: readonly number[], hops: number): Float64Array {
  const out = new Float64Array(Math.max(0, energies.length - hops + 1))
  for (let j = 0; j < out.length; j++) {
    let sum = 0
    for (let h = 0; h < hops; h++) sum += energies[j + h] as number
    out[j] = sum / ((edges[j + hops] as number) - (edges[j] as number))
  }
  return out
}

/** Weighted energy between neighbouring edges, over all channels. */
function* hopEnergySteps(
  channels: Channels,
  sampleRate: number,
  weights: readonly number[],
  edges: readonly number[],
): Generator<number, Float64Array> {
  checkChannels(channels, weights)
  const energies = new Float64Array(edges.length - 1)
  const filters = channels.map(() => createKFilter(sampleRate))
  for (let j = 0; j < energies.length; j++) {
    channels.forEach((x, c) => {
      const energy = weightedEnergy(filters[c] as KFilter, x, edges[j] as number, edges[j + 1] as number)
      energies[j] = (energies[j] as number) + (weights[c] as number) * energy
    })
    yield (j + 1) / energies.length
  }
  return energies
}

function checkChannels(channels: Channels, weights: readonly number[]): void {
  const frames = channels[0]?.length
  if (frames === undefined) throw new RangeError('loudness needs 1 channel or more, got 0')
  channels.forEach((x, c) => {
    if (x.length !== frames) throw new RangeError(`channel ${c} has ${x.length} samples, channel 0 has ${frames}`)
  })
  if (weights.length !== channels.length) throw new RangeError(`${channels.length} channels need as many weights, got ${weights.length}`)
}

function mean(z: Float64Array): number {
  let sum = 0
  for (let i = 0; i < z.length; i++) sum += z[i] as number
  return z.length > 0 ? sum / z.length : 0
}
