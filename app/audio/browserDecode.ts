// Formats other than WAV, through the browser's own decoder at the set's rate. Bounded before it starts: the decoder gives everything at once.
import { durationSeconds } from './fileDuration.ts'
import { loadWrapper } from './wrapper.ts'

export const MOST_COMPRESSED_BYTES = 64 * 2 ** 20
export const LONGEST_COMPRESSED_S = 20 * 60
/** A file whose header tells no duration is only taken this small. */
const MOST_UNKNOWN_BYTES = 16 * 2 ** 20
const EDGE_BYTES = 2 ** 18

export type Decoded =
  | { readonly ok: true; readonly channels: readonly Float32Array[] }
  | { readonly ok: false; readonly reason: string; readonly hint: string }

const SHORTER = 'cut it, or open a WAV file, of which any length is read in part'

/** Decodes at `rate` Hz, or says why not. */
export async function decodeInBrowser(file: File, rate: number): Promise<Decoded> {
  if (file.size === 0) return { ok: false, reason: 'the file is empty', hint: 'choose a file with sound in it' }
  if (file.size > MOST_COMPRESSED_BYTES)
    return {
      ok: false,
      reason: `it is ${megabytes(file.size)} long; ${megabytes(MOST_COMPRESSED_BYTES)} at most are decoded`,
      hint: SHORTER,
    }
  const bytes = async (from: number, to: number) => new Uint8Array(await file.slice(from, to).arrayBuffer())
  const seconds = durationSeconds(await bytes(0, EDGE_BYTES), await bytes(Math.max(0, file.size - EDGE_BYTES), file.size), file.size)
  if (seconds !== null && seconds > LONGEST_COMPRESSED_S) {
    const size = megabytes(seconds * rate * 2 * 4)
    return {
      ok: false,
      reason: `it lasts ${Math.round(seconds / 60)} min, ${size} decoded; ${LONGEST_COMPRESSED_S / 60} min at most are decoded`,
      hint: SHORTER,
    }
  }
  if (seconds === null && file.size > MOST_UNKNOWN_BYTES)
    return { ok: false, reason: `its length is unknown and ${megabytes(file.size)} may decode to far more`, hint: SHORTER }
  try {
    const { OfflineAudioContext } = await loadWrapper()
    const context = new OfflineAudioContext({ length: 1, numberOfChannels: 1, sampleRate: rate })
    const buffer = await context.decodeAudioData(await file.arrayBuffer())
    if (buffer.length === 0) return { ok: false, reason: 'it holds no samples', hint: 'choose a file with sound in it' }
    const channels = Array.from({ length: buffer.numberOfChannels }, (_, c) => buffer.getChannelData(c).slice())
    return { ok: true, channels }
  } catch {
    return { ok: false, reason: 'this browser cannot decode it', hint: 'choose a sound file, WAV at best' }
  }
}

export const megabytes = (bytes: number) => `${Math.round(bytes / 2 ** 20)} MB`
