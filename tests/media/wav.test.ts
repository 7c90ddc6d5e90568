import { describe, expect, it } from 'vitest'
import { MAX_CHANNELS, readWav, readWavInfo, writeWav } from '../../src/media/wav.ts'
import { ascii, chunk, fmt, riff, u16, u32, wavBytes } from './wavBytes.ts'

const read = (bytes: Uint8Array) => {
  const result = readWav(bytes)
  if (!result.ok) throw new Error(result.reason)
  return result.value
}
const refusal = (bytes: Uint8Array) => {
  const result = readWav(bytes)
  if (result.ok) throw new Error('was read')
  expect(result.reason).toMatch(/^[^A-Z].*[^.]$/)
  expect(result.hint).not.toBe('')
  return { code: result.code, reason: result.reason }
}
const float32 = (...xs: number[]) => [...new Uint8Array(Float32Array.from(xs).buffer)]
const float64 = (...xs: number[]) => [...new Uint8Array(Float64Array.from(xs).buffer)]

describe('reading words', () => {
  // Oracle: FACTS 10 (n / 2^(bits-1); 8-bit unsigned), worked by hand.
  it.each([
    ['pcm8', { bits: 8, data: [0, 128, 255, 64] }, [-1, 0, 127 / 128, -0.5]],
    ['pcm16', { bits: 16, data: [0, 0x80, 0xff, 0x7f, 0, 0] }, [-1, 32767 / 32768, 0]],
    ['pcm24', { bits: 24, data: [0, 0, 0x80, 0xff, 0xff, 0x7f, 0xff, 0xff, 0xff] }, [-1, 8388607 / 8388608, -1 / 8388608]],
    ['pcm32', { bits: 32, data: [0, 0, 0, 0x80, 0xff, 0xff, 0xff, 0x7f] }, [-1, 2147483647 / 2147483648]],
    ['float32', { tag: 3, bits: 32, data: float32(-1.5, 0.25) }, [-1.5, 0.25]],
    ['float64', { tag: 3, bits: 64, data: float64(1 / 3, -2) }, [1 / 3, -2]],
  ] as const)('%s gives exact doubles, plain and extensible', (format, spec, samples) => {
    const plain = read(wavBytes(spec))
    expect(plain.format).toBe(format)
    expect([...(plain.channels[0] as Float64Array)]).toEqual(samples)
    const extensible = read(wavBytes({ ...spec, extensible: 'tag' in spec ? spec.tag : 1 }))
    expect(extensible).toEqual(plain)
  })

  it('takes channels apart and keeps rate and frame count', () => {
    const wav = read(wavBytes({ channels: 3, rate: 44100, data: [1, 2, 3, 4, 5, 6].flatMap((n) => u16(n * 256)) }))
    expect(wav.sampleRate).toBe(44100)
    expect(wav.totalFrames).toBe(2)
    expect(wav.channels.map((c) => [...c].map((x) => x * 128))).toEqual([
      [1, 4],
      [2, 5],
      [3, 6],
    ])
  })

  it('reads a file that starts inside a larger buffer', () => {
    const bytes = wavBytes()
    const larger = new Uint8Array(bytes.length + 7)
    larger.set(bytes, 3)
    expect(read(larger.subarray(3, 3 + bytes.length))).toEqual(read(bytes))
  })
})

