// loop.ring: the longest 60 dB decay over the sweep.

import { bisect } from '../analysis/loopSearch.ts'
import { largestPoleOfLoop, ringSeconds } from '../analysis/poles.ts'
import { type SweptPole, sweptPole } from '../analysis/polesSweep.ts'
import { roundedDown } from '../analysis/stabilityRaise.ts'
import { withAt } from '../set/path.ts'
import { judge, labelOf, limitOf } from './limits.ts'
import { loopPole, noLoopReason } from './loopFigures.ts'
import { QUIET } from './loopPoles.ts'
import { quantity } from './loopText.ts'
import type { Check, CheckFunction, CheckInput, Figure, Mend } from './types.ts'

/** Status and seconds alone; null for what does not die away, and without a loop. */
export const loopRingFigure = (input: CheckInput): Figure & { readonly value: number | null } => {
  const pole = loopPole(input)
  if (pole === null) return { status: 'holds', value: null }
  const value = ringSeconds(pole.lnBound, input.sampleRate)
  return { status: value === null ? 'near' : judge(limitOf(input.set, 'loop.ring'), value), value }
}

export const loopRing: CheckFunction = (input): Check => {
  const pole = loopPole(input)
  const limit = limitOf(input.set, 'loop.ring')
  const base = { id: 'loop.ring', limit: limit.limit, unit: 's', label: labelOf('loop.ring') } as const
  if (pole === null) return { ...base, status: 'holds', value: null, text: `${noLoopReason(input) ?? QUIET}.`, working: [] }
  const { status, value } = loopRingFigure(input)
  const mend = status === 'holds' || limit.limit === null ? null : shorterRing(input, pole, limit.limit)
  return {
    ...base,
    status,
    value,
    text: value === null ? 'It does not die away.' : `The longest ring takes ${quantity(value, 's')} to fall by 60 dB.`,
    working: [
      {
        formula: 'T60 = ln 1000/(−ln r · fs)',
        numbers: `ln r = ${quantity(pole.lnBound)}, fs = ${quantity(input.sampleRate, 'Hz')}`,
        result: value === null ? 'none: r ≥ 1' : quantity(value, 's'),
        source: 'decay of the largest pole; M. R. Schroeder 1961 (from memory) for its comb form',
      },
    ],
    ...(mend && { mend: [mend] }),
  }
}

/** The largest feedback that rings no longer than `seconds`: at the worst place first, then tried over the sweep. */
function shorterRing({ set, sampleRate }: CheckInput, { loop }: SweptPole, seconds: number): Mend | null {
  const size = Math.abs(set.loop.feedback)
  const sign = Math.sign(set.loop.feedback)
  const rings = (pole: { readonly lnBound: number } | null) => {
    const ring = pole === null ? 0 : ringSeconds(pole.lnBound, sampleRate)
    return ring === null || ring > seconds
  }
  const limit = bisect((g) => rings(largestPoleOfLoop({ ...loop, gain: sign * g }, sampleRate)), size, 0, 24)
  const value = sign * roundedDown(limit)
  if (value === 0 || rings(sweptPole(withAt(set, 'loop.feedback', value), sampleRate))) return null
  return { label: `Feedback ${quantity(value)}`, path: 'loop.feedback', value }
}
