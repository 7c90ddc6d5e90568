import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { formatQuantity, parseQuantity } from '../../src/set/units.ts'

const value = (text: string, unit: string, context = {}) => {
  const result = parseQuantity(text, unit, context)
  if (!result.ok) throw new Error(result.problems[0]?.message)
  return result.value
}
const refusal = (text: string, unit: string, context = {}) => {
  const result = parseQuantity(text, unit, context)
  if (result.ok) throw new Error(`read as ${result.value}`)
  const [problem] = result.problems
  return `${problem?.message}; ${problem?.hint}`
}

describe('quantities as typed', () => {
  it.each([
    // SI prefixes: the SI brochure (BIPM), 9th edition, table 7.
    ['2.5ms', 'ms', 2.5],
    ['2.5 ms', 'ms', 2.5],
    ['2.5', 'ms', 2.5],
    ['2,5 ms', 'ms', 2.5],
    ['.5', 'ms', 0.5],
    ['5.', 'ms', 5],
    ['2 s', 'ms', 2000],
    ['400us', 'ms', 0.4],
    ['400 µs', 'ms', 0.4],
    ['400 μs', 'ms', 0.4],
    ['1.1 s', 'ms', 1100],
    ['250 ms', 's', 0.25],
    ['1.2k', 'Hz', 1200],
    ['6.5 kHz', 'Hz', 6500],
    ['96 MHz', 'Hz', 96e6],
    ['400 mHz', 'Hz', 0.4],
    ['90 bpm', 'Hz', 1.5],
    ['-6 dB', 'dB', -6],
    ['−6 dB', 'dB', -6],
    ['+6', 'dB', 6],
    ['- 6', 'dB', -6],
    ['50 %', '', 0.5],
    ['50%', '', 0.5],
    ['-0.7', '', -0.7],
    ['1/4', '', 0.25],
    ['20 dB', '', 10],
    ['90°', '°', 90],
    ['−90 deg', '°', -90],
    ['7 st', 'octaves', 7 / 12],
    ['1 oct', 'octaves', 1],
    ['50 ct', 'cents', 50],
    ['64 KiB', 'B', 65536],
    ['64 kB', 'B', 64000],
    ['16', 'samples', 16],
    ['16 samples', 'samples', 16],
    ['12 000', 'Hz', 12000],
    ['12\u2009000.5', 'Hz', 12000.5],
    ['1e3', 'Hz', 1000],
    ['1e−3 Hz', 'Hz', 0.001],
    ['0,125', 'ms', 0.125],
    ['  7  ', 'ms', 7],
  ])('%s in %s is %d', (text, unit, expected) => {
    expect(value(text, unit)).toBe(expected)
  })

  it.each([
    // A whole note is four beats (common practice): at 96 beats a minute it lasts 2.5 s.
    ['1/8 @ 96', 'ms', 312.5],
    ['1/4@120', 'ms', 500],
    ['1/8. @ 96', 'ms', 468.75],
    ['1/4t @ 120', 'ms', 1000 / 3],
    ['1/8 @ 96 bpm', 'ms', 312.5],
    ['1/8 @ 96', 'Hz', 3.2],
    ['1/1 @ 96', 'Hz', 0.4],
    // FACTS 11, derived: f = bpm/60/beats; 120 beats a minute: 1 beat 2 Hz, 4 beats (a bar of 4/4) 0.5 Hz, 8 beats 0.25 Hz.
    ['1 beat @ 120', 'Hz', 2],
    ['4 beats @ 120', 'Hz', 0.5],
    ['1 bar @ 120', 'Hz', 0.5],
    ['2 bars @ 120', 'Hz', 0.25],
    ['8 Beats @ 120 bpm', 'Hz', 0.25],
    ['1/2 beat @ 120', 'Hz', 4],
    ['1,5 beats @ 120', 'Hz', 4 / 3],
    // Quarter 60000/bpm ms, eighth half of it, dotted × 1.5, triplet × 2/3.
    ['1/4 @ 100', 'ms', 600],
    ['1/8 dotted @ 100', 'ms', 450],
    ['1/8 triplet @ 100', 'ms', 200],
    ['1 beat @ 100', 'ms', 600],
    // ISO 16: A4 is 440 Hz. Others: equal temperament, as printed in tables of note frequencies to two decimals.
    ['A4', 'Hz', 440],
    ['A3', 'Hz', 220],
    ['a3', 'Hz', 220],
    ['C4', 'Hz', 261.63],
    ['Bb3', 'Hz', 233.08],
    ['B♭3', 'Hz', 233.08],
    ['F#4', 'Hz', 369.99],
    ['F♯4', 'Hz', 369.99],
    ['E2', 'Hz', 82.41],
    ['A-1', 'Hz', 13.75],
    ['A4+100ct', 'Hz', 466.16],
    ['A4 − 100 ct', 'Hz', 415.3],
    ['A3', 'ms', 1000 / 220],
  ])('%s in %s is %d, musically', (text, unit, expected) => {
    expect(value(text, unit)).toBeCloseTo(expected, expected > 1000 ? 1 : 2)
  })

  it('takes the tempo of the page when the beat names none', () => {
    expect(value('1/4', 'ms', { tempoBpm: 60 })).toBe(1000)
    expect(value('1/4 @ 120', 'ms', { tempoBpm: 60 })).toBe(500)
    expect(value('2 bars', 'Hz', { tempoBpm: 120 })).toBe(0.25)
    expect(value('1/8 dotted', 'ms', { tempoBpm: 100 })).toBe(450)
  })

  it('reads samples as a time when the rate is known', () => {
    expect(value('48 samples', 'ms', { sampleRate: 48000 })).toBe(1)
    expect(refusal('48 samples', 'ms')).toContain('where a time in ms is wanted')
  })

  it.each([
    ['', 'ms', 'is empty'],
    ['abc', 'ms', 'is no number'],
    ['3 kHz', 'ms', 'is a frequency, where a time in ms is wanted'],
    ['3 ms', 'Hz', 'is a time, where a frequency in Hz is wanted'],
    ['3 Hz', 'dB', 'is a frequency, where a level in dB is wanted'],
    ['A3', 'dB', 'is a note, where a level in dB is wanted'],
    ['1/8 @ 96', '°', 'is a part of a whole note, where an angle in degrees is wanted'],
    ['3 parsec', 'ms', 'has the unknown unit "parsec"; known here are s, ms, us, ns'],
    ['1/8', 'ms', 'needs a tempo in beats a minute; write for example 1/8 @ 96'],
    ['1/8 @ fast', 'ms', 'has no tempo from 1 to 1000'],
    ['1/0 @ 96', 'ms', 'is no part of a whole note'],
    ['0 beats @ 96', 'Hz', 'is no part of a whole note'],
    ['2 bars', 'Hz', 'needs a tempo in beats a minute; write for example 2 bars @ 96'],
    ['many beats', 'ms', 'is no number'],
    ['1 beat', 'dB', 'is a part of a whole note, where a level in dB is wanted'],
    ['3 mhz', 'Hz', 'write MHz for millions, mHz for thousandths'],
    ['64k', 'B', 'write KiB or MiB for powers of 1024'],
    ['1,000', 'Hz', 'could mean 1.000 or 1000'],
    ['1,000.5', 'Hz', 'has more than one decimal sign'],
    ['1.2.3', 'Hz', 'has more than one decimal sign'],
    ['1e999', 'Hz', 'is no finite number'],
    ['1e99999', 'Hz', 'is no finite number'],
    ['1/0', '', 'is no finite number'],
    ['NaN', 'ms', 'is no number'],
    ['Infinity', 'ms', 'is no number'],
    ['0x10', 'ms', 'has the unknown unit "x10"'],
    ['constructor', 'ms', 'is no number'],
    ['3 constructor', 'ms', 'has the unknown unit "constructor"'],
    ['3 __proto__', 'ms', 'has the unknown unit "__proto__"'],
  ])('%s in %s is refused: %s', (text, unit, reason) => {
    expect(refusal(text, unit)).toContain(reason)
  })

  it('shifts decimals by a power of ten without rounding: n s is 1000 n ms for every typed decimal', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 999999 }), fc.integer({ min: 0, max: 6 }), (digits, places) => {
        const text = `${(digits / 10 ** places).toFixed(places)}`
        expect(value(`${text} s`, 'ms')).toBe(Number(`${text}e3`))
      }),
    )
  })

  it('never throws and never gives a number that is not finite, whatever is typed', () => {
    const typed = fc.oneof(fc.string(), fc.stringMatching(/^[-−+]?[0-9.,eE ]{0,8} ?[a-zA-Z°%µ/@#]{0,5}[0-9.]{0,4}$/))
    fc.assert(
      fc.property(typed, fc.constantFrom('ms', 's', 'Hz', 'dB', '°', 'octaves', 'cents', 'B', 'samples', 'frames', ''), (text, unit) => {
        const result = parseQuantity(text, unit)
        if (result.ok) expect(Number.isFinite(result.value)).toBe(true)
        else expect(result.problems[0]?.hint).toBeTruthy()
      }),
      { numRuns: 2000 },
    )
  })

  it('throws for a unit no quantity has', () => {
    expect(() => parseQuantity('1', 'furlong')).toThrow(RangeError)
    expect(() => parseQuantity('1', 'toString')).toThrow(RangeError)
  })
})

describe('quantities as printed', () => {
  it.each([
    [0.7071, '', '0.7071'],
    [-0.7071, '', '−0.7071'],
    [2.5, 'ms', '2.5'],
    [12, 'ms', '12'],
    [3.333333, 'ms', '3.333'],
    [0.0123456, 'ms', '0.01235'],
    [1234.5678, 'Hz', '1\u2009235'],
    [9999, 'Hz', '9\u2009999'],
    [999, 'Hz', '999'],
    [12345.678, 'Hz', '12\u2009346'],
    [96000000, 'Hz', '96\u2009000\u2009000'],
    [262144, 'B', '262\u2009144'],
    [-6.0206, 'dB', '−6.02'],
    [-0.001, 'dB', '0'],
    [90, '°', '90'],
    [5.4321, 'cents', '5.4'],
    [0, 'ms', '0'],
    [-0, 'ms', '0'],
    [1e-9, '', '1e−9'],
  ])('%d %s reads %s', (number, unit, text) => {
    expect(formatQuantity(number, unit)).toEqual({ number: text, unit })
  })

  it('what it prints is read back within half a unit of its last digit', () => {
    fc.assert(
      fc.property(fc.double({ min: -1e9, max: 1e9, noNaN: true }), fc.constantFrom('ms', 'Hz', '', 'octaves', 's'), (number, unit) => {
        const { number: text } = formatQuantity(number, unit)
        const back = value(`${text} ${unit}`, unit)
        // Four significant digits, or whole numbers.
        expect(Math.abs(back - number)).toBeLessThanOrEqual(
          Math.max(0.5000001, Math.abs(number)) * 0.0005001 + (Math.abs(number) >= 1000 ? 0.5000001 : 0),
        )
      }),
      { numRuns: 1000 },
    )
  })

  it('refuses what is not finite', () => {
    expect(() => formatQuantity(Number.NaN, 'ms')).toThrow(RangeError)
    expect(() => formatQuantity(Number.POSITIVE_INFINITY, 'ms')).toThrow(RangeError)
  })
})
