// The largest |H| over frequency and sweep. Rows of one frequency over every position are looked at where the bound of levelsBound.ts is largest first; the
// best places are followed to their summits, and the search ends when what was found comes up to the bound, or the work allowed for is done: then the true
// largest lies between the two, and both are given.
import { frozenShapeValue, phaseOffset, wrapPhase } from '../dsp/sweep.ts'
import type { ParameterSet } from '../set/types.ts'
import { frozenExtremes } from './extremes.ts'
import { type Frozen, freeze } from './frozen.ts'
import { frozenRead } from './frozenRead.ts'
import { boundAt, type FrequencyBound, frequencyBound, hasFilters, largestBound } from './levelsBound.ts'
import { freezeAtLargestSlope, lineAsOutput, readsTogether } from './levelsSet.ts'
import { goldenMaximum } from './loopSearch.ts'
import { type PathTable, pathPositions, pathStretches, pathTable } from './pathTable.ts'
import { createTuning, pathValues, type Tuning, tune } from './pathValues.ts'
import { pathDelays, pathReads, type SweepPath, sweepPath } from './sweepPath.ts'
import { shapeCorners } from './sweepSlope.ts'
import { transferAt, transferOf } from './transfer.ts'

export interface LargestGain {
  /** Reached: |H| at this place. */
  readonly gain: number
  /** No held position and no frequency has more; Infinity where the loop gain is not below 1. */
  readonly bound: number
  readonly channel: number
  readonly frequencyHz: number
  /** Position of the cycle, of voice 0 of channel 0, at which `channel` (or its like) has this gain. */
  readonly position: number
  /** Delay of the channel's first voice there, ms. */
  readonly delayMs: number
}

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

interface Place {
  readonly channel: number
  readonly omega: number
  readonly t: number
  readonly gain: number
}

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
  if (ground.path.stops.length === 1) return standing(ground, quick)
  const search = createSearch(ground, quick)
  const rows = rowsOf(search, top)
  const cost = search.table.first.length
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

interface Ground {
  readonly path: SweepPath
  readonly frozen: Frozen
  readonly bounds: readonly FrequencyBound[]
  readonly delays: Float64Array
}

