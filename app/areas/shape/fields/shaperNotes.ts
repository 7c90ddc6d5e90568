// What follows from a shaper's values, in lines beneath its fields.
import { aliasToneHz, foldedEnergy } from '../../../../src/analysis/folded.ts'
import { type DrivenSine, drivenSine, harmonicDb, totalDistortion } from '../../../../src/analysis/harmonics.ts'
import { type TableError, tableError } from '../../../../src/analysis/tableError.ts'
import { shapersOf } from '../../../../src/checks/shaperFigures.ts'
import { createShaper } from '../../../../src/dsp/shaper.ts'
import type { ParameterSet, Shaper } from '../../../../src/set/types.ts'
import { showIn } from '../../../fields/quantity.ts'
import type { ShaperOwner } from './ShaperFields.tsx'

type Noted = 'drive' | 'ceiling' | 'positive' | 'negative' | 'deadZone' | 'antialias' | 'tableSize' | 'tableRange'
export type ShaperNotes = Readonly<Record<Noted, readonly string[]>>

export function shaperNotes(set: ParameterSet, owner: ShaperOwner, shaper: Shaper): ShaperNotes {
  const amplitude = shapersOf(set).find(({ path }) => path === owner)?.amplitude ?? 0.5
  const sine = drivenSine(shaper, amplitude, 5)
  const table = tableError(shaper)
  return {
    drive: driveNotes(shaper, sine),
    ceiling: [ceilingNote(shaper)],
    positive: [limitNote(shaper, shaper.positive)],
    negative: [limitNote(shaper, shaper.negative), shaper.positive === shaper.negative ? 'halves alike: no DC' : dcNote(sine)],
    deadZone: [zoneNote(shaper)],
    antialias: aliasNotes(set, owner, shaper, amplitude),
    tableSize: sizeNotes(table),
    tableRange: rangeNotes(shaper, table),
  }
}

const MINUS = '−'
const number = (value: number, digits = 3) => String(Number(value.toPrecision(digits))).replace('-', MINUS)
const decibel = (value: number) => `${value.toFixed(1).replace('-', MINUS)} dB`
const level = (value: number) => (value > 0 ? decibel(20 * Math.log10(value)) : 'silence')

function driveNotes(shaper: Shaper, sine: DrivenSine): readonly string[] {
  const slope = Math.abs(createShaper(shaper).slopeAtZero)
  const small = slope === 0 ? 'small signals do not pass' : `small signals × ${number(slope)} (${level(slope)})`
  const ratio = totalDistortion(sine)
  if (ratio === null) return [small, `${MINUS}6 dBFS does not pass`]
  const [second, third] = [harmonicDb(sine, 2), harmonicDb(sine, 3)]
  const named = [second === null ? '' : `2nd ${decibel(second)}`, third === null ? '' : `3rd ${decibel(third)}`].filter(Boolean)
  return [small, named.length === 0 ? `${MINUS}6 dBFS stays clean` : `${MINUS}6 dBFS: ${named.join(', ')}`]
}

/** Where the curve ends, if it does: out of its upper or lower half, whichever is higher. */
function ceilingNote({ curve, ceiling, positive, negative, points }: Shaper): string {
  if (curve === 'diode' || curve === 'deadZone') return 'no limit: this curve has no end'
  const most = curve === 'drawn' ? points.reduce((top, [, k]) => Math.max(top, Math.abs(k)), 0) : 1
  return `never above ${level(ceiling * most * Math.max(positive, negative))}FS`
}

function limitNote({ curve, drive, ceiling, points }: Shaper, limit: number): string {
  if (curve === 'diode') return `bends from ${number((0.45 * limit) / drive)} in on`
  if (curve === 'deadZone') return 'scales the dead zone'
  const end = curve === 'drawn' ? (points.at(-1)?.[1] ?? 0) : 1
  const from = curve === 'hardClip' ? 1 : curve === 'cubic' ? 1.5 : curve === 'drawn' ? (points.at(-1)?.[0] ?? 0) : null
  const out = `ends at ${number(ceiling * limit * end)}`
  return from === null ? `${out}, approached` : `${out}, from ${number((from * limit) / drive)} in on`
}

/** What rounding leaves of a mean that is 0. */
const ROUNDING = 1e-14

function dcNote(sine: DrivenSine): string {
  const dc = Math.abs(sine.amplitudes[0] as number)
  return `unlike halves: DC ${dc > ROUNDING ? `${level(dc)}FS` : 'none'} of ${MINUS}6 dBFS`
}

function zoneNote({ deadZone, drive, positive, negative }: Shaper): string {
  const least = (deadZone * Math.min(positive, negative)) / drive
  return least === 0 ? 'passes everything' : `silent below ${level(least)}FS`
}

function aliasNotes(set: ParameterSet, owner: ShaperOwner, shaper: Shaper, amplitude: number): readonly string[] {
  const rate = set.sampleRate
  const at = (antialias: Shaper['antialias']) => foldedText(foldedEnergy({ ...shaper, antialias }, amplitude, rate).db)
  const tone = `${number(aliasToneHz(rate) / 1000)} kHz`
  const half = 500 / rate
  if (shaper.antialias === 'none') return [`${tone} folds ${at('none')}`, `antiderivative: ${at('adaa1')}, ${showIn(half, 'ms')} later`]
  const delay = owner === 'loop.shaper' ? 'loop read ½ sample shorter: pitch stays' : `half a sample (${showIn(half, 'ms')}) later`
  return [`${tone} folds ${at('adaa1')}; without ${at('none')}`, delay]
}

const foldedText = (db: number | null) => (db === null || db <= -400 ? 'nothing' : decibel(db))

function sizeNotes({ largest, bound, boundBy }: TableError): readonly string[] {
  if (largest === 0) return ['the table is exact', 'corners on its points, lines between']
  return [`off by ${level(largest)} at most`, `bound ${boundBy === 'bend' ? 'h²/8 · max|f″|' : 'h/4 · corner'} ${level(bound)}`]
}

function rangeNotes(shaper: Shaper, { table, beyond }: TableError): readonly string[] {
  const points = `a point every ${number(table.step)} in, drive included`
  if (beyond !== null && beyond < 5e-4) return [points, `past ±${number(shaper.tableRange)} nothing is lost`]
  const held = beyond === null ? 'the curve goes on' : `off by up to ${number(beyond, 2)}`
  return [points, `past ±${number(shaper.tableRange)} held: ${held}`]
}
