// What --material takes and refuses, and why.
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest'
import { CommandFailure } from '../../src/cli/failure.ts'
import { readMaterial } from '../../src/cli/material.ts'
import { writeWav } from '../../src/media/wav.ts'
import { changedSet } from '../dsp/sets.ts'

const folder = mkdtempSync(path.join(tmpdir(), 'combwright-material-'))
const at = (name: string) => path.join(folder, name)
const sine = (frames: number) => Float64Array.from({ length: frames }, (_, i) => 0.3 * Math.sin(i / 10))
const mono = changedSet((s) => {
  s.layout = 'mono'
})

beforeAll(() => {
  writeFileSync(at('good.wav'), writeWav([sine(48000)], 48000, 'float32'))
  writeFileSync(at('other.wav'), writeWav([sine(44100), sine(44100)], 44100, 'pcm16'))
  writeFileSync(at('short.wav'), writeWav([sine(9600)], 48000, 'pcm16'))
  writeFileSync(at('silent.wav'), writeWav([new Float64Array(48000)], 48000, 'pcm16'))
  writeFileSync(at('slow.wav'), writeWav([sine(2000)], 500, 'pcm16'))
  writeFileSync(at('text.wav'), 'This is a text about music, and no sound file at all.')
  writeFileSync(at('empty.wav'), '')
})
afterAll(() => rmSync(folder, { recursive: true }))

describe('material', () => {
  it('at the rate judged at is taken as it is', () => {
    const material = readMaterial(at('good.wav'), mono, 48000)
    expect(material).toMatchObject({ name: 'good.wav', sampleRate: 48000 })
    expect(material.channels[0]).toHaveLength(48000)
  })

  it('at another rate is resampled, and channels too many are averaged, and both are said', () => {
    const said: string[] = []
    const spy = vi.spyOn(process.stderr, 'write').mockImplementation((text) => said.push(String(text)) > 0)
    const { channels, sampleRate } = readMaterial(at('other.wav'), mono, 48000)
    spy.mockRestore()
    expect([sampleRate, channels[0]?.length]).toEqual([48000, 48000])
    expect(said.join('')).toMatch(/2 channels, averaged into the one line[\s\S]*resampled from 44100 Hz to 48000 Hz/)
  })

  it.each([
    ['short.wav', /lasts 0\.20 s, and loudness is measured over 0\.4 s at least/],
    ['silent.wav', /is silent/],
    ['slow.wav', /at 500 Hz, and 1000 to 768000 Hz can be resampled/],
    ['text.wav', /not a WAV file/],
    ['empty.wav', /empty/],
    ['nowhere.wav', /cannot be read: no such file/],
  ])('%s is refused with its reason', (name, reason) => {
    expect(() => readMaterial(at(name), mono, 48000)).toThrow(CommandFailure)
    expect(() => readMaterial(at(name), mono, 48000)).toThrow(reason)
  })
})
