// What the Curve plot says: in its corners, under the cursor, at rest, in one sentence, as tables and numbers.
import type { AgainstDrive, CurveReply, Transfer } from '../../workers/curveJob.ts'
import type { PlotNumbers, PlotTable } from '../plotTypes.ts'
import { decimal } from '../words.ts'

export const NO_SHAPER =
  'No shaper in the path: nothing bends a sample’s value.\nOpen Input, Output or the loop’s Shaper in the drawing and choose a curve.'

export interface Shown {
  /** "loop shaper" */
  readonly name: string
  readonly reply: CurveReply
}

/** "−91.7 dB" of a part of full scale; "none" for 0. */
export const levelOf = (value: number): string => (value > 0 ? `${decimal(20 * Math.log10(value), 1)} dB` : 'none')

const SUPERSCRIPT: Readonly<Record<string, string>> = {
  '-': '⁻',
  '0': '⁰',
  '1': '¹',
  '2': '²',
  '3': '³',
  '4': '⁴',
  '5': '⁵',
  '6': '⁶',
  '7': '⁷',
  '8': '⁸',
  '9': '⁹',
}

/** "2.57 × 10⁻⁶", "0.024": so many significant digits. */
export function scientific(value: number, digits: number): string {
  if (value === 0) return '0'
  const power = Math.floor(Math.log10(Math.abs(value)) + 1e-12)
  if (power >= -2 && power <= 3) return short(value, Math.max(0, digits - 1 - power))
  const mantissa = short(value / 10 ** power, digits - 1)
  const exponent = [...String(power)].map((sign) => SUPERSCRIPT[sign]).join('')
  return mantissa === '1' ? `10${exponent}` : `${mantissa} × 10${exponent}`
}

/** Without zeros at its end. */
const short = (value: number, decimals: number): string => {
  const text = decimal(value, decimals)
  return text.includes('.') ? text.replace(/\.?0+$/, '') : text
}

/** "−0.420 → −0.781 · table off by −95.2 dB" */
export function transferCursorWords({ transfer }: CurveReply, part: number): string {
  const i = Math.round(part * (transfer.x.length - 1))
  const off = transfer.error[i] as number
  const table = Number.isNaN(off) ? 'beyond the table, its end held' : off > 0 ? `table off by ${levelOf(off)}` : 'table exact'
  return `${decimal(transfer.x[i] as number, 3)} → ${decimal(transfer.y[i] as number, 3)} · ${table}`
}

export function transferRestWords({ transfer }: CurveReply): string {
  if (transfer.largest === 0) return 'table exact'
  return `table off by at most ${levelOf(transfer.largest)} · bound ${levelOf(transfer.bound)}`
}

/** "h²/8 · max|f″|" with the numbers in it. */
export function boundWords({ boundBy, step, measure, bound }: Transfer): string {
  const [formula, what] = boundBy === 'bend' ? ['h²/8 · max|f″|', '|f″|'] : ['h/4 · corner', 'change of slope at a corner']
  return `${formula}: h ${scientific(step, 3)}, ${what} ${scientific(measure, 3)} give ${scientific(bound, 3)}`
}

/** What happens past the table's ends; empty where nothing is lost. */
export function beyondWords({ beyond }: Transfer, range: number): string {
  if (beyond !== null && beyond < 0.0005) return ''
  return `past ±${decimal(range, range < 10 ? 2 : 0)} held${beyond === null ? '' : `, off by up to ${decimal(beyond, 3)}`}`
}

export function transferSummary({ name, reply }: Shown): string {
  const { shaper } = reply.request
  const { transfer } = reply
  const ends = [transfer.y[0], transfer.y.at(-1)].map((y) => decimal(y as number, 2))
  const table = transfer.largest === 0 ? 'exact' : `off by at most ${levelOf(transfer.largest)}, bound ${levelOf(transfer.bound)}`
  return `Curve of the ${name}: from ${ends[0]} to ${ends[1]}; its table of ${decimal(shaper.tableSize, 0)} intervals over ±${decimal(shaper.tableRange, 2)} is ${table}.`
}

const ROWS = 32

