// loop.margin: how far the smallest certified loop gain is from 1.
import type { Stability } from '../analysis/stability.ts'
import { roundedDown } from '../analysis/stabilityRaise.ts'
import { judge, type Limit, labelOf, limitOf } from './limits.ts'
import { loopWhole, loopWord, noLoopReason, noLoopWorking } from './loopFigures.ts'
import { marginDb, nearOne, quantity } from './loopText.ts'
import type { Check, CheckFunction, CheckInput, Figure, Mend, Status } from './types.ts'

/** Status and margin alone. */
export const loopMarginFigure = (input: CheckInput): Figure & { readonly value: number | null } => {
  const value = noLoopReason(input) === null ? marginDb(decisive(loopWord(input)).gain) : null
  return { status: statusOf(input, limitOf(input.set, 'loop.margin'), value), value }
}

export const loopMargin: CheckFunction = (input): Check => {
  const stability = loopWord(input)
  const limit = limitOf(input.set, 'loop.margin')
  const { name, gain } = decisive(stability)
  const { status, value } = loopMarginFigure(input)
  const mend = status === 'holds' ? null : mendOf(input, loopWhole(input), limit)
  return {
    id: 'loop.margin',
    status,
    value,
    limit: limit.limit,
    unit: 'dB',
    label: labelOf('loop.margin'),
    text: value === null ? `${noLoopReason(input)}.` : marginText(value, stability),
    working:
      value === null
        ? noLoopWorking(input)
        : [
            {
              formula: `−20 log₁₀ ${name}`,
              numbers: `${name} = ${nearOne(gain)}`,
              result: quantity(value, 'dB'),
              source: sourceText(stability),
            },
          ],
    ...(mend && { mend: [mend] }),
  }
}

function sourceText({ certified, word }: Stability): string {
  if (certified?.name === '|L| in phase')
    return 'largest gain at a phase of 0: with more feedback than that the loop sings (Nyquist’s criterion)'
  if (certified) return 'smallest certified loop gain'
  return word === 'proven'
    ? 'largest loop gain; the poles prove the loop all the same'
    : 'largest frozen loop gain: none is certified while it moves'
}

function decisive({ certified, frozenGain }: Stability): { name: string; gain: number } {
  return certified ? { name: certified.name, gain: certified.value } : { name: '|g| σ max|A F|', gain: frozenGain }
}

/**
 * Beyond the limit no gain is certified. A shaper may still hold such a loop, and the poles of one that stands still may prove it though its gain passes 1 where
 * it comes back out of phase: then it is near, for what is stable must not fail.
 */
function statusOf(input: CheckInput, limit: Limit, value: number | null): Status {
  const status = judge(limit, value)
  const held = () => input.set.loop.shaper !== null || (loopWord(input).word === 'proven' && (value ?? 0) <= 0)
  return status === 'fails' && held() ? 'near' : status
}

function marginText(value: number, { certified, word, movement, gammaInfinity }: Stability): string {
  const db = quantity(Math.abs(value), 'dB')
  if (certified?.name === '|L| in phase')
    return `Where the loop comes back in phase its gain stays ${db} below 1; elsewhere it passes 1, which a loop that stands still may.`
  if (certified && !movement.moves) return `The loop gain stays ${db} below 1; the loop stands still.`
  if (certified)
    return `The loop gain stays ${db} below 1, certified ${certified.value === gammaInfinity ? 'for any movement' : 'while it moves'}.`
  if (value > 0) return `Held anywhere, the loop gain stays ${db} below 1; while it moves that is not certified.`
  return `The loop gain reaches ${db} above 1${word === 'proven' ? ', though not where it comes back in phase' : ''}.`
}

/**
 * Feedback at which the gain that then decides is the margin away from the limit: all gains are proportional to it. γN decides only where the proofs still
 * fail, so its larger feedback counts only there.
 */
function mendOf({ set }: CheckInput, { gammaInfinity, gamma2, gammaN }: Stability, { limit, margin }: Limit): Mend | null {
  const size = Math.abs(set.loop.feedback)
  const target = 10 ** (-((limit ?? 0) + margin) / 20)
  const proof = Math.min(gammaInfinity, gamma2 ?? gammaInfinity)
  const swept = gammaN !== null && (proof * target) / gammaN >= 1 ? target / gammaN : 0
  const reached = roundedDown(size * Math.max(target / proof, swept))
  if (!(reached > 0 && reached < size)) return null
  const value = Math.sign(set.loop.feedback) * reached
  return { label: `Feedback ${quantity(value)}`, path: 'loop.feedback', value }
}
