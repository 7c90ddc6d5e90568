// What sets of each intent usually hold. Nothing is judged by it: a field shows the range as a band and in a note.
import type { Intent } from './types.ts'

export interface UsualRange {
  readonly low: number
  readonly high: number
  readonly source: string
  /** The source in the few words that fit beneath a field. */
  readonly cite: string
  /** How sure the source is. `read`: the printed table was read; `second-hand`: read in somebody's transcription; `unsettled`: transcriptions disagree; `memory`: the book was not retrieved. */
  readonly mark: 'read' | 'second-hand' | 'unsettled' | 'memory'
}

const PART_2 = 'J. Dattorro, "Effect Design, Part 2: Delay-Line Modulation and Chorus", J. Audio Eng. Soc. 45(10), 1997'
const part2 =
  (where: string) =>
  (low: number, high: number): UsualRange => ({ low, high, source: `${PART_2}, ${where}`, cite: `Dattorro 1997, ${where}`, mark: 'read' })
/** Approximate effect delay range, onset to range end, ms. */
const delays = part2('Table 7')
/** Knob settings; its feedback stands in a denominator 1 + f z^-N, so its sign is turned for g. */
const gains = part2('Table 6')
/** Its text on effects in stereo. */
const stereo = part2('section 6')
/** A university laboratory's table of delay-based effects. */
const laboratory = (low: number, high: number, mark: UsualRange['mark'] = 'second-hand'): UsualRange => ({
  low,
  high,
  source: 'table of delay-based effects after U. Zölzer (ed.), DAFX, chapter "Delays", in the transcription of a university laboratory',
  cite: 'DAFX, chapter "Delays"',
  mark,
})
/** A resonator: a delay that does not move. */
const resonator = (low: number, high: number): UsualRange => ({
  low,
  high,
  source: 'U. Zölzer (ed.), DAFX, 1st ed. 2002, Table 3.1 (resonator)',
  cite: 'DAFX 2002, Table 3.1',
  mark: 'memory',
})

const RANGES: Readonly<Record<Intent, Readonly<Record<string, UsualRange>>>> = {
  chorus: {
    'line.baseMs': delays(1, 30),
    'sweep.depthMs': laboratory(1, 30),
    // The circuit's chorus has none; its "white" one −0.7071 with the sign of g.
    'loop.feedback': gains(-0.7071, 0),
    'mix.dry': gains(0.7071, 1),
    'mix.wet': gains(0.7071, 1),
  },
  flanger: {
    'line.baseMs': delays(0, 10),
    'sweep.depthMs': laboratory(0, 2),
    // The book's own table is remembered with 0.1 to 1 Hz.
    'sweep.rateHz': laboratory(0.1, 5, 'unsettled'),
    // Apart, the two combs fill each other's notches between the loudspeakers.
    'sweep.stereoPhase': stereo(0, 0),
    'loop.feedback': gains(0, 0.7071),
    'mix.dry': gains(0.7071, 0.7071),
    'mix.wet': gains(0.7071, 0.7071),
  },
  vibrato: {
    'line.baseMs': delays(0, 5),
    'sweep.depthMs': laboratory(0, 3),
    'sweep.rateHz': laboratory(0.1, 5),
    'loop.feedback': gains(0, 0),
    'mix.dry': gains(0, 0),
    'mix.wet': gains(1, 1),
  },
  doubler: {
    'line.baseMs': delays(10, 100),
    // Whether 1 or 10 ms is where it starts differs between transcriptions.
    'sweep.depthMs': laboratory(1, 100, 'unsettled'),
    'loop.feedback': gains(0, 0),
    'mix.dry': gains(0.7071, 0.7071),
    'mix.wet': gains(0.7071, 0.7071),
  },
  comb: {
    'line.baseMs': resonator(0, 20),
    'sweep.rateHz': resonator(0, 0),
  },
  other: {},
}

/** The usual range of a field for an intent, in the field's unit; null where none is known. */
export function usualRange(intent: Intent, path: string): UsualRange | null {
  return RANGES[intent][path] ?? null
}

/** The mark in plain words. */
export const MARK_WORDS: Readonly<Record<UsualRange['mark'], string>> = {
  read: 'read in the paper',
  'second-hand': 'second-hand',
  unsettled: 'transcriptions disagree',
  memory: 'from memory',
}

/** Part of a bound: settings are printed to one decimal here and to four there, 0.7 is 0.7071. */
const ROUNDING = 0.02

/** Whether a value is outside its usual range by more than rounding. */
export const isUnusual = ({ low, high }: UsualRange, value: number): boolean =>
  value < low - ROUNDING * Math.max(0.1, Math.abs(low)) || value > high + ROUNDING * Math.max(0.1, Math.abs(high))
