// Oracles: scipy.io.wavfile and sox write files that we read, and read files that we write.
import { spawnSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import os from 'node:os'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, describe, expect, it } from 'vitest'
import { readWav, type WavAudio, writeWav } from '../../src/media/wav.ts'
import { createRandom } from '../../src/signal/random.ts'
import { hasCommand, hasScipy, PYTHON } from '../tools.ts'

const folder = mkdtempSync(path.join(os.tmpdir(), 'combwright-wav-'))
afterAll(() => rmSync(folder, { recursive: true, force: true }))
const at = (name: string) => path.join(folder, name)

function run(command: string, ...args: string[]): string {
  const done = spawnSync(command, args, { encoding: 'utf8', maxBuffer: 1 << 26 })
  expect(done.status, done.stderr).toBe(0)
  return done.stdout
}
const scipy = (...args: string[]) => JSON.parse(run(PYTHON, fileURLToPath(new URL('wav_others.py', import.meta.url)), ...args))

function read(name: string): WavAudio {
  const result = readWav(readFileSync(at(name)))
  if (!result.ok) throw new Error(result.reason)
  return result.value
}

const random = createRandom(8)
/** Within ±0.9, each an exact multiple of 2^-15, so that every format holds it. */
const samples = [0, 1].map(() => Float64Array.from({ length: 50 }, () => Math.round((2 * random() - 1) * 0.9 * 32768) / 32768))

describe.runIf(process.env.CI || hasScipy())('scipy.io.wavfile', () => {
  it('its files are read sample by sample', () => {
    const put = scipy('write', folder) as Record<string, number[][]>
    const scale: Record<string, (n: number) => number> = {
      u8: (n) => (n - 128) / 128,
      i16: (n) => n / 32768,
      i32: (n) => n / 2147483648,
      f32: (n) => n,
      f64: (n) => n,
    }
    expect(Object.keys(put)).toEqual(Object.keys(scale))
    for (const [name, channels] of Object.entries(put)) {
      const wav = read(`${name}.wav`)
      expect(wav.sampleRate).toBe(44100)
      expect(wav.channels.map((c) => [...c])).toEqual(channels.map((c) => c.map((n) => scale[name]!(n))))
    }
  })

  it.each([
    ['float32', 'float32', 1],
    ['pcm16', 'int16', 32768],
    ['pcm32', 'int32', 2147483648],
  ] as const)('reads our %s', (format, dtype, scale) => {
    writeFileSync(at('ours.wav'), writeWav(samples, 96000, format))
    const [back] = scipy('read', at('ours.wav')) as { rate: number; dtype: string; channels: number[][] }[]
    expect([back?.rate, back?.dtype]).toEqual([96000, dtype])
    expect(back?.channels).toEqual(samples.map((c) => [...c].map((x) => x * scale)))
  })
})

describe.runIf(process.env.CI || hasCommand('sox'))('sox', () => {
  // From our 32-bit file, whose samples fit 16 bits, so nothing is rounded on the way.
  it.each([
    ['16 bits', ['-b', '16'], 'pcm16'],
    ['24 bits, extensible', ['-b', '24'], 'pcm24'],
    ['24 bits, plain', ['-t', 'wavpcm', '-b', '24'], 'pcm24'],
    ['32 bits', ['-b', '32', '-e', 'signed'], 'pcm32'],
    ['32-bit float', ['-b', '32', '-e', 'floating-point'], 'float32'],
    ['64-bit float', ['-b', '64', '-e', 'floating-point'], 'float64'],
  ] as const)('its %s file is read sample by sample', (_, options, format) => {
    writeFileSync(at('source.wav'), writeWav(samples, 48000, 'pcm32'))
    run('sox', '-D', at('source.wav'), ...options, at('sox.wav'))
    const wav = read('sox.wav')
    expect([wav.format, wav.sampleRate]).toEqual([format, 48000])
    expect(wav.channels).toEqual(samples)
  })

  it.each(['float32', 'pcm16', 'pcm32'] as const)('reads our %s', (format) => {
    writeFileSync(at('ours.wav'), writeWav(samples, 44100, format))
    const raw = spawnSync('sox', ['-D', at('ours.wav'), '-t', 'raw', '-e', 'floating-point', '-b', '64', '-'], { maxBuffer: 1 << 26 })
    expect(raw.status, raw.stderr.toString()).toBe(0)
    expect(raw.stderr.toString()).toBe('')
    const words = new Float64Array(Uint8Array.from(raw.stdout).buffer)
    expect([...words]).toEqual(Array.from({ length: 100 }, (_, i) => samples[i % 2]![i >> 1]))
  })

  it('a file it wrote to a pipe, without a true length, is refused with a hint', () => {
    const raw = ['-t', 'raw', '-r', '48000', '-e', 'signed', '-b', '16', '-c', '2']
    const piped = spawnSync('sox', [...raw, '-', '-t', 'wav', '-'], { input: new Uint8Array(400), maxBuffer: 1 << 26 })
    expect(piped.stdout.length).toBe(444)
    const result = readWav(Uint8Array.from(piped.stdout))
    expect(!result.ok && result.code).toBe('cut')
    expect(!result.ok && result.hint).toMatch(/pipe/)
  })

  it('its big-endian and µ-law files are refused by name', () => {
    writeFileSync(at('source.wav'), writeWav(samples, 48000, 'pcm16'))
    run('sox', at('source.wav'), '-B', at('big.wav'))
    run('sox', at('source.wav'), '-e', 'mu-law', at('law.wav'))
    const [big, law] = ['big.wav', 'law.wav'].map((name) => readWav(readFileSync(at(name))))
    expect(big?.ok === false && big.reason).toMatch(/RIFX/)
    expect(law?.ok === false && law.reason).toMatch(/µ-law/)
  })
})
