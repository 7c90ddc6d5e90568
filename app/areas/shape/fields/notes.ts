// What follows from a field's value, in up to two lines beneath it. Pure: a set (and the tempo) in, sentences out.
import { highPassHalfPowerHz, lowPassHalfPowerHz } from '../../../../src/dsp/filters.ts'
import { delayRange, voiceOffsetMs } from '../../../../src/set/delayRange.ts'
import { getAt } from '../../../../src/set/path.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'
import { showIn, showNumber } from '../../../fields/quantity.ts'
import { detuneOf } from './detuneOf.ts'
import { ringNote } from './ringNote.ts'
import { shortNumber, unusualNote, usualWords } from './usualNote.ts'

export interface NoteContext {
  readonly tempoBpm: number
}

type Note = (set: ParameterSet, context: NoteContext) => readonly string[]

/** Lines for the field at a path; none where nothing follows. Where its value is unusual for the intent, the last says so. */
export function fieldNotes(path: string, set: ParameterSet, context: NoteContext): readonly string[] {
  const notes = NOTES[path]?.(set, context) ?? []
  const unusual = unusualNote(path, set)
  return unusual === null ? notes : [...notes, unusual]
}

const usual = (path: string): Note => {
  return (set) => {
    const words = unusualNote(path, set) === null ? usualWords(path, set) : null
    return words === null ? [] : [words]
  }
}

const NOTES: Readonly<Record<string, Note>> = {
  sampleRate: ({ sampleRate }) => [`a sample every ${showIn(1e6 / sampleRate, 'µs')}`],
  'input.gainDb': gainNote('input.gainDb'),
  'line.baseMs': usual('line.baseMs'),
  'sweep.depthMs': (set) => [sweptRange(set)],
  'sweep.depthOctaves': (set) => [sweptRange(set)],
  'sweep.rateHz': ({ sweep }, { tempoBpm }) => {
    if (sweep.rateHz === 0) return ['stands still at the start position']
    const seconds = threeDigits(1 / sweep.rateHz)
    return [
      `a cycle in ${seconds < 1 ? showIn(1000 * seconds, 'ms') : showIn(seconds, 's')} · ${beats(tempoBpm / 60 / sweep.rateHz)} at ${tempoBpm}`,
    ]
  },
  'sweep.stereoPhase': ({ sweep }) => [
    sweep.stereoPhase === 0
      ? 'both channels together'
      : `right is ${part(Math.abs(sweep.stereoPhase) / 360)} ${sweep.stereoPhase > 0 ? 'ahead' : 'behind'}`,
  ],
  'sweep.edgeMs': ({ sweep }) => {
    const edge = Math.min((sweep.edgeMs * sweep.rateHz) / 1000, 0.5)
    return [edge === 0 ? 'jumps at once' : `${percent(edge)} of the cycle an edge`]
  },
  'sweep.updateEvery': ({ sweep, sampleRate }) => [`every ${roundedMs((1000 * sweep.updateEvery) / sampleRate)} ms`],
  'voices.phaseSpread': ({ voices }) =>
    voices.count === 1 ? ['one voice: nothing to spread'] : [`voices ${showNumber(voices.phaseSpread / voices.count, DEGREES)}° apart`],
  'voices.spreadMs': (set) => {
    const { count } = set.voices
    if (count === 1) return ['one voice: nothing to spread']
    const at = (v: number) => roundedMs(set.line.baseMs + voiceOffsetMs(set.voices, v))
    return [`middles from ${at(0)} to ${at(count - 1)} ms`]
  },
  'loop.feedback': (set) => [ringNote(set), ...usual('loop.feedback')(set, { tempoBpm: 0 })],
  'loop.dampingHz': lowPassNote('loop.dampingHz'),
  'loop.lowCutHz': highPassNote('loop.lowCutHz'),
  'loop.crossFeed': ({ loop }) => [`${percent(loop.crossFeed)} of each loop goes to the other line`],
  'mix.dry': linearNote('mix.dry'),
  'mix.wet': linearNote('mix.wet'),
  'mix.dryDelayMs': ({ mix, sampleRate }) => {
    const samples = Math.floor((mix.dryDelayMs * sampleRate) / 1000 + 0.5)
    return [`${samples} whole ${samples === 1 ? 'sample' : 'samples'}`]
  },
  'mix.wetLowCutHz': highPassNote('mix.wetLowCutHz'),
  'mix.wetHighCutHz': lowPassNote('mix.wetHighCutHz'),
  'mix.outputGainDb': gainNote('mix.outputGainDb'),
}

const DEGREES = { kind: 'number', unit: '°' } as const
const number = (value: number, unit: string) => showNumber(value, { kind: 'number', unit })
/** Two decimals from a tenth of a millisecond up, four below. */
const roundedMs = (ms: number) => number(Number(ms.toFixed(Math.abs(ms) < 0.1 ? 4 : 2)), 'ms')
const percent = (share: number) => `${shortNumber(Number((100 * share).toPrecision(2)))} %`

function gainNote(path: string): Note {
  return (set) => [`× ${number(10 ** ((getAt(set, path) as number) / 20), '')}`]
}

function linearNote(path: string): Note {
  return (set) => {
    const value = getAt(set, path) as number
    const level = value === 0 ? 'silent' : `${showIn(20 * Math.log10(Math.abs(value)), 'dB')}${value < 0 ? ', inverted' : ''}`
    return [[level, ...usual(path)(set, { tempoBpm: 0 })].join(' · ')]
  }
}

function lowPassNote(path: string): Note {
  return (set) => {
    const hz = getAt(set, path) as number | null
    if (hz === null) return []
    const true3 = lowPassHalfPowerHz(hz, set.sampleRate)
    return [true3 === null ? 'falls less than 3 dB up to half the rate' : `true −3 dB point ${showIn(true3, 'Hz')}`]
  }
}

function highPassNote(path: string): Note {
  return (set) => {
    const hz = getAt(set, path) as number | null
    return hz === null ? [] : [`true −3 dB point ${showIn(highPassHalfPowerHz(hz, set.sampleRate), 'Hz')}`]
  }
}

function sweptRange(set: ParameterSet): string {
  const { voices } = delayRange(set)
  const ms = (samples: number) => roundedMs((samples * 1000) / set.sampleRate)
  return `${ms(voices.minSamples)} to ${ms(voices.maxSamples)} ms`
}

/** "−6.3 to +6.2 cents", of the delay as it is read, edges and update interval included. */
export function widthText(set: ParameterSet): string {
  const { upCents, downCents, motion } = detuneOf(set)
  if (motion !== 'plays' || downCents === null) return motion === 'stalls' ? 'the read stalls' : 'the read runs backwards'
  if (upCents === 0 && downCents === 0) return 'no change of pitch'
  return `${cents(downCents)} to ${cents(upCents)} cents`
}

const cents = (value: number) => `${value > 0 ? '+' : value < 0 ? '−' : ''}${Math.abs(value).toFixed(1)}`

const threeDigits = (value: number) => Number(value.toPrecision(3))
const beats = (count: number) => `${shortNumber(threeDigits(count))} ${count === 1 ? 'beat' : 'beats'}`

function part(cycles: number): string {
  const named: Readonly<Record<number, string>> = {
    0.25: 'a quarter cycle',
    0.5: 'half a cycle',
    0.75: 'three quarters',
    1: 'a whole cycle',
  }
  return named[cycles] ?? `${shortNumber(cycles)} cycle`
}
