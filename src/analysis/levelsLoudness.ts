// Loudness of a set against its bypass, ITU-R BS.1770: the same material through the path and past it, in steps.
import { createEngine, inputChannels, outputChannels, processEngine } from '../dsp/engine.ts'
import type { ParameterSet } from '../set/types.ts'
import { integratedLoudnessSteps } from '../signal/loudness.ts'
import { partOf } from './levelsSteps.ts'

export interface LoudnessFigures {
  /** LUFS; null where nothing passes the gate (below −70 LUFS). */
  readonly effect: number | null
  readonly bypass: number | null
  /** Effect − bypass, LU; null where either is. */
  readonly differenceLu: number | null
  /** True where the output grew past any number. */
  readonly diverged: boolean
}

const BLOCK = 1024

/** `material`: one or more channels of equal length at `sampleRate` Hz, 0.4 s or more (RangeError). Routed as the engine routes it; the bypass is what its hard bypass gives. */
export function* loudnessSteps(
  set: ParameterSet,
  material: readonly Float64Array[],
  sampleRate = set.sampleRate,
): Generator<number, LoudnessFigures> {
  const frames = material[0]?.length ?? 0
  if (!(frames >= 0.4 * sampleRate)) throw new RangeError(`material must be 0.4 s or longer, got ${frames} samples at ${sampleRate} Hz`)
  const output = yield* partOf(rendered(set, material, sampleRate), 0, 0.6)
  const straight = bypassed(set, material)
  const diverged = output === null
  const effect = output === null ? null : finite(yield* partOf(integratedLoudnessSteps(output, sampleRate), 0.6, 0.2))
  const bypass = finite(yield* partOf(integratedLoudnessSteps(straight, sampleRate), 0.8, 0.2))
  return { effect, bypass, differenceLu: effect === null || bypass === null ? null : effect - bypass, diverged }
}

const finite = (lufs: number): number | null => (Number.isFinite(lufs) ? lufs : null)

/** The set's output, or null where it is not finite. */
function* rendered(set: ParameterSet, material: readonly Float64Array[], sampleRate: number): Generator<number, Float64Array[] | null> {
  const engine = createEngine(set, { sampleRate, live: false })
  const frames = (material[0] as Float64Array).length
  const output = Array.from({ length: outputChannels(set.layout) }, () => new Float64Array(frames))
  for (let at = 0; at < frames; at += BLOCK) {
    const count = Math.min(BLOCK, frames - at)
    processEngine(engine, material, output, count, at)
    if (output.some((y) => !(Math.abs(y[at + count - 1] as number) < GROWN))) return null
    yield (at + count) / frames
  }
  return output
}

/** 180 dB over full scale: it will not come back. */
const GROWN = 1e9

/** The material as the lines get it, one channel an output. */
function bypassed(set: ParameterSet, material: readonly Float64Array[]): Float64Array[] {
  const lines = inputChannels(set.layout)
  const lineOf = (line: number): Float64Array => {
    if (material.length <= lines) return material[Math.min(line, material.length - 1)] as Float64Array
    const mean = new Float64Array((material[0] as Float64Array).length)
    for (const x of material) for (let i = 0; i < mean.length; i++) mean[i] = (mean[i] as number) + (x[i] as number) / material.length
    return mean
  }
  return Array.from({ length: outputChannels(set.layout) }, (_, c) => lineOf(lines === 2 ? c : 0))
}
