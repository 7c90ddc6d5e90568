// The shapers a set has, and the sine each is asked with.
import { type Folded, foldedEnergy } from '../analysis/folded.ts'
import type { ParameterSet, Shaper } from '../set/types.ts'
import { judge, limitOf } from './limits.ts'
import { quantity } from './loopText.ts'
import type { CheckInput, Figure } from './types.ts'

/** −6 dBFS of a sine whose full scale is a peak of 1. */
export const TONE_DBFS = -6

export interface PresentShaper {
  readonly path: 'input.shaper' | 'loop.shaper' | 'mix.shaper'
  readonly name: 'input shaper' | 'loop shaper' | 'output shaper'
  readonly shaper: Shaper
  /** Peak of the sine at its input. */
  readonly amplitude: number
}

/**
 * Shapers of a set in the order of the path. The input shaper is asked with −6 dBFS into the set, its input gain included; what reaches the
 * others depends on frequency and sweep, so they are asked with −6 dBFS at their own input.
 */
export function shapersOf({ input, loop, mix }: ParameterSet): PresentShaper[] {
  const tone = 10 ** (TONE_DBFS / 20)
  const all = [
    { path: 'input.shaper', name: 'input shaper', shaper: input.shaper, amplitude: tone * 10 ** (input.gainDb / 20) },
    { path: 'loop.shaper', name: 'loop shaper', shaper: loop.shaper, amplitude: tone },
    { path: 'mix.shaper', name: 'output shaper', shaper: mix.shaper, amplitude: tone },
  ] as const
  return all.flatMap(({ shaper, ...rest }) => (shaper ? [{ ...rest, shaper }] : []))
}

/** Those that are heard: a loop without feedback is not. */
export const heardShapers = (set: ParameterSet): PresentShaper[] =>
  shapersOf(set).filter(({ path }) => path !== 'loop.shaper' || set.loop.feedback !== 0)

export interface ShaperFold {
  readonly present: PresentShaper
  readonly folded: Folded
}

/** Each heard shaper with what it folds, the worst first. */
export function shaperFolds({ set, sampleRate }: Pick<CheckInput, 'set' | 'sampleRate'>): ShaperFold[] {
  const folds = heardShapers(set).map((present) => ({ present, folded: foldOf(present, sampleRate) }))
  const size = ({ folded }: ShaperFold) => folded.db ?? Number.NEGATIVE_INFINITY
  return folds.sort((a, b) => size(b) - size(a))
}

const known = new WeakMap<Shaper, { readonly key: string; readonly folded: Folded }>()

/** Found once for a shaper that stays the same while another is changed. */
function foldOf({ shaper, amplitude }: PresentShaper, sampleRate: number): Folded {
  const key = `${amplitude} ${sampleRate}`
  let found = known.get(shaper)
  if (found?.key !== key) {
    found = { key, folded: foldedEnergy(shaper, amplitude, sampleRate) }
    known.set(shaper, found)
  }
  return found.folded
}

/** Status and value of shaper.alias without words or mends. */
export function shaperAliasFigure(input: CheckInput): Figure {
  const value = shaperFolds(input)[0]?.folded.db ?? null
  return { status: judge(limitOf(input.set, 'shaper.alias'), value), value }
}

/** Why there is nothing to ask. */
export const noShaperText = ({ loop }: ParameterSet): string =>
  loop.shaper ? 'The loop shaper is not heard: there is no feedback' : 'There is no shaper'

/** "tanh, drive 4, limits 1 and 0.8, ceiling 1": what the curve is made from. */
export function curveText({ curve, drive, positive, negative, ceiling, deadZone }: Shaper): string {
  const limits = positive === negative ? `limit ${quantity(positive)}` : `limits +${quantity(positive)} and −${quantity(negative)}`
  const zone = curve === 'deadZone' ? `, dead zone ${quantity(deadZone)}` : ''
  return `${CURVE_NAMES[curve]}${zone}, drive ${quantity(drive)}, ${limits}, ceiling ${quantity(ceiling)}`
}

export const CURVE_NAMES: Readonly<Record<Shaper['curve'], string>> = {
  hardClip: 'hard clip',
  arctan: 'arctangent',
  tanh: 'tanh',
  cubic: 'cubic',
  diode: 'diode',
  deadZone: 'dead zone',
  drawn: 'drawn curve',
}

export const FOURIER = 'c_n = (2/π) ∫₀^π shaper(A cos ψ) cos nψ dψ'
