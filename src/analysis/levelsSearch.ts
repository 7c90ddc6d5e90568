// The largest |H| over frequency and sweep. Rows of one frequency over every position are looked at where the bound of levelsBound.ts is largest first; the
// best places are followed to their summits, and the search ends when what was found comes up to the bound, or the work allowed for is done: then the true
// largest lies between the two, and both are given.
import type { ParameterSet } from '../set/types.ts'
import { frozenExtremes } from './extremes.ts'
import type { Frozen } from './frozen.ts'
import { boundAt, hasFilters, largestBound } from './levelsBound.ts'
import { frozenAt, type Ground, groundOf, type LargestGain, named, type Place } from './levelsPlace.ts'
import { freezeAtLargestSlope, lineAsOutput } from './levelsSet.ts'
import { goldenMaximum } from './loopSearch.ts'
import { type PathTable, pathPositions, pathReach, pathStretches, pathTable } from './pathTable.ts'
import { createTuning, pathValues, type Tuning, tune } from './pathValues.ts'
import { transferAt, transferOf } from './transfer.ts'

/** Found and bound closer than this are one figure: 0.009 dB. */
const SAME = 0.999
/** Reads that may be evaluated over all rows, at 10 to 20 ns each, and positions a row has at most. */
const BUDGET = 400_000
const MOST_POSITIONS = 128
const POINTS_PER_TOOTH = 6
/** Rows looked at before the best places among them are followed. */
const BATCH = 48
const SPREAD = 400
const FOLLOWED = 4
/** Teeth of a standing comb that are looked at one by one. */
const MOST_TEETH = 1500

interface Search extends Ground {
  readonly tuning: Tuning
  readonly table: PathTable
  readonly values: Float64Array
  /** rad/sample between two teeth of the longest delay. */
  readonly tooth: number
  best: Place
}

/** The largest gain of `set` over [0, fs/2] and every position the sweep reaches, the same signal at every input. sampleRate in Hz. */
export function largestGain(set: ParameterSet, sampleRate = set.sampleRate): LargestGain {
  const ground = groundOf(set, sampleRate)
  const tops = ground.bounds.map(largestBound)
  const bound = Math.max(...tops.map(({ value }) => value))
  const top = tops.reduce((a, b) => (b.value > a.value ? b : a)).omega
  const quick = quickLook(ground, top)
  if (quick.gain >= bound * SAME) return named(ground.path, quick, bound)
  const still = ground.path.stops.length === 1 ? standing(ground, quick) : null
  if (still?.whole) return named(ground.path, still.best, still.best.gain)
  const search = createSearch(ground, still?.best ?? quick)
  const rows = rowsOf(search, top)
  // A row costs its reads, and the phasors of every delay.
  const cost = search.table.first.length + search.tuning.re.length / 8
  let left = BUDGET
  for (let i = 0; i < rows.length && search.best.gain < bound * SAME && left > 0; i += BATCH) {
    const seeds: Place[] = []
    for (const omega of rows.slice(i, i + BATCH)) {
      if (highestAt(search, omega) <= search.best.gain) continue
      const place = bestOfRow(search, omega)
      left -= cost
      if (place) seeds.push(place)
    }
    seeds.sort((a, b) => b.gain - a.gain)
    for (const seed of apart(seeds, search.tooth / 2).slice(0, FOLLOWED)) {
      if (search.best.gain < bound * SAME) follow(search, seed)
    }
  }
  return named(ground.path, search.best, bound)
}

/** Both ends of the path at 0, at π and where the bound is largest: with signs that agree and no low cut, 0 Hz has it all. */
function quickLook(ground: Ground, top: number): Place {
  const { path } = ground
  let best: Place = { channel: 0, omega: 0, t: path.stops[0] as number, gain: 0 }
  for (const t of new Set([path.stops[0] as number, path.stops.at(-1) as number])) {
    const transfer = transferOf(frozenAt(ground, t))
    const out = new Float64Array(4 * transfer.channels)
    for (const omega of new Set([0, Math.PI, top])) {
      transferAt(transfer, omega, out)
      for (let channel = 0; channel < path.walked; channel++) {
        const gain = Math.hypot(out[4 * channel] as number, out[4 * channel + 1] as number)
        if (gain > best.gain) best = { channel, omega, t, gain }
      }
    }
  }
  return best
}

/** One position: every peak of its response, `whole`, or of so many teeth from 0 Hz on. */
function standing({ path, frozen, delays, bounds }: Ground, ends: Place): { best: Place; whole: boolean } {
  const held = frozenAt({ path, frozen, delays, bounds }, ends.t)
  const perHz = (2 * Math.PI) / path.sampleRate
  const tooth = toothOf(held)
  const whole = Math.PI <= MOST_TEETH * tooth
  const maxHz = whole ? path.sampleRate / 2 : (MOST_TEETH * tooth) / perHz
  let best = ends
  for (const { kind, channel, frequencyHz, db } of frozenExtremes(held, { maxHz, withinHz: tooth / perHz / 1e4 })) {
    const gain = 10 ** (db / 20)
    if (kind === 'peak' && gain > best.gain) best = { channel, omega: frequencyHz * perHz, t: ends.t, gain }
  }
  return { best, whole }
}

const toothOf = (frozen: Frozen): number => (2 * Math.PI) / transferOf(frozen).longest

