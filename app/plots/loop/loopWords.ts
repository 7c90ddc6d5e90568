// What the loop plot says: under the cursor, at rest, in one sentence, as a table and as numbers.
import type { LoopReach, LoopTrace } from '../../workers/analysisJobs/loop.ts'
import { type Columns, columnPoints, partOf } from '../columns.ts'
import type { PlotNumbers, PlotTable } from '../plotTypes.ts'
import { decibel, decimal, duration, hertz, noteWords, radius } from '../words.ts'

export const NO_LOOP = 'No feedback: nothing comes back into the line,\nso nothing can ring or run away.'

export const ringWords = (seconds: number | null): string => (seconds === null ? 'does not die away' : `rings ${duration(seconds)}`)

/** "4.2 dB below the limit" for the most that any held position reaches. */
export function marginWords({ high }: LoopReach): string {
  const margin = -Math.max(...high)
  if (Math.abs(margin) < 0.05) return 'at the limit'
  return `${decimal(Math.abs(margin), 1)} dB ${margin > 0 ? 'below' : 'above'} the limit`
}

export function loopRestWords({ largest }: LoopTrace, reach: LoopReach | null): string {
  if (largest === null) return 'no feedback'
  const margin = reach && reach.high.length > 0 ? ` · ${marginWords(reach)}` : ''
  return `largest pole ${radius(largest.radius)} · ${ringWords(largest.ringSeconds)}${margin}`
}

export function loopSummary(trace: LoopTrace, reach: LoopReach | null): string {
  if (trace.largest === null) return 'Loop: no feedback, nothing can ring.'
  return `Loop gain at sweep position ${decimal(trace.position, 2)}: ${loopRestWords(trace, reach)}.`
}

const between = (reach: LoopReach | null, i: number): [string, string] =>
  reach && reach.high.length > 0 ? [decibel(reach.low[i] as number), decibel(reach.high[i] as number)] : ['', '']

const columnOf = (columns: Columns, hz: number): number =>
  Math.max(0, Math.min(columns.count - 1, Math.floor(partOf(columns, hz) * columns.count)))

export function loopTable(trace: LoopTrace, reach: LoopReach | null): PlotTable {
  return {
    caption: trace.largest === null ? 'No feedback: no loop gain' : `Poles of the loop at sweep position ${decimal(trace.position, 2)}`,
    head: ['Frequency', 'Note', 'Radius', '60 dB decay', 'Loop gain', 'Least over the sweep', 'Most over the sweep'],
    rows: trace.poles.map(({ frequencyHz, radius: size, ringSeconds, db }) => [
      `${hertz(frequencyHz)} Hz`,
      noteWords(Math.max(1, frequencyHz)),
      radius(size),
      ringSeconds === null ? 'none' : duration(ringSeconds),
      decibel(db),
      ...between(reach, columnOf(trace.columns, frequencyHz)),
    ]),
  }
}

export function loopNumbers(trace: LoopTrace, reach: LoopReach | null): PlotNumbers {
  const hz = columnPoints(trace.columns).filter((_, i) => i % 2 === 1)
  const lines = trace.lines.map((db) => db.filter((_, i) => i % 2 === 1))
  const wash = reach && reach.high.length === hz.length ? [reach.low, reach.high] : []
  return {
    head: [
      'frequency_hz',
      ...lines.map((_, line) => `line_${line + 1}_db`),
      ...(wash.length > 0 ? ['sweep_least_db', 'sweep_most_db'] : []),
    ],
    columns: [hz, ...lines, ...wash],
  }
}

/** "1 268 Hz · −9.8 dB · D♯6 +33 ct"; between the trace's points, half a pixel apart, the loop gain runs straight. */
export function loopCursorWords(trace: LoopTrace | null, hz: number): string {
  if (trace === null) return `${hertz(hz)} Hz`
  const levels = trace.lines.map((db) => levelOf(db, partOf(trace.columns, hz)))
  const [first, second] = levels
  if (first === undefined) return 'no feedback'
  const other = second !== undefined && Math.abs(second - first) >= 0.05 ? ` · second ${decibel(second)}` : ''
  return `${hertz(hz)} Hz · ${decibel(first)}${other} · ${noteWords(hz)}`
}

function levelOf(db: Float64Array, part: number): number {
  const at = Math.max(0, Math.min(db.length - 1, part * (db.length - 1)))
  const i = Math.min(db.length - 2, Math.floor(at))
  return (db[i] as number) + ((db[i + 1] as number) - (db[i] as number)) * (at - i)
}
