// How large a signal can become in the line and at the output: the worst gain over frequency and sweep, the worst sample of an input within full scale held
// anywhere (l1 norm), and a bound on that sample for any movement. All for inputs within ±1, so that a gain in dB is also a level in dB of full scale.
import type { ParameterSet } from '../set/types.ts'
import { freeze } from './frozen.ts'
import type { LargestGain } from './levelsPlace.ts'
import { largestGain } from './levelsSearch.ts'
import { freezeAtLargestSlope, lineAsOutput, sweepStands } from './levelsSet.ts'
import { type PeakBounds, peakBounds, readL1 } from './lineNorm.ts'
import { impulseNorm } from './lineNormFrozen.ts'
import { toneMax } from './norms.ts'
import { everyPositionStable } from './polesSweep.ts'
import { sectorOf } from './sector.ts'

export interface HeldNorm {
  /** ‖h‖₁ as far as it was run, and with the bound on its tail (null: not seen to decay). */
  readonly sum: number
  readonly bound: number | null
  readonly channel: number
  readonly position: number
  readonly samples: number
}

export interface LevelFigure {
  /** Worst gain over frequency and sweep, shapers by the largest gain they have; null where some held position is not stable. */
  readonly worst: LargestGain | null
  /** Worst sample, the sweep held at the positions tried where it is largest; null where some held position is not stable. */
  readonly l1: HeldNorm | null
  /** Worst sample for any movement of the delays; with shapers their ceilings count. null: no such bound. */
  readonly anyMovement: number | null
  /** True where that bound, and not the gain, limits the level: a shaper's ceiling. */
  readonly heldByShaper: boolean
  /** The figure that is judged: 20 log10 of the smaller of worst gain and shapers' bound; null where neither is finite. Silence is −400. */
  readonly db: number | null
  /** 20 log10 of the worst sample, likewise; null where there is none. */
  readonly sampleDb: number | null
}

export interface LevelFigures {
  /** At the output. */
  readonly peak: LevelFigure
  /** Of w, what is written into the line. */
  readonly line: LevelFigure
  readonly peakBounds: PeakBounds
  readonly lineBounds: PeakBounds
}

const SILENCE = 1e-20
/** Positions of which the likeliest are run, and samples a run may take. */
const LOOKED_AT = 24
const RUN = 3
const MOST_SAMPLES = 60_000

/** 20 log10, held at −400; what rounding leaves of a gain of 1 is 0 dB. */
export function levelDb(gain: number): number {
  const db = 20 * Math.log10(Math.max(SILENCE, gain))
  return Math.abs(db) < 1e-12 ? 0 : db
}

/** Levels at the output and in the line of a valid set run at `sampleRate` Hz. Milliseconds. */
export function levelFigures(set: ParameterSet, sampleRate = set.sampleRate): LevelFigures {
  const lineSet = lineAsOutput(set)
  const stable = stableEverywhere(set, sampleRate)
  const bounds = { peakBounds: peakBounds(set, sampleRate), lineBounds: peakBounds(lineSet, sampleRate) }
  const norms = stable ? heldNorms(set, sampleRate, bounds) : null
  return {
    peak: levelFigure(set, { worst: stable ? largestGain(set, sampleRate) : null, l1: norms?.output ?? null }, bounds.peakBounds),
    line: levelFigure(lineSet, { worst: stable ? largestGain(lineSet, sampleRate) : null, l1: norms?.line ?? null }, bounds.lineBounds),
    ...bounds,
  }
}

function levelFigure(set: ParameterSet, { worst, l1 }: Pick<LevelFigure, 'worst' | 'l1'>, { output }: PeakBounds): LevelFigure {
  // What never moves is bounded by what it does where it stands.
  const anyMovement = sweepStands(set) ? smallest(output, l1?.bound ?? null) : output
  const bends = set.input.shaper !== null || set.mix.shaper !== null || (set.loop.shaper !== null && set.loop.feedback !== 0)
  const ceiling = bends ? output : null
  const heldByShaper = ceiling !== null && (worst === null || ceiling < worst.gain)
  const gain = heldByShaper ? ceiling : (worst?.gain ?? null)
  const sample = smallest(l1 && (l1.bound ?? output ?? l1.sum), ceiling)
  return {
    worst,
    l1,
    anyMovement,
    heldByShaper,
    db: gain === null ? null : levelDb(gain),
    sampleDb: sample === null ? null : levelDb(sample),
  }
}

function smallest(a: number | null, b: number | null): number | null {
  return a === null ? b : b === null ? a : Math.min(a, b)
}

/** Whether every held position is stable with the shaper at its largest gain: without it no gain is finite. */
function stableEverywhere(set: ParameterSet, sampleRate: number): boolean {
  const { bound: slope, bothSigns } = sectorOf(set.loop.shaper)
  if (Math.abs(set.loop.feedback) * slope * toneMax(freeze(set, 0, sampleRate).loop.tone) < 1) return true
  return everyPositionStable(set, sampleRate, { slope, bothSigns, oneGain: true })
}

/** A held norm that comes so close to what any movement can do is the largest. */
const ENOUGH = 0.995

function heldNorms(
  set: ParameterSet,
  sampleRate: number,
  { peakBounds: { output }, lineBounds: { output: line } }: Pick<LevelFigures, 'peakBounds' | 'lineBounds'>,
): { readonly output: HeldNorm; readonly line: HeldNorm } {
  const largest = { output: NO_NORM, line: NO_NORM }
  for (const position of likelyPositions(set, sampleRate)) {
    const { outputs, lines, samples } = impulseNorm(freezeAtLargestSlope(set, position, sampleRate), MOST_SAMPLES)
    for (const [key, norms] of [['output', outputs] as const, ['line', lines] as const]) {
      norms.forEach((norm, channel) => {
        if (norm.sum > largest[key].sum) largest[key] = { ...norm, channel, position, samples }
      })
    }
    if (output !== null && line !== null && largest.output.sum > ENOUGH * output && largest.line.sum > ENOUGH * line) break
  }
  return largest
}

const NO_NORM: HeldNorm = { sum: 0, bound: 0, channel: 0, position: 0, samples: 0 }

/** Positions at which the reads' own l1 norms multiply to most, alike ones in an order that spreads over the cycle. */
function likelyPositions(set: ParameterSet, sampleRate: number): number[] {
  const looped = set.loop.feedback !== 0
  // Nothing that is heard moves.
  if (sweepStands(set) || (set.mix.wet === 0 && (!looped || set.loop.delay === 'fixed'))) return [set.sweep.startPhase]
  const tried = Array.from({ length: LOOKED_AT }, (_, i) => {
    const position = ((i + 1) * 0.6180339887498949) % 1
    const { channels, loop } = freeze(set, position, sampleRate)
    const voices = Math.max(...channels.map((channel) => channel.voices.reduce((sum, read) => sum + readL1(read), 0)))
    const around = looped ? Math.abs(loop.gain) * Math.max(...loop.reads.map(readL1)) : 0
    return { position, estimate: voices / Math.max(1e-3, 1 - around) }
  })
  return tried
    .sort((a, b) => b.estimate - a.estimate)
    .slice(0, RUN)
    .map(({ position }) => position)
}
