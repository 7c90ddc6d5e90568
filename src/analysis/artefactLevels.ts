// From powers by bin to decibels: artefacts of voices and loop in the wet signal, over the whole of it and per octave.
import type { ParameterSet } from '../set/types.ts'
import { toDb } from '../signal/levels.ts'
import type { GroupPower, Measured } from './artefactMeasure.ts'
import { noiseTopHz } from './artefactNoise.ts'
import { chainAt, type FilterChain, loopChain, wetChain } from './filterChain.ts'
import { freeze } from './frozen.ts'

export interface ArtefactBand {
  readonly centreHz: number
  /** Artefacts in this octave against the wet signal in it, dB. */
  readonly db: number
  /** The wet signal in this octave against all of it, dB. */
  readonly wetDb: number
}

/** Artefacts against the wet signal, dB, never below −400. */
export interface ArtefactLevels {
  /** The larger of the next two. */
  readonly db: number
  readonly cycleDb: number
  readonly steepestDb: number
  /** Of the group that `db` is from. */
  readonly bands: readonly ArtefactBand[]
  /** Of the voices' reads, and of the loop's read, alone in that group; null without a moving loop. */
  readonly voicesDb: number
  readonly loopDb: number | null
  /** What stands still of the difference against the reference in that group: the interpolator's mean loss, which tone.droop tells. */
  readonly standingDb: number
}

/** What the filters do at each bin: |wet filters|², and the power that a pass's error comes to in the line, against one pass's. */
export interface ArtefactWeights {
  readonly sampleRate: number
  readonly wet: Float64Array
  readonly loop: Float64Array
}

/** At most this many passes' worth of error in the line: 60 dB of loop gain margin is nowhere near, a loop at its limit is. */
const MOST_PASSES = 1000

/**
 * Weights at bins 0 … fs/2. The error e of one pass comes back filtered by a = g F (small-signal slope of the loop shaper included): Σ a^(2k), k ≥ 1, =
 * a²/(1 − a²), the phases of successive passes being unrelated while the delay moves. Held at a thousand passes.
 */
export function artefactWeights(set: ParameterSet, sampleRate: number, bins: number): ArtefactWeights {
  const frozen = freeze(set, 0, sampleRate)
  const power = powerOf(bins)
  const wet = power(wetChain(frozen))
  const loop = power(loopChain(frozen)).map((a2) => (a2 < 1 ? Math.min(MOST_PASSES, a2 / (1 - a2)) : MOST_PASSES))
  return { sampleRate, wet, loop }
}

const powerOf = (bins: number) => (chain: FilterChain) =>
  Float64Array.from({ length: bins }, (_, k) => {
    const angle = (Math.PI * k) / (bins - 1)
    const h = new Float64Array(4)
    chainAt(chain, Math.cos(angle), -Math.sin(angle), h)
    return (h[0] as number) ** 2 + (h[1] as number) ** 2
  })

export function artefactLevels({ voices, loop }: Measured, weights: ArtefactWeights): ArtefactLevels {
  const cycle = groupOf(voices.cycle, loop?.cycle ?? null, weights)
  const steepest = groupOf(voices.steepest, loop?.steepest ?? null, weights)
  const [cycleDb, steepestDb] = [ratioDb(cycle.moving, cycle.wet), ratioDb(steepest.moving, steepest.wet)]
  const worse = steepestDb > cycleDb ? steepest : cycle
  return {
    db: Math.max(cycleDb, steepestDb),
    cycleDb,
    steepestDb,
    bands: bandsOf(worse, weights.sampleRate),
    voicesDb: ratioDb(worse.voices, worse.wet),
    loopDb: loop && ratioDb(worse.loop, worse.wet),
    standingDb: ratioDb(worse.standing, worse.wet),
  }
}

interface Weighted {
  readonly wet: Float64Array
  readonly moving: Float64Array
  readonly voices: Float64Array
  readonly loop: Float64Array
  readonly standing: Float64Array
}

function groupOf(voices: GroupPower, loop: GroupPower | null, { wet, loop: passes }: ArtefactWeights): Weighted {
  const weighted = (power: Float64Array) => power.map((p, k) => p * (wet[k] as number))
  const ofVoices = weighted(voices.moving)
  // The loop's error is read by the voices like everything in the line: by as much as their sum is louder or softer than one read.
  const scale = loop ? total(voices.signal) / total(loop.signal) : 0
  const ofLoop = loop ? loop.moving.map((p, k) => p * scale * (passes[k] as number) * (wet[k] as number)) : new Float64Array(wet.length)
  const moving = ofVoices.map((p, k) => p + (ofLoop[k] as number))
  return { wet: weighted(voices.signal), moving, voices: ofVoices, loop: ofLoop, standing: weighted(voices.standing) }
}

/** Octaves from 62.5 Hz up, as far as the noise reaches. */
function bandsOf({ wet, moving }: Weighted, sampleRate: number): ArtefactBand[] {
  const all = total(wet)
  const perHz = (2 * (wet.length - 1)) / sampleRate
  const bands: ArtefactBand[] = []
  for (let centreHz = 62.5; centreHz / Math.SQRT2 < noiseTopHz(sampleRate); centreHz *= 2) {
    const from = Math.ceil((centreHz / Math.SQRT2) * perHz)
    const to = Math.min(wet.length, Math.ceil(centreHz * Math.SQRT2 * perHz))
    const inBand = total(wet.subarray(from, to))
    bands.push({ centreHz, db: ratioDb(moving.subarray(from, to), wet.subarray(from, to)), wetDb: powerDb(inBand / all) })
  }
  return bands
}

const total = (power: Float64Array): number => power.reduce((sum, p) => sum + p, 0)
const powerDb = (power: number): number => toDb(Math.sqrt(power))
/** Two silences are −400 dB apart. */
function ratioDb(part: Float64Array, whole: Float64Array): number {
  const below = total(whole)
  return below > 0 ? powerDb(total(part) / below) : powerDb(0)
}
