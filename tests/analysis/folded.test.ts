// Oracle: the engine itself. A tone whose frequency shares no small ratio with the rate is rendered; what is left of it after its own harmonics
// below half the rate are fitted and taken away is what folded.
import { describe, expect, it } from 'vitest'
import { aliasToneHz, foldedEnergy } from '../../src/analysis/folded.ts'
import { renderSet } from '../../src/dsp/render.ts'
import { defaultShaper } from '../../src/set/defaults.ts'
import type { Shaper } from '../../src/set/types.ts'
import { changedSet } from '../dsp/sets.ts'

const FS = 48000
/** 5 kHz and a little: no harmonic up to the thousandth folds nearer than 5 Hz to another. */
const TONE = 5000 * (1 + Math.SQRT2 / 1000)
const FRAMES = 1 << 16

/** Level of what is no harmonic below fs/2, against the first: each harmonic measured by itself through a window without leakage to the others. */
function playedFolds(shaper: Shaper, amplitude: number): number {
  const set = changedSet((s) => {
    s.layout = 'mono'
    s.voices.count = 1
    s.mix.dry = 1
    s.mix.wet = 0
    s.mix.shaper = { ...shaper, points: shaper.points.map(([t, k]) => [t, k]) }
  })
  const input = Float64Array.from({ length: FRAMES }, (_, n) => amplitude * Math.sin((2 * Math.PI * TONE * n) / FS))
  const [out] = renderSet(set, [input]) as [Float64Array]
  // Hann's window squared: its side lobes fall by 30 dB an octave.
  const window = Float64Array.from({ length: FRAMES }, (_, n) => Math.sin((Math.PI * (n + 0.5)) / FRAMES) ** 4)
  const rest = Float64Array.from(out.subarray(0, FRAMES))
  let tone = 0
  for (let n = 0; n * TONE < FS / 2; n++) {
    const angle = (2 * Math.PI * n * TONE) / FS
    let [re, im, weight] = [0, 0, 0]
    for (let i = 0; i < FRAMES; i++) {
      re += (window[i] as number) * (out[i] as number) * Math.cos(angle * i)
      im += (window[i] as number) * (out[i] as number) * Math.sin(angle * i)
      weight += window[i] as number
    }
    const scale = (n === 0 ? 1 : 2) / weight
    if (n === 1) tone = scale * Math.hypot(re, im)
    for (let i = 0; i < FRAMES; i++) rest[i] = (rest[i] as number) - scale * (re * Math.cos(angle * i) + im * Math.sin(angle * i))
  }
  let [energy, weight] = [0, 0]
  for (let i = 0; i < FRAMES; i++) {
    energy += (window[i] as number) * (rest[i] as number) ** 2
    weight += window[i] as number
  }
  return 10 * Math.log10((2 * energy) / weight / (tone * tone))
}

describe('foldedEnergy', () => {
  const cases: readonly Partial<Shaper>[] = [
    { curve: 'hardClip', drive: 3 },
    { curve: 'hardClip', drive: 3, antialias: 'adaa1' },
    { curve: 'tanh', drive: 6, negative: 0.5 },
    { curve: 'tanh', drive: 6, negative: 0.5, antialias: 'adaa1' },
    { curve: 'arctan', drive: 0.5, antialias: 'adaa1' },
    { curve: 'diode', drive: 2 },
    { curve: 'diode', drive: 2, antialias: 'adaa1' },
    { curve: 'deadZone', deadZone: 0.1, antialias: 'adaa1' },
  ]
  it.each(cases.map((change) => [JSON.stringify(change), change] as const))('%s folds what the engine plays', (_, change) => {
    const shaper = { ...defaultShaper('tanh'), ...change }
    const predicted = foldedEnergy(shaper, 0.5, FS, TONE).db as number
    expect(Math.abs(playedFolds(shaper, 0.5) - predicted)).toBeLessThan(0.02)
  })

  it('adaa1 folds less than the bare curve, and changes nothing of what a doubled rate would', () => {
    const clip = { ...defaultShaper('hardClip'), drive: 4 }
    const db = (antialias: Shaper['antialias'], fs: number) => foldedEnergy({ ...clip, antialias }, 0.5, fs).db as number
    expect(db('adaa1', 48000)).toBeLessThan(db('none', 48000) - 5)
    expect(db('none', 96000)).toBeLessThan(db('none', 48000) - 5)
    expect(db('adaa1', 96000)).toBeLessThan(db('none', 96000) - 5)
  })

  it('the tone is 5 kHz, below 12.5 kHz of rate 0.4 of it', () => {
    expect([192000, 12500, 10000, 8000].map(aliasToneHz)).toEqual([5000, 5000, 4000, 3200])
    expect(foldedEnergy(defaultShaper('tanh'), 0.5, 8000).kept).toBe(1)
    expect(foldedEnergy(defaultShaper('tanh'), 0.5, 40000).kept).toBe(4)
  })

  it('a curve that is not reached folds nothing; one that lets nothing through has no level', () => {
    expect(foldedEnergy(defaultShaper('hardClip'), 0.5, FS).db).toBe(-400)
    expect(foldedEnergy({ ...defaultShaper('deadZone'), deadZone: 1 }, 0.5, FS).db).toBeNull()
    expect(() => foldedEnergy(defaultShaper('tanh'), 0.5, FS, 24000)).toThrow(/toneHz must lie between 0 and 24000 Hz, got 24000/)
  })
})
