// WAV files: bytes to samples and back. Everything in a file is untrusted: sizes are checked against the bytes that are there
// before memory is taken, and a refusal says why.
//
// Read: PCM of 8, 16, 24, 32 bits, float of 32 and 64, each plain or extensible, in RIFF, RF64 or BW64. Written: PCM of 16 and 32 bits, float of 32.
//
// Why no package reads them: of those compared, `wavefile` takes 20 to 200 times as long, accepts cut files and counts the pad byte as a sample;
// `node-wav` allocates what the header asks for; `wav-decoder` loses its way at odd chunks; the last two and `wav-file-decoder` know
// no extensible format and give single precision, which 32-bit words do not survive.
//
// Sources: FACTS 10; scipy.io.wavfile and sox as outside references in tests/outside.
import { type MediaResult, type Refusal, refuse } from './mediaResult.ts'
import { type Chunk, readRiff } from './riff.ts'
import { decodeSamples, encodeSamples, SAMPLE_BYTES, type SampleFormat } from './samples.ts'

export const MAX_CHANNELS = 64
export const MAX_SAMPLE_RATE = 768_000
/** Samples over all channels that one read may give: 1 GiB of doubles, 23 minutes of stereo at 48 kHz. */
export const MAX_SAMPLES = 2 ** 27

export interface WavInfo {
  /** Hz. */
  readonly sampleRate: number
  readonly channelCount: number
  /** Frames in the file; a reading with `maxFrames` may hold fewer. */
  readonly totalFrames: number
  readonly format: SampleFormat
}

export interface WavAudio extends WavInfo {
  /** One array a channel, full scale ±1 (float files may exceed it). */
  readonly channels: Float64Array[]
}

export interface ReadWavOptions {
  /** Reads only the first so many frames. */
  readonly maxFrames?: number
  /** Length of the whole file in bytes when `bytes` is only its beginning, long enough for the frames asked for. */
  readonly fileBytes?: number
}

interface Located extends WavInfo {
  readonly data: Chunk
}

const RESAVE = 'export it again as WAV, PCM of 16, 24 or 32 bits or 32-bit float'

/** What a WAV file holds, without decoding its samples. Refuses what {@link readWav} refuses, samples that are no numbers excepted. */
export function readWavInfo(bytes: Uint8Array, options: ReadWavOptions = {}): MediaResult<WavInfo> {
  const located = locate(bytes, options)
  if (!located.ok) return located
  const { data: _data, ...info } = located.value
  return { ok: true, value: info }
}

/**
 * Decodes a WAV file. PCM words are n / 2^(bits-1), float words as they stand. Refuses, with a reason: no WAV file, one that is empty, cut or contradicts
 * itself, an encoding that is not read, more than {@link MAX_CHANNELS} channels or {@link MAX_SAMPLES} samples, a rate outside 1 Hz to {@link MAX_SAMPLE_RATE}, a sample
 * that is not finite. Never throws for what stands in `bytes`; takes no memory before sizes are checked.
 */
export function readWav(bytes: Uint8Array, options: ReadWavOptions = {}): MediaResult<WavAudio> {
  const located = locate(bytes, options)
  if (!located.ok) return located
  const { data, ...info } = located.value
  const frames = Math.min(info.totalFrames, options.maxFrames ?? info.totalFrames)
  const frameBytes = SAMPLE_BYTES[info.format] * info.channelCount
  if (frames * info.channelCount > MAX_SAMPLES) {
    const seconds = Math.floor(MAX_SAMPLES / info.channelCount / info.sampleRate)
    return refuse(
      'unsupported',
      `${info.totalFrames} frames of ${info.channelCount} channels are too many to open at once`,
      `cut it to ${seconds} s`,
    )
  }
  if (data.start + frames * frameBytes > bytes.length) {
    return refuse('cut', `the bytes given end before frame ${frames}`, 'read the rest of the file')
  }
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  const channels = decodeSamples(view, data.start, { format: info.format, channels: info.channelCount, frames })
  const fault = info.format.startsWith('float') ? nonFinite(channels) : undefined
  return fault ?? { ok: true, value: { ...info, channels } }
}

