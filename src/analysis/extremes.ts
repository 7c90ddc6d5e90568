// Every notch and peak of a frozen response: roots of d|H|²/dω, found by sign on a grid of fourteen points per period of the
// longest delay and refined in their cells. |H|² and not its logarithm: its derivative passes a null in a straight line.
import {
  departsFromCubic,
  type ExtremeKind,
  type FoundExtreme,
  hidesPair,
  type PowerSample,
  powerSample,
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
/** Power this far below what dry and wet would give side by side is what is left when they cancel everywhere. */
const CANCELLED = 1e-27
/** Power this far below the largest, at 0 Hz or fs/2, is a null. */
const NULL_POWER = 1e-20

export interface ExtremeOptions {
  readonly maxHz?: number
  readonly withinHz?: number
  /** List a null at exactly 0 Hz too, where |H| always stands level. */
  readonly fromDc?: boolean
}

/**
 * Notches and peaks in (0, maxHz], by channel, then rising frequency. maxHz in (0, sampleRate/2], by default
 * sampleRate/2, where |H| always stands level: what is there counts when it is a null, or a turn after another one.
 * Frequencies within `withinHz` (0.002 Hz); pairs that differ by less than 1e-6 dB are left out. Throws RangeError for maxHz.
 */
export function frozenExtremes(frozen: Frozen, options: ExtremeOptions = {}): Extreme[] {
  const nyquist = frozen.sampleRate / 2
  const maxHz = options.maxHz ?? nyquist
  if (!(maxHz > 0 && maxHz <= nyquist)) throw new RangeError(`maxHz must be in (0, ${nyquist}] Hz, got ${maxHz}`)
  const perHz = (2 * Math.PI) / frozen.sampleRate
  const tolerance = perHz * (options.withinHz ?? ROOT_HZ)
  // The searches use a transfer of their own: the grid's is stepped from point to point.
  const transfer = transferOf(frozen)
  const trails = frozen.channels.map((_, channel): Trail => {
    const search: Search = { transfer, channel, tolerance, out: new Float64Array(4 * transfer.channels), found: [] }
    return { search, floor: CANCELLED * sideBySide(frozen, channel), a: null, b: null, bentBefore: false, largest: 0 }
  })
  // What stands at maxHz itself turns within the tolerance of it.
  walkGrid(transferOf(frozen), Math.min(Math.PI, perHz * maxHz + tolerance), lowestCorner(frozen), trails)
  return trails.flatMap((trail) =>
    ended(trail, maxHz === nyquist, options.fromDc ?? false).map(({ kind, omega, power }) => ({
      channel: trail.search.channel,
      kind,
      frequencyHz: Math.min(maxHz, omega / perHz),
      db: decibels(power),
    })),
  )
}

/** One channel on its way up the grid: its last two samples, and what was found below them. */
interface Trail {
  readonly search: Search
  /** Where two neighbours lie below it there is nothing between them. */
  readonly floor: number
  a: PowerSample | null
  b: PowerSample | null
  /** The cubic through the neighbours of a did not meet a. */
  bentBefore: boolean
  largest: number
}

/** ω below which a filter of the path shapes the response, where the delays alone would ask for no points. */
function lowestCorner({ loop, wetTone }: Frozen): number {
  const poles = [loop.tone.lowPass, loop.tone.highPass, wetTone.lowPass, wetTone.highPass]
  return Math.min(1, ...poles.map((pole) => (pole === null ? 1 : -Math.log(pole))))
}

/** Power of dry and wet where nothing cancels, loop apart. */
function sideBySide({ inputGain, outputGain, dry, channels }: Frozen, channel: number): number {
  const { wet, voices } = channels[channel] as Frozen['channels'][number]
  return (inputGain * outputGain * (Math.abs(dry) + Math.abs(wet) * voices.length)) ** 2
}

/** Every grid point of (0, maxOmega] in rising order to every trail. */
function walkGrid(t: Transfer, maxOmega: number, corner: number, trails: readonly Trail[]): void {
  const cells = Math.max(8, Math.ceil((maxOmega * POINTS_PER_PERIOD * t.longest) / (2 * Math.PI)))
  const step = maxOmega / cells
  const out = new Float64Array(4 * t.channels)
  const visit = (omega: number) => {
    for (const trail of trails) advance(trail, powerSample(out, trail.search.channel, omega))
  }
  // Both 0 and π are level by symmetry: the grid stays a hair inside.
  const inside = step * 1e-3
  for (let omega = Math.min(inside, corner / 20); omega < step; omega *= 1.25) {
    transferAt(t, omega, out)
    visit(omega)
  }
  for (let k = 1; k < cells; k++) {
    if (k % FRESH_EVERY === 1) transferGrid(t, k * step, step, out)
    else transferStep(t, out)
    visit(k * step)
  }
  const last = Math.min(maxOmega, Math.PI - inside)
  transferAt(t, last, out)
  visit(last)
}

function advance(trail: Trail, next: PowerSample): void {
  const { a, b } = trail
  trail.largest = Math.max(trail.largest, next.power)
  // The point between two cells against the cubic through their outer ends needs no evaluation of its own.
  if (a && b) settle(trail, a, b, departsFromCubic(a, b, next))
  trail.a = b
  trail.b = next
}

/** Looks into the cell from a to b, where `bent` says how the cubic met b. */
function settle(trail: Trail, a: PowerSample, b: PowerSample, bent: boolean): void {
  const halve = bent || trail.bentBefore
  const silent = a.power < trail.floor && b.power < trail.floor
  if (!silent && !isFlat(a, b) && (halve || turns(a, b) || hidesPair(a, b))) searchCell(trail.search, a, b, halve)
  trail.bentBefore = bent
}

function ended(trail: Trail, toNyquist: boolean, fromDc: boolean): FoundExtreme[] {
  const { a, b, search } = trail
  if (a && b) settle(trail, a, b, false)
  let { largest } = trail
  for (const { power } of search.found) largest = Math.max(largest, power)
  const found = significant(search.found, largest)
  if (toNyquist && b) found.push(...atNyquist(search, b, found.at(-1), largest))
  if (!fromDc) return found
  const { power } = samplePower(search, 0)
  return power < NULL_POWER * largest ? [{ kind: 'notch', omega: 0, power }, ...found] : found
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
  const isNull = kind === 'notch' && power < NULL_POWER * largest
  if (before ? before.kind === kind : !isNull) return []
  const here = { kind, omega: Math.PI, power }
  return before && significant([before, here], largest).length === 0 ? [] : [here]
}
