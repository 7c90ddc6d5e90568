import { describe, expect, it } from 'vitest'
import { cents, decibel, decimal, duration, hertz, milliseconds, noteWords, radius } from '../../../app/plots/words.ts'

describe('numbers on plots', () => {
  it.each([
    [decimal(1268.4, 0), '1\u2009268'],
    [decimal(-9.84, 1), '\u22129.8'],
    [decimal(6, 0, true), '+6'],
    [decimal(-0.04, 1), '0.0'],
    [decimal(1234567.5, 1), '1\u2009234\u2009567.5'],
  ])('%s has a real minus sign and thin spaces', (text, wanted) => {
    expect(text).toBe(wanted)
  })

  it('a frequency has about four digits', () => {
    expect([hertz(96.83), hertz(482.3), hertz(12957.2)]).toEqual(['96.8', '482', '12\u2009957'])
  })

  it('a level is signed; a null says that it is below what counts', () => {
    expect([decibel(-9.84), decibel(3), decibel(-400)]).toEqual(['\u22129.8 dB', '+3.0 dB', 'below \u2212200 dB'])
  })

  // Oracle: equal temperament, A4 = 440 Hz (ISO 16): D♯6 = 440 · 2^(18/12) = 1244.51 Hz, 1268 Hz lies 32.4 cents above.
  it('a frequency reads as its nearest note and cents', () => {
    expect(noteWords(1268)).toBe('D♯6 +32 ct')
    expect(noteWords(440)).toBe('A4 0 ct')
    expect(noteWords(435)).toBe('A4 \u221220 ct')
  })

  it('times and cents keep the digits that mean something', () => {
    expect([milliseconds(5.2149), milliseconds(0.0521), milliseconds(140.24)]).toEqual(['5.21 ms', '0.052 ms', '140.2 ms'])
    expect([duration(0.0083), duration(0.42), duration(12.34)]).toEqual(['8.3 ms', '0.42 s', '12.3 s'])
    expect([cents(4.52), cents(-171.4)]).toEqual(['+4.5 cents', '\u2212171 cents'])
  })

  it('a pole radius shows how far it is from 1', () => {
    expect([radius(0.9980895), radius(0.99998345), radius(0.5), radius(1), radius(1.000412)]).toEqual([
      '0.9981',
      '0.999983',
      '0.500',
      '1.000',
      '1.00041',
    ])
  })
})
