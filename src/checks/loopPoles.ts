// loop.poles: the largest pole radius over the sweep, for small signals. A value, judged under loop.stability;
// at 1 and above it is at least a note, because nothing that grows should read as holding.
import type { SweptPole } from '../analysis/polesSweep.ts'
import { labelOf } from './limits.ts'
import { loopPole, noLoopReason, noLoopWorking } from './loopFigures.ts'
import { delaysText, nearOne, quantity } from './loopText.ts'
import type { Check, CheckFunction, CheckInput, FigureFunction } from './types.ts'

/** Status and radius alone; radius and bound where the lines are too long to be searched through. */
export const loopPolesFigure: FigureFunction = (input) => {
  const pole = loopPole(input)
  if (pole === null) return { status: 'holds', value: null }
  return { status: pole.radius >= 1 ? 'note' : 'holds', value: pole.bound > pole.radius ? [pole.radius, pole.bound] : pole.radius }
}

export const loopPoles: CheckFunction = (input): Check => {
  const pole = loopPole(input)
  const base = { id: 'loop.poles', status: 'holds', limit: null, unit: '', label: labelOf('loop.poles') } as const
  if (pole === null) return { ...base, value: null, text: `${noLoopReason(input) ?? QUIET}.`, working: noLoopWorking(input) }
  const searched = pole.bound > pole.radius
  return {
    ...base,
    ...loopPolesFigure(input),
    text: poleText(input, pole, searched),
    working: [
      {
        formula: equationText(input),
        numbers: numbersText(input, pole),
        result: searched
          ? `${nearOne(pole.radius)} found; none above ${nearOne(pole.bound)}`
          : `r = ${nearOne(pole.radius)}, 1 − r = ${quantity(-Math.expm1(pole.lnRadius))}`,
        source: searched
          ? 'Newton’s method; bound: Perron root of the moduli (the lines are too long to search through)'
          : 'Newton’s method in ln z; none outside, by the argument principle',
      },
    ],
  }
}

/** A shaper with a dead zone has no slope at 0. */
export const QUIET = 'No loop for small signals: the loop shaper lets nothing through there'

function poleText({ sampleRate }: CheckInput, pole: SweptPole, searched: boolean): string {
  const where = `at a loop delay of ${delaysText(pole.delaysSamples, sampleRate)}`
  if (searched) return `The largest pole radius is between ${nearOne(pole.radius)} and ${nearOne(pole.bound)}, ${where}.`
  const at = pole.frequencyHz === null ? '' : `, at ${quantity(pole.frequencyHz, 'Hz')}`
  return `The largest pole radius over the sweep is ${nearOne(pole.radius)}, ${where}${at}.`
}

function equationText({ set }: CheckInput): string {
  const crossed = set.layout === 'stereo' && set.loop.crossFeed > 0
  return crossed ? '1 − g(1−k)F(A₀ + A₁) + g²(1−2k)F²A₀A₁ = 0, largest |z|' : '1 − g A(z) F(z) = 0, largest |z|'
}

function numbersText({ set, sampleRate }: CheckInput, pole: SweptPole): string {
  const { feedback, dampingHz, lowCutHz, crossFeed, interpolation } = set.loop
  const parts = [
    `g = ${quantity(feedback)}`,
    `D = ${pole.delaysSamples.map((d) => quantity(d)).join(' and ')} samples at ${quantity(sampleRate, 'Hz')}, ${interpolation}`,
  ]
  if (set.layout === 'stereo' && crossFeed > 0) parts.push(`k = ${quantity(crossFeed)}`)
  if (dampingHz !== null) parts.push(`damping ${quantity(dampingHz, 'Hz')}`)
  if (lowCutHz !== null) parts.push(`low cut ${quantity(lowCutHz, 'Hz')}`)
  if (set.loop.shaper !== null) parts.push('shaper at its small-signal slope')
  return parts.join(', ')
}
