// A brief speaks of "first notch from 200 Hz to 2 kHz". This is that quantity: the lowest notch or peak of the comb, and
// where it stands at both ends of the sweep.
import { edge, frozenShapeValue } from '../dsp/sweep.ts'
import type { ParameterSet } from '../set/types.ts'
import { type Extreme, type ExtremeKind, frozenExtremes } from './extremes.ts'
import { type Frozen, freeze } from './frozen.ts'

/** Part of 1/(longest delay) below which an extreme is a filter's doing, as the hump that a low cut leaves: its lead puts that at ¼ at most, combs turn from ½ on. */
const FILTER_PART = 0.4
/** Teeth of the longest delay within which a comb turns at the latest: two delays a thousandth apart make the widest. */
const MOST_TEETH = 1000
/** Root search of a first extreme, Hz: fine enough to take differences of. */
const FIRST_WITHIN_HZ = 1e-6

/**
 * Lowest notch or peak above 0 Hz of the first output channel with the sweep held at `position`, null when there is none up to
 * sampleRate/2 or a thousand times 1/(longest delay). Turns below 0.4/(longest delay, low-pass filters’ own included), which only filters make, are passed over.
 */
export function firstExtreme(set: ParameterSet, kind: ExtremeKind, position: number, sampleRate = set.sampleRate): Extreme | null {
  return firstOfFrozen(freeze(set, position, sampleRate), kind)
}

/** The same of a frozen set. */
export function firstOfFrozen(frozen: Frozen, kind: ExtremeKind): Extreme | null {
  const left = firstChannel(frozen)
  const nyquist = frozen.sampleRate / 2
  const lag = lowPassDelay(frozen.loop.tone.lowPass) + lowPassDelay(frozen.wetTone.lowPass)
  const tooth = frozen.sampleRate / (longestOwnDelay(left) + lag)
  const end = Math.min(nyquist, MOST_TEETH * tooth)
  for (let maxHz = 2 * tooth; ; maxHz *= 4) {
    const found = frozenExtremes(left, { maxHz: Math.min(maxHz, end), withinHz: FIRST_WITHIN_HZ })
    const first = found.find((extreme) => extreme.kind === kind && extreme.frequencyHz >= FILTER_PART * tooth)
    if (first) return first
    if (maxHz >= end) return null
  }
}

/** The first channel alone, with the line it reads; with both lines where they feed each other. */
export function firstChannel(frozen: Frozen): Frozen {
  const channels = frozen.channels.slice(0, 1)
  if (frozen.loop.crossFeed !== 0 && frozen.loop.gain !== 0) return { ...frozen, channels }
  return { ...frozen, channels, lines: 1, loop: { ...frozen.loop, crossFeed: 0, reads: frozen.loop.reads.slice(0, 1) } }
}

/** Longest delay that the first channel itself is made of, samples, at least 1. */
export function longestOwnDelay({ channels, loop, dryDelay }: Frozen): number {
  const voices = channels[0]?.voices ?? []
  const reads = loop.gain === 0 ? voices : [...voices, ...loop.reads.slice(0, 1)]
  return Math.max(1, dryDelay, ...reads.map((read) => read.delaySamples))
}

/** Delay of (1−a)/(1−a z⁻¹) at 0 Hz, samples. */
const lowPassDelay = (pole: number | null) => (pole === null ? 0 : pole / (1 - pole))

export interface SweepEnds {
  /** Position and s where voice 0 of the first channel reads furthest back, and nearest. */
  readonly longest: { readonly position: number; readonly s: number }
  readonly shortest: { readonly position: number; readonly s: number }
}

/** The ends of the sweep of the first channel's first voice; at rate 0 both are where it stands. */
export function sweepEnds(set: ParameterSet): SweepEnds {
  const { shape, rateHz, startPhase, points } = set.sweep
  const at = (position: number) => ({ position, s: frozenShapeValue(set.sweep, position) })
  if (rateHz === 0) return { longest: at(startPhase), shortest: at(startPhase) }
  if (shape === 'drawn') {
    const ordered = [...points].sort((a, b) => a[1] - b[1])
    return { longest: at(ordered.at(-1)?.[0] ?? 0), shortest: at(ordered[0]?.[0] ?? 0) }
  }
  if (shape === 'rampUp' || shape === 'rampDown') {
    // Without an edge the jump's far side is reached only in the limit.
    const e = edge(set.sweep)
    const start = at(e / 2)
    const end = at(e === 0 ? 1 - 1e-12 : 1 - e / 2)
    return shape === 'rampUp' ? { longest: end, shortest: start } : { longest: start, shortest: end }
  }
  return { longest: at(0.25), shortest: at(0.75) }
}

export interface FirstExtremeRange {
  /** At the largest delay of the sweep, and at the smallest; null where there is no such extreme. */
  readonly lowHz: number | null
  readonly highHz: number | null
}

/** The first notch or peak at both ends of the sweep: "from … to …". */
export function firstExtremeRange(set: ParameterSet, kind: ExtremeKind, sampleRate = set.sampleRate): FirstExtremeRange {
  const ends = sweepEnds(set)
  return {
    lowHz: firstExtreme(set, kind, ends.longest.position, sampleRate)?.frequencyHz ?? null,
    highHz: firstExtreme(set, kind, ends.shortest.position, sampleRate)?.frequencyHz ?? null,
  }
}
