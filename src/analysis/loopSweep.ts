// The loop at every place its sweep can stand. Lines that do not hear each other, or stand at the same delay, depend on that delay alone and are walked
// over the delays reached; crossed lines at different phases are walked over the positions of the cycle.

import { smallestDelay } from '../set/delayRange.ts'
import type { ParameterSet } from '../set/types.ts'
import { type FrozenLoop, freeze, frozenLoopDelay } from './frozen.ts'
import { frozenRead } from './frozenRead.ts'
import { type LoopLine, logGain, logGainResult } from './loopLine.ts'
import { loopParts } from './loopPair.ts'
import { bisect, goldenMaximum } from './loopSearch.ts'
import { loopMovement } from './movingRead.ts'
import { lineMax } from './norms.ts'
import { shapeCorners } from './sweepSlope.ts'

export interface LoopSweep {
  /** What is walked: a delay in samples, a position of the cycle, or nothing. */
  readonly over: 'delay' | 'position' | 'still'
  readonly from: number
  readonly to: number
  /** Places to look at first, ascending, ends included. */
  readonly places: readonly number[]
  /**
   * Places always looked at in full: positions at which both lines stand at one delay, and so come round in phase everywhere; delays that end the sweep or bring
   * the loudest frequency round in phase.
   */
  readonly together: readonly number[]
  readonly at: (place: number) => FrozenLoop
}

/** Even places before refining, and how many of the places are looked at in full after a cheap look at all. */
const EVEN = 8
const POSITIONS = 128
const FULL_LOOKS = 6
/** Shortest delay, samples, from which on poles are so dense that the cheap look tells places apart. */
const DENSE = 24
const scratch = logGainResult()

/** The frozen loops of a set over its sweep at `sampleRate` Hz. */
export function loopSweep(set: ParameterSet, sampleRate = set.sampleRate): LoopSweep {
  const movement = loopMovement(set, sampleRate)
  const template = freeze(set, set.sweep.startPhase, sampleRate).loop
  const least = smallestDelay(set.loop.interpolation, 'loop')
  if (!movement.moves) {
    const place = set.sweep.startPhase
    return { over: 'still', from: place, to: place, places: [place], together: [], at: () => template }
  }
  const oneDelay = template.crossFeed === 0 || set.sweep.stereoPhase % 360 === 0
  if (!oneDelay) {
    const at = (position: number): FrozenLoop => ({
      ...template,
      reads: [0, 1].map((line) => frozenRead(set.loop.interpolation, Math.max(least, frozenLoopDelay(set, position, line, sampleRate)))),
    })
    const turn = set.sweep.stereoPhase / 360
    const corners = shapeCorners(set.sweep).flatMap((phi) => [phi, phi - turn - Math.floor(phi - turn)])
    const even = Array.from({ length: POSITIONS + 1 }, (_, i) => i / POSITIONS)
    const apart = (position: number) => frozenLoopDelay(set, position, 0, sampleRate) - frozenLoopDelay(set, position, 1, sampleRate)
    const together = meetings(apart, ascending([...even, ...corners]))
    return { over: 'position', from: 0, to: 1, places: ascending([...even, ...corners, ...together]), together, at }
  }
  const lines = template.crossFeed === 0 ? 1 : template.reads.length
  const at = (delay: number): FrozenLoop => {
    const read = frozenRead(set.loop.interpolation, delay)
    return { ...template, reads: Array.from({ length: lines }, () => read) }
  }
  const { minSamples: from, maxSamples: to } = movement
  const places = delayPlaces(from, to, at)
  return { over: 'delay', from, to, ...places, at }
}

/** Where a function that is smooth between `places` changes sign. */
function meetings(apart: (place: number) => number, places: readonly number[]): number[] {
  return places.flatMap((to, i) => {
    const from = places[i - 1]
    if (from === undefined || apart(from) >= 0 === apart(to) >= 0) return []
    return [bisect((t) => apart(t) >= 0, from, to)]
  })
}

/** Ends, whole and half delays next to them (no loss there, or a recursive read at its longest), even steps, and the delays at which the loudest frequency comes round in phase. */
function delayPlaces(from: number, to: number, at: (delay: number) => FrozenLoop): Pick<LoopSweep, 'places' | 'together'> {
  const even = Array.from({ length: EVEN + 1 }, (_, i) => from + ((to - from) * i) / EVEN)
  const whole = [0, 0.5, 1, 1.5, 2, 2.5, 3].flatMap((i) => [Math.floor(to) - i, Math.floor(to) + 0.5, Math.ceil(from) + i])
  const aligned = loopParts(at(to), 1).lines.flatMap((line) => alignedDelays(line, from, to))
  const places = [...even, ...even.map(Math.round), ...whole, ...aligned, ...aligned.map(Math.round)]
  const reached = (delays: readonly number[]) => ascending(delays.filter((delay) => delay >= from && delay <= to))
  // Between a low cut and damping one narrow band is loudest: where it comes round in phase counts for more than the delay's length.
  const { lowPass, highPass } = at(to).tone
  const peaked = lowPass !== null && highPass !== null
  const together = from < DENSE ? places : [from, to, Math.floor(to), Math.ceil(from), ...aligned, ...(peaked ? even : [])]
  return { places: reached(places), together: reached(together) }
}

