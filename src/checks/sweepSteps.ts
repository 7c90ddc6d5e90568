// sweep.steps: what interpolator and update interval add to the wet signal, against a perfect read of the true delay.
import {
  type ArtefactBench,
  artefactBench,
  type ChangePath,
  type CheapestSetting,
  cheapestChange,
  cheapestSetting,
  choiceOf,
  levelsOf,
  settingOf,
  withSetting,
} from '../analysis/artefactBench.ts'
import { benchArtefacts } from '../analysis/artefacts.ts'
import { getAt } from '../set/path.ts'
import { judge, type Limit, labelOf, limitOf } from './limits.ts'
import { quantity } from './loopText.ts'
import { blameText, nothingText, stepsWorking } from './sweepStepsWorking.ts'
import type { CheckInput, CheckSteps, Figure, Mend } from './types.ts'

export function* sweepSteps(input: CheckInput): CheckSteps {
  const { set, sampleRate } = input
  const limit = limitOf(set, 'sweep.steps')
  const base = { id: 'sweep.steps', limit: limit.limit, unit: 'dB', label: labelOf('sweep.steps') } as const
  const nothing = nothingText(set)
  if (nothing) return { ...base, status: 'holds', value: null, text: nothing.text, working: [nothing.step] }
  const bench = yield* parts(0, 0.4, artefactBench(set, sampleRate))
  const found = yield* parts(0.4, 0.6, benchArtefacts(bench))
  const value = found.own?.db ?? null
  const status = judge(limit, value)
  const cheapest = yield* parts(0.6, 0.8, cheapestWithin(bench, limit))
  const mend = status === 'holds' ? [] : yield* parts(0.8, 1, mends(bench, limit, value ?? 0))
  return {
    ...base,
    status,
    value,
    text: `Artefacts of reading and updating lie ${quantity(-(value ?? 0), 'dB')} below the wet signal; ${blameText(set, found)} leaves most of them.`,
    working: stepsWorking({ set, sampleRate, limit, bench, found, cheapest }),
    ...(mend.length > 0 && { mend }),
  }
}

/** Status and value alone, at a third of the cost. */
export function* sweepStepsFigure({ set, sampleRate }: CheckInput): Generator<number, Figure> {
  const limit = limitOf(set, 'sweep.steps')
  if (nothingText(set)) return { status: 'holds', value: null }
  const bench = yield* parts(0, 0.8, artefactBench(set, sampleRate))
  const { db } = yield* parts(0.8, 1, levelsOf(bench, choiceOf(settingOf(set))))
  return { status: judge(limit, db), value: db }
}

/** Runs `steps`, one or more runs from 0 to 1, as the part `from` to `to` of the whole. */
function* parts<T>(from: number, to: number, steps: Generator<number, T>): Generator<number, T> {
  let most = 0
  let step = steps.next()
  for (; !step.done; step = steps.next()) {
    most = Math.max(most, step.value)
    yield from + (to - from) * most
  }
  return step.value
}

/** The cheapest that holds, or where none does, that is inside the limit. */
export interface Cheapest {
  readonly targetDb: number
  readonly found: CheapestSetting | null
}

function* cheapestWithin(bench: ArtefactBench, limit: Limit): Generator<number, Cheapest> {
  const targets = targetsOf(limit)
  for (const targetDb of targets) {
    const found = yield* cheapestSetting(bench, targetDb)
    if (found) return { targetDb, found }
  }
  return { targetDb: targets.at(-1) as number, found: null }
}

/** What to stay at or below in order to hold, and in order not to fail, dB. */
function targetsOf({ limit, margin }: Limit): readonly number[] {
  const most = limit ?? 0
  // At the margin's very edge a figure is near already.
  return margin > 0 ? [most - margin - 1e-9, most] : [most]
}

const LABELS: Readonly<Record<ChangePath, string>> = {
  'line.interpolation': 'Line read',
  'loop.interpolation': 'Loop read',
  'sweep.updateEvery': 'Update every',
  'sweep.between': 'Between updates',
}

/** The cheapest change of each single field that holds, or else one that no longer fails. */
function* mends(bench: ArtefactBench, limit: Limit, value: number): Generator<number, Mend[]> {
  const found: Mend[] = []
  for (const path of Object.keys(LABELS) as ChangePath[]) {
    for (const targetDb of targetsOf(limit)) {
      // A set that is inside the limit is not helped by being inside it.
      if (value <= targetDb) continue
      const change = yield* cheapestChange(bench, path, targetDb)
      if (!change) continue
      const to = getAt(withSetting(bench.stage.set, change.setting), path) as string | number
      const unit = path === 'sweep.updateEvery' ? (to === 1 ? ' sample' : ' samples') : ''
      found.push({ label: `${LABELS[path]} ${to}${unit} (${quantity(change.db, 'dB')})`, path, value: to })
      break
    }
  }
  return found
}
