// Settings of interpolators and updates tried on one set's stretches: what each leaves, what each costs, and the cheapest that leaves little enough.
import type { Between, Interpolation, ParameterSet } from '../set/types.ts'
import { setProblems } from '../set/validity.ts'
import { type EstimatedPower, interpolatorPower, tonesOf, updatesPower } from './artefactEstimate.ts'
import { type ArtefactLevels, type ArtefactWeights, artefactLevels, artefactWeights } from './artefactLevels.ts'
import { measureSteps, type ReadChoice } from './artefactMeasure.ts'
import { type ArtefactStage, artefactStage } from './artefactStage.ts'
import { type StabilityWord, stability } from './stability.ts'

/** What of a set decides its artefacts. */
export interface ReadSetting {
  readonly line: Interpolation
  readonly loop: Interpolation
  readonly updateEvery: number
  readonly between: Between
}

export interface ArtefactBench {
  readonly stage: ArtefactStage
  readonly weights: ArtefactWeights
  readonly known: Map<string, ArtefactLevels>
  estimates: Estimates | null
}

/** Prepares the references of a valid set whose sweep moves, with other `material` in the line if given (artefactStage). Yields the part done. */
export function* artefactBench(set: ParameterSet, sampleRate: number, material?: Float64Array): Generator<number, ArtefactBench> {
  const stage = yield* artefactStage(set, sampleRate, material)
  return { stage, weights: artefactWeights(set, sampleRate, stage.length / 2 + 1), known: new Map(), estimates: null }
}

/** Artefacts of a choice; measured once. */
export function* levelsOf({ stage, weights, known }: ArtefactBench, choice: ReadChoice): Generator<number, ArtefactLevels> {
  const { voices, loop, updates } = choice
  // Updates at every sample have nothing between them, and a loop that stands is not measured.
  const key = [voices, stage.loops ? loop : '', updates.every, updates.every === 1 ? '' : updates.between].join()
  const before = known.get(key)
  if (before) return before
  const levels = artefactLevels(yield* measureSteps(stage, choice), weights)
  known.set(key, levels)
  return levels
}

export const settingOf = ({ line, loop, sweep }: ParameterSet): ReadSetting => ({
  line: line.interpolation,
  loop: loop.interpolation,
  updateEvery: sweep.updateEvery,
  between: sweep.between,
})

export const withSetting = (set: ParameterSet, { line, loop, updateEvery, between }: ReadSetting): ParameterSet => ({
  ...set,
  line: { ...set.line, interpolation: line },
  loop: { ...set.loop, interpolation: loop },
  sweep: { ...set.sweep, updateEvery, between },
})

export const choiceOf = ({ line, loop, updateEvery, between }: ReadSetting): ReadChoice => ({
  voices: line,
  loop,
  updates: { every: updateEvery, between },
})

/** A setting's interpolators alone: an update every sample. */
export const everySample = ({ line, loop }: ReadSetting): ReadChoice => ({ voices: line, loop, updates: { every: 1, between: 'ramp' } })

/** Additions and multiplications of one read of a sample, the fraction's subtraction included; a division counts as 14 (a small core's, from memory). */
export const READ_COST: Readonly<Record<Interpolation, number>> = { nearest: 1, linear: 4, hermite4: 15, lagrange3: 15, allpass1: 20 }
/** The same for one evaluation of the sweep: phase, shape and law. */
export const SWEEP_COST = 30

/**
 * What a setting costs a sample and line, in additions and multiplications, to put settings in order by: V · (read + move) and for a loop that is heard
 * read + move again; move = {@link SWEEP_COST}/K, and 1 more where the delay ramps. Not cycles of a part.
 */
export function settingCost({ voices, loop }: ParameterSet, setting: ReadSetting): number {
  const move = SWEEP_COST / setting.updateEvery + (setting.between === 'ramp' && setting.updateEvery > 1 ? 1 : 0)
  const looped = loop.feedback === 0 ? 0 : READ_COST[setting.loop] + (loop.delay === 'moving' ? move : 0)
  return voices.count * (READ_COST[setting.line] + move) + looped
}

export interface CheapestSetting {
  readonly setting: ReadSetting
  readonly cost: number
  readonly db: number
}

const KINDS = Object.keys(READ_COST) as Interpolation[]
const INTERVALS = [1, 2, 4, 8, 16, 32, 64]
const BETWEEN: readonly Between[] = ['ramp', 'hold']
const UPDATES = INTERVALS.flatMap((updateEvery) => BETWEEN.map((between) => ({ updateEvery, between })))
/** Settings estimated to miss by more than this, dB, are not measured. */
const ESTIMATE_DB = 1

