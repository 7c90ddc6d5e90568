// Stability of the loop while it moves, in five words, the strongest that can be said (DESIGN 5). Frozen poles inside the unit circle prove nothing about
// a moving delay, so the proofs go through norms; every number a proof uses is kept for the working.
import type { ParameterSet } from '../set/types.ts'
import { freeze } from './frozen.ts'
import { largestCrossing } from './loopCrossing.ts'
import { loopParts } from './loopPair.ts'
import { type LoopMovement, loopMovement } from './movingRead.ts'
import { type CertifiedNorm, certifiedNorm } from './movingReadNorm.ts'
import { MOVING_CONSTANT, MOVING_LIMIT, READ_PEAK, toneL1, toneMax } from './norms.ts'
import { pairPolesOutside } from './polesPairWinding.ts'
import { everyPositionStable, isInside, type SweptPole, sweptGain, sweptPole } from './polesSweep.ts'
import { boundedLevel, type Sector, sectorOf } from './sector.ts'

export type StabilityWord = 'proven' | 'computed' | 'frozen' | 'bounded' | 'diverges'

/** What the word rests on. */
export type StabilityProof = 'noLoop' | 'poles' | 'still' | 'peak' | 'energy' | 'sweep' | 'frozen' | 'level' | 'none'

/** The closed-form part: everything but the certified norm and the positions one by one. */
export interface LoopGains {
  /** |g|. */
  readonly feedback: number
  readonly sector: Sector
  readonly movement: LoopMovement
  readonly readPeak: number
  readonly toneL1: number
  readonly toneMax: number
  /** C of the interpolator, where γ2 is defined at this ε. */
  readonly constant: number | null
  /** |g| σ ρ∞ ‖f‖₁: below 1 for any movement whatever. */
  readonly gammaInfinity: number
  /** |g| σ max|F| √(1 + C ε): below 1 for any movement of at most ε. null where C or ε does not allow it. */
  readonly gamma2: number | null
  /** |g| σ max|A F| over the frozen positions. */
  readonly frozenGain: number
}

export interface Stability extends LoopGains {
  readonly word: StabilityWord
  readonly proof: StabilityProof
  /** Certified N and γN = |g| σ max|F| N; null where they were not needed or cannot be had. */
  readonly norm: CertifiedNorm | null
  readonly gammaN: number | null
  /**
   * The smallest loop gain that is certified while the loop moves; null where none is. Of a loop that stands still, `max|L|`, its largest gain, or where that
   * passes 1 and its poles prove it all the same, `|L| in phase`, the largest gain at which it comes back in phase.
   */
  readonly certified: { readonly name: 'γ∞' | 'γ2' | 'γN' | 'max|L|' | '|L| in phase'; readonly value: number } | null
  /** Level the line stays below for an input within ±1, where the word is `frozen` or `bounded` and there is one. */
  readonly level: number | null
  /** Largest pole over the sweep, where the word needed it. */
  readonly pole: SweptPole | null
}

/** The loop gains of a set that need no rendering. sampleRate in Hz. */
export function loopGains(set: ParameterSet, sampleRate = set.sampleRate): LoopGains {
  const { tone } = freeze(set, 0, sampleRate).loop
  const kind = set.loop.interpolation
  const movement = loopMovement(set, sampleRate)
  const sector = sectorOf(set.loop.shaper)
  const feedback = Math.abs(set.loop.feedback)
  const gain = feedback * sector.bound
  const constant = movement.epsilon <= MOVING_LIMIT ? MOVING_CONSTANT[kind] : null
  const l1 = toneL1(tone)
  const max = toneMax(tone)
  return {
    feedback,
    sector,
    movement,
    readPeak: READ_PEAK[kind],
    toneL1: l1,
    toneMax: max,
    constant,
    gammaInfinity: gain * READ_PEAK[kind] * l1,
    gamma2: constant === null ? null : gain * max * Math.sqrt(1 + constant * movement.epsilon),
    frozenGain: gain === 0 ? 0 : sweptGain(set, sampleRate, sector.bound),
  }
}

/**
 * The strongest word for a valid set at `sampleRate` (Hz). Closed form but for `computed`, which factors the read operator over the sweep, and only where nothing
 * stronger holds and it could help. `norm` is also certified where it only makes what a weaker word says and offers more exact.
 */
export function stability(set: ParameterSet, sampleRate = set.sampleRate): Stability {
  return withNorm(set, sampleRate, stabilityWord(set, sampleRate))
}

