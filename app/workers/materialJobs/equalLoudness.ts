// Equal loudness: how much louder or softer the set is than the same sound bypassed, by BS.1770 (src/signal/loudness.ts).
//
// Both are measured over the repeat region, at most its first 20 s, on the engine's own output: once as it plays, once in hard bypass, so
// that layout and channel count count alike. The region goes round once unmeasured first (up to 2 s), so that the tail of its end lies under its start as it does when it
// repeats.
import { createEngine, inputChannels, outputChannels, processEngine, setBypass } from '../../../src/dsp/engine.ts'
import { DEFAULT_TONE } from '../../../src/material/tone.ts'
import { integratedLoudness } from '../../../src/signal/loudness.ts'
import type { MaterialReply, MaterialRequest } from '../materialProtocol.ts'
import { keptMaterial } from './memory.ts'

type Measurement = Extract<MaterialRequest, { kind: 'measure' }>

const LONGEST_MEASURED_S = 20
const LEAD_S = 2
const TONE_S = 8
const PIECE = 4096
/** Pieces between two looks at whether a newer measurement came: about a tenth of a second of work. */
const PIECES_AT_ONCE = 24
const MOST_DB = 12

/** dB to add to the set so that it sounds as loud as the bypassed sound, ±12; null for silence. */
export async function measureEqualLoudness(request: Measurement, isAbandoned: () => boolean): Promise<MaterialReply> {
  const input = inputOf(request)
  if (input === null) return abandoned
  const wet = await run(request, input, request.bypass, isAbandoned)
  const dry = wet && (await run(request, input, 'hard', isAbandoned))
  if (!wet || !dry) return abandoned
  const gainDb = integratedLoudness(dry, request.rate) - integratedLoudness(wet, request.rate)
  return { ok: true, gainDb: Number.isFinite(gainDb) ? Math.max(-MOST_DB, Math.min(MOST_DB, gainDb)) : null }
}

const abandoned: MaterialReply = { ok: false, code: 'abandoned', reason: 'a newer measurement came', hint: '' }

type Channels = readonly (Float32Array | Float64Array)[]

function inputOf({ of, rate, startS, endS }: Measurement): Channels | null {
  if ('toneHz' in of) {
    const peak = 10 ** (DEFAULT_TONE.levelDb / 20)
    const step = (2 * Math.PI * of.toneHz) / rate
    return [Float64Array.from({ length: Math.round(TONE_S * rate) }, (_, n) => peak * Math.sin(step * n))]
  }
  const material = keptMaterial(of.memory)
  if (!material) return null
  const from = Math.round(startS * rate)
  const to = Math.min(Math.round(endS * rate), from + Math.round(LONGEST_MEASURED_S * rate))
  return material.channels.map((samples) => samples.subarray(from, to))
}

async function run(
  request: Measurement,
  input: Channels,
  bypass: Measurement['bypass'] | 'hard',
  isAbandoned: () => boolean,
): Promise<Float64Array[] | null> {
  const { set, rate } = request
  const engine = createEngine(set, { sampleRate: rate })
  setBypass(engine, bypass)
  const frames = input[0]?.length ?? 0
  const lead = Math.min(frames, Math.round(LEAD_S * rate))
  const block = Array.from({ length: inputChannels(set.layout) }, () => new Float64Array(PIECE))
  const out = Array.from({ length: outputChannels(set.layout) }, () => new Float64Array(PIECE))
  const measured = out.map(() => new Float64Array(frames))
  let pieces = 0
  for (let at = -lead; at < frames; at += PIECE) {
    const count = Math.min(PIECE, frames - at)
    fill(block, input, at, count)
    processEngine(engine, block, out, count)
    for (let c = 0; c < out.length; c++) {
      for (let i = Math.max(0, -at); i < count; i++) (measured[c] as Float64Array)[at + i] = (out[c] as Float64Array)[i] as number
    }
    if (++pieces % PIECES_AT_ONCE === 0) {
      await new Promise((resolve) => setTimeout(resolve))
      if (isAbandoned()) return null
    }
  }
  return measured
}

/** Frames at … at + count of the repeating input; a mono engine gets the average, a mono input goes everywhere. */
function fill(block: readonly Float64Array[], input: Channels, at: number, count: number): void {
  const frames = input[0]?.length ?? 1
  for (let c = 0; c < block.length; c++) {
    const to = block[c] as Float64Array
    const from = input.length > block.length ? input : [input[c] ?? (input[0] as Float64Array)]
    for (let i = 0; i < count; i++) {
      const n = (((at + i) % frames) + frames) % frames
      let sum = 0
      for (const samples of from) sum += samples[n] as number
      to[i] = sum / from.length
    }
  }
}
