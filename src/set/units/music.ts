// Musical ways of writing a time or a frequency: a note, a fraction of a whole note or a number of beats or bars at a tempo.
// Common practice, no source: A4 = 440 Hz, equal temperament, a whole note is four beats, and so is a bar.
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

const FRACTION = /^(\d{1,3})\s*\/\s*(\d{1,3})\s*(\.|d|dotted|t|triplet)?\s*(?:@\s*(.*))?$/i
/** "3 beats", "1/2 beat", "1.5 bars". */
const COUNT = /^(.*?)\s*(beat|bar)s?\s*(?:@\s*(.*))?$/i
const BEATS_A_BAR = 4

/**
 * Length in s of a fraction of a whole note, "1/8 @ 96" is 1/8 · 240/96, or of beats or bars, "1/2 beat @ 96" is 1/2 · 60/96. Behind a fraction "." or "d" dots it
 * (× 3/2), "t" makes a triplet (× 2/3). The tempo in beats a minute stands behind @ or comes from `tempoBpm`. null when the text is neither.
 */
export function beatSeconds(text: string, tempoBpm: number | undefined): BeatReading | null {
  const length = fractionBeats(text) ?? countedBeats(text)
  if (length === null) return null
  const { beats, written, typed } = length
  if (!(beats > 0 && Number.isFinite(beats)))
    return { reason: 'is no part of a whole note', hint: 'write for example 1/8 @ 96, or 2 beats @ 96' }
  const bpm = typed === undefined ? tempoBpm : tempo(typed)
  const hint = `write for example ${written} @ 96`
  if (bpm === undefined) return { reason: 'needs a tempo in beats a minute', hint }
  if (!(bpm >= 1 && bpm <= 1000)) return { reason: 'has no tempo from 1 to 1000 beats a minute', hint }
  return { seconds: (60 * beats) / bpm }
}

interface Length {
  readonly beats: number
  /** Without its tempo. */
  readonly written: string
  readonly typed: string | undefined
}

function fractionBeats(text: string): Length | null {
  const match = FRACTION.exec(text)
  if (!match) return null
  const [, over, under, alter, typed] = match as unknown as [string, string, string, string | undefined, string | undefined]
  const stretch = alter === undefined ? 1 : /^t/i.test(alter) ? 2 / 3 : 3 / 2
  return { beats: Number(over) === 0 ? 0 : 4 * (Number(over) / Number(under)) * stretch, written: text.replace(/@.*/, '').trim(), typed }
}

function countedBeats(text: string): Length | null {
  const match = COUNT.exec(text)
  if (!match) return null
  const [, count, word, typed] = match as unknown as [string, string, string, string | undefined]
  const reading = count === '' ? null : readNumber(count)
  if (!reading || 'reason' in reading) return null
  const under = /^\/\s*(\d+)$/.exec(reading.rest)
  if (reading.rest !== '' && !under) return null
  const unit = word.toLowerCase() === 'bar' ? BEATS_A_BAR : 1
  return { beats: (decimalValue(reading.decimal) / Number(under?.[1] ?? 1)) * unit, written: text.replace(/@.*/, '').trim(), typed }
}

function tempo(text: string): number {
  const reading = readNumber(text)
  return reading && 'decimal' in reading && /^(bpm)?$/i.test(reading.rest) ? decimalValue(reading.decimal) : Number.NaN
}