function createSearch({ path, frozen, bounds, delays }: Ground, best: Place): Search {
  const stretches = pathStretches(path)
  const reach = pathReach(path, stretches, delays)
  // Two positions a sample of travel meet whole delays, where a read loses nothing.
  const table = pathTable(path, pathPositions(path, stretches, 2, MOST_POSITIONS))
  return {
    path,
    frozen,
    table,
    delays,
    tuning: createTuning(frozen, reach),
    values: new Float64Array(2 * table.ts.length),
    bounds,
    tooth: (2 * Math.PI) / Math.max(1, reach.highest, frozen.dryDelay),
    best,
  }
}

const highestAt = ({ bounds }: Search, omega: number): number => Math.max(...bounds.map((bound) => boundAt(bound, omega)))

/** ω of every row, the likeliest first: where the bound is largest, the first teeth, and between them the whole range spread evenly by the golden ratio. */
function rowsOf(search: Search, top: number): number[] {
  const { tooth, bounds } = search
  const step = tooth / POINTS_PER_TOOTH
  const near = [0, Math.PI, top]
  for (let i = 1; i <= 2 * POINTS_PER_TOOTH; i++) near.push(i * step, top - i * step, top + i * step)
  const inside = (omega: number) => omega >= 0 && omega <= Math.PI
  const peaks = standingPeaks(search)
  if (peaks !== null) return alternating(near.filter(inside), peaks)
  const spread = Array.from({ length: SPREAD }, (_, i) => Math.PI * (((i + 1) * 0.6180339887498949) % 1))
  if (!bounds.some(hasFilters)) return alternating(near.filter(inside), spread)
  const bound = (omega: number) => Math.max(...bounds.map((b) => boundAt(b, omega)))
  const ranked = spread.map((omega) => ({ omega, value: bound(omega) })).sort((a, b) => b.value - a.value)
  return alternating(
    near.filter(inside),
    ranked.map(({ omega }) => omega),
  )
}

/** A loop that stands while the voices move rings at its own frequencies, and only there: its peaks up to the 400th, highest first. null for others. */
function standingPeaks({ path: { set, sampleRate }, frozen }: Search): number[] | null {
  if (frozen.loop.gain === 0 || set.loop.delay !== 'fixed') return null
  const line = freezeAtLargestSlope(lineAsOutput(set), 0, sampleRate)
  const tooth = toothOf(line)
  const perHz = (2 * Math.PI) / sampleRate
  const maxHz = Math.min(sampleRate / 2, (SPREAD * tooth) / perHz)
  return frozenExtremes(line, { maxHz, withinHz: tooth / perHz / 1e4 })
    .filter(({ kind }) => kind === 'peak')
    .sort((a, b) => b.db - a.db)
    .map(({ frequencyHz }) => frequencyHz * perHz)
}

/** One of `first`, one of `second`, and so on; then what is left of the longer. */
function alternating(first: readonly number[], second: readonly number[]): number[] {
  return Array.from({ length: Math.max(first.length, second.length) }, (_, i) => [first[i], second[i]])
    .flat()
    .filter((value) => value !== undefined)
}

function bestOfRow(search: Search, omega: number): Place | null {
  const { tuning, table, values, path } = search
  tune(tuning, omega)
  let best: Place | null = null
  for (let channel = 0; channel < path.walked; channel++) {
    pathValues(tuning, table, channel, values)
    let at = 0
    let power = -1
    for (let i = 0; i < table.ts.length; i++) {
      const re = values[2 * i] as number
      const im = values[2 * i + 1] as number
      const size = re * re + im * im
      if (size > power) {
        power = size
        at = i
      }
    }
    const place = { channel, omega, t: table.ts[at] as number, gain: Math.sqrt(power) }
    if (place.gain > (best?.gain ?? 0)) best = place
  }
  if (best && best.gain > search.best.gain) search.best = best
  return best
}

/** Places in different teeth, best first. */
function apart(places: readonly Place[], distance: number): Place[] {
  const kept: Place[] = []
  for (const place of places) if (kept.every((other) => Math.abs(other.omega - place.omega) >= distance)) kept.push(place)
  return kept
}

/** Goes up from a place: at each position the summit over frequency next to it, and of those the highest over the position. */
function follow(search: Search, seed: Place): void {
  const { table, tooth } = search
  const i = table.ts.indexOf(seed.t)
  const from = table.ts[Math.max(0, i - 1)] as number
  const to = table.ts[Math.min(table.ts.length - 1, i + 1)] as number
  let { omega } = seed
  const summit = (t: number): number => {
    const transfer = transferOf(frozenAt(search, t))
    const out = new Float64Array(4 * transfer.channels)
    const gainAt = (at: number): number => {
      transferAt(transfer, at, out, seed.channel)
      return Math.hypot(out[4 * seed.channel] as number, out[4 * seed.channel + 1] as number)
    }
    const low = Math.max(0, omega - tooth / 3)
    const high = Math.min(Math.PI, omega + tooth / 3)
    const top = goldenMaximum(gainAt, low, high, tooth * 1e-4)
    for (const at of [top.at, low, high]) {
      const gain = gainAt(at)
      if (gain > search.best.gain) search.best = { channel: seed.channel, omega: at, t, gain }
    }
    return top.value
  }
  summit(seed.t)
  if (to === from) return
  if (search.best.t === seed.t) omega = search.best.omega
  goldenMaximum(summit, from, to, (to - from) * 0.02)
}

/** What no held position and no frequency exceeds, linear; Infinity where the loop gain is not below 1. A fraction of a millisecond. */
export function largestGainBound(set: ParameterSet, sampleRate = set.sampleRate): number {
  return Math.max(...groundOf(set, sampleRate).bounds.map((bound) => largestBound(bound).value))
}