function groundOf(set: ParameterSet, sampleRate: number): Ground {
  const path = sweepPath(set, sampleRate)
  const frozen = freezeAtLargestSlope(set, 0, sampleRate)
  return {
    path,
    frozen,
    bounds: Array.from({ length: path.walked }, (_, c) => frequencyBound(frozen, c, inPhase(set, frozen, c))),
    delays: new Float64Array(pathReads(path)),
  }
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

/** One position: every peak of its response. */
function standing({ path, frozen, delays, bounds }: Ground, ends: Place): LargestGain {
  const held = frozenAt({ path, frozen, delays, bounds }, ends.t)
  const perHz = (2 * Math.PI) / path.sampleRate
  let best = ends
  for (const { kind, channel, frequencyHz, db } of frozenExtremes(held, { withinHz: toothOf(held) / perHz / 1e4 })) {
    const gain = 10 ** (db / 20)
    if (kind === 'peak' && gain > best.gain) best = { channel, omega: frequencyHz * perHz, t: ends.t, gain }
  }
  return named(path, best, best.gain)
}

const toothOf = (frozen: Frozen): number => (2 * Math.PI) / transferOf(frozen).longest

function createSearch({ path, frozen, bounds, delays }: Ground, best: Place): Search {
  const stretches = pathStretches(path)
  let lowest = Number.POSITIVE_INFINITY
  let highest = 0
  for (const t of stretches.length === 0 ? path.stops : stretches.flatMap(({ from, to }) => [from, to])) {
    pathDelays(path, t, delays)
    for (const delay of delays) {
      lowest = Math.min(lowest, delay)
      highest = Math.max(highest, delay)
    }
  }
  // Two positions a sample of travel meet whole delays, where a read loses nothing.
  const table = pathTable(path, pathPositions(path, stretches, 2, MOST_POSITIONS))
  return {
    path,
    frozen,
    table,
    delays,
    tuning: createTuning(frozen, Math.max(0, Math.floor(lowest) - 3), Math.ceil(highest) + 5),
    values: new Float64Array(2 * table.ts.length),
    bounds,
    tooth: (2 * Math.PI) / Math.max(1, highest, frozen.dryDelay),
    best,
  }
}

const inPhase = (set: ParameterSet, { dryDelay, loop }: Frozen, c: number): boolean =>
  dryDelay === 0 && loop.crossFeed === 0 && readsTogether(set, c)

const highestAt = ({ bounds }: Search, omega: number): number => Math.max(...bounds.map((bound) => boundAt(bound, omega)))

/** ω of every row, the likeliest first: where the bound is largest, the first teeth, and between them the whole range spread evenly by the golden ratio. */
function rowsOf(search: Search, top: number): number[] {
  const { tooth, bounds } = search
  const step = tooth / POINTS_PER_TOOTH
  const near = [0, Math.PI, top]
  for (let i = 1; i <= 2 * POINTS_PER_TOOTH; i++) near.push(i * step, top - i * step, top + i * step)
  const spread = standingPeaks(search) ?? Array.from({ length: SPREAD }, (_, i) => Math.PI * (((i + 1) * 0.6180339887498949) % 1))
  const inside = (omega: number) => omega >= 0 && omega <= Math.PI
  if (!bounds.some(hasFilters)) return alternating(near.filter(inside), spread)
  const bound = (omega: number) => Math.max(...bounds.map((b) => boundAt(b, omega)))
  const ranked = spread.map((omega) => ({ omega, value: bound(omega) })).sort((a, b) => b.value - a.value)
  return alternating(
    near.filter(inside),
    ranked.map(({ omega }) => omega),
  )
}

/** A loop that stands while the voices move rings at its own frequencies, and only there: its peaks up to the 400th. null for others. */
function standingPeaks({ path: { set, sampleRate }, frozen }: Search): number[] | null {
  if (frozen.loop.gain === 0 || set.loop.delay !== 'fixed') return null
  const line = freezeAtLargestSlope(lineAsOutput(set), 0, sampleRate)
  const tooth = toothOf(line)
  const perHz = (2 * Math.PI) / sampleRate
  const maxHz = Math.min(sampleRate / 2, (SPREAD * tooth) / perHz)
  return frozenExtremes(line, { maxHz, withinHz: tooth / perHz / 1e4 })
    .filter(({ kind }) => kind === 'peak')
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

/** The path's state at t as a frozen set, from which one channel's response is had exactly. */
function frozenAt({ path, frozen, delays }: Ground, t: number): Frozen {
  pathDelays(path, t, delays)
  const { set, lines } = path
  const voices = set.voices.count
  // A line that is not walked stands like the first.
  const loopOf = (line: number) => delays[line < lines ? line : 0] as number
  return {
    ...frozen,
    loop: { ...frozen.loop, reads: frozen.loop.reads.map((_, line) => frozenRead(set.loop.interpolation, loopOf(line))) },
    channels: frozen.channels.map((channel, c) => ({
      ...channel,
      voices: channel.voices.map((_, v) =>
        frozenRead(set.line.interpolation, delays[lines + (c < path.walked ? c * voices : 0) + v] as number),
      ),
    })),
  }
}

function named(path: SweepPath, best: Place, bound: number): LargestGain {
  const { set, sampleRate } = path
  // Channels that do not hear each other's sweep are walked as if in phase.
  const walked = path.offsets === null ? 0 : (path.offsets[path.lines + best.channel * set.voices.count] as number)
  const phase = (path.offsets === null ? positionOf(set, best.t) : best.t) + walked
  const position = path.stops.length === 1 ? best.t : wrapPhase(phase - phaseOffset(set, best.channel, 0))
  const { channels } = freeze(set, position, sampleRate)
  return {
    gain: best.gain,
    bound: Math.max(bound, best.gain),
    channel: best.channel,
    frequencyHz: (best.omega * sampleRate) / (2 * Math.PI),
    position,
    delayMs: ((channels[best.channel]?.voices[0]?.delaySamples ?? 0) * 1000) / sampleRate,
  }
}

/** The first position of the cycle at which the shape stands at s. */
function positionOf({ sweep }: ParameterSet, s: number): number {
  const corners = [0, ...shapeCorners(sweep), 1]
  let nearest = { position: 0, away: Number.POSITIVE_INFINITY }
  const visit = (position: number) => {
    const away = Math.abs(frozenShapeValue(sweep, position) - s)
    if (away < nearest.away - 1e-12) nearest = { position: wrapPhase(position), away }
  }
  for (let i = 1; i < corners.length; i++) {
    let a = corners[i - 1] as number
    let b = (corners[i] as number) - 1e-12
    if (b <= a) continue
    visit(a)
    const rising = frozenShapeValue(sweep, b) > frozenShapeValue(sweep, a)
    for (let k = 0; k < 60; k++) {
      const middle = (a + b) / 2
      if (frozenShapeValue(sweep, middle) < s === rising) a = middle
      else b = middle
    }
    visit(a)
    visit(b)
  }
  return nearest.position
}

/** What no held position and no frequency exceeds, linear; Infinity where the loop gain is not below 1. A fraction of a millisecond. */
export function largestGainBound(set: ParameterSet, sampleRate = set.sampleRate): number {
  return Math.max(...groundOf(set, sampleRate).bounds.map((bound) => largestBound(bound).value))
}