/**
 * The bytes of a WAV file: the same arguments give the same bytes. `channels`: 1 to {@link MAX_CHANNELS} arrays of one length; `sampleRate`: whole Hz from 1 to
 * {@link MAX_SAMPLE_RATE}. `float32` keeps what exceeds ±1 and carries a `fact` chunk; `pcm16`, `pcm32` round half up and saturate. Throws RangeError for
 * anything else, for a sample that is not finite (also after rounding to single) and for more than 4 GiB.
 */
export function writeWav(
  channels: readonly (Float64Array | Float32Array)[],
  sampleRate: number,
  format: 'float32' | 'pcm16' | 'pcm32',
): Uint8Array {
  const frames = channels[0]?.length ?? 0
  checkWritable(channels, sampleRate, frames)
  const isFloat = format === 'float32'
  const width = SAMPLE_BYTES[format]
  const frameBytes = width * channels.length
  const dataBytes = frames * frameBytes
  const fmtBytes = isFloat ? 18 : 16
  const header = 12 + 8 + fmtBytes + (isFloat ? 12 : 0) + 8
  const total = header + dataBytes + (dataBytes % 2)
  if (total - 8 > 0xffffffff) throw new RangeError(`a WAV file holds at most 4 GiB, got ${total} bytes`)

  const bytes = new Uint8Array(total)
  const view = new DataView(bytes.buffer)
  let at = 0
  const text = (s: string) => {
    for (let i = 0; i < 4; i++) bytes[at++] = s.charCodeAt(i)
  }
  const u16 = (n: number) => {
    view.setUint16(at, n, true)
    at += 2
  }
  const u32 = (n: number) => {
    view.setUint32(at, n, true)
    at += 4
  }
  text('RIFF')
  u32(total - 8)
  text('WAVE')
  text('fmt ')
  u32(fmtBytes)
  u16(isFloat ? 3 : 1)
  u16(channels.length)
  u32(sampleRate)
  u32(sampleRate * frameBytes)
  u16(frameBytes)
  u16(width * 8)
  if (isFloat) {
    u16(0)
    text('fact')
    u32(4)
    u32(frames)
  }
  text('data')
  u32(dataBytes)
  encodeSamples(view, at, channels, format)
  return bytes
}

function checkWritable(channels: readonly (Float64Array | Float32Array)[], sampleRate: number, frames: number): void {
  if (channels.length < 1 || channels.length > MAX_CHANNELS) {
    throw new RangeError(`channels must be 1 to ${MAX_CHANNELS}, got ${channels.length}`)
  }
  if (!Number.isInteger(sampleRate) || sampleRate < 1 || sampleRate > MAX_SAMPLE_RATE) {
    throw new RangeError(`sampleRate must be a whole number of Hz from 1 to ${MAX_SAMPLE_RATE}, got ${sampleRate}`)
  }
  channels.forEach((samples, c) => {
    if (samples.length !== frames) throw new RangeError(`channel ${c} has ${samples.length} samples, channel 0 has ${frames}`)
    const i = samples.findIndex((x) => !Number.isFinite(Math.fround(x)))
    if (i >= 0) throw new RangeError(`sample ${i} of channel ${c} must be finite, got ${samples[i]}`)
  })
}

function locate(bytes: Uint8Array, options: ReadWavOptions): MediaResult<Located> {
  const fileBytes = options.fileBytes ?? bytes.length
  const riff = readRiff(bytes, fileBytes)
  if (!riff.ok) return riff
  const named = (id: string) => riff.value.chunks.filter((chunk) => chunk.id === id)
  const [fmt, secondFmt] = named('fmt ')
  const [data, secondData] = named('data')
  if (secondFmt || secondData) return refuse('damaged', `more than one ${secondFmt ? '"fmt "' : '"data"'} chunk`, RESAVE)
  if (!fmt) return refuse(data ? 'damaged' : 'cut', 'no "fmt " chunk: nothing says how the samples are coded', RESAVE)
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  const form = readFormat(view, fmt)
  if (!form.ok) return form
  if (!data) return refuse('cut', 'no "data" chunk: there are no samples', RESAVE)
  const { format, channelCount } = form.value
  if (data.size === 0) return refuse('empty', 'the file holds no samples', 'choose a WAV file with sound in it')
  if (data.start + data.size > fileBytes) {
    const reason = `the header promises ${data.size} bytes of samples, the file holds ${Math.max(0, fileBytes - data.start)}`
    return refuse('cut', reason, 'copy it again; a file written to a pipe has no true length: export it again')
  }
  const frameBytes = SAMPLE_BYTES[format] * channelCount
  if (data.size % frameBytes !== 0) {
    return refuse('damaged', `${data.size} bytes of samples are no whole number of ${frameBytes}-byte frames`, RESAVE)
  }
  return { ok: true, value: { ...form.value, totalFrames: data.size / frameBytes, data } }
}

