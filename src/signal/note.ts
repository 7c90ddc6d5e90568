// Frequencies as notes of the equal temperament: A4 = 440 Hz (ISO 16), twelve steps of 100 cents an octave, octaves counted from C (middle C is C4).

export interface NearestNote {
  /** C, C♯ … B. */
  readonly name: string
  readonly octave: number
  /** How far `hz` lies above the note, in [−50, 50). */
  readonly cents: number
  /** The note's own frequency in Hz. */
  readonly noteHz: number
}

const NAMES = ['C', 'C♯', 'D', 'D♯', 'E', 'F', 'F♯', 'G', 'G♯', 'A', 'A♯', 'B'] as const
const A4_HZ = 440
// Half steps from C4 up to A4.
const A4_STEP = 9

/** The nearest note to a frequency: step = 12 log2(hz/440). hz > 0 and finite, RangeError otherwise. */
export function nearestNote(hz: number): NearestNote {
  if (!(hz > 0 && hz < Number.POSITIVE_INFINITY)) throw new RangeError(`hz must be above 0 and finite, got ${hz}`)
  const exact = 12 * Math.log2(hz / A4_HZ)
  const step = Math.floor(exact + 0.5)
  const fromC4 = step + A4_STEP
  return {
    name: NAMES[((fromC4 % 12) + 12) % 12] as string,
    octave: 4 + Math.floor(fromC4 / 12),
    cents: 100 * (exact - step),
    noteHz: A4_HZ * 2 ** (step / 12),
  }
}
