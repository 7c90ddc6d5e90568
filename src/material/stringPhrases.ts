// Two phrases on plucked strings: strummed chords and a bass line. The progressions are our own.
// Keys count half steps, 69 is A4 = 440 Hz.
import { type PluckedString, pluck, pluckSteps } from './string.ts'

const keyHz = (key: number) => 440 * 2 ** ((key - 69) / 12)

const CHORD_SECONDS = 1.5
const STRUM_SECONDS = 0.018
const UPSTROKE_AT = 0.94
/** A minor seventh, F major ninth, D minor ninth, E suspended: five strings each, lowest first. */
const CHORDS = [
  [45, 52, 55, 60, 64],
  [41, 48, 55, 57, 64],
  [50, 57, 60, 64, 65],
  [40, 47, 52, 57, 62],
] as const
const CHORD_STRING: Omit<PluckedString, 'hz' | 'heldSeconds'> = { amplitude: 1, pluckAt: 0.13, stiffness: 4e-5, loss: 1.1, highLoss: 6e-7 }

/** Four strummed chords of 1.5 s, each answered by an upstroke of its three highest strings: attacks, decays and a wide spectrum. 6 s. */
export function pluckedChords(sampleRate: number): Float64Array {
  const steps = pluckedChordsSteps(sampleRate)
  let step = steps.next()
  while (!step.done) step = steps.next()
  return step.value
}

/** The same partial by partial; yields the part done, 0 to 1. */
export function* pluckedChordsSteps(sampleRate: number): Generator<number, Float64Array> {
  const circle = new Float64Array(Math.round(CHORDS.length * CHORD_SECONDS * sampleRate))
  const strings = CHORDS.flatMap((chord, c) => strummed(chord, c * CHORD_SECONDS))
  for (let i = 0; i < strings.length; i++) {
    const { at, string } = strings[i] as Struck
    for (const _ of pluckSteps(circle, sampleRate, Math.round(at * sampleRate), string)) yield i / strings.length
  }
  return circle
}

interface Struck {
  readonly at: number
  readonly string: PluckedString
}

/** The strings of one chord in the order they are struck, from `begin` s. */
function strummed(chord: readonly number[], begin: number): Struck[] {
  return chord.flatMap((key, s) => {
    const at = begin + s * STRUM_SECONDS
    const again = begin + UPSTROKE_AT + (chord.length - 1 - s) * STRUM_SECONDS
    // A string sounds until it is plucked again or the hand moves on.
    const high = s >= 2
    const down = { at, string: { ...CHORD_STRING, hz: keyHz(key), heldSeconds: (high ? again : begin + CHORD_SECONDS) - at } }
    if (!high) return [down]
    const heldSeconds = begin + CHORD_SECONDS - again
    return [down, { at: again, string: { ...CHORD_STRING, amplitude: 0.6, pluckAt: 0.2, hz: keyHz(key), heldSeconds } }]
  })
}

const EIGHTH_SECONDS = 0.3
/** One key an eighth; 0 is a rest. */
const BASS_KEYS = [33, 0, 33, 40, 43, 40, 29, 0, 29, 36, 41, 36, 38, 45, 40, 44] as const
const BASS_STRING: Omit<PluckedString, 'hz' | 'heldSeconds'> = { amplitude: 1, pluckAt: 0.22, stiffness: 2e-5, loss: 1.6, highLoss: 5e-6 }

/** Sixteen eighths on a dull, low string, 44 to 110 Hz: shows what a comb does to a fundamental. 4.8 s. */
export function bassLine(sampleRate: number): Float64Array {
  const circle = new Float64Array(Math.round(BASS_KEYS.length * EIGHTH_SECONDS * sampleRate))
  BASS_KEYS.forEach((key, i) => {
    const held = EIGHTH_SECONDS * 0.92
    if (key > 0) strike(circle, sampleRate, i * EIGHTH_SECONDS, { ...BASS_STRING, hz: keyHz(key), heldSeconds: held })
  })
  return circle
}

function strike(circle: Float64Array, sampleRate: number, seconds: number, string: PluckedString): void {
  pluck(circle, sampleRate, Math.round(seconds * sampleRate), string)
}
