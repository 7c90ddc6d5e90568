// level.dc: what asymmetric shapers leave of a tone as DC, in the line and at the output.
import { asymmetricShapers, DC_TONE_PEAK, type DcFigures, dcSteps } from '../analysis/dc.ts'
import { getAt } from '../set/path.ts'
import type { Shaper } from '../set/types.ts'
import { toDb } from '../signal/levels.ts'
import { judge, type Limit, labelOf, limitOf } from './limits.ts'
import { counted, quantity } from './loopText.ts'
import type { CheckInput, CheckSteps, Mend, WorkingStep } from './types.ts'

const NAMES = { 'input.shaper': 'input shaper', 'loop.shaper': 'loop shaper', 'mix.shaper': 'output shaper' } as const

export function* levelDc(input: CheckInput): CheckSteps {
  const { set, sampleRate } = input
  const limit = limitOf(set, 'level.dc')
  const base = { id: 'level.dc', limit: limit.limit, unit: 'dBFS', label: labelOf('level.dc') } as const
  const uneven = asymmetricShapers(set)
  if (uneven.length === 0)
    return { ...base, status: 'holds', value: null, text: 'No DC: no shaper in use has unequal limits.', working: [symmetryStep()] }
  const figures = yield* dcSteps(set, sampleRate)
  const { line, output } = figures
  const value = line === null || output === null ? null : toDb(Math.max(line, output))
  const status = value === null ? 'fails' : judge(limit, value)
  const mend = status === 'holds' ? [] : mends(input, uneven)
  return {
    ...base,
    status,
    value,
    text: textOf(figures, value),
    working: workingOf(input, figures, limit),
    ...(mend.length > 0 && { mend }),
  }
}

const symmetryStep = (): WorkingStep => ({
  formula: 'path(−x) = −path(x), so the mean over a tone’s opposite half periods is 0',
  numbers: 'positive = negative limit in every shaper in use, or none in use',
  result: 'exactly 0, nothing was rendered',
  source: 'every read, filter and odd curve turns over with its input',
})

function textOf({ line, output, toneHz }: DcFigures, value: number | null): string {
  if (value === null || line === null || output === null) return 'The DC grows without end.'
  const where = line > output ? 'in the line' : 'at the output'
  return `A tone of −6 dBFS at ${quantity(toneHz, 'Hz')} leaves ${quantity(value, 'dBFS')} of DC ${where}.`
}

function workingOf({ set, sampleRate }: CheckInput, figures: DcFigures, limit: Limit): WorkingStep[] {
  const { line, output, toneHz, settleSeconds, windowSeconds, cycles, rateHz } = figures
  const sweep =
    cycles === 0
      ? 'the sweep stands'
      : `${counted(cycles, 'cycle')} of the sweep${rateHz === set.sweep.rateHz ? '' : `, run at ${quantity(rateHz, 'Hz')} so that they pass`}`
  const tone = `x = ${quantity(DC_TONE_PEAK)} sin 2π ${quantity(toneHz)} t at ${quantity(sampleRate, 'Hz')}, every input`
  const window = `${quantity(settleSeconds, 's')} to settle, then ${quantity(windowSeconds, 's')}: ${sweep}`
  const source = 'rendered by the double engine; Hann window, so that every position of the sweep counts alike'
  const result = (mean: number | null) => (mean === null ? 'grows without end' : `${quantity(mean)}, ${quantity(toDb(mean), 'dBFS')}`)
  return [
    {
      formula: 'mean of w',
      numbers: `${tone}; ${window}`,
      result: line === 0 ? '0: only the output shaper is uneven' : result(line),
      source,
    },
    { formula: 'mean of y', numbers: `${tone}; ${window}`, result: result(output), source },
    {
      formula: 'larger of both ≤ limit',
      numbers: `limit ${quantity(limit.limit ?? 0, 'dBFS')}, near within ${quantity(limit.margin, 'dB')} of it`,
      result: line === null || output === null ? 'outside' : wordOf(limit, toDb(Math.max(line, output))),
      source: limit.own ? 'the set’s own limit' : limit.row.source,
    },
  ]
}

const wordOf = (limit: Limit, db: number): string =>
  ({ holds: 'inside', near: 'inside, near the limit', fails: 'outside', note: 'outside' })[judge(limit, db)]

/** Equal limits leave nothing, where only one shaper has unequal ones: by symmetry, without rendering. */
function mends({ set }: CheckInput, uneven: ReturnType<typeof asymmetricShapers>): Mend[] {
  const [path] = uneven
  if (uneven.length !== 1 || path === undefined) return []
  const { positive, negative } = getAt(set, path) as Shaper
  return [
    { label: `Negative limit of the ${NAMES[path]} ${quantity(positive)}`, path: `${path}.negative`, value: positive },
    { label: `Positive limit of the ${NAMES[path]} ${quantity(negative)}`, path: `${path}.positive`, value: negative },
  ]
}
