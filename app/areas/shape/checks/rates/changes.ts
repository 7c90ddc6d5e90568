// What another sample rate changes about a set's checks: the rows of the table, each figure as it would stand in the list.
import type { CheckId } from '../../../../../src/checks/limits.ts'
import type { CheckValue, Status } from '../../../../../src/checks/types.ts'
import type { Rated, RatedCheck } from '../../../../workers/analysisJobs/rates.ts'
import { checkFigure } from '../checkWords.ts'

export const RATES: readonly number[] = [32000, 44100, 48000, 88200, 96000, 192000]

/** The usual rates with the set's own among them. */
export const ratesWith = (own: number): number[] => [...new Set([...RATES, own])].sort((a, b) => a - b)

export interface Cell {
  readonly status: Status
  readonly figure: string
}

export interface ChangeRow {
  readonly id: CheckId
  readonly label: string
  /** One a rate; null where it is still to come or cannot be. */
  readonly cells: readonly (Cell | null)[]
}

export interface Changes {
  readonly rows: readonly ChangeRow[]
  /** Labels of those that stay the same at every rate. */
  readonly same: readonly string[]
}

/** Splits the checks into those that another rate changes, by status or noticeably by figure, and those it leaves as they are at the set's own. */
export function changesOf(rated: readonly Rated[], ownRate: number): Changes {
  const own = rated.find(({ rate }) => rate === ownRate)?.checks ?? []
  const rows: ChangeRow[] = []
  const same: string[] = []
  for (const check of own) {
    const at = rated.map(({ checks }) => checks.find(({ id }) => id === check.id) ?? null)
    if (at.some((other) => other !== null && differs(check, other)))
      rows.push({ id: check.id, label: check.label, cells: at.map((one) => one && { status: one.status, figure: checkFigure(one) }) })
    else same.push(check.label)
  }
  return { rows, same }
}

/** By status; or by a figure that reads differently by more than rounding. */
export function differs(own: RatedCheck, other: RatedCheck): boolean {
  return own.status !== other.status || (checkFigure(own) !== checkFigure(other) && valuesDiffer(own.value, other.value, own.unit))
}

/** Decibels, loudness and cents by a fixed distance, everything else by part of its size. */
const FIXED: Readonly<Record<string, number>> = { dB: 0.3, dBFS: 0.3, LU: 0.3, cents: 0.5 }
const PART = 0.02

function valuesDiffer(a: CheckValue, b: CheckValue, unit: string): boolean {
  if (typeof a === 'number' && typeof b === 'number')
    return Math.abs(a - b) > (FIXED[unit] ?? PART * Math.max(Math.abs(a), Math.abs(b)) + 1e-9)
  if (a === null || b === null || typeof a !== 'object' || typeof b !== 'object') return a !== b
  const keys = new Set([...Object.keys(a), ...Object.keys(b)])
  return [...keys].some((key) => valuesDiffer(at(a, key), at(b, key), unit))
}

const at = (value: object, key: string): CheckValue => (value as Readonly<Record<string, CheckValue>>)[key] ?? null

/** "44.1 kHz". */
export const rateWords = (rate: number): string => `${Number((rate / 1000).toFixed(2))} kHz`
