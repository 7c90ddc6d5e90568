// Single changes of the worst shaper that fold less: each tried on the whole set.
import { foldedEnergy } from '../analysis/folded.ts'
import { bisect } from '../analysis/loopSearch.ts'
import { roundedDown } from '../analysis/stabilityRaise.ts'
import { withAt } from '../set/path.ts'
import type { ParameterSet, Shaper } from '../set/types.ts'
import { setProblems } from '../set/validity.ts'
import { judge, limitOf } from './limits.ts'
import { quantity } from './loopText.ts'
import { CURVE_NAMES, type ShaperFold, shaperAliasFigure } from './shaperFigures.ts'
import type { CheckInput, Mend, Status } from './types.ts'

const SOFT: readonly Shaper['curve'][] = ['cubic', 'tanh', 'arctan']
/** Halvings of the value's logarithm: the value to a few hundredths, of which one or two digits are offered. */
const HALVINGS = 8

const RANK: Readonly<Record<Status, number>> = { fails: 0, near: 1, note: 2, holds: 2 }

/** Anti-aliasing, less drive (of a dead zone: a smaller one), a softer curve: those that raise the status of the whole check on a set that stays valid. */
export function softer(input: CheckInput, { present }: ShaperFold, now: Status): Mend[] {
  const { path, shaper } = present
  const [key, label, least] =
    shaper.curve === 'deadZone' ? (['deadZone', 'Dead zone', 1e-6] as const) : (['drive', 'Drive', 0.001] as const)
  const candidates: Mend[] = []
  if (shaper.antialias === 'none') candidates.push({ label: 'Antiderivative anti-aliasing', path: `${path}.antialias`, value: 'adaa1' })
  const value = smaller(input, present, now, key, least)
  if (value !== null) candidates.push({ label: `${label} ${quantity(value)}`, path: `${path}.${key}`, value })
  const curve = softestCurve(input, present)
  if (curve !== null) candidates.push({ label: `Curve ${CURVE_NAMES[curve]}`, path: `${path}.curve`, value: curve })
  return candidates.filter((mend) => raises(input, withAt(input.set, mend.path, mend.value), now))
}

function raises({ sampleRate }: CheckInput, set: ParameterSet, now: Status): boolean {
  if (setProblems(set, sampleRate).length > 0) return false
  return RANK[shaperAliasFigure({ set, sampleRate }).status] > RANK[now]
}

/** The largest value of a field, below the present one, with which this shaper still passes the tone and holds; where none does, is near. */
function smaller(
  { set, sampleRate }: CheckInput,
  { shaper, amplitude }: ShaperFold['present'],
  now: Status,
  key: 'drive' | 'deadZone',
  least: number,
): number | null {
  const limit = limitOf(set, 'shaper.alias')
  for (const wanted of [RANK.holds, RANK.near]) {
    if (wanted <= RANK[now]) return null
    const inside = (value: number) => {
      const { db } = foldedEnergy({ ...shaper, [key]: value }, amplitude, sampleRate)
      return db !== null && RANK[judge(limit, db)] >= wanted
    }
    if (!inside(least) || inside(shaper[key])) continue
    const edge = Math.exp(bisect((ln) => inside(Math.exp(ln)), Math.log(least), Math.log(shaper[key]), HALVINGS))
    for (const digits of [2, 1]) {
      const value = roundedDown(edge, digits)
      if (value >= least && inside(value)) return value
    }
  }
  return null
}

function softestCurve({ sampleRate }: CheckInput, { shaper, amplitude }: ShaperFold['present']): Shaper['curve'] | null {
  const level = (curve: Shaper['curve']) => foldedEnergy({ ...shaper, curve }, amplitude, sampleRate).db ?? Number.POSITIVE_INFINITY
  const [best] = SOFT.filter((curve) => curve !== shaper.curve)
    .map((curve) => ({ curve, db: level(curve) }))
    .sort((a, b) => a.db - b.db)
  return best?.curve ?? null
}
