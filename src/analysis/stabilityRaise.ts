// What would raise the word: single changes of the set, worked out from the norms and each tried before it is offered.

import { parameter } from '../set/parameters.ts'
import { withAt } from '../set/path.ts'
import type { ParameterSet } from '../set/types.ts'
import { setProblems } from '../set/validity.ts'
import { largestCrossing } from './loopCrossing.ts'
import { loopParts } from './loopPair.ts'
import { loopSweep } from './loopSweep.ts'
import { MOVING_CONSTANT, MOVING_LIMIT } from './norms.ts'
import { provenStability, type Stability, type StabilityWord } from './stability.ts'

export interface Raise {
  readonly path: string
  readonly value: number | string | null
  /** The word the changed set gets. */
  readonly word: StabilityWord
}

/** Changes of one field that raise the word, strongest first, at most one a field. Empty when nothing is stronger or no single change reaches it. */
export function raises(set: ParameterSet, sampleRate: number, now: Stability): Raise[] {
  if (now.word === 'proven') return []
  const candidates: Change[] = [
    { path: 'loop.feedback', value: signedFeedback(set, provenFeedback(set, sampleRate, now)) },
    { path: 'loop.interpolation', value: 'linear' },
    ...slowerSweeps(set, now),
    { path: 'sweep.between', value: 'ramp' },
    { path: 'loop.delay', value: 'fixed' },
    ...shaperChanges(set, now),
  ]
  const proven = candidates.filter((change) => provesSet(set, sampleRate, change)).map((change): Raise => ({ ...change, word: 'proven' }))
  const computed = now.word === 'computed' ? null : computedFeedback(set, now)
  const sure = proven.find((raise) => raise.path === 'loop.feedback')
  const more = computed !== null && !(sure && Math.abs(sure.value as number) >= Math.abs(computed.value as number))
  return more ? [...proven, computed] : proven
}

type Change = Omit<Raise, 'word'>

function provesSet(set: ParameterSet, sampleRate: number, { path, value }: Change): boolean {
  if (typeof value === 'number' && !inRange(path, value)) return false
  const changed = withAt(set, path, value)
  return setProblems(changed, sampleRate).length === 0 && provenStability(changed, sampleRate) !== null
}

function inRange(path: string, value: number): boolean {
  const row = parameter(path)
  return (row.kind === 'number' || row.kind === 'integer') && value >= row.min && value <= row.max
}

/** Three significant digits, towards 0: what is offered must lie inside what was worked out. */
export function roundedDown(value: number, digits = 3): number {
  if (!(value > 0)) return 0
  const inside = value * (1 - 1e-9)
  const step = 10 ** (Math.floor(Math.log10(inside)) + 1 - digits)
  return Number((Math.floor(inside / step) * step).toPrecision(digits))
}

const signedFeedback = (set: ParameterSet, size: number): number => Math.sign(set.loop.feedback) * roundedDown(size)

/** |g| up to which a proof holds. */
function provenFeedback(set: ParameterSet, sampleRate: number, now: Stability): number {
  const { sector, readPeak, toneL1, toneMax, constant, movement } = now
  const peak = 1 / (sector.bound * readPeak * toneL1)
  const energy = constant === null ? 0 : 1 / (sector.bound * toneMax * Math.sqrt(1 + constant * movement.epsilon))
  return Math.max(peak, energy, movement.moves ? 0 : stillLimit(set, sampleRate, now))
}

/** The feedback up to which the certified norm of this sweep, which does not depend on it, keeps γN below 1. */
function computedFeedback(set: ParameterSet, now: Stability): Raise | null {
  if (now.norm === null) return null
  const value = signedFeedback(set, 1 / (now.sector.bound * now.toneMax * now.norm.norm))
  return { path: 'loop.feedback', value, word: 'computed' }
}

/** Of a loop standing still: up to where it comes back in phase at 1, or with a shaper up to where its gain is 1. */
function stillLimit(set: ParameterSet, sampleRate: number, now: Stability): number {
  if (set.loop.shaper !== null) return now.feedback / now.frozenGain
  const sweep = loopSweep(set, sampleRate)
  const { lines, pair } = loopParts(sweep.at(sweep.from), 1)
  if (pair !== null) return now.feedback / now.frozenGain
  return now.feedback / Math.max(...lines.map(largestCrossing))
}

/** Rates and edge times at which the sweep is slow enough for γ2 to be below 1. */
function slowerSweeps(set: ParameterSet, now: Stability): Change[] {
  const constant = MOVING_CONSTANT[set.loop.interpolation]
  const gain = now.feedback * now.sector.bound * now.toneMax
  const { epsilon } = now.movement
  if (constant === null || gain >= 1 || epsilon === 0) return []
  const target = Math.min(MOVING_LIMIT, (1 / (gain * gain) - 1) / constant)
  const ratio = epsilon / target
  return [
    { path: 'sweep.rateHz', value: roundedDown(set.sweep.rateHz / ratio) },
    { path: 'sweep.edgeMs', value: roundedUp(set.sweep.edgeMs > 0 ? set.sweep.edgeMs * ratio : 0) },
    { path: set.sweep.law === 'time' ? 'sweep.depthMs' : 'sweep.depthOctaves', value: roundedDown(depthOf(set) / ratio) },
  ].filter(({ value }) => value > 0)
}

const depthOf = ({ sweep }: ParameterSet): number => (sweep.law === 'time' ? sweep.depthMs : sweep.depthOctaves)

function roundedUp(value: number): number {
  const down = roundedDown(value)
  return down >= value ? down : Number((down + 10 ** (Math.floor(Math.log10(value)) - 2)).toPrecision(3))
}

/** Less drive, or no shaper, where the shaper's own gain is what is too large. */
function shaperChanges(set: ParameterSet, now: Stability): Change[] {
  const { shaper } = set.loop
  if (shaper === null || now.sector.bound <= 1) return []
  const smallest = Math.min(now.gammaInfinity, now.gamma2 ?? Number.POSITIVE_INFINITY)
  return [
    { path: 'loop.shaper.drive', value: roundedDown(shaper.drive / smallest) },
    { path: 'loop.shaper', value: null },
  ]
}