describe('chunks', () => {
  const data = chunk('data', [1, 0, 2, 0])

  it('steps over unknown and odd-sized chunks, before and after the samples', () => {
    const plain = read(wavBytes())
    expect(read(riff(chunk('LIST', ascii('odd')), fmt(), chunk('junk', [7]), data, chunk('bext', [1, 2, 3])))).toEqual(plain)
  })

  it('does not count the pad byte of odd data as a sample', () => {
    expect(read(wavBytes({ bits: 8, data: [128, 192, 64] })).totalFrames).toBe(3)
  })

  it('reads odd data whose pad byte is missing', () => {
    expect(read(wavBytes({ bits: 8, data: [128, 192, 64] }).slice(0, -1)).totalFrames).toBe(3)
  })

  it.each([0, 4, 0xffffffff])('does not trust the size of the whole (%i)', (size) => {
    const bytes = wavBytes()
    new DataView(bytes.buffer).setUint32(4, size, true)
    expect(read(bytes)).toEqual(read(wavBytes()))
  })

  it.each(['RF64', 'BW64'])('reads %s with its 64-bit size', (container) => {
    const bytes = riff(
      chunk('ds64', [...u32(100), ...u32(0), ...u32(4), ...u32(0), ...u32(2), ...u32(0), ...u32(0)]),
      fmt(),
      chunk('data', [1, 0, 2, 0], 0xffffffff),
    )
    bytes.set(ascii(container))
    expect(read(bytes)).toEqual(read(wavBytes()))
  })

  it('refuses RF64 whose 64-bit size exceeds the file, and RF64 without ds64', () => {
    const bytes = riff(
      chunk('ds64', [...u32(0), ...u32(0), ...u32(4), ...u32(9), ...u32(2), ...u32(0), ...u32(0)]),
      fmt(),
      chunk('data', [1, 0, 2, 0], 0xffffffff),
    )
    bytes.set(ascii('RF64'))
    expect(refusal(bytes).code).toBe('cut')
    const bare = wavBytes()
    bare.set(ascii('RF64'))
    expect(refusal(bare).code).toBe('damaged')
  })
})

describe('refusals', () => {
  it.each([
    ['an empty file', new Uint8Array(0), 'empty'],
    ['text', Uint8Array.from(ascii('hello, this is no sound')), 'foreign'],
    ['another container', Uint8Array.from([...ascii('OggS'), ...u32(0), ...u32(0)]), 'foreign'],
    ['RIFF that is no WAVE', Uint8Array.from([...ascii('RIFF'), ...u32(4), ...ascii('AVI ')]), 'foreign'],
    ['big-endian RIFX', Uint8Array.from([...ascii('RIFX'), ...u32(4), ...ascii('WAVE')]), 'unsupported'],
    ['a header cut short', wavBytes().slice(0, 9), 'cut'],
    ['a cut format chunk', wavBytes().slice(0, 30), 'cut'],
    ['a file that ends before its samples', wavBytes().slice(0, 36), 'cut'],
    ['samples cut short', wavBytes().slice(0, -1), 'cut'],
    ['a promise of 4 GB', wavBytes({ dataSize: 0xffffffff }), 'cut'],
    ['no samples', wavBytes({ data: [] }), 'empty'],
    ['half a frame', wavBytes({ channels: 2, data: [1, 0, 2, 0, 3, 0] }), 'damaged'],
    ['no format chunk', riff(chunk('data', [1, 0])), 'damaged'],
    ['a short format chunk', riff(chunk('fmt ', [1, 0, 1, 0]), chunk('data', [1, 0])), 'damaged'],
    ['two format chunks', riff(fmt(), fmt(), chunk('data', [1, 0])), 'damaged'],
    ['two data chunks', riff(fmt(), chunk('data', [1, 0]), chunk('data', [1, 0])), 'damaged'],
    ['no channels', wavBytes({ channels: 0, frameBytes: 2 }), 'damaged'],
    ['65 channels', wavBytes({ channels: 65 }), 'unsupported'],
    ['a rate of 0', wavBytes({ rate: 0 }), 'damaged'],
    ['an absurd rate', wavBytes({ rate: 768_001 }), 'damaged'],
    ['a wrong frame size', wavBytes({ frameBytes: 3 }), 'damaged'],
    ['12-bit words', wavBytes({ bits: 12, frameBytes: 2 }), 'unsupported'],
    ['A-law', wavBytes({ tag: 6, bits: 8 }), 'unsupported'],
    ['16-bit float', wavBytes({ tag: 3, bits: 16 }), 'unsupported'],
    ['more valid bits than bits', wavBytes({ extensible: 1, validBits: 17 }), 'damaged'],
    [
      'an extensible format cut to 18 bytes',
      riff(chunk('fmt ', [...u16(0xfffe), ...fmt().slice(10, 24), 0, 0]), chunk('data', [1, 0])),
      'damaged',
    ],
    ['thousands of empty chunks', riff(Array.from({ length: 5000 }, () => chunk('LIST', [])).flat(), fmt()), 'damaged'],
  ])('%s is refused', (_, bytes, code) => {
    expect(refusal(bytes).code).toBe(code)
  })

  it('an extensible format with a foreign sub-format', () => {
    const bytes = wavBytes({ extensible: 1 })
    bytes[12 + 8 + 30] = 0x77
    expect(refusal(bytes).code).toBe('unsupported')
  })

  it('says how many bytes are missing', () => {
    expect(refusal(wavBytes({ dataSize: 1000 })).reason).toBe('the header promises 1000 bytes of samples, the file holds 4')
  })

  it.each([Number.NaN, Number.POSITIVE_INFINITY])('names the first sample that is %d', (bad) => {
    const { code, reason } = refusal(wavBytes({ tag: 3, bits: 32, channels: 2, data: float32(0, 0, 0, bad) }))
    expect(code).toBe('nonFinite')
    expect(reason).toBe(`sample 1 of channel 1 is ${bad}`)
  })
})

