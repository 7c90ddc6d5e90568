// The teeth of a comb on the frequency axis: which notches and peaks are marked, how far they lie apart, from where
// on they are denser than pixels.
import type { Extreme, ExtremeKind } from '../../../src/analysis/extremes.ts'
import { type Columns, partOf } from '../../plots/columns.ts'

export interface Mark {
  readonly kind: ExtremeKind
  readonly frequencyHz: number
  readonly db: number
  /** Its frequency is written beside it. */
  readonly labelled: boolean
}

/** An extreme is marked when it stands out from its neighbours by so many dB. */
const PROMINENT_DB = 3
/** Numbers stand at least so many pixels apart; marks without numbers, closer. */
const LABEL_APART_PX = 40
const MARK_APART_PX = 14
/** Teeth narrower than this are drawn as a band. */
const DENSE_PX = 4
/** A dashed line needs wider ones to be followed. */
export const DENSE_DASHED_PX = 12
/** Over how many teeth's width they are counted. */
const WINDOW_TEETH = 6

/** Marks of one channel's extremes (rising frequency), thinned from the left, each kind by itself; none where teeth are closer than marks. */
export function marksOf(extremes: readonly Extreme[], columns: Columns): Mark[] {
  const marks: Mark[] = []
  const far = Number.NEGATIVE_INFINITY
  const last = { notch: far, peak: far }
  const lastLabel = { notch: far, peak: far }
  extremes.forEach((extreme, i) => {
    if (!standsOut(extremes, i)) return
    const { kind, frequencyHz, db } = extreme
    const x = partOf(columns, frequencyHz) * columns.count
    const apart = x - last[kind]
    last[kind] = x
    if (x < 0 || x > columns.count || apart < MARK_APART_PX) return
    const labelled = apart >= LABEL_APART_PX / 2 && x - lastLabel[kind] >= LABEL_APART_PX
    marks.push({ kind, frequencyHz, db, labelled })
    if (labelled) lastLabel[kind] = x
  })
  return marks
}

const standsOut = (extremes: readonly Extreme[], i: number): boolean => prominence(extremes, i) >= PROMINENT_DB

/** By how many dB an extreme stands out from its neighbours; 0 of one that has none. */
export function prominence(extremes: readonly Extreme[], i: number): number {
  const own = extremes[i]
  const sides = [extremes[i - 1], extremes[i + 1]].filter((other) => other !== undefined)
  if (!own || sides.length === 0) return 0
  return Math.min(...sides.map((other) => Math.abs(other.db - own.db)))
}

/** Spacing of even notches, Hz: their mean distance when none of the first departs from it by over 2 %; null otherwise. */
export function spacingOf(extremes: readonly Extreme[]): number | null {
  const notches = extremes.filter((extreme, i) => extreme.kind === 'notch' && standsOut(extremes, i)).slice(0, 40)
  const first = notches[0]
  const last = notches.at(-1)
  if (!first || !last || notches.length < 3) return null
  const mean = (last.frequencyHz - first.frequencyHz) / (notches.length - 1)
  const even = notches.every((notch, i) => Math.abs(notch.frequencyHz - first.frequencyHz - i * mean) <= 0.02 * mean * Math.max(1, i))
  return even ? mean : null
}

/** The first column from which on teeth are narrower than `narrowPx` everywhere; `count` when there is none. */
export function denseColumn(extremes: readonly Extreme[], columns: Columns, narrowPx = DENSE_PX): number {
  const { count } = columns
  const channels = new Set(extremes.map((extreme) => extreme.channel))
  let dense = count
  for (const channel of channels) {
    const perColumn = new Uint32Array(count)
    for (const extreme of extremes) {
      const i = Math.floor(partOf(columns, extreme.frequencyHz) * count)
      if (extreme.channel === channel && i >= 0 && i < count) perColumn[i] = (perColumn[i] ?? 0) + 1
    }
    dense = Math.min(dense, denseFrom(perColumn, narrowPx))
  }
  return dense
}

/** A tooth is one notch and one peak. */
function denseFrom(perColumn: Uint32Array, narrowPx: number): number {
  const count = perColumn.length
  const windowPx = WINDOW_TEETH * narrowPx
  const least = 2 * WINDOW_TEETH
  let inWindow = 0
  for (let i = count - 1; i >= 0; i--) {
    inWindow += perColumn[i] ?? 0
    if (i + windowPx < count) inWindow -= perColumn[i + windowPx] ?? 0
    if (i + windowPx <= count && inWindow < least) return i + windowPx
  }
  return 0
}
