// Anything may be called a WAV file. Seeded; a failure prints seed and smallest case.
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { MAX_CHANNELS, MAX_SAMPLE_RATE, readWav, readWavInfo, writeWav } from '../../src/media/wav.ts'
import { ascii, chunk, fmt, riff, u32, type WavSpec, wavBytes } from './wavBytes.ts'

const SEED = 19

/** What must hold of any reading: a reason, or samples that the bytes can really hold. Returns whether it was read. */
function judge(bytes: Uint8Array, options = {}): boolean {
  const result = readWav(bytes, options)
  const info = readWavInfo(bytes, options)
  if (!result.ok) {
    expect(result.reason.length).toBeGreaterThan(0)
    expect(result.reason.length).toBeLessThan(200)
    expect(result.hint.length).toBeGreaterThan(0)
    expect(result.reason).toMatch(/^[ -~µ×]*$/)
    return false
  }
  expect(info.ok).toBe(true)
  const { channels, channelCount, sampleRate, totalFrames } = result.value
  expect(channels.length).toBe(channelCount)
  expect(channelCount).toBeGreaterThanOrEqual(1)
  expect(channelCount).toBeLessThanOrEqual(MAX_CHANNELS)
  expect(sampleRate).toBeGreaterThanOrEqual(1)
  expect(sampleRate).toBeLessThanOrEqual(MAX_SAMPLE_RATE)
  expect(channels.every((c) => c.length === channels[0]?.length && c.every(Number.isFinite))).toBe(true)
  // No sample without a byte of its own: nothing small can ask for much memory.
  expect((channels[0]?.length ?? 0) * channelCount).toBeLessThanOrEqual(bytes.length)
  expect(totalFrames).toBeGreaterThan(0)
  return true
}

const bytesOf = (maxLength: number) => fc.uint8Array({ maxLength })
const spec: fc.Arbitrary<WavSpec> = fc
  .record({
    kind: fc.constantFrom([1, 8], [1, 16], [1, 24], [1, 32], [3, 32], [3, 64]),
    channels: fc.integer({ min: 1, max: 5 }),
    rate: fc.constantFrom(8000, 44100, 48000, 192000),
    frames: fc.integer({ min: 1, max: 20 }),
    extensible: fc.boolean(),
    // Below 0x7f no float word is infinite or no number.
    words: fc.uint8Array({ minLength: 1, maxLength: 64, max: 0x7e }),
  })
  .map(({ kind: [tag, bits], channels, rate, frames, extensible, words }) => {
    const data = Array.from({ length: (channels * frames * (bits as number)) / 8 }, (_, i) => words[i % words.length] as number)
    return { tag, bits, channels, rate, data, ...(extensible ? { extensible: tag } : {}) } as WavSpec
  })
const file = spec.map(wavBytes)
const change = fc.record({ at: fc.nat(), value: fc.oneof(fc.constantFrom(0, 1, 0x7f, 0x80, 0xff), fc.nat(255)) })

describe('hostile bytes', () => {
  it('never throw, whatever they are', () => {
    fc.assert(
      fc.property(bytesOf(300), (bytes) => {
        judge(bytes)
      }),
      { seed: SEED, numRuns: 3000 },
    )
  })

  it('never throw after a true beginning', () => {
    const starts = [ascii('RIFF'), [...ascii('RIFF'), ...u32(100), ...ascii('WAVE')], [...riff(fmt())], [...wavBytes()].slice(0, 40)]
    fc.assert(
      fc.property(fc.constantFrom(...starts), bytesOf(200), (start, rest) => {
        judge(Uint8Array.from([...start, ...rest]))
      }),
      { seed: SEED, numRuns: 3000 },
    )
  })

  it('true files are read, and still judged well with some bytes changed', () => {
    const counts = { read: 0, refused: 0 }
    fc.assert(
      fc.property(file, fc.array(change, { minLength: 1, maxLength: 6 }), (bytes, changes) => {
        expect(judge(bytes)).toBe(true)
        for (const { at, value } of changes) bytes[at % Math.min(bytes.length, 80)] = value
        counts[judge(bytes) ? 'read' : 'refused']++
      }),
      { seed: SEED, numRuns: 4000 },
    )
    // Both ends were really reached.
    expect(counts.read).toBeGreaterThan(100)
    expect(counts.refused).toBeGreaterThan(1000)
  })

  it('a file cut anywhere is refused', () => {
    fc.assert(
      fc.property(file, fc.double({ min: 0, max: 1, maxExcluded: true, noNaN: true }), (bytes, part) => {
        const length = Math.floor(part * (bytes.length - (isOdd(bytes) ? 1 : 0)))
        expect(judge(bytes.slice(0, length))).toBe(false)
      }),
      { seed: SEED, numRuns: 3000 },
    )
  })

  it('chunks of any name and promised size neither throw nor hang', () => {
    const odd = fc.record({
      id: fc.string({ minLength: 4, maxLength: 4, unit: 'binary-ascii' }),
      body: bytesOf(20),
      size: fc.oneof(fc.nat(40), fc.constantFrom(0x7fffffff, 0x80000000, 0xffffffff)),
    })
    fc.assert(
      fc.property(spec, fc.array(odd, { maxLength: 6 }), fc.nat(6), (s, others, at) => {
        const chunks = others.map(({ id, body, size }) => chunk(id, [...body], size))
        chunks.splice(at % (chunks.length + 1), 0, [...fmt(s), ...chunk('data', s.data ?? [])])
        judge(riff(...chunks))
      }),
      { seed: SEED, numRuns: 3000 },
    )
  })

  it('a file in part, with any claim about the whole', () => {
    fc.assert(
      fc.property(file, fc.nat(100), fc.nat(1000), fc.double({ min: 0, max: 1, noNaN: true }), (bytes, maxFrames, fileBytes, part) => {
        judge(bytes.slice(0, Math.floor(part * bytes.length)), { maxFrames, fileBytes })
      }),
      { seed: SEED, numRuns: 3000 },
    )
  })
})

it('what is written is read back: float to single precision, integers to half a step', () => {
  const channels = fc.integer({ min: 1, max: 4 }).chain((count) =>
    fc.integer({ min: 1, max: 30 }).chain((frames) =>
      fc.array(fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: frames, maxLength: frames }), {
        minLength: count,
        maxLength: count,
      }),
    ),
  )
  fc.assert(
    fc.property(
      channels,
      fc.constantFrom('float32', 'pcm16', 'pcm32'),
      fc.integer({ min: 1, max: MAX_SAMPLE_RATE }),
      (values, format, rate) => {
        const input = values.map((c) => Float64Array.from(c))
        const result = readWav(writeWav(input, rate, format))
        if (!result.ok) throw new Error(result.reason)
        expect([result.value.format, result.value.sampleRate]).toEqual([format, rate])
        result.value.channels.forEach((c, i) => {
          c.forEach((v, n) => {
            const x = input[i]?.[n] as number
            const step = format === 'pcm16' ? 2 ** -15 : 2 ** -31
            // Full scale itself has no word and becomes the largest, one step less.
            if (format === 'float32') expect(v).toBe(Math.fround(x))
            else expect(Math.abs(v - x)).toBeLessThanOrEqual(x > 1 - step ? step : step / 2)
          })
        })
      },
    ),
    { seed: SEED, numRuns: 500 },
  )
})

/** Whether the data chunk has a pad byte, without which the samples are still whole. */
function isOdd(bytes: Uint8Array): boolean {
  const at = 12 + 8 + new DataView(bytes.buffer).getUint32(16, true)
  return new DataView(bytes.buffer).getUint32(at + 4, true) % 2 === 1
}
