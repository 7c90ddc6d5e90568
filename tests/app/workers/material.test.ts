import { describe, expect, it } from 'vitest'
import { framesKept, materialFrom, minutes, readWavFile } from '../../../app/workers/materialJobs/decode.ts'
import { measureEqualLoudness } from '../../../app/workers/materialJobs/equalLoudness.ts'
import { keep, type Made, overviewOf } from '../../../app/workers/materialJobs/memory.ts'
import { renderPhrase } from '../../../app/workers/materialJobs/phrase.ts'
import type { Material, MaterialReply } from '../../../app/workers/materialProtocol.ts'
import { PHRASES } from '../../../src/material/phraseList.ts'
import { writeWav } from '../../../src/media/wav.ts'
import { defaultSet } from '../../../src/set/defaults.ts'
import { withAt } from '../../../src/set/path.ts'
import { resampleTo } from '../../../src/signal/resample.ts'

const sine = (frames: number, hz: number, fs: number, peak = 0.25) =>
  Float64Array.from({ length: frames }, (_, n) => peak * Math.sin((2 * Math.PI * hz * n) / fs))

const fileOf = (bytes: Uint8Array) => new Blob([new Uint8Array(bytes)])
const made = (result: Made | MaterialReply): Made => {
  if ('ok' in result) throw new Error(`refused: ${JSON.stringify(result)}`)
  return result
}

describe('the user’s WAV', () => {
  it('at the context’s rate keeps its samples to single precision', async () => {
    const left = sine(4800, 440, 48_000)
    const wav = made(await readWavFile(fileOf(writeWav([left], 48_000, 'float32')), 48_000))
    expect(wav.channels[0]).toEqual(Float32Array.from(left))
    expect(wav.remarks).toEqual([])
  })

  it('at another rate is resampled as the command line does, and says so', async () => {
    const left = Float64Array.from(Float32Array.from(sine(4410, 440, 44_100)))
    const wav = made(await readWavFile(fileOf(writeWav([left, left], 44_100, 'float32')), 48_000))
    expect(wav.channels[0]).toEqual(Float32Array.from(resampleTo([left], 44_100, 48_000)[0] as Float64Array))
    expect([wav.sourceRate, wav.sourceChannels, wav.remarks]).toEqual([44_100, 2, ['resampled from 44.1 kHz']])
  })

  it('of more channels than two is averaged, as the signal path does with more inputs than lines', async () => {
    const [a, b, c] = [0.1, 0.2, 0.6].map((level) => new Float64Array(100).fill(level)) as [Float64Array, Float64Array, Float64Array]
    const wav = made(await readWavFile(fileOf(writeWav([a, b, c], 48_000, 'float32')), 48_000))
    expect(wav.channels.length).toBe(1)
    expect(wav.channels[0]?.[50]).toBeCloseTo(0.3, 7)
    expect(wav.remarks).toEqual(['3 channels averaged'])
  })

  it('longer than ten minutes is cut to them, and says of how much', async () => {
    // 8 kHz, 11 minutes: 5.28 million samples.
    const bytes = writeWav([new Float32Array(8000 * 660)], 8000, 'pcm16')
    const wav = made(await readWavFile(fileOf(bytes), 8000))
    expect(wav.channels[0]?.length).toBe(8000 * 600)
    expect(wav.remarks).toEqual(['the first 10 min 00 s of 11 min 00 s'])
  })

  it.each([
    ['empty', new Uint8Array(0), 'empty'],
    ['foreign', new TextEncoder().encode('{"format":"combwright-set"}'), 'foreign'],
    ['cut', writeWav([new Float64Array(1000)], 48_000, 'pcm16').slice(0, 900), 'cut'],
  ])('%s is refused with a reason', async (_name, bytes, code) => {
    const reply = await readWavFile(fileOf(bytes), 48_000)
    expect(reply).toMatchObject({ ok: false, code })
    expect((reply as { reason: string }).reason.length).toBeGreaterThan(10)
  })

  it('never keeps more samples than its bound, whatever rate and channels', () => {
    for (const [from, to, channels] of [
      [44_100, 48_000, 2],
      [192_000, 192_000, 2],
      [8000, 192_000, 2],
      [48_000, 48_000, 64],
    ] as const) {
      const frames = framesKept(from, to, channels)
      expect(frames * channels).toBeLessThanOrEqual(2 ** 27)
      expect(frames * channels * (to / from)).toBeLessThanOrEqual(2 ** 27)
      expect(frames / from).toBeLessThanOrEqual(600)
    }
  })

  it('lengths read in words', () => {
    expect([minutes(4.25), minutes(60), minutes(349.9)]).toEqual(['4.3 s', '1 min 00 s', '5 min 49 s'])
  })
})

