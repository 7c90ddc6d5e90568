// The chunks of a RIFF file, found and bounded before anything is read from them.
//
// layout: [ "RIFF" size form | id size body pad? | id size body pad? | … ], sizes 32-bit little-endian, odd bodies padded by one byte
// that the size does not count. RF64 and BW64 write 0xFFFFFFFF as a size and keep the 64-bit one in a leading ds64 chunk.
// Sources: Microsoft/IBM, "Multimedia Programming Interface and Data Specifications 1.0" (RIFF; from memory); EBU Tech 3306 (RF64; from memory).
import { type MediaResult, refuse } from './mediaResult.ts'

export interface Chunk {
  readonly id: string
  /** First byte of the body. */
  readonly start: number
  /** Bytes the header promises, pad not counted; from ds64 where that speaks for it. */
  readonly size: number
}

export interface Riff {
  readonly container: 'RIFF' | 'RF64' | 'BW64'
  readonly chunks: readonly Chunk[]
}

const UNKNOWN_SIZE = 0xffffffff
const RESAVE = 'open it in the program that made it and export it again as WAV'
// A file of chunks without bodies would otherwise list one object for every eight bytes.
const MAX_CHUNKS = 4096

/**
 * Lists the chunks of a WAVE file. `bytes` may be only its beginning: `fileBytes` is then the length of the whole file, and the list ends
 * where `bytes` does. The size of the whole in the header is not trusted, since many programs write it wrongly. Time grows with the number of chunks only.
 */
export function readRiff(bytes: Uint8Array, fileBytes = bytes.length): MediaResult<Riff> {
  if (fileBytes === 0) return refuse('empty', 'the file is empty', 'choose a WAV file')
  const container = fourCc(bytes, 0)
  if (container !== 'RIFF' && container !== 'RF64' && container !== 'BW64') return foreign(container)
  if (bytes.length < 12) return refuse('cut', `the file ends after ${bytes.length} bytes, inside its header`, RESAVE)
  const form = fourCc(bytes, 8)
  if (form !== 'WAVE') return refuse('foreign', `a RIFF file of kind ${JSON.stringify(printable(form))}, not WAVE`, 'choose a WAV file')

  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  const chunks: Chunk[] = []
  let data64: number | undefined
  let at = 12
  while (at + 8 <= bytes.length) {
    const id = fourCc(bytes, at)
    let size = view.getUint32(at + 4, true)
    const start = at + 8
    if (id === 'ds64' && container !== 'RIFF' && data64 === undefined) {
      if (size < 24 || start + 24 > bytes.length) return refuse('damaged', 'the ds64 chunk is too short to hold the 64-bit sizes', RESAVE)
      data64 = Number(view.getBigUint64(start + 8, true))
    }
    if (id === 'data' && size === UNKNOWN_SIZE && data64 !== undefined) size = data64
    if (chunks.length === MAX_CHUNKS) return refuse('damaged', `more than ${MAX_CHUNKS} chunks`, RESAVE)
    chunks.push({ id, start, size })
    at = start + size + (size % 2)
  }
  if (container !== 'RIFF' && data64 === undefined) return refuse('damaged', `a ${container} file without its ds64 chunk`, RESAVE)
  return { ok: true, value: { container, chunks } }
}

function foreign(id: string): MediaResult<Riff> {
  if (id === 'RIFX') return refuse('unsupported', 'a big-endian WAV file (RIFX)', 'export it as an ordinary little-endian WAV')
  return refuse('foreign', `not a WAV file: it begins with ${JSON.stringify(printable(id))}, not "RIFF"`, 'choose a WAV file')
}

function fourCc(bytes: Uint8Array, at: number): string {
  return String.fromCharCode(...bytes.subarray(at, at + 4))
}

/** A four-letter code as it may stand in a message: bytes that are no printable ASCII become dots. */
export function printable(id: string): string {
  return id.replace(/[^ -~]/g, '.')
}
