// Every notch and peak of a frozen response: roots of d|H|²/dω, found by sign on a grid of ten points per period of the
// longest delay and refined in their cells. |H|² and not its logarithm: its derivative passes a null in a straight line.
import {
  departsFromCubic,
  type ExtremeKind,
  type FoundExtreme,
  hidesPair,
  type PowerSample,
  type Search,
  samplePower,
  searchCell,
  turns,
} from './extremeCells.ts'
import type { Frozen } from './frozen.ts'
import { decibels } from './response.ts'
import { type Transfer, transferAt, transferGrid, transferOf, transferStep } from './transfer.ts'

export type { ExtremeKind } from './extremeCells.ts'

export interface Extreme {
  readonly channel: number
  readonly kind: ExtremeKind
  readonly frequencyHz: number
  readonly db: number
}

const POINTS_PER_PERIOD = 14
/** Steps after which the grid's phasors are computed afresh. */
const FRESH_EVERY = 256
/** Where a search for a root ends, Hz, unless asked otherwise. */
const ROOT_HZ = 0.002
/** A notch and a peak next to it closer than this are one level: 1e-6 dB. */
const SAME_LEVEL = 2.3e-7
/** Power this far below the largest is rounding. */
const ROUNDING = 1e-24

/**
 * Notches and peaks in (0, maxHz], by channel, then rising frequency. maxHz in (0, sampleRate/2], by default
 * sampleRate/2, where |H| always stands level: what is there counts when it is a null, or a turn after another one.
 * Frequencies within `withinHz` (0.002 Hz); pairs that differ by less than 1e-6 dB are left out. Throws RangeError for maxHz.
 */
export function frozenExtremes(frozen: Frozen, options: { readonly maxHz?: number; readonly withinHz?: number } = {}): Extreme[] {
  const nyquist = frozen.sampleRate / 2
  const maxHz = options.maxHz ?? nyquist
  if (!(maxHz > 0 && maxHz <= nyquist)) throw new RangeError(`maxHz must be in (0, ${nyquist}] Hz, got ${maxHz}`)
  const transfer = transferOf(frozen)
  const tolerance = (2 * Math.PI * (options.withinHz ?? ROOT_HZ)) / frozen.sampleRate
  // What stands at maxHz itself turns within the tolerance of it.
  const grid = sampleGrid(transfer, Math.min(Math.PI, (2 * Math.PI * maxHz) / frozen.sampleRate + tolerance), lowestCorner(frozen))
  return frozen.channels.flatMap((_, channel) => {
    const search: Search = { transfer, channel, tolerance, out: new Float64Array(4 * transfer.channels), found: [] }
    return channelExtremes(search, grid, maxHz)
  })
}

interface Grid {
  readonly omegas: Float64Array
  /** Per channel. */
  readonly powers: readonly Float64Array[]
  readonly slopes: readonly Float64Array[]
}

/** ω below which a filter of the path shapes the response, where the delays alone would ask for no points. */
function lowestCorner({ loop, wetTone }: Frozen): number {
  const poles = [loop.tone.lowPass, loop.tone.highPass, wetTone.lowPass, wetTone.highPass]
  return Math.min(1, ...poles.map((pole) => (pole === null ? 1 : -Math.log(pole))))
}