/**
 * The cheapest setting, by settingCost, that leaves artefacts of at most `targetDb` and the loop's stability no weaker a word; null when none does. The
 * loop's interpolator stays unless it alone misses.
 */
export function* cheapestSetting(bench: ArtefactBench, targetDb: number): Generator<number, CheapestSetting | null> {
  const own = settingOf(bench.stage.set)
  const { loopDb } = yield* levelsOf(bench, everySample(own))
  const loops = loopDb === null || loopDb <= targetDb ? [own.loop] : KINDS
  const settings = KINDS.flatMap((line) => loops.flatMap((loop) => UPDATES.map((update) => ({ line, loop, ...update }))))
  return yield* cheapestOf(bench, settings, targetDb)
}

/** The cheapest of the settings that differ from the set's own in one field. `path`: which. */
export function* cheapestChange(bench: ArtefactBench, path: ChangePath, targetDb: number): Generator<number, CheapestSetting | null> {
  const own = settingOf(bench.stage.set)
  const changes: Readonly<Record<ChangePath, readonly ReadSetting[]>> = {
    'line.interpolation': KINDS.map((line) => ({ ...own, line })),
    'loop.interpolation': bench.stage.loops ? KINDS.map((loop) => ({ ...own, loop })) : [],
    'sweep.updateEvery': INTERVALS.map((updateEvery) => ({ ...own, updateEvery })),
    'sweep.between': BETWEEN.map((between) => ({ ...own, between })),
  }
  return yield* cheapestOf(bench, changes[path], targetDb)
}

export type ChangePath = 'line.interpolation' | 'loop.interpolation' | 'sweep.updateEvery' | 'sweep.between'

/** Estimates by formula, corrected by what was measured of the set's own interpolators, choose what is measured, in order of cost. */
function* cheapestOf(bench: ArtefactBench, settings: readonly ReadSetting[], targetDb: number): Generator<number, CheapestSetting | null> {
  const { set } = bench.stage
  const estimate = yield* estimates(bench)
  const worthTrying = settings
    .map((setting) => ({ setting, cost: settingCost(set, setting), power: estimate(setting) }))
    .filter(({ power }) => 10 * Math.log10(power) <= targetDb + ESTIMATE_DB)
    .sort((a, b) => a.cost - b.cost || a.power - b.power)
  for (const { setting, cost } of worthTrying) {
    const { db } = yield* levelsOf(bench, choiceOf(setting))
    if (db <= targetDb && isSound(bench, setting)) return { setting, cost, db }
  }
  return null
}

const WORDS: readonly StabilityWord[] = ['diverges', 'bounded', 'frozen', 'computed', 'proven']

/** Valid, and the loop no less surely stable than it is. */
function isSound({ stage: { set, sampleRate, loops } }: ArtefactBench, setting: ReadSetting): boolean {
  const changed = withSetting(set, setting)
  if (setProblems(changed, sampleRate).length > 0) return false
  const word = (of: ParameterSet) => WORDS.indexOf(stability(of, sampleRate).word)
  return !loops || word(changed) >= word(set)
}

/** Power of a setting's artefacts against the wet signal. */
type Estimates = (setting: ReadSetting) => number

function* estimates(bench: ArtefactBench): Generator<number, Estimates> {
  if (bench.estimates) return bench.estimates
  const { stage } = bench
  const tones = tonesOf(bench)
  const own = settingOf(stage.set)
  const byKind = {} as Record<Interpolation, EstimatedPower>
  for (const kind of KINDS) {
    byKind[kind] = interpolatorPower(kind, tones)
    yield 0
  }
  // A sweep that meets few fractions leaves less than one that meets all.
  const alone = yield* levelsOf(bench, everySample(own))
  const measured = 10 ** (alone.db / 10)
  const met = Math.min(1, measured / Math.max(1e-40, byKind[own.line].voices + (stage.loops ? byKind[own.loop].loop : 0)))
  for (const kind of KINDS) byKind[kind] = { voices: byKind[kind].voices * met, loop: stage.loops ? byKind[kind].loop * met : 0 }
  const byUpdates = new Map<string, EstimatedPower>()
  for (const { updateEvery: every, between } of UPDATES) {
    byUpdates.set(between + every, yield* updatesPower(stage, tones, { every, between }))
  }
  bench.estimates = ({ line, loop, updateEvery, between }) => {
    const updates = byUpdates.get(between + updateEvery) as EstimatedPower
    return byKind[line].voices + byKind[loop].loop + updates.voices + (stage.loops ? updates.loop : 0)
  }
  return bench.estimates
}
