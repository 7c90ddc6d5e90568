// The working of loop.stability: every gain that was tried, whether or not it decided.

import type { Stability } from '../analysis/stability.ts'
import type { Raise } from '../analysis/stabilityRaise.ts'
import { loopPole, noLoopWorking } from './loopFigures.ts'
import { counted, delaysText, nearOne, quantity } from './loopText.ts'
import type { CheckInput, WorkingStep } from './types.ts'

export function stabilityWorking(input: CheckInput, stability: Stability, changes: readonly Raise[]): WorkingStep[] {
  if (stability.proof === 'noLoop') return noLoopWorking(input)
  return [
    peakStep(stability),
    movementStep(input, stability),
    ...energySteps(stability),
    ...sweptSteps(stability),
    frozenStep(stability),
    ...poleSteps(input),
    ...levelSteps(stability),
    ...changes.map(raiseStep),
  ]
}

const SMALL_GAIN = 'small-gain theorem'

function peakStep(s: Stability): WorkingStep {
  return {
    formula: 'γ∞ = |g| σ ρ∞ ‖f‖₁ < 1: stable for any movement',
    numbers: `|g| = ${quantity(s.feedback)}, σ = ${quantity(s.sector.bound)}, ρ∞ = ${quantity(s.readPeak)}, ‖f‖₁ = ${quantity(s.toneL1)}`,
    result: nearOne(s.gammaInfinity),
    source: `${SMALL_GAIN}, largest value (l∞); ρ∞ = largest Σ|hₖ| of the read; ‖f‖₁ in closed form, no tail left out`,
  }
}

function movementStep({ set }: CheckInput, { movement }: Stability): WorkingStep {
  const { shape, rateHz, law, depthMs, depthOctaves, updateEvery, between } = set.sweep
  const depth = law === 'time' ? quantity(depthMs, 'ms') : quantity(depthOctaves, 'octaves')
  const updates = updateEvery === 1 ? 'every sample' : `every ${updateEvery} samples, ${between === 'ramp' ? 'ramps' : 'steps'} between`
  const still = set.loop.delay === 'fixed' ? 'fixed loop delay' : 'the sweep stands still'
  return {
    formula: 'ε = max |D[n+1] − D[n]| of the delay read',
    numbers: movement.moves ? `${shape}, ${quantity(rateHz, 'Hz')}, ${depth}, ${updates}` : still,
    result: `${quantity(movement.epsilon)} samples a sample`,
    source: shape === 'drift' ? 'steepest step drift can draw, from −1 to 1' : 'closed form of the sweep, any alignment',
  }
}

function energySteps(s: Stability): WorkingStep[] {
  if (s.gamma2 === null || s.constant === null) return []
  return [
    {
      formula: 'γ2 = |g| σ max|F| √(1 + C ε) < 1: stable for any movement of at most ε',
      numbers: `|g| = ${quantity(s.feedback)}, σ = ${quantity(s.sector.bound)}, max|F| = ${quantity(s.toneMax)}, C = ${s.constant}, ε = ${quantity(s.movement.epsilon)}`,
      result: nearOne(s.gamma2),
      source: `${SMALL_GAIN}, energy (l2); C from the read’s Gram matrix, recomputed in the tests`,
    },
  ]
}

function sweptSteps({ norm, gammaN, feedback, sector, toneMax }: Stability): WorkingStep[] {
  if (norm === null || gammaN === null) return []
  const tried = norm.repeats
    ? 'one cycle, which all others repeat'
    : `${counted(norm.alignments, norm.method === 'cycles' ? 'cycle' : 'starting fraction')}`
  return [
    {
      formula: 'N = ‖R‖: t² I − RᵀR positive definite, R the read over this sweep (LDLᵀ, all pivots > 0)',
      numbers: `${norm.method === 'cycles' ? 'whole cycle' : 'windows at the steepest places'}; ${tried}; margin ${quantity(norm.margin * 100)} % of N − 1`,
      result: `N = ${nearOne(norm.measured)} by bisection, ${nearOne(norm.norm)} certified`,
      source: 'Sylvester’s law of inertia',
    },
    {
      formula: 'γN = |g| σ max|F| N < 1: stable over this sweep',
      numbers: `|g| = ${quantity(feedback)}, σ = ${quantity(sector.bound)}, max|F| = ${quantity(toneMax)}, N = ${nearOne(norm.norm)}`,
      result: nearOne(gammaN),
      source: `${SMALL_GAIN}, energy (l2)`,
    },
  ]
}

function frozenStep(s: Stability): WorkingStep {
  return {
    formula: '|g| σ max|A F| over every held position and frequency',
    numbers: `|g| = ${quantity(s.feedback)}, σ = ${quantity(s.sector.bound)}`,
    result: nearOne(s.frozenGain),
    source: s.movement.moves ? 'frozen response; below 1 every held position is stable' : `${SMALL_GAIN}; the loop stands still`,
  }
}

function poleSteps(input: CheckInput): WorkingStep[] {
  const pole = loopPole(input)
  if (pole === null) return []
  return [
    {
      formula: 'largest |z| with 1 − g A(z) F(z) = 0, over the sweep',
      numbers: `delay ${delaysText(pole.delaysSamples, input.sampleRate)}`,
      result: pole.bound > pole.radius ? `between ${nearOne(pole.radius)} and ${nearOne(pole.bound)}` : nearOne(pole.radius),
      source: 'Newton’s method in ln z; none outside, by the argument principle',
    },
  ]
}

function levelSteps({ level, feedback, readPeak, toneL1 }: Stability): WorkingStep[] {
  if (level === null) return []
  return [
    {
      formula: '1 + |g| ρ∞ sup{|shaper(r)| : |r| ≤ ‖f‖₁ ρ∞ A} ≤ A: the line stays within A',
      numbers: `|g| = ${quantity(feedback)}, ρ∞ = ${quantity(readPeak)}, ‖f‖₁ = ${quantity(toneL1)}, input within ±1`,
      result: `A = ${quantity(level)}`,
      source: `${SMALL_GAIN}, largest value (l∞)`,
    },
  ]
}

function raiseStep({ path, value, word }: Raise): WorkingStep {
  return {
    formula: `what would make it ${word}`,
    numbers: `${path}: ${value === null ? 'none' : value}`,
    result: word,
    source: 'the set with that change, judged again',
  }
}