// Body of fmt: tag 0, channels 2, rate 4, bytes a second 8 (not used: often wrong), bytes a frame 12, bits 14; extensible: size 16, valid bits 18, mask 20, sub-format 24.
function readFormat(view: DataView, fmt: Chunk): MediaResult<Omit<WavInfo, 'totalFrames'>> {
  if (fmt.size < 16 || fmt.start + fmt.size > view.byteLength)
    return refuse(fmt.size < 16 ? 'damaged' : 'cut', `a "fmt " chunk of ${fmt.size} bytes`, RESAVE)
  let tag = view.getUint16(fmt.start, true)
  const channelCount = view.getUint16(fmt.start + 2, true)
  const sampleRate = view.getUint32(fmt.start + 4, true)
  const frameBytes = view.getUint16(fmt.start + 12, true)
  const bits = view.getUint16(fmt.start + 14, true)
  if (tag === EXTENSIBLE) {
    if (fmt.size < 40) return refuse('damaged', `an extensible "fmt " chunk of ${fmt.size} bytes, 40 are needed`, RESAVE)
    if (!hasWaveGuid(view, fmt.start + 24)) return refuse('unsupported', 'an extensible format with an unknown sub-format', RESAVE)
    tag = view.getUint16(fmt.start + 24, true)
    const validBits = view.getUint16(fmt.start + 18, true)
    if (validBits > bits) return refuse('damaged', `${validBits} valid bits in words of ${bits}`, RESAVE)
  }
  const format = FORMATS[`${tag}:${bits}`]
  if (!format) return refuse('unsupported', `samples coded as ${ENCODINGS[tag] ?? `format ${tag}`} of ${bits} bits are not read`, RESAVE)
  if (channelCount < 1 || channelCount > MAX_CHANNELS) {
    return refuse(channelCount < 1 ? 'damaged' : 'unsupported', `${channelCount} channels, 1 to ${MAX_CHANNELS} are read`, RESAVE)
  }
  if (sampleRate < 1 || sampleRate > MAX_SAMPLE_RATE) {
    return refuse('damaged', `a sample rate of ${sampleRate} Hz, 1 to ${MAX_SAMPLE_RATE} are read`, RESAVE)
  }
  const expected = SAMPLE_BYTES[format] * channelCount
  if (frameBytes !== expected)
    return refuse('damaged', `frames of ${frameBytes} bytes where ${channelCount} × ${bits} bits make ${expected}`, RESAVE)
  return { ok: true, value: { sampleRate, channelCount, format } }
}

const EXTENSIBLE = 0xfffe
const FORMATS: Readonly<Record<string, SampleFormat>> = {
  '1:8': 'pcm8',
  '1:16': 'pcm16',
  '1:24': 'pcm24',
  '1:32': 'pcm32',
  '3:32': 'float32',
  '3:64': 'float64',
}
const ENCODINGS: Readonly<Record<number, string>> = {
  1: 'PCM',
  2: 'ADPCM',
  3: 'float',
  6: 'A-law',
  7: 'µ-law',
  17: 'IMA ADPCM',
  80: 'MPEG audio',
  85: 'MP3',
}

// {0000xxxx-0000-0010-8000-00AA00389B71}: the format tag stands in the first two bytes.
const WAVE_GUID_TAIL = [0, 0, 0, 0, 0x10, 0, 0x80, 0, 0, 0xaa, 0, 0x38, 0x9b, 0x71]

function hasWaveGuid(view: DataView, at: number): boolean {
  return WAVE_GUID_TAIL.every((byte, i) => view.getUint8(at + 2 + i) === byte)
}

function nonFinite(channels: readonly Float64Array[]): Refusal | undefined {
  for (const [c, samples] of channels.entries()) {
    for (let i = 0; i < samples.length; i++) {
      if (Number.isFinite(samples[i])) continue
      return refuse(
        'nonFinite',
        `sample ${i} of channel ${c} is ${samples[i]}`,
        'repair the recording; the samples of a float file must be numbers',
      )
    }
  }
  return undefined
}
