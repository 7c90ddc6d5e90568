// The response as a table to read and as numbers for a file.
import type { Reach } from '../../workers/analysisJobs/reach.ts'
import type { Trace } from '../../workers/analysisJobs/trace.ts'
import { columnPoints, partOf } from '../columns.ts'
import type { PlotNumbers, PlotTable } from '../plotTypes.ts'
import { decibel, decimal, hertz, noteWords } from '../words.ts'

/** Third-octave centres, 20 Hz to 20 kHz (preferred numbers R10 of ISO 3, as IEC 61260 names its bands). */
const THIRDS = [
  20, 25, 31.5, 40, 50, 63, 80, 100, 125, 160, 200, 250, 315, 400, 500, 630, 800, 1000, 1250, 1600, 2000, 2500, 3150, 4000, 5000, 6300,
  8000, 10000, 12500, 16000, 20000,
] as const

export function responseTable(trace: Trace, reach: Reach | null): PlotTable {
  const second = trace.differs
  const head = [
    'Frequency',
    'Note',
    second ? 'First channel' : 'Level',
    ...(second ? ['Second channel'] : []),
    'Least over the sweep',
    'Most over the sweep',
  ]
  const columnOf = (hz: number) =>
    Math.min(trace.columns.count - 1, Math.max(0, Math.floor(partOf(trace.columns, hz) * trace.columns.count)))
  const reached = (values: Float64Array | undefined, hz: number) =>
    values ? decibel(values[Math.min(values.length - 1, columnOf(hz))] as number) : ''
  const level = (channel: number, hz: number) => {
    const { low, high } = trace.channels[channel] ?? {}
    const i = columnOf(hz)
    return low && high ? between(low[i] as number, high[i] as number) : ''
  }
  const row = (hz: number, name: string, own?: string) => [
    name,
    noteWords(hz),
    own ?? level(0, hz),
    ...(second ? [level(1, hz)] : []),
    reached(reach?.low, hz),
    reached(reach?.high, hz),
  ]
  const marks = trace.marks.filter(({ labelled }) => labelled)
  return {
    caption: `Response at sweep position ${decimal(trace.position, 2)}: notches and peaks, then third octaves`,
    head,
    rows: [
      ...marks.map(({ kind, frequencyHz, db }) => row(frequencyHz, `${kind} ${hertz(frequencyHz)} Hz`, decibel(db))),
      ...THIRDS.filter((hz) => hz <= trace.columns.highHz).map((hz) => row(hz, `${decimal(hz, hz === 31.5 ? 1 : 0)} Hz`)),
    ],
  }
}

function between(low: number, high: number): string {
  return high - low < 0.5 ? decibel((low + high) / 2) : `${decibel(low)} to ${decibel(high)}`
}

/** At every point of the trace: both channels, and the sweep's reach of the point's pixel column. */
export function responseNumbers(trace: Trace, reach: Reach | null): PlotNumbers {
  const hz = columnPoints(trace.columns)
  const channels = trace.channels.map(({ db }) => db)
  const names = channels.length === 1 ? ['level_db'] : channels.map((_, c) => `channel_${c + 1}_db`)
  if (!reach) return { head: ['frequency_hz', ...names], columns: [hz, ...channels] }
  const spread = (values: Float64Array) => hz.map((_, i) => values[Math.min(values.length - 1, i >> 1)] as number)
  return {
    head: ['frequency_hz', ...names, 'sweep_least_db', 'sweep_most_db'],
    columns: [hz, ...channels, spread(reach.low), spread(reach.high)],
  }
}
