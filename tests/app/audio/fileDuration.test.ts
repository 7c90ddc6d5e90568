import { spawnSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import os from 'node:os'
import path from 'node:path'
import { describe, expect, it } from 'vitest'
import { durationSeconds } from '../../../app/audio/fileDuration.ts'
import { writeWav } from '../../../src/media/wav.ts'

const EDGE = 2 ** 18
const lengthOf = (bytes: Uint8Array) =>
  durationSeconds(bytes.subarray(0, EDGE), bytes.subarray(Math.max(0, bytes.length - EDGE)), bytes.length)

const text = (word: string) => [...word].map((letter) => letter.charCodeAt(0))
const u32 = (n: number) => [n >>> 24, (n >>> 16) & 255, (n >>> 8) & 255, n & 255]

describe('headers made by hand', () => {
  // RFC 9639, section 8.2 (from memory): 44.1 kHz, 2 channels, 16 bits, 441 000 samples.
  it('FLAC: samples over rate', () => {
    const packed = [(44_100 >> 12) & 255, (44_100 >> 4) & 255, ((44_100 & 15) << 4) | (1 << 1) | 0, 0xf0]
    const bytes = Uint8Array.from([...text('fLaC'), 0, 0, 0, 34, ...Array(10).fill(0), ...packed, ...u32(441_000), ...Array(16).fill(0)])
    expect(lengthOf(bytes)).toBe(10)
  })

  it('MP4: duration over time scale, in a header at either end of the file', () => {
    const mvhd = [...u32(108), ...text('mvhd'), 0, 0, 0, 0, ...u32(0), ...u32(0), ...u32(1000), ...u32(90_500), ...Array(80).fill(0)]
    expect(lengthOf(Uint8Array.from([...u32(8), ...text('ftyp'), ...mvhd]))).toBe(90.5)
    expect(lengthOf(Uint8Array.from([...u32(8), ...text('ftyp'), ...Array(600_000).fill(1), ...mvhd]))).toBe(90.5)
  })

  it('MP3: size over the first frame’s bit rate, or the frame count of its Xing header', () => {
    const frame = [0xff, 0xfb, 0x90, 0x00]
    const constant = Uint8Array.from([...frame, ...Array(159_996).fill(0)])
    // 128 kbit/s: 16 000 bytes a second.
    expect(lengthOf(constant)).toBe(10)
    const varying = Uint8Array.from([...frame, ...Array(32).fill(0), ...text('Xing'), 0, 0, 0, 1, ...u32(1000), ...Array(5000).fill(0)])
    expect(lengthOf(varying)).toBeCloseTo((1000 * 1152) / 44_100, 9)
  })

  it('tells nothing for what it does not know', () => {
    expect(lengthOf(new Uint8Array(0))).toBe(null)
    expect(lengthOf(Uint8Array.from(text('just some words that are no sound at all')))).toBe(null)
    expect(lengthOf(new Uint8Array(100_000))).toBe(null)
  })
})

// Oracle: sox (Debian), which writes the formats of its own accord; formats it was built without are left to the cases above.
describe.runIf(spawnSync('sox', ['--version']).status === 0)('files written by sox', () => {
  it.each(['flac', 'ogg'])('%s: 2.5 s', (kind) => {
    const folder = mkdtempSync(path.join(os.tmpdir(), 'combwright-'))
    const source = path.join(folder, 'in.wav')
    const coded = path.join(folder, `out.${kind}`)
    writeFileSync(source, writeWav([new Float64Array(120_000).map((_, n) => Math.sin(n / 20) / 3)], 48_000, 'pcm16'))
    expect(spawnSync('sox', [source, coded]).status).toBe(0)
    expect(lengthOf(readFileSync(coded))).toBeCloseTo(2.5, 2)
    rmSync(folder, { recursive: true })
  })
})
