// Musical ways of writing a time or a frequency: a note, or a fraction of a whole note at a tempo.
// Common practice, no source: A4 = 440 Hz, equal temperament, a whole note is four beats.
import { decimalValue, readNumber } from './number.ts'

const SEMITONES: Readonly<Record<string, number>> = { C: 0, D: 2, E: 4, F: 5, G: 7, A: 9, B: 11 }
const NOTE = /^([A-Ga-g])([#♯]{0,2}|[b♭]{0,2})([-−]?\d{1,2})\s*(?:([+\-−]\s*\d+(?:[.,]\d+)?)\s*(?:ct|cents?))?$/

/** Frequency in Hz of a note such as "A3", "Bb2", "F♯4", "A3+12ct": 440 · 2^((semitones from A4 + cents/100)/12). null when the text is no note. */
export function noteHz(text: string): number | null {
  const match = NOTE.exec(text)
  if (!match) return null
  const [, letter, accidentals, octave, cents] = match as unknown as [string, string, string, string, string | undefined]
  const sharp = /[#♯]/.test(accidentals) ? accidentals.length : -accidentals.length
  const semitones = (SEMITONES[letter.toUpperCase()] as number) + sharp + 12 * (signed(octave) - 4) - 9
  return 440 * 2 ** ((semitones + (cents === undefined ? 0 : signed(cents)) / 100) / 12)
}

const signed = (text: string): number => Number(text.replace('−', '-').replace(',', '.').replace(/\s/g, ''))

export type BeatReading = { readonly seconds: number } | { readonly reason: string; readonly hint: string }

const FRACTION = /^(\d{1,3})\s*\/\s*(\d{1,3})\s*(\.|d|t)?\s*(?:@\s*(.*))?$/

/**
 * Length in s of a fraction of a whole note: "1/8 @ 96" is 1/8 · 240/96. Behind the fraction "." or "d" dots it (× 3/2), "t" makes a triplet (× 2/3).
 * The tempo in beats a minute stands behind @ or comes from `tempoBpm`. null when the text is no fraction.
 */
export function beatSeconds(text: string, tempoBpm: number | undefined): BeatReading | null {
  const match = FRACTION.exec(text)
  if (!match) return null
  const [, over, under, alter, typed] = match as unknown as [string, string, string, string | undefined, string | undefined]
  if (Number(over) === 0 || Number(under) === 0) return { reason: 'is no part of a whole note', hint: 'write for example 1/8 @ 96' }
  const bpm = typed === undefined ? tempoBpm : tempo(typed)
  if (bpm === undefined) return { reason: 'needs a tempo in beats a minute', hint: `write for example ${over}/${under} @ 96` }
  if (!(bpm >= 1 && bpm <= 1000))
    return { reason: 'has no tempo from 1 to 1000 beats a minute', hint: `write for example ${over}/${under} @ 96` }
  const stretch = alter === undefined ? 1 : alter === 't' ? 2 / 3 : 3 / 2
  return { seconds: (((Number(over) / Number(under)) * 240) / bpm) * stretch }
}

function tempo(text: string): number {
  const reading = readNumber(text)
  return reading && 'decimal' in reading && /^(bpm)?$/i.test(reading.rest) ? decimalValue(reading.decimal) : Number.NaN
}
