// loop.ring: the longest 60 dB decay over the sweep.

import { largestPoleOfLoop, ringSeconds, slowestResonances } from '../analysis/poles.ts'
import { type SweptPole, sweptPole } from '../analysis/polesSweep.ts'
import { roundedDown } from '../analysis/stabilityRaise.ts'
import { withAt } from '../set/path.ts'
import { judge, labelOf, limitOf } from './limits.ts'
import { loopPole, noLoopReason, noLoopWorking } from './loopFigures.ts'
import { QUIET } from './loopPoles.ts'
import { delaysText, quantity } from './loopText.ts'
import type { Check, CheckFunction, CheckInput, Figure, Mend, WorkingStep } from './types.ts'

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
  if (pole === null)
    return { ...base, status: 'holds', value: null, text: `${noLoopReason(input) ?? QUIET}.`, working: noLoopWorking(input) }
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
      ...resonanceSteps(pole, input.sampleRate),
    ],
    ...(mend && { mend: [mend] }),
  }
}

/** The slowest resonances one by one, each with its frequency and decay. */
function resonanceSteps(pole: SweptPole, sampleRate: number): WorkingStep[] {
  const { found, upToHz } = slowestResonances(pole.loop, sampleRate, 5)
  if (found.length === 0) return []
  const decay = (seconds: number | null) => (seconds === null ? 'does not fall' : quantity(seconds, 's'))
  return [
    {
      formula: 'T60 of each resonance, slowest first',
      numbers: `delay ${delaysText(pole.delaysSamples, sampleRate)}, resonances up to ${quantity(upToHz, 'Hz')}`,
      result: found.map(({ frequencyHz, ringSeconds: seconds }) => `${quantity(frequencyHz, 'Hz')}: ${decay(seconds)}`).join('; '),
      source: 'every pole of the loop held there, by Newton’s method',
    },
  ]
}

/** ln of a feedback's size is nearly proportional to ln r: so many secant steps bring the ring to a part in 10⁶. */
const SECANTS = 12
/** ln of a feedback too small to be offered. */
const LEAST = Math.log(0.001)

/** The largest feedback that rings no longer than `seconds`: at the worst place first, then tried over the sweep. */
function shorterRing({ set, sampleRate }: CheckInput, { loop, lnBound }: SweptPole, seconds: number): Mend | null {
  if (!(seconds > 0)) return null
  const sign = Math.sign(set.loop.feedback)
  const wanted = -Math.log(1000) / (seconds * sampleRate)
  const lnRadius = (u: number) => largestPoleOfLoop({ ...loop, gain: sign * Math.exp(u) }, sampleRate)?.lnBound ?? Number.NEGATIVE_INFINITY
  let before = { u: Math.log(Math.abs(set.loop.feedback)), x: lnBound }
  let here = before
  let slope = 1 / Math.max(1, ...loop.reads.map((read) => read.delaySamples))
  for (let i = 0; i < SECANTS && Math.abs(here.x - wanted) > 1e-6 * -wanted; i++) {
    const u = here.u - (here.x - wanted) / slope
    // A ring that is the filters' own, not the loop's, is not shortened by feedback.
    if (!(u > LEAST)) return null
    before = here
    here = { u, x: lnRadius(u) }
    if (here.u !== before.u && here.x !== before.x) slope = (here.x - before.x) / (here.u - before.u)
    if (!(slope > 0 && Number.isFinite(slope))) return null
  }
  const value = sign * roundedDown(Math.exp(here.u))
  const changed = value === 0 ? null : sweptPole(withAt(set, 'loop.feedback', value), sampleRate)
  if (changed === null || !(changed.lnBound <= wanted)) return null
  return { label: `Feedback ${quantity(value)}`, path: 'loop.feedback', value }
}
