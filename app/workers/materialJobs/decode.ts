// The user's recording: WAV by our own reader at its own rate, resampled by src/signal as `render` does, so that page and command line hear
// the same samples. What the browser decoded comes in ready and is only bounded.
import { SAMPLE_BYTES } from '../../../src/media/samples.ts'
import { readWav, readWavInfo } from '../../../src/media/wav.ts'
import { resampleTo } from '../../../src/signal/resample.ts'
import { LONGEST_S, type MaterialReply, MOST_SAMPLES } from '../materialProtocol.ts'
import type { Made } from './memory.ts'

/** Enough for any header with its pictures and notes; the samples' own chunk must begin within it. */
const HEADER_BYTES = 4 * 2 ** 20

/** Reads at most LONGEST_S of a WAV file and brings it to `rate`. A refusal comes back as the reply it is. */
export async function readWavFile(file: Blob, rate: number): Promise<Made | MaterialReply> {
  const head = new Uint8Array(await file.slice(0, HEADER_BYTES).arrayBuffer())
  const info = readWavInfo(head, { fileBytes: file.size })
  if (!info.ok) return info
  const { channelCount, sampleRate, totalFrames, format } = info.value
  const maxFrames = Math.min(totalFrames, framesKept(sampleRate, rate, channelCount))
  const wanted = HEADER_BYTES + maxFrames * channelCount * SAMPLE_BYTES[format]
  const bytes = wanted <= head.length ? head : new Uint8Array(await file.slice(0, wanted).arrayBuffer())
  const wav = readWav(bytes, { fileBytes: file.size, maxFrames })
  if (!wav.ok) return wav
  const remarks: string[] = []
  if (maxFrames < totalFrames) remarks.push(`the first ${minutes(maxFrames / sampleRate)} of ${minutes(totalFrames / sampleRate)}`)
  const mixed = atMostTwo(wav.value.channels, remarks)
  const resampled = sampleRate === rate ? mixed : resampleTo(mixed, sampleRate, rate)
  if (sampleRate !== rate) remarks.push(`resampled from ${kHz(sampleRate)}`)
  const channels = resampled.map((samples) => Float32Array.from(samples))
  return { channels, rate, sourceChannels: channelCount, sourceRate: sampleRate, remarks }
}

/** What the browser decoded, bounded like everything else. */
export function materialFrom(decoded: readonly Float32Array[], rate: number): Made {
  const frames = decoded[0]?.length ?? 0
  const kept = Math.min(frames, framesKept(rate, rate, decoded.length))
  const remarks: string[] = []
  if (kept < frames) remarks.push(`the first ${minutes(kept / rate)} of ${minutes(frames / rate)}`)
  const cut = kept < frames ? decoded.map((samples) => samples.slice(0, kept)) : decoded
  const channels = atMostTwo(cut, remarks).map((samples) => (samples instanceof Float32Array ? samples : Float32Array.from(samples)))
  return { channels, rate, sourceChannels: decoded.length, sourceRate: rate, remarks }
}

/** Frames kept of a recording at `from` Hz that will be played at `to` Hz. */
export function framesKept(from: number, to: number, channels: number): number {
  const bySize = Math.floor(MOST_SAMPLES / channels / Math.max(1, to / from))
  return Math.min(Math.floor(LONGEST_S * from), bySize)
}

/** More channels than two are averaged, as the signal path does when there are more inputs than lines. */
function atMostTwo<T extends Float32Array | Float64Array>(channels: readonly T[], remarks: string[]): readonly (T | Float64Array)[] {
  if (channels.length <= 2) return channels
  remarks.push(`${channels.length} channels averaged`)
  const mono = new Float64Array(channels[0]?.length ?? 0)
  for (const samples of channels) for (let i = 0; i < mono.length; i++) mono[i] = (mono[i] as number) + (samples[i] as number)
  for (let i = 0; i < mono.length; i++) mono[i] = (mono[i] as number) / channels.length
  return [mono]
}

export const kHz = (hz: number) => `${Number((hz / 1000).toFixed(3))} kHz`

export function minutes(seconds: number): string {
  const whole = Math.floor(seconds)
  return whole < 60 ? `${seconds.toFixed(1)} s` : `${Math.floor(whole / 60)} min ${String(whole % 60).padStart(2, '0')} s`
}