/** Delays in reach, from both ends inwards, at which the angle of largest |F| has phase 0. */
function alignedDelays(line: LoopLine, from: number, to: number): number[] {
  const { theta } = lineMax(line)
  if (!(theta > 1e-9) || line.gain === 0) return []
  const { phase } = logGain(line, 0, theta, scratch)
  // phase − D θ = 2π k for the largest D ≤ to and the smallest D ≥ from.
  const longer = line.delay - to
  const last = Math.floor((line.delay * theta - phase) / (2 * Math.PI))
  const first = Math.ceil(((from + longer) * theta - phase) / (2 * Math.PI))
  return [last, last - 1, first, first + 1].map((turns) => (2 * Math.PI * turns + phase) / theta - longer)
}

const ascending = (values: readonly number[]): number[] => [...new Set(values)].sort((a, b) => a - b)

/** A cheap stand-in for a costly score, used to choose among positions. */
export type Score = (loop: FrozenLoop) => number

/**
 * Where over the sweep `score` is largest: at the places, then by golden section about the best. Stops early once `enough` is exceeded. Positions, of which
 * there are many, are first ordered by `estimate`.
 */
export function worstPlace(
  sweep: LoopSweep,
  score: Score,
  { enough = Number.POSITIVE_INFINITY, estimate = score }: { readonly enough?: number; readonly estimate?: Score } = {},
): { place: number; score: number } {
  let best = { place: sweep.places[0] as number, score: Number.NEGATIVE_INFINITY }
  const consider = (place: number): number => {
    const value = score(sweep.at(place))
    if (value > best.score) best = { place, score: value }
    return value
  }
  // The far end first: a longer loop dies away more slowly, and a caller that only needs "enough" is often served at once.
  const places = sweep.over === 'position' || estimate !== score ? likeliest(sweep, estimate) : [...sweep.places].reverse()
  for (const place of places) {
    consider(place)
    if (best.score > enough) return best
  }
  if (sweep.over === 'still') return best
  const i = sweep.places.indexOf(best.place)
  const before = sweep.places[i - 1] ?? sweep.from
  const after = sweep.places[i + 1] ?? sweep.to
  if (sweep.over === 'position') {
    const low = Math.max(before, best.place - 1)
    const high = Math.min(after, best.place + 1)
    if (high > low) consider(goldenMaximum((t) => estimate(sweep.at(t)), low, high, 1e-6).at)
    return best
  }
  // Between distant places first, then within the sample, whose whole and half delays are corners of what is looked for.
  const start = best.place
  const below = sweep.places.findLast((place) => place < start - 2)
  const above = sweep.places.find((place) => place > start + 2)
  if (below !== undefined) goldenMaximum(consider, below, start, 0.7)
  if (above !== undefined) goldenMaximum(consider, start, above, 0.7)
  const within = (delay: number) => Math.min(sweep.to, Math.max(sweep.from, delay))
  const { place } = best
  if (!sweep.places.includes(place)) for (const delay of cornersAbout(place)) consider(within(delay))
  const tolerance = sweep.from < DENSE ? 0.002 : 0.02
  const centre = best.place
  const [low, high] = [within(Math.max(before, centre - 1)), within(Math.min(after, centre + 1))]
  if (centre - low > tolerance) goldenMaximum(consider, low, centre, tolerance)
  if (high - centre > tolerance) goldenMaximum(consider, centre, high, tolerance)
  return best
}

/** Whole delays either side, and half ones with what is read just below them. */
function cornersAbout(delay: number): number[] {
  const whole = Math.floor(delay)
  return [whole, whole + 1, whole - 0.5, whole + 0.5, whole + 0.5 - 1e-9, whole + 1.5 - 1e-9]
}

/** The places of highest estimate, that one first, and those where the lines meet. */
function likeliest(sweep: LoopSweep, estimate: Score): number[] {
  const best = sweep.places
    .map((place) => ({ place, value: estimate(sweep.at(place)) }))
    .sort((a, b) => b.value - a.value)
    .slice(0, FULL_LOOKS)
    .map(({ place }) => place)
  return [...new Set([...best, ...sweep.together])]
}