describe('what is kept', () => {
  it('every phrase of the list is made at the context’s rate', () => {
    for (const { id } of PHRASES) expect(renderPhrase(id, 44_100).channels[0]?.length).toBeGreaterThan(44_100 / 2)
    expect(() => renderPhrase('nothing', 48_000)).toThrow(RangeError)
  })

  it('the overview holds smallest and largest of each column, all channels together', () => {
    const left = new Float32Array(4096)
    const right = new Float32Array(4096)
    left[7] = 0.5
    right[6] = -0.25
    const { min, max, seconds } = overviewOf([left, right], 48_000)
    expect([min.length, max[1], min[1], max[2]]).toEqual([1024, 0.5, -0.25, 0])
    expect(seconds).toBe(4096 / 48_000)
  })

  it('a sound decoded by the browser is cut to the same bounds', () => {
    expect(materialFrom([new Float32Array(8000 * 700)], 8000).channels[0]?.length).toBe(8000 * 600)
  })
})

describe('equal loudness', () => {
  const FS = 48_000
  const material = () =>
    (
      keep({ channels: [Float32Array.from(sine(FS * 2, 1000, FS))], rate: FS, sourceChannels: 1, sourceRate: FS, remarks: [] }) as {
        material: Material
      }
    ).material
  const dryOnly = (dry: number) => withAt(withAt(defaultSet(), 'mix.wet', 0), 'mix.dry', dry)
  const measure = async (set = defaultSet(), options: { startS?: number; endS?: number; abandoned?: boolean } = {}) => {
    const of = { memory: material().memory }
    const reply = await measureEqualLoudness(
      { kind: 'measure', set, bypass: 'off', of, rate: FS, startS: options.startS ?? 0, endS: options.endS ?? 2 },
      () => options.abandoned === true,
    )
    return reply.ok && 'gainDb' in reply ? reply.gainDb : reply
  }

  // Oracle: a bare gain of the dry path changes BS.1770 loudness by exactly its decibels.
  it.each([
    [0.5, 20 * Math.log10(2)],
    [1, 0],
    [2, -20 * Math.log10(2)],
  ])('a dry gain of %s asks for %s dB', async (dry, wanted) => {
    expect(await measure(dryOnly(dry))).toBeCloseTo(wanted, 6)
  })

  it('asks for 12 dB at most either way, and for nothing when there is silence', async () => {
    expect(await measure(dryOnly(0.01))).toBe(12)
    expect(await measure(dryOnly(8))).toBe(-12)
    expect(await measure(dryOnly(0))).toBe(null)
  })

  it('makes the set as loud as its own bypass: gain applied, both measure alike', async () => {
    const gain = (await measure()) as number
    const raised = withAt(defaultSet(), 'mix.outputGainDb', gain)
    expect(await measure(raised)).toBeCloseTo(0, 6)
  })

  it('gives way to a newer measurement', async () => {
    expect(await measure(defaultSet(), { abandoned: true })).toMatchObject({ ok: false, code: 'abandoned' })
  })

  it('does not measure a sound that is no longer kept', async () => {
    const { memory } = material()
    material()
    const request = { kind: 'measure', set: defaultSet(), bypass: 'off', of: { memory }, rate: FS, startS: 0, endS: 1 } as const
    expect(await measureEqualLoudness(request, () => false)).toMatchObject({ ok: false })
  })

  it('measures the tone, which has no memory', async () => {
    const request = { kind: 'measure', set: dryOnly(0.5), bypass: 'off', of: { toneHz: 1000 }, rate: FS, startS: 0, endS: 0 } as const
    const reply = await measureEqualLoudness(request, () => false)
    expect(reply.ok && 'gainDb' in reply && reply.gainDb).toBeCloseTo(20 * Math.log10(2), 6)
  })
})
