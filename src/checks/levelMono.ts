// level.mono: what is lost when both outputs are summed.
import { type MonoLoss, monoLoss } from '../analysis/mono.ts'
import { withAt } from '../set/path.ts'
import type { ParameterSet } from '../set/types.ts'
import { judge, type Limit, labelOf, limitOf } from './limits.ts'
import { quantity } from './loopText.ts'
import type { Check, CheckFunction, CheckInput, Mend, WorkingStep } from './types.ts'

/** What monoLoss gives where the sum is silent, dB; nothing real comes near. */
const ALL_DB = 300

export const levelMono: CheckFunction = (input): Check => {
  const { set, sampleRate } = input
  const limit = limitOf(set, 'level.mono')
  const base = { id: 'level.mono', limit: limit.limit, unit: 'dB', label: labelOf('level.mono') } as const
  if (set.layout === 'mono')
    return { ...base, status: 'holds', value: null, text: 'One output: there is nothing to sum.', working: [oneStep()] }
  const loss = monoLoss(set, sampleRate)
  const status = judge(limit, loss.lossDb)
  const mend = status === 'holds' ? [] : mends(input, limit)
  return {
    ...base,
    status,
    value: loss.lossDb,
    text: textOf(loss),
    working: workingOf(input, loss, limit),
    ...(mend.length > 0 && { mend }),
  }
}

const oneStep = (): WorkingStep => ({
  formula: 'y₀ + y₁',
  numbers: 'layout mono: y₁ does not exist',
  result: 'no loss',
  source: 'the layout',
})

function textOf({ lossDb, octaves }: MonoLoss): string {
  if (lossDb === null) return 'Nothing comes out of either output.'
  if (lossDb > ALL_DB) return 'The sum of both outputs is silent: one is the other turned over.'
  if (lossDb < 0.005) return 'The sum of both outputs loses nothing.'
  const worst = octaves.reduce((a, b) => (b.lossDb > a.lossDb ? b : a))
  const where = worst.lossDb > lossDb + 0.5 ? `, most from ${octaveText(worst.lowHz)}: ${lostText(worst.lossDb)}` : ''
  return `The sum of both outputs loses ${quantity(lossDb, 'dB')}${where}.`
}

const octaveText = (lowHz: number): string => `${quantity(lowHz)} to ${quantity(2 * lowHz, 'Hz')}`
const lostText = (lossDb: number): string => (lossDb > ALL_DB ? 'everything' : quantity(lossDb, 'dB'))

/** A sum louder than both outputs on average, by rounding, is no gain. */
const oneDecimal = (db: number): string => (Math.abs(db) < 0.05 ? '0.0' : db.toFixed(1).replace('-', '−'))

function workingOf({ set }: CheckInput, loss: MonoLoss, limit: Limit): WorkingStep[] {
  const { lossDb, averageDb, position, positions, meetings, octaves, frequencies } = loss
  const places =
    positions === 1
      ? 'where the sweep stands'
      : `the worst of ${positions} sweep positions${meetings > 0 ? ' and those where both delays come closest' : ''}, ${quantity(position)}`
  const sides = set.mix.invertRight ? ', wet of channel 2 turned over' : ''
  const none = 'nothing comes out'
  return [
    {
      formula: '10 log₁₀(Σ(|H₀|² + |H₁|²)/2 / Σ|H₀ + H₁|²/4)',
      numbers: `${frequencies} frequencies of equal ratio, 20 Hz to 20 kHz (pink noise), the same signal at every input${sides}; ${places}`,
      result: lossDb === null ? none : lostText(lossDb),
      source: 'like outputs lose 0 dB, unrelated ones 3.01 dB, opposite ones all; weighting: this project’s choice',
    },
    {
      formula: 'the same by octaves, there',
      numbers: `${octaves.map(({ lowHz }) => quantity(lowHz)).join(', ')} Hz and up`,
      result: `${octaves.map((octave) => (octave.lossDb > ALL_DB ? 'all' : oneDecimal(octave.lossDb))).join(', ')} dB`,
      source: 'the sums above, cut at octaves',
    },
    {
      formula: 'the same with power averaged over the sweep',
      numbers: `${positions === 1 ? 'it stands' : `${positions} positions`}`,
      result: averageDb === null ? none : lostText(averageDb),
      source: 'sums over position and frequency',
    },
    {
      formula: 'loss ≤ limit',
      numbers: `limit ${quantity(limit.limit ?? 0, 'dB')}, near within ${quantity(limit.margin, 'dB')} of it`,
      result: { holds: 'inside', near: 'inside, near the limit', fails: 'outside', note: 'outside' }[judge(limit, lossDb)],
      source: limit.own ? 'the set’s own limit' : limit.row.source,
    },
  ]
}

/** Single changes after which it holds, each tried. */
function mends({ set, sampleRate }: CheckInput, limit: Limit): Mend[] {
  const candidates: Mend[] = [
    ...(set.mix.invertRight ? [{ label: 'Right wet not turned over', path: 'mix.invertRight', value: false }] : []),
    ...(set.sweep.stereoPhase !== 0 ? [{ label: 'Stereo phase 0°', path: 'sweep.stereoPhase', value: 0 }] : []),
    ...(set.mix.dry === 0 ? [{ label: `Dry ${quantity(Math.abs(set.mix.wet))}`, path: 'mix.dry', value: Math.abs(set.mix.wet) }] : []),
  ]
  const holds = (changed: ParameterSet) => judge(limit, monoLoss(changed, sampleRate).lossDb) === 'holds'
  return candidates.filter(({ path, value }) => holds(withAt(set, path, value)))
}
