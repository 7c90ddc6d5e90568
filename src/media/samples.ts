// Sample words in a WAV data chunk to doubles and back. Words are little-endian, channels interleaved.
//
// Integers are read as n / 2^(bits-1), so that the most negative word is exactly -1 and nothing else than a power of two is divided by;
// 8-bit words are unsigned with 128 for silence. Sources: RIFF practice as in FACTS 10 (from memory); scipy.io.wavfile agrees (outside test).

export type SampleFormat = 'pcm8' | 'pcm16' | 'pcm24' | 'pcm32' | 'float32' | 'float64'

export const SAMPLE_BYTES: Readonly<Record<SampleFormat, number>> = { pcm8: 1, pcm16: 2, pcm24: 3, pcm32: 4, float32: 4, float64: 8 }

/** Takes the channels apart: `frames` frames of `channels` words each from `view`, starting at byte `start`. Exact: every word has its own double. */
export function decodeSamples(
  view: DataView,
  start: number,
  layout: { format: SampleFormat; channels: number; frames: number },
): Float64Array[] {
  const { format, channels, frames } = layout
  const width = SAMPLE_BYTES[format]
  const stride = width * channels
  return Array.from({ length: channels }, (_, c) => {
    const out = new Float64Array(frames)
    const first = start + c * width
    switch (format) {
      case 'pcm8':
        for (let i = 0, at = first; i < frames; i++, at += stride) out[i] = (view.getUint8(at) - 128) / 128
        break
      case 'pcm16':
        for (let i = 0, at = first; i < frames; i++, at += stride) out[i] = view.getInt16(at, true) / 32768
        break
      case 'pcm24':
        for (let i = 0, at = first; i < frames; i++, at += stride)
          out[i] = (view.getUint16(at, true) + view.getInt8(at + 2) * 65536) / 8388608
        break
      case 'pcm32':
        for (let i = 0, at = first; i < frames; i++, at += stride) out[i] = view.getInt32(at, true) / 2147483648
        break
      case 'float32':
        for (let i = 0, at = first; i < frames; i++, at += stride) out[i] = view.getFloat32(at, true)
        break
      case 'float64':
        for (let i = 0, at = first; i < frames; i++, at += stride) out[i] = view.getFloat64(at, true)
        break
    }
    return out
  })
}

/** Writes the channels interleaved from byte `start` on. Integers round half up and saturate: floor(x · 2^(bits-1) + ½), held at the rails. */
export function encodeSamples(
  view: DataView,
  start: number,
  channels: readonly (Float64Array | Float32Array)[],
  format: 'pcm16' | 'pcm32' | 'float32',
): void {
  const width = SAMPLE_BYTES[format]
  const stride = width * channels.length
  channels.forEach((samples, c) => {
    const frames = samples.length
    const first = start + c * width
    if (format === 'float32') {
      for (let i = 0, at = first; i < frames; i++, at += stride) view.setFloat32(at, samples[i] as number, true)
    } else if (format === 'pcm16') {
      for (let i = 0, at = first; i < frames; i++, at += stride) view.setInt16(at, toWord(samples[i] as number, 32768), true)
    } else {
      for (let i = 0, at = first; i < frames; i++, at += stride) view.setInt32(at, toWord(samples[i] as number, 2147483648), true)
    }
  })
}

function toWord(x: number, scale: number): number {
  const n = Math.floor(x * scale + 0.5)
  return n < -scale ? -scale : n >= scale ? scale - 1 : n
}
