// What sets of each intent usually hold. Nothing is judged by it: a field shows the range as a band and in a note.
import type { Intent } from './types.ts'

export interface UsualRange {
  readonly low: number
  readonly high: number
  readonly source: string
  /** How sure the source is. `read`: the printed table was read; `second-hand`: read in somebody's transcription; `unsettled`: transcriptions disagree; `memory`: the book was not retrieved. */
  readonly mark: 'read' | 'second-hand' | 'unsettled' | 'memory'
}

const PART_2 = 'J. Dattorro, "Effect Design, Part 2: Delay-Line Modulation and Chorus", J. Audio Eng. Soc. 45(10), 1997'
/** Approximate effect delay range, onset to range end, ms. */
const delays = (low: number, high: number): UsualRange => ({ low, high, source: `${PART_2}, Table 7`, mark: 'read' })
/** Knob settings; its feedback stands in a denominator 1 + f z^-N, so its sign is turned for g. */
const gains = (low: number, high: number): UsualRange => ({ low, high, source: `${PART_2}, Table 6`, mark: 'read' })
/** A university laboratory's table of delay-based effects. */
const labDepth = (low: number, high: number, mark: UsualRange['mark'] = 'second-hand'): UsualRange => ({
  low,
  high,
  source: 'table of delay-based effects after U. Zölzer (ed.), DAFX, chapter "Delays", in the transcription of a university laboratory',
  mark,
})
const labRate = labDepth

const RANGES: Readonly<Record<Intent, Readonly<Record<string, UsualRange>>>> = {
  chorus: {
    'line.baseMs': delays(1, 30),
    'sweep.depthMs': labDepth(1, 30),
    // The circuit's chorus has none; its "white" one −0.7071 with the sign of g.
    'loop.feedback': gains(-0.7071, 0),
    'mix.dry': gains(0.7071, 1),
    'mix.wet': gains(0.7071, 1),
  },
  flanger: {
    'line.baseMs': delays(0, 10),
    'sweep.depthMs': labDepth(0, 2),
    // The book's own table is remembered with 0.1 to 1 Hz.
    'sweep.rateHz': labRate(0.1, 5, 'unsettled'),
    'loop.feedback': gains(0, 0.7071),
    'mix.dry': gains(0.7071, 0.7071),
    'mix.wet': gains(0.7071, 0.7071),
  },
  vibrato: {
    'line.baseMs': delays(0, 5),
    'sweep.depthMs': labDepth(0, 3),
    'sweep.rateHz': labRate(0.1, 5),
    'loop.feedback': gains(0, 0),
    'mix.dry': gains(0, 0),
    'mix.wet': gains(1, 1),
  },
  doubler: {
    'line.baseMs': delays(10, 100),
    // Whether 1 or 10 ms is where it starts differs between transcriptions.
    'sweep.depthMs': labDepth(1, 100, 'unsettled'),
    'loop.feedback': gains(0, 0),
    'mix.dry': gains(0.7071, 0.7071),
    'mix.wet': gains(0.7071, 0.7071),
  },
  comb: {
    'line.baseMs': { low: 0, high: 20, source: 'U. Zölzer (ed.), DAFX, 1st ed. 2002, Table 3.1 (resonator)', mark: 'memory' },
  },
  other: {},
}

/** The usual range of a field for an intent, in the field's unit; null where none is known. */
export function usualRange(intent: Intent, path: string): UsualRange | null {
  return RANGES[intent][path] ?? null
}