/** The same word, proof, level and certified gain at a fraction of the cost: a norm that does not make the loop `computed` is left null. */
export function stabilityWord(set: ParameterSet, sampleRate = set.sampleRate): Stability {
  const gains = loopGains(set, sampleRate)
  const proven = provenStability(set, sampleRate, gains)
  if (proven !== null) return proven
  const gain = energyGain(gains)
  const norm = gain < 1 && gains.movement.moves ? certifiedNorm(set, sampleRate, { below: 1 / gain }) : null
  if (norm === null) return { ...gains, norm, gammaN: null, certified: null, ...weakerWord(set, sampleRate, gains) }
  const gammaN = gain * norm.norm
  return { ...gains, norm, gammaN, level: null, pole: null, word: 'computed', proof: 'sweep', certified: { name: 'γN', value: gammaN } }
}

/** |g| σ max|F|: the energy gain of a loop whose read is passive. */
const energyGain = ({ feedback, sector, toneMax: max }: LoopGains): number => feedback * sector.bound * max

/** Adds the certified norm to a word weaker than `computed`, where it says more than γ∞ and γ2 do. */
export function withNorm(set: ParameterSet, sampleRate: number, word: Stability): Stability {
  const gain = energyGain(word)
  if (word.word === 'proven' || word.norm !== null || !word.movement.moves || !(gain < 1)) return word
  const norm = certifiedNorm(set, sampleRate, { below: Math.min(word.gammaInfinity, word.gamma2 ?? Number.POSITIVE_INFINITY) / gain })
  return { ...word, norm, gammaN: norm && gain * norm.norm }
}

/** The word `proven` with what it rests on, or null where the set cannot be proven in closed form. Cheap: a millisecond or so. */
export function provenStability(set: ParameterSet, sampleRate = set.sampleRate, gains = loopGains(set, sampleRate)): Stability | null {
  const { feedback, sector, movement, gammaInfinity, gamma2, frozenGain } = gains
  const proven = (proof: StabilityProof, certified = smallestGain(gains), pole: SweptPole | null = null): Stability => {
    return { ...gains, norm: null, gammaN: null, level: null, pole, word: 'proven', proof, certified }
  }
  if (feedback * sector.bound === 0) return proven('noLoop', null)
  if (!movement.moves && set.loop.shaper === null) {
    const pole = stillPole(set, sampleRate)
    return pole === null ? null : proven('poles', frozenGain < 1 ? smallestGain(gains) : inPhaseGain(set, sampleRate), pole)
  }
  if (gammaInfinity < 1) return proven('peak')
  if (gamma2 !== null && gamma2 < 1) return proven('energy')
  return !movement.moves && frozenGain < 1 ? proven('still') : null
}

/** The largest pole of a loop that neither moves nor bends, if it lies inside the circle: which decides such a loop exactly. */
function stillPole(set: ParameterSet, sampleRate: number): SweptPole | null {
  const pole = sweptPole(set, sampleRate)
  if (pole === null || !isInside(pole)) return null
  const { pair } = loopParts(freeze(set, set.sweep.startPhase, sampleRate).loop)
  // Crossed lines too long to be searched through are counted round the circle.
  return pair !== null && pole.lnBound >= 0 && pairPolesOutside(pair, 0) > 0 ? null : pole
}

/** Largest |L| of a still loop where L is real and positive, if that is below 1: so far the feedback may be raised (Nyquist). Not known of crossed lines. */
function inPhaseGain(set: ParameterSet, sampleRate: number): Stability['certified'] {
  const { lines, pair } = loopParts(freeze(set, set.sweep.startPhase, sampleRate).loop)
  const value = pair === null ? Math.max(...lines.map(largestCrossing)) : Number.POSITIVE_INFINITY
  return value < 1 ? { name: '|L| in phase', value } : null
}

function weakerWord(set: ParameterSet, sampleRate: number, gains: LoopGains): Pick<Stability, 'word' | 'proof' | 'level' | 'pole'> {
  const { shaper } = set.loop
  const level = shaper && boundedLevel(shaper, { feedback: gains.feedback, readPeak: gains.readPeak, toneL1: gains.toneL1 })
  const { bound: slope, bothSigns } = gains.sector
  const pole = shaper === null ? sweptPole(set, sampleRate) : null
  if (everyPositionStable(set, sampleRate, { slope, bothSigns, oneGain: shaper === null }))
    return { word: 'frozen', proof: 'frozen', level, pole }
  return level === null ? { word: 'diverges', proof: 'none', level, pole } : { word: 'bounded', proof: 'level', level, pole }
}

/** Smallest of the gains below which the loop is certified, whatever their size. */
function smallestGain(gains: LoopGains): Stability['certified'] {
  const candidates: NonNullable<Stability['certified']>[] = [{ name: 'γ∞', value: gains.gammaInfinity }]
  if (gains.gamma2 !== null) candidates.push({ name: 'γ2', value: gains.gamma2 })
  // Standing still, read and filters are one filter, and its own largest gain is the energy gain.
  if (!gains.movement.moves) candidates.push({ name: 'max|L|', value: gains.frozenGain })
  return candidates.reduce((a, b) => (b.value < a.value ? b : a))
}
