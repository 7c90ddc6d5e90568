// What the response plot says: under the cursor, at rest, and in one sentence.
import { freeze } from '../../../src/analysis/frozen.ts'
import { transferAt, transferOf } from '../../../src/analysis/transfer.ts'
import type { ParameterSet } from '../../../src/set/types.ts'
import { powerDb } from '../../workers/analysisJobs/powerDb.ts'
import type { Reach } from '../../workers/analysisJobs/reach.ts'
import type { Trace } from '../../workers/analysisJobs/trace.ts'
import type { Under } from '../frequencyPlot.ts'
import { decibel, decimal, hertz, noteWords } from '../words.ts'

/** Level of every channel at one frequency with the sweep held at `position`, dB. */
export function levelsAt(set: ParameterSet, position: number, hz: number): number[] {
  const frozen = freeze(set, position)
  const out = new Float64Array(4 * frozen.channels.length)
  transferAt(transferOf(frozen), (2 * Math.PI * hz) / frozen.sampleRate, out)
  return frozen.channels.map((_, c) => powerDb(out[4 * c] as number, out[4 * c + 1] as number))
}

/** "1 268 Hz · −9.8 dB · D♯6 +33 ct"; two levels where the channels differ. */
export function cursorWords({ set, position, hz }: Pick<Under<'trace'>, 'set' | 'position' | 'hz'>): string {
  const [first = Number.NaN, second] = levelsAt(set, position, hz)
  const other = second !== undefined && Math.abs(second - first) >= 0.05 ? ` · second ${decibel(second)}` : ''
  return `${hertz(hz)} Hz · ${decibel(first)}${other} · ${noteWords(hz)}`
}

/** "notches every 192 Hz", else how many marks there are. */
export function restWords(trace: Trace): string {
  if (trace.spacingHz !== null) return `notches every ${hertz(trace.spacingHz)} Hz`
  const notches = trace.marks.filter(({ kind }) => kind === 'notch')
  const first = notches[0]
  return first ? `first notch ${hertz(first.frequencyHz)} Hz` : 'no notch'
}

export function summaryWords(trace: Trace, reach: Reach | null): string {
  const at = `Response at sweep position ${decimal(trace.position, 2)}`
  const [first] = trace.channels
  const span = first ? `, ${decibel(Math.min(...first.low))} to ${decibel(Math.max(...first.high))}` : ''
  const over = reach ? `; over the sweep ${decibel(Math.min(...reach.low))} to ${decibel(Math.max(...reach.high))}` : ''
  return `${at}: ${restWords(trace)}${span}${over}.`
}
