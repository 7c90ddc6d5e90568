import { describe, expect, it } from 'vitest'
import { PHRASES, type PhraseId } from '../../src/material/phraseList.ts'
import { phrase } from '../../src/material/phrases.ts'
import { realFft } from '../../src/signal/fft.ts'
import { peak, rms, toDb } from '../../src/signal/levels.ts'
import { integratedLoudness } from '../../src/signal/loudness.ts'

const ids = PHRASES.map((p) => p.id)
const BINOMIAL = [1, -8, 28, -56, 70, -56, 28, -8, 1]
const music = ids.filter((id) => id !== 'impulse')

/** Power of x between two frequencies, x cut to a power of two. */
function bandPower(x: Float64Array, rate: number, low: number, high: number): number {
  const { re, im } = realFft(x.slice(0, 2 ** Math.floor(Math.log2(x.length))))
  const size = 2 * (re.length - 1)
  let sum = 0
  for (let k = Math.ceil((low * size) / rate); k < Math.min(re.length, (high * size) / rate); k++)
    sum += (re[k] as number) ** 2 + (im[k] as number) ** 2
  return sum
}

describe('every phrase', () => {
  it.each(ids)('%s lasts 4 to 8 s, is finite and the same each time', (id) => {
    const x = phrase(id, 48000)
    expect(x.length / 48000).toBeGreaterThanOrEqual(4)
    expect(x.length / 48000).toBeLessThanOrEqual(8)
    expect(x.every(Number.isFinite)).toBe(true)
    const again = phrase(id, 48000)
    expect(x.every((v, n) => v === again[n])).toBe(true)
  })

  it.each(ids)('%s can be had at odd and extreme rates', (id) => {
    for (const rate of [8000, 11025.5, 44100, 192000]) {
      const x = phrase(id, rate)
      expect(peak(x)).toBeLessThanOrEqual(0.5)
      expect(x.length / rate).toBeGreaterThanOrEqual(3.999)
    }
  })

  it.each(music)('%s lies near −20 dBFS rms with peaks under −6 dBFS', (id) => {
    const x = phrase(id, 48000)
    expect(Math.abs(toDb(rms(x)) + 20)).toBeLessThan(2.5)
    expect(toDb(peak(x))).toBeLessThan(-6)
  })

  it.each(music)('%s is as loud at 96 kHz and 44.1 kHz as at 48 kHz, within 0.7 LU', (id) => {
    const at = (rate: number) => integratedLoudness([phrase(id, rate)], rate)
    expect(Math.abs(at(96000) - at(48000))).toBeLessThan(0.7)
    expect(Math.abs(at(44100) - at(48000))).toBeLessThan(0.7)
  })

  // The eighth difference makes a step 70 times larger and hardly more of what a chord holds below 9 kHz. (Noise: its test
  // on the empty band above 20 kHz covers the whole circle. Strings and drums: circular.test.ts.)
  it.each(['heldChord', 'tone'] as const)('%s repeats without a seam', (id) => {
    const x = phrase(id, 48000)
    const eighth = new Float64Array(x.length)
    BINOMIAL.forEach((weight, i) => {
      for (let n = 0; n < x.length; n++) eighth[n] = (eighth[n] as number) + weight * (x[(n + i) % x.length] as number)
    })
    expect(peak(eighth.subarray(-8))).toBeLessThanOrEqual(peak(eighth.subarray(0, -8)))
    // A step of 0.002 would show: every sample beside it changes by at least this much, more than the sound ever does.
    expect(56 * 0.002).toBeGreaterThan(2 * peak(eighth))
  })

  it('ids and labels are unique and every phrase says what it is for', () => {
    expect(new Set(ids).size).toBe(ids.length)
    expect(new Set(PHRASES.map((p) => p.label)).size).toBe(ids.length)
    for (const p of PHRASES) expect(p.about).toMatch(/\.$/)
  })

  it('refuses rates and ids it does not know, naming them', () => {
    expect(() => phrase('noise', 7999)).toThrow(/8000 to 192000 Hz, got 7999/)
    expect(() => phrase('noise', Number.NaN)).toThrow(RangeError)
    expect(() => phrase('horn' as PhraseId, 48000)).toThrow(/got horn/)
  })
})

describe('what each is for', () => {
  it('plucked chords: partials up to 14 kHz, above only what attacks spread', () => {
    const x = phrase('pluckedChords', 48000)
    expect(toDb(Math.sqrt(bandPower(x, 48000, 8000, 14000) / bandPower(x, 48000, 20, 24000)))).toBeGreaterThan(-50)
    expect(toDb(Math.sqrt(bandPower(x, 48000, 15000, 24000) / bandPower(x, 48000, 20, 24000)))).toBeLessThan(-60)
  })

  // Oracle: equal temperament, key 33 is 55 Hz; the first eighth and its rest hold that string alone.
  it('bass line: begins on 55 Hz', () => {
    const x = phrase('bassLine', 48000).slice(0, 16384)
    const { re, im } = realFft(
      x.map((v, n) => v * (1 - Math.cos((2 * Math.PI * n) / x.length))),
      2 ** 18,
    )
    const magnitude = re.map((v, k) => Math.hypot(v, im[k] as number))
    const low = Math.round((40 * 2 ** 18) / 48000)
    const high = Math.round((80 * 2 ** 18) / 48000)
    const band = magnitude.slice(low, high)
    const hz = ((low + band.indexOf(Math.max(...band))) * 48000) / 2 ** 18
    expect(Math.abs(hz - 55)).toBeLessThan(0.3)
  })

  it('drum bar: kick below 120 Hz, hat above 7 kHz, and rests between', () => {
    const x = phrase('drumBar', 48000)
    const all = bandPower(x, 48000, 20, 24000)
    expect(toDb(Math.sqrt(bandPower(x, 48000, 20, 120) / all))).toBeGreaterThan(-6)
    expect(toDb(Math.sqrt(bandPower(x, 48000, 7000, 24000) / all))).toBeGreaterThan(-25)
    const rests = Array.from({ length: 480 }, (_, i) => rms(x.subarray(i * 480, (i + 1) * 480))).filter((r) => toDb(r) < -55)
    expect(rests.length).toBeGreaterThan(20)
  })

  it('held chord: the same level in every tenth of a second', () => {
    const x = phrase('heldChord', 48000)
    const levels = Array.from({ length: 60 }, (_, i) => toDb(rms(x.subarray(i * 4800, (i + 1) * 4800))))
    expect(Math.max(...levels) - Math.min(...levels)).toBeLessThan(4)
  })

  // Oracle: definition of pink noise, power density ∝ 1/f: every octave holds the same power.
  it('pink noise: equal power in every octave', () => {
    const x = phrase('noise', 48000)
    const octaves = [40, 80, 160, 320, 640, 1280, 2560, 5120, 10000].map((low) => 10 * Math.log10(bandPower(x, 48000, low, 2 * low)))
    expect(Math.max(...octaves) - Math.min(...octaves)).toBeLessThan(0.1)
    expect(bandPower(x, 48000, 20010, 24000)).toBeLessThan(1e-20 * bandPower(x, 48000, 20, 20000))
  })

  it('impulses: one sample of 0.5 a second, all else 0', () => {
    const x = phrase('impulse', 48000)
    expect([...x.entries()].filter(([, v]) => v !== 0)).toEqual([12000, 60000, 108000, 156000].map((n) => [n, 0.5]))
  })
})
