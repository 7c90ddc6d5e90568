// The one table of limits. `holds` inside the limit, `near` within the margin of it, `outside` beyond it.
// A set's own `limits` replaces the limit by id; the margin stays.
import { CHECK_IDS, type CheckId, type LimitableId } from '../set/checkIds.ts'
import type { ParameterSet } from '../set/types.ts'
import type { Status } from './types.ts'

export type { CheckId } from '../set/checkIds.ts'

export interface LimitRow {
  readonly id: CheckId
  readonly label: string
  readonly unit: string
  /** `atMost`: beyond means above the limit. `atLeast`: beyond means at or below it. `none`: a value, or a word with its own rule. */
  readonly sense: 'atMost' | 'atLeast' | 'none'
  /** In `unit`; null where there is none. Some depend on the set (intent, number format, headroom). */
  readonly limit: number | null | ((set: ParameterSet) => number)
  /** Distance from the limit, on its good side, inside which the status is `near`. */
  readonly margin: number | ((set: ParameterSet) => number)
  /** Status beyond the limit. */
  readonly outside: 'fails' | 'near' | 'note'
  readonly source: string
}

/** A check that a set may limit has a sense, the others have none: what set validation refuses and what is judged cannot disagree. */
type Rows = {
  readonly [Id in CheckId]: Omit<LimitRow, 'id' | 'sense'> & { readonly sense: Id extends LimitableId ? 'atMost' | 'atLeast' : 'none' }
}

const q15 = (set: ParameterSet): boolean => set.target.numberFormat === 'q15'
const practice = 'common practice, no source'
const ours = 'this project’s choice'

