// Stability of the loop while it moves, in five words, the strongest that can be said (DESIGN 5). Frozen poles inside the unit circle prove nothing about
// a moving delay, so the proofs go through norms; every number a proof uses is kept for the working.
import type { ParameterSet } from '../set/types.ts'
import { freeze } from './frozen.ts'
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
  /** The smallest loop gain that is certified while the loop moves; null where none is. */
  readonly certified: { readonly name: 'γ∞' | 'γ2' | 'γN' | 'max|L|'; readonly value: number } | null
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
 * stronger holds and it could help. `budget`: rows that may cost (0: none, the word then skips `computed`).
 */
export function stability(set: ParameterSet, sampleRate = set.sampleRate, budget?: number): Stability {
  const gains = loopGains(set, sampleRate)
  const rest = { norm: null, gammaN: null, level: null, pole: null }
  const smallest = smallestGain(gains)
  if (gains.feedback * gains.sector.bound === 0) return { ...gains, ...rest, word: 'proven', proof: 'noLoop', certified: null }
  if (!gains.movement.moves && set.loop.shaper === null) return stillStability(set, sampleRate, gains)
  if (gains.gammaInfinity < 1) return { ...gains, ...rest, word: 'proven', proof: 'peak', certified: smallest }
  if (gains.gamma2 !== null && gains.gamma2 < 1) return { ...gains, ...rest, word: 'proven', proof: 'energy', certified: smallest }
  if (!gains.movement.moves && gains.frozenGain < 1) return { ...gains, ...rest, word: 'proven', proof: 'still', certified: smallest }
  const gain = gains.feedback * gains.sector.bound * gains.toneMax
  const norm = gain < 1 && gains.movement.moves && budget !== 0 ? certifiedNorm(set, sampleRate, budget) : null
  const gammaN = norm && gain * norm.norm
  const withNorm = { ...gains, ...rest, norm, gammaN }
  if (gammaN !== null && gammaN < 1) return { ...withNorm, word: 'computed', proof: 'sweep', certified: { name: 'γN', value: gammaN } }
  return { ...withNorm, certified: null, ...weakerWord(set, sampleRate, gains) }
}

/** A loop that neither moves nor bends is decided exactly by its poles. */
function stillStability(set: ParameterSet, sampleRate: number, gains: LoopGains): Stability {
  const pole = sweptPole(set, sampleRate)
  const { pair } = loopParts(freeze(set, set.sweep.startPhase, sampleRate).loop)
  const uncertain = pair !== null && pole !== null && pole.lnBound >= 0 && isInside(pole)
  const inside = isInside(pole) && !(uncertain && pairPolesOutside(pair, 0) > 0)
  const rest = { norm: null, gammaN: null, level: null, pole }
  const certified = inside && gains.frozenGain < 1 ? smallestGain(gains) : null
  return { ...gains, ...rest, word: inside ? 'proven' : 'diverges', proof: inside ? 'poles' : 'none', certified }
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
