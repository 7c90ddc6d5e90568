// The built-in phrases: what an effect is judged on when no recording is at hand. All synthesised here, mono, the same samples each time.
import { setLevel } from './circular.ts'
import { drumBar } from './drums.ts'
import { PHRASES, type PhraseId } from './phraseList.ts'
import { heldChord, impulses, pinkNoise } from './steady.ts'
import { bassLine, pluckedChords, pluckedChordsSteps } from './stringPhrases.ts'
import { DEFAULT_TONE, type ToneOptions, tone } from './tone.ts'

export const MIN_PHRASE_RATE = 8000
export const MAX_PHRASE_RATE = 192_000

// −20 dBFS rms leaves a resonance 14 dB before it clips; −6.1 dB caps what is mostly attack.
const LEVEL = { targetRms: 0.1, maxPeak: 0.495 }

/**
 * A phrase as mono samples at `sampleRate` Hz, in [{@link MIN_PHRASE_RATE}, {@link MAX_PHRASE_RATE}]. The whole array repeats without a seam: what sounds at its end is laid over
 * its beginning. 4 to 8 s; −20 dBFS rms or less where the peak would pass −6 dBFS (impulses: 0.5; tone: as `options` say). Takes 10 to 300 ms at 48 kHz. RangeError outside the ranges.
 */
export function phrase(id: PhraseId, sampleRate: number, options: { readonly tone?: ToneOptions } = {}): Float64Array {
  checkRate(sampleRate)
  switch (id) {
    case 'pluckedChords':
      return setLevel(pluckedChords(sampleRate), LEVEL)
    case 'bassLine':
      return setLevel(bassLine(sampleRate), LEVEL)
    case 'drumBar':
      return setLevel(drumBar(sampleRate), LEVEL)
    case 'heldChord':
      return setLevel(heldChord(sampleRate), LEVEL)
    case 'noise':
      return setLevel(pinkNoise(sampleRate), LEVEL)
    case 'impulse':
      return impulses(sampleRate)
    case 'tone':
      return tone(sampleRate, options.tone ?? DEFAULT_TONE)
    default:
      throw new RangeError(`phrase must be one of ${PHRASES.map((p) => p.id).join(', ')}, got ${id}`)
  }
}

/** The plucked chords, the same samples as the phrase, made in steps of less than a millisecond; yields the part done. RangeError for a rate outside. */
export function* pluckedChordsPhraseSteps(sampleRate: number): Generator<number, Float64Array> {
  checkRate(sampleRate)
  return setLevel(yield* pluckedChordsSteps(sampleRate), LEVEL)
}

function checkRate(sampleRate: number): void {
  if (!(sampleRate >= MIN_PHRASE_RATE && sampleRate <= MAX_PHRASE_RATE)) {
    throw new RangeError(`sampleRate must be ${MIN_PHRASE_RATE} to ${MAX_PHRASE_RATE} Hz, got ${sampleRate}`)
  }
}
