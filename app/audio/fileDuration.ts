// How long a compressed recording lasts, from its own header, before the browser is asked to decode it: decoded it may be a hundred times larger.
// Only what is needed to refuse in time; a file that is not understood here is judged by its size alone.
//
// Sources: ISO/IEC 11172-3 (bit rates of layer III), ISO/IEC 14496-12 (mvhd), RFC 9639 (FLAC STREAMINFO), RFC 3533 (Ogg granule position): all from memory.

/** `head` and `tail` are the first and last bytes of the file (64 KB each will do), `size` its length. Seconds, or null when the header does not say. */
export function durationSeconds(head: Uint8Array, tail: Uint8Array, size: number): number | null {
  const seconds = flac(head) ?? ogg(head, tail) ?? mp4(head) ?? mp4(tail) ?? mp3(head, size)
  return seconds !== null && Number.isFinite(seconds) && seconds > 0 ? seconds : null
}

const text = (bytes: Uint8Array, at: number, word: string) => [...word].every((letter, i) => bytes[at + i] === letter.charCodeAt(0))
const viewOf = (bytes: Uint8Array) => new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)

/** STREAMINFO: 20 bits of rate, 3 channels, 5 depth, 36 bits of total samples, 10 bytes into its body. */
function flac(head: Uint8Array): number | null {
  if (!text(head, 0, 'fLaC') || head.length < 26) return null
  const view = viewOf(head)
  const rate = view.getUint32(18) >>> 12
  const samples = ((head[21] as number) & 15) * 2 ** 32 + view.getUint32(22)
  return rate > 0 ? samples / rate : null
}

/** Granule position of the last page over the rate; Opus always counts at 48 kHz. */
function ogg(head: Uint8Array, tail: Uint8Array): number | null {
  if (!text(head, 0, 'OggS')) return null
  const body = 27 + (head[26] ?? 0)
  const rate = text(head, body, 'OpusHead')
    ? 48_000
    : text(head, body + 1, 'vorbis') && head.length > body + 16
      ? viewOf(head).getUint32(body + 12, true)
      : 0
  if (rate === 0) return null
  for (let at = tail.length - 27; at >= 0; at--) {
    if (text(tail, at, 'OggS')) return Number(viewOf(tail).getBigInt64(at + 6, true)) / rate
  }
  return null
}

/** mvhd: version 0 has 32-bit times, version 1 64-bit ones. */
function mp4(bytes: Uint8Array): number | null {
  const view = viewOf(bytes)
  for (let at = 4; at + 36 <= bytes.length; at++) {
    if (!text(bytes, at, 'mvhd')) continue
    const long = bytes[at + 4] === 1
    const scale = view.getUint32(at + (long ? 24 : 16))
    const duration = long ? Number(view.getBigUint64(at + 28)) : view.getUint32(at + 20)
    return scale > 0 ? duration / scale : null
  }
  return null
}

const KBPS = {
  1: [0, 32, 40, 48, 56, 64, 80, 96, 112, 128, 160, 192, 224, 256, 320],
  2: [0, 8, 16, 24, 32, 40, 48, 56, 64, 80, 96, 112, 128, 144, 160],
} as const
const RATES = [44_100, 48_000, 32_000]

/** From the frame count of a Xing or Info header, else from the first frame's bit rate, which a file with a varying one only roughly keeps. */
function mp3(head: Uint8Array, size: number): number | null {
  const skip = text(head, 0, 'ID3') ? 10 + id3Size(head) : 0
  // A picture in the tag can push the first frame out of sight.
  if (skip > head.length - 4) return null
  for (let at = skip; at + 4 <= Math.min(head.length, skip + 4096); at++) {
    if (head[at] !== 0xff || ((head[at + 1] as number) & 0xe6) !== 0xe2) continue
    const version = ((head[at + 1] as number) >> 3) & 3
    const kbps = KBPS[version === 3 ? 1 : 2][(head[at + 2] as number) >> 4]
    const base = RATES[((head[at + 2] as number) >> 2) & 3]
    if (version === 1 || !kbps || base === undefined) continue
    const rate = version === 3 ? base : version === 2 ? base / 2 : base / 4
    return xingSeconds(head, at, version === 3 ? 1152 : 576, rate) ?? ((size - at) * 8) / (kbps * 1000)
  }
  return null
}

function xingSeconds(head: Uint8Array, frame: number, samples: number, rate: number): number | null {
  for (let at = frame + 4; at < frame + 64 && at + 12 <= head.length; at++) {
    if (!text(head, at, 'Xing') && !text(head, at, 'Info')) continue
    return (head[at + 7] as number) & 1 ? (viewOf(head).getUint32(at + 8) * samples) / rate : null
  }
  return null
}

const id3Size = (head: Uint8Array) => [6, 7, 8, 9].reduce((size, i) => size * 128 + ((head[i] ?? 0) & 127), 0)