describe('part of a file', () => {
  const whole = wavBytes({ data: Array.from({ length: 100 }, (_, i) => i) })

  it('reads the first frames from the first bytes of a longer file and says how long the whole is', () => {
    const part = readWav(whole.slice(0, 44 + 20), { maxFrames: 10, fileBytes: whole.length })
    expect(part.ok && part.value.totalFrames).toBe(50)
    expect(part.ok && part.value.channels[0]).toEqual(read(whole).channels[0]?.slice(0, 10))
  })

  it('refuses when the bytes given do not hold the frames asked for', () => {
    const part = readWav(whole.slice(0, 44 + 19), { maxFrames: 10, fileBytes: whole.length })
    expect(!part.ok && part.code).toBe('cut')
  })

  it('info tells format and length from the header alone', () => {
    const info = readWavInfo(whole.slice(0, 44), { fileBytes: whole.length })
    expect(info).toEqual({ ok: true, value: { sampleRate: 48000, channelCount: 1, totalFrames: 50, format: 'pcm16' } })
  })
})

describe('writing', () => {
  const samples = Float64Array.from([0, 0.5, -1, 0.999969482421875, 2 ** -31, -0.1])

  it('float32 has a fact chunk with the frame count and keeps what exceeds full scale', () => {
    const bytes = writeWav([samples, samples.map((x) => 3 * x)], 44100, 'float32')
    expect(new TextDecoder().decode(bytes.slice(38, 42))).toBe('fact')
    expect(new DataView(bytes.buffer).getUint32(46, true)).toBe(samples.length)
    const wav = read(bytes)
    expect(wav.format).toBe('float32')
    expect([...(wav.channels[1] as Float64Array)]).toEqual([...samples].map((x) => Math.fround(3 * x)))
  })

  it.each([
    ['pcm16', 16],
    ['pcm32', 32],
  ] as const)('%s rounds half up and saturates', (format, bits) => {
    const lsb = 2 ** (1 - bits)
    const input = Float64Array.from([0.5 * lsb, -0.5 * lsb, -1.5 * lsb, 1.49 * lsb, 1, 7, -1, -7])
    const words = [...(read(writeWav([input], 48000, format)).channels[0] as Float64Array)].map((x) => x / lsb)
    const rail = 2 ** (bits - 1)
    expect(words).toEqual([1, 0, -1, 1, rail - 1, rail - 1, -rail, -rail])
  })

  it('every pcm32 word survives a round trip', () => {
    const words = Float64Array.from([-2147483648, -2147483647, -1, 0, 1, 123456789, 2147483647], (n) => n / 2147483648)
    expect(read(writeWav([words], 48000, 'pcm32')).channels[0]).toEqual(words)
  })

  it('gives the same bytes each time', () => {
    expect(writeWav([samples], 48000, 'float32')).toEqual(writeWav([samples], 48000, 'float32'))
  })

  it('throws for what cannot be written, naming it', () => {
    const one = new Float64Array(2)
    expect(() => writeWav([], 48000, 'pcm16')).toThrow(new RangeError('channels must be 1 to 64, got 0'))
    expect(() => writeWav(Array(MAX_CHANNELS + 1).fill(one), 48000, 'pcm16')).toThrow(/got 65/)
    expect(() => writeWav([one], 44100.5, 'pcm16')).toThrow(/44100.5/)
    expect(() => writeWav([one, new Float64Array(3)], 48000, 'pcm16')).toThrow(/channel 1 has 3 samples/)
    expect(() => writeWav([Float64Array.of(0, Number.NaN)], 48000, 'pcm16')).toThrow(/sample 1 of channel 0/)
    expect(() => writeWav([Float64Array.of(1e39)], 48000, 'float32')).toThrow(/1e\+39/)
  })
})
