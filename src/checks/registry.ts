// Which checks exist, what each costs, and how they are run.
import type { ParameterSet } from '../set/types.ts'
import { levelDc } from './levelDc.ts'
import { levelLine } from './levelLine.ts'
import { levelLoudness } from './levelLoudness.ts'
import { levelMono } from './levelMono.ts'
import { levelPeak } from './levelPeak.ts'
import { LIMITS } from './limits.ts'
import { loopMargin } from './loopMargin.ts'
import { loopPoles } from './loopPoles.ts'
import { loopRing } from './loopRing.ts'
import { loopStability } from './loopStability.ts'
import { responseExtremes } from './responseExtremes.ts'
import { shaperAlias } from './shaperAlias.ts'
import { shaperHarmonics } from './shaperHarmonics.ts'
import { sweepDetune } from './sweepDetune.ts'
import { sweepFusion } from './sweepFusion.ts'
import { sweepRange } from './sweepRange.ts'
import { sweepSteps } from './sweepSteps.ts'
import { toneDroop } from './toneDroop.ts'
import type { Check, CheckEntry, CheckInput, CheckKind, CheckMaterial, CheckProgress, CheckSteps, Verdict } from './types.ts'

const UNSORTED: readonly CheckEntry[] = [
  { id: 'loop.stability', kind: 'closed', run: loopStability },
  { id: 'loop.margin', kind: 'closed', run: loopMargin },
  { id: 'loop.poles', kind: 'closed', run: loopPoles },
  { id: 'loop.ring', kind: 'closed', run: loopRing },
  { id: 'response.extremes', kind: 'closed', run: responseExtremes },
  { id: 'sweep.range', kind: 'closed', run: sweepRange },
  { id: 'sweep.detune', kind: 'closed', run: sweepDetune },
  { id: 'sweep.fusion', kind: 'closed', run: sweepFusion },
  { id: 'sweep.steps', kind: 'rendered', run: sweepSteps },
  { id: 'tone.droop', kind: 'closed', run: toneDroop },
  { id: 'level.peak', kind: 'closed', run: levelPeak },
  { id: 'level.line', kind: 'closed', run: levelLine },
  { id: 'level.dc', kind: 'rendered', run: levelDc },
  { id: 'level.loudness', kind: 'rendered', run: levelLoudness },
  { id: 'level.mono', kind: 'closed', run: levelMono },
  { id: 'shaper.harmonics', kind: 'closed', run: shaperHarmonics },
  { id: 'shaper.alias', kind: 'closed', run: shaperAlias },
]

const row = new Map<string, number>(LIMITS.map(({ id }, i) => [id, i]))

/** Every check of one set at one place of its knobs, in the order of the table of limits. panel.box stands beside them: it runs these at other places. */
export const CHECKS: readonly CheckEntry[] = [...UNSORTED].sort((a, b) => (row.get(a.id) ?? 0) - (row.get(b.id) ?? 0))

export interface CheckOptions {
  /** Hz, 8000 to 192000; the set's own when absent. */
  readonly sampleRate?: number
  readonly material?: CheckMaterial
  /** Only these kinds; all when absent. */
  readonly kinds?: readonly CheckKind[]
}

/** Runs the checks of a valid set step by step, yielding how far they are; returns them in the table's order. Throws RangeError for a rate out of range. */
export function* checkSteps(set: ParameterSet, options: CheckOptions = {}): Generator<CheckProgress, Check[]> {
  const input = checkInput(set, options)
  const entries = CHECKS.filter(({ kind }) => options.kinds?.includes(kind) ?? true)
  const checks: Check[] = []
  for (const { id, run } of entries) {
    const at = { id, done: checks.length, total: entries.length }
    yield { ...at, part: 0 }
    const begun = run(input)
    if (!isSteps(begun)) {
      checks.push(begun)
      continue
    }
    let step = begun.next()
    for (; !step.done; step = begun.next()) yield { ...at, part: step.value }
    checks.push(step.value)
  }
  return checks
}

/** All checks at once. */
export function runChecks(set: ParameterSet, options: CheckOptions = {}): Check[] {
  const steps = checkSteps(set, options)
  let step = steps.next()
  while (!step.done) step = steps.next()
  return step.value
}

/** What checks of `set` look at. Throws RangeError for a rate out of range. */
export function checkInput(set: ParameterSet, { sampleRate = set.sampleRate, material }: CheckOptions = {}): CheckInput {
  if (!(sampleRate >= 8000 && sampleRate <= 192000)) throw new RangeError(`sampleRate must be 8000 to 192000 Hz, got ${sampleRate}`)
  return { set, sampleRate, ...(material && { material }) }
}

const isSteps = (begun: Check | CheckSteps): begun is CheckSteps => 'next' in begun

/** The worst status of all checks; a note weighs nothing. */
export function verdictOf(checks: readonly Pick<Check, 'status'>[]): Verdict {
  if (checks.some((c) => c.status === 'fails')) return 'fails'
  return checks.some((c) => c.status === 'near') ? 'near' : 'holds'
}