function sampleGrid(t: Transfer, maxOmega: number, corner: number): Grid {
  const cells = Math.max(8, Math.ceil((maxOmega * POINTS_PER_PERIOD * t.longest) / (2 * Math.PI)))
  const step = maxOmega / cells
  // Both 0 and π are level by symmetry: the grid stays a hair inside.
  const inside = step * 1e-3
  const low: number[] = []
  for (let omega = Math.min(inside, corner / 20); omega < step; omega *= 1.25) low.push(omega)
  const total = low.length + cells
  const perChannel = () => Array.from({ length: t.channels }, () => new Float64Array(total))
  const grid = { omegas: new Float64Array(total), powers: perChannel(), slopes: perChannel() }
  const out = new Float64Array(4 * t.channels)
  const keep = (i: number, omega: number) => {
    grid.omegas[i] = omega
    for (let c = 0; c < t.channels; c++) {
      const re = out[4 * c] as number
      const im = out[4 * c + 1] as number
      ;(grid.powers[c] as Float64Array)[i] = re * re + im * im
      ;(grid.slopes[c] as Float64Array)[i] = 2 * (re * (out[4 * c + 2] as number) + im * (out[4 * c + 3] as number))
    }
  }
  low.forEach((omega, i) => {
    transferAt(t, omega, out)
    keep(i, omega)
  })
  for (let k = 1; k < cells; k++) {
    if (k % FRESH_EVERY === 1) transferGrid(t, k * step, step, out)
    else transferStep(t, out)
    keep(low.length + k - 1, k * step)
  }
  const last = Math.min(maxOmega, Math.PI - inside)
  transferAt(t, last, out)
  keep(total - 1, last)
  return grid
}

function channelExtremes(search: Search, grid: Grid, maxHz: number): Extreme[] {
  const { channel, transfer } = search
  const { omegas } = grid
  const powers = grid.powers[channel] as Float64Array
  const slopes = grid.slopes[channel] as Float64Array
  const at = (i: number): PowerSample => ({ omega: omegas[i] as number, power: powers[i] as number, slope: slopes[i] as number })
  let a = at(0)
  let bentBefore = false
  for (let i = 1; i < omegas.length; i++) {
    const b = at(i)
    // The point between two cells against the cubic through their outer ends needs no evaluation of its own.
    const bent = i + 1 < omegas.length && departsFromCubic(a, b, at(i + 1))
    const halve = bent || bentBefore
    if (!isFlat(a, b) && (halve || turns(a, b) || hidesPair(a, b))) searchCell(search, a, b, halve)
    bentBefore = bent
    a = b
  }
  let largest = 0
  for (const power of powers) largest = Math.max(largest, power)
  for (const { power } of search.found) largest = Math.max(largest, power)
  const found = significant(search.found, largest)
  if (maxHz === transfer.sampleRate / 2) found.push(...atNyquist(search, a, found.at(-1), largest))
  return found.map(({ kind, omega, power }) => ({
    channel,
    kind,
    frequencyHz: Math.min(maxHz, (omega * transfer.sampleRate) / (2 * Math.PI)),
    db: decibels(power),
  }))
}

/** Nothing but rounding between a and b: an all-pass, or a voice alone read to the nearest sample. */
function isFlat(a: PowerSample, b: PowerSample): boolean {
  const width = b.omega - a.omega
  return width * Math.max(Math.abs(a.slope), Math.abs(b.slope)) < 1e-10 * Math.min(a.power, b.power)
}

/** Drops neighbours of one level, then what has become neighbours. */
function significant(found: readonly FoundExtreme[], largest: number): FoundExtreme[] {
  const kept: FoundExtreme[] = []
  for (const next of found) {
    const before = kept.at(-1)
    if (before && Math.abs(next.power - before.power) <= SAME_LEVEL * Math.max(next.power, before.power) + ROUNDING * largest) kept.pop()
    else kept.push(next)
  }
  return kept
}

/** |H| mirrors at fs/2. A slope that merely runs out there, as a low-pass does, is not listed. */
function atNyquist(search: Search, last: PowerSample, before: FoundExtreme | undefined, largest: number): FoundExtreme[] {
  const { power } = samplePower(search, Math.PI)
  const kind: ExtremeKind = last.slope > 0 ? 'peak' : 'notch'
  const isNull = kind === 'notch' && power < 1e-20 * largest
  if (before ? before.kind === kind : !isNull) return []
  const here = { kind, omega: Math.PI, power }
  return before && significant([before, here], largest).length === 0 ? [] : [here]
}