export function transferTable({ name, reply }: Shown): PlotTable {
  const { x, y, error } = reply.transfer
  return {
    caption: `Curve of the ${name} and what its table misses; ${boundWords(reply.transfer)}`,
    head: ['In', 'Out', 'Table off by'],
    rows: Array.from({ length: ROWS + 1 }, (_, k) => {
      const i = Math.round((k * (x.length - 1)) / ROWS)
      const off = error[i] as number
      return [decimal(x[i] as number, 3), decimal(y[i] as number, 4), Number.isNaN(off) ? 'held' : scientific(off, 3)]
    }),
  }
}

export const transferNumbers = ({ reply: { transfer } }: Shown): PlotNumbers => ({
  head: ['in', 'out', 'table_error'],
  columns: [transfer.x, transfer.y, transfer.error],
})

/** Nearest of the drives that were looked at. */
export function driveIndex({ drives }: AgainstDrive, part: number): number {
  return Math.max(0, Math.min(drives.length - 1, Math.round(part * (drives.length - 1))))
}

const MOST_NAMED = 1
/** Quieter harmonics are not named. */
const NAMED_DB = -120

/** "drive 4.00 · 3: −13.9 dB · THD 23 % · DC −18.4 dBFS · folds −23.8 dB": the strongest harmonic leads. */
export function driveWords(against: AgainstDrive, i: number): string {
  const levels = against.harmonics
    .map((db, k) => ({ n: k + 2, db: db[i] as number }))
    .filter(({ db }) => db > NAMED_DB)
    .sort((a, b) => b.db - a.db)
    .slice(0, MOST_NAMED)
    .map(({ n, db }) => `${n}: ${decimal(db, 1)}`)
  const [distortion, dc, folded] = [against.distortion, against.dcDb, against.foldedDb].map((of) => of[i] as number) as [
    number,
    number,
    number,
  ]
  const parts = [`drive ${decimal(against.drives[i] as number, 2)}`]
  if (Number.isNaN(distortion)) return `${parts[0]} · nothing passes`
  parts.push(levels.length > 0 ? `${levels.join(', ')} dB` : 'no harmonics')
  if (distortion > 1e-6) parts.push(`THD ${percent(distortion)}`)
  if (!Number.isNaN(dc)) parts.push(`DC ${decimal(dc, 1)} dBFS`)
  parts.push(Number.isNaN(folded) ? 'nothing folds' : `folds ${decimal(folded, 1)} dB`)
  return parts.join(' · ')
}

const percent = (ratio: number) => `${Number((100 * ratio).toPrecision(2))} %`

export function harmonicsSummary({ name, reply }: Shown): string {
  return `Harmonics of a −6 dBFS sine through the ${name}: ${driveWords(reply.own, 0)}.`
}

const orNone = (value: number, digits: number) => (Number.isNaN(value) ? 'none' : decimal(value, digits))

export function harmonicsTable({ name, reply: { against } }: Shown): PlotTable {
  return {
    caption: `Harmonics of a −6 dBFS sine through the ${name} against drive, dB against the first`,
    head: ['Drive', ...against.harmonics.map((_, k) => `Harmonic ${k + 2}`), 'Distortion', 'DC, dBFS', 'Folded of 5 kHz'],
    rows: Array.from({ length: Math.floor((against.drives.length - 1) / 4) + 1 }, (_, k) => {
      const i = 4 * k
      const ratio = against.distortion[i] as number
      return [
        decimal(against.drives[i] as number, 3),
        ...against.harmonics.map((db) => orNone(db[i] as number, 1)),
        Number.isNaN(ratio) ? 'none' : percent(ratio),
        orNone(against.dcDb[i] as number, 1),
        orNone(against.foldedDb[i] as number, 1),
      ]
    }),
  }
}

export const harmonicsNumbers = ({ reply: { against } }: Shown): PlotNumbers => ({
  head: ['drive', ...against.harmonics.map((_, k) => `harmonic_${k + 2}_db`), 'distortion', 'dc_dbfs', 'folded_db'],
  columns: [against.drives, ...against.harmonics, against.distortion, against.dcDb, against.foldedDb],
})
