// Oracle: scipy.signal.lfilter with the coefficients printed in ITU-R BS.1770-5 Annex 1, gates written in Python.
import { describe, expect, it } from 'vitest'
import { integratedLoudness, momentaryLoudness, shortTermLoudness } from '../../src/signal/loudness.ts'
import { createRandom } from '../../src/signal/random.ts'
import { itIsMadeAgain, reference } from './reference.ts'

const made = reference<{
  seed: number
  parts: [gain: number, seconds: number][]
  integrated: number
  blocks: [all: number, loud: number, gated: number]
  momentary: number[]
  shortTerm: number[]
}>('loudness_scipy')

const RATE = 48000
const gain = made.parts.flatMap(([g, seconds]) => Array.from({ length: Math.round(seconds * RATE) }, () => g))
const random = createRandom(made.seed)
const channel = (scale: number) => Float64Array.from(gain, (g) => (2 * random() - 1) * g * scale)
const programme = [channel(1), channel(0.5)]

// The printed coefficients are rounded at the 14th place; the high-pass has poles at 0.995, so that is 1e-9 LU here.
const LU = 1e-8

describe('loudness of a programme on which both gates act', () => {
  it('the reference does gate', () => {
    const [all, loud, gated] = made.blocks
    expect(all).toBeGreaterThan(loud)
    expect(loud).toBeGreaterThan(gated)
  })

  it('integrated', () => {
    expect(Math.abs(integratedLoudness(programme, RATE) - made.integrated)).toBeLessThan(LU)
  })

  it('momentary and short-term, window by window', () => {
    const momentary = momentaryLoudness(programme, RATE)
    const shortTerm = shortTermLoudness(programme, RATE)
    expect([momentary.length, shortTerm.length]).toEqual([made.momentary.length, made.shortTerm.length])
    made.momentary.forEach((lufs, i) => {
      expect(Math.abs((momentary[i] as number) - lufs)).toBeLessThan(LU)
    })
    made.shortTerm.forEach((lufs, i) => {
      expect(Math.abs((shortTerm[i] as number) - lufs)).toBeLessThan(LU)
    })
  })
})

itIsMadeAgain('loudness_scipy')