const ROWS: Rows = {
  'loop.stability': {
    label: 'Stability under the sweep',
    unit: '',
    sense: 'none',
    limit: null,
    margin: 0,
    outside: 'fails',
    source: 'small-gain theorem; frozen poles alone prove nothing about a moving delay',
  },
  'loop.margin': {
    label: 'Loop gain margin',
    unit: 'dB',
    sense: 'atLeast',
    limit: 0,
    margin: 0.5,
    outside: 'fails',
    source: `0 dB: small-gain theorem; margin: ${ours}`,
  },
  'loop.poles': {
    label: 'Largest pole radius',
    unit: '',
    sense: 'none',
    limit: null,
    margin: 0,
    outside: 'note',
    source: 'a value, not judged',
  },
  'loop.ring': { label: 'Longest ring', unit: 's', sense: 'atMost', limit: 3, margin: 0, outside: 'near', source: practice },
  'response.extremes': {
    label: 'Notches and peaks',
    unit: 'Hz',
    sense: 'none',
    limit: null,
    margin: 0,
    outside: 'note',
    source: 'values, not judged',
  },
  'sweep.range': {
    label: 'Delay range',
    unit: 'ms',
    sense: 'none',
    limit: null,
    margin: 1,
    outside: 'fails',
    source: 'smallest delay of each interpolator, from its points; margin 1 sample',
  },
  'sweep.detune': {
    label: 'Largest detune',
    unit: 'cents',
    sense: 'atMost',
    limit: (set) => (set.intent === 'vibrato' ? 150 : 50),
    margin: 0,
    outside: 'near',
    source: practice,
  },
  'sweep.fusion': { label: 'Longest delay', unit: 'ms', sense: 'atMost', limit: 50, margin: 0, outside: 'note', source: practice },
  'sweep.steps': {
    label: 'Stepping artefacts',
    unit: 'dB',
    sense: 'atMost',
    limit: -40,
    margin: 20,
    outside: 'fails',
    source: practice,
  },
  'tone.droop': {
    label: 'Interpolation loss',
    unit: 'dB',
    sense: 'none',
    limit: null,
    margin: 0,
    outside: 'note',
    source: 'a value, not judged',
  },
  'level.peak': {
    label: 'Worst gain at the output',
    unit: 'dB',
    sense: 'atMost',
    limit: (set) => set.target.headroomDb,
    margin: 1,
    outside: 'fails',
    source: 'the set’s target.headroomDb',
  },
  'level.line': {
    label: 'Worst gain in the line',
    unit: 'dB',
    sense: 'atMost',
    limit: (set) => set.target.headroomDb,
    margin: 1,
    outside: 'fails',
    source: 'the set’s target.headroomDb',
  },
  'level.dc': { label: 'DC left', unit: 'dBFS', sense: 'atMost', limit: -40, margin: 20, outside: 'fails', source: practice },
  'level.loudness': {
    label: 'Loudness against bypass',
    unit: 'LU',
    sense: 'none',
    limit: null,
    margin: 0,
    outside: 'note',
    source: 'ITU-R BS.1770; not judged',
  },
  'level.mono': {
    label: 'Loss in the mono sum',
    unit: 'dB',
    sense: 'atMost',
    limit: 20,
    margin: 14,
    outside: 'fails',
    source: practice,
  },
  'shaper.harmonics': {
    label: 'Harmonics of the shapers',
    unit: 'dB',
    sense: 'none',
    limit: null,
    margin: 0,
    outside: 'note',
    source: 'values, not judged',
  },
  'shaper.alias': {
    label: 'Folded energy of the shapers',
    unit: 'dB',
    sense: 'atMost',
    limit: -50,
    margin: 20,
    outside: 'fails',
    source: practice,
  },
  'number.noise': {
    label: 'Noise of the number format',
    unit: 'dBFS',
    sense: 'atMost',
    limit: (set) => (q15(set) ? -80 : -100),
    margin: (set) => (q15(set) ? 12 : 15),
    outside: 'fails',
    source: practice,
  },
  'number.limitCycle': { label: 'Limit cycle', unit: 'LSB', sense: 'atMost', limit: 4, margin: 3, outside: 'fails', source: practice },
  'number.saturation': { label: 'Saturation', unit: 'hits', sense: 'none', limit: null, margin: 0, outside: 'fails', source: ours },
  'target.ram': {
    label: 'RAM',
    unit: '%',
    sense: 'atMost',
    limit: 100,
    margin: 15,
    outside: 'fails',
    source: `the part; margin: ${ours}`,
  },
  'target.flash': {
    label: 'Flash',
    unit: '%',
    sense: 'atMost',
    limit: 100,
    margin: 15,
    outside: 'fails',
    source: `the part; margin: ${ours}`,
  },
  'target.load': {
    label: 'Share of the clock',
    unit: '%',
    sense: 'atMost',
    limit: 100,
    margin: 30,
    outside: 'fails',
    source: `the part; margin: ${ours}`,
  },
  'panel.box': {
    label: 'Worst knob position',
    unit: '',
    sense: 'none',
    limit: null,
    margin: 0,
    outside: 'fails',
    source: 'as the worst check',
  },
}

/** Every check's row, in the order checks are listed. */
export const LIMITS: readonly LimitRow[] = CHECK_IDS.map((id) => ({ id, ...ROWS[id] }))
const byId = new Map(LIMITS.map((row) => [row.id, row]))

function rowOf(id: CheckId): LimitRow {
  const row = byId.get(id)
  if (!row) throw new RangeError(`no check has the id ${id}`)
  return row
}

/** What a check is called, in sentence case. */
export const labelOf = (id: CheckId): string => rowOf(id).label

export interface Limit {
  readonly row: LimitRow
  readonly limit: number | null
  readonly margin: number
  /** True when the set overrides the table's limit. */
  readonly own: boolean
}

/** The limit in force for a check: the set's own if it has one, else the table's. */
export function limitOf(set: ParameterSet, id: CheckId): Limit {
  const row = rowOf(id)
  const table = typeof row.limit === 'function' ? row.limit(set) : row.limit
  const own = set.limits[id]
  return { row, limit: own ?? table, margin: typeof row.margin === 'function' ? row.margin(set) : row.margin, own: own !== undefined }
}

/** Status of a figure against its limit. A figure that does not exist (null) holds. */
export function judge({ row, limit, margin }: Limit, value: number | null): Status {
  if (value === null || limit === null || row.sense === 'none') return 'holds'
  if (row.sense === 'atMost') return value > limit ? row.outside : margin > 0 && value >= limit - margin ? 'near' : 'holds'
  return value <= limit ? row.outside : value < limit + margin ? 'near' : 'holds'
}
