// loop.stability: the strongest word that can be said of the loop while it moves, and what would raise it.
import type { Stability } from '../analysis/stability.ts'
import { type Raise, raises } from '../analysis/stabilityRaise.ts'
import { parameter } from '../set/parameters.ts'
import { labelOf } from './limits.ts'
import { loopWhole, loopWord, noLoopReason } from './loopFigures.ts'
import { stabilityWorking } from './loopStabilityWorking.ts'
import { delaysText, nearOne, quantity } from './loopText.ts'
import type { Check, CheckFunction, CheckInput, FigureFunction, Mend, Status } from './types.ts'

const STATUS: Readonly<Record<Stability['word'], Status>> = {
  proven: 'holds',
  computed: 'holds',
  frozen: 'near',
  bounded: 'near',
  diverges: 'fails',
}

/** Status and word alone: nothing is searched that would raise it. */
export const loopStabilityFigure: FigureFunction = (input) => {
  const { word } = loopWord(input)
  return { status: STATUS[word], value: word }
}

export const loopStability: CheckFunction = (input): Check => {
  const stability = loopWhole(input)
  const changes = raises(input.set, input.sampleRate, stability)
  const reason = noLoopReason(input)
  return {
    id: 'loop.stability',
    ...loopStabilityFigure(input),
    limit: 'computed',
    unit: '',
    label: labelOf('loop.stability'),
    text: reason === null ? `${wordText(input, stability)}${raiseText(changes)}` : `${reason}, so nothing can build up.`,
    working: stabilityWorking(input, stability, changes),
    ...(changes.length > 0 && { mend: changes.map(mendOf) }),
  }
}

function wordText({ set, sampleRate }: CheckInput, s: Stability): string {
  switch (s.proof) {
    case 'noLoop':
      return 'No loop: nothing can build up.'
    case 'poles':
      return `Proven: the loop stands still and its largest pole radius is ${nearOne(s.pole?.radius ?? 0)}, below 1.`
    case 'peak':
      return `Proven for any movement: no peak comes back larger than ${nearOne(s.gammaInfinity)} of itself.`
    case 'energy':
      return `Proven for any movement this slow (${quantity(s.movement.epsilon)} samples a sample): no energy comes back larger than ${nearOne(s.gamma2 ?? 0)} of itself.`
    case 'still':
      return `Proven: the loop stands still and its gain, shaper included, is at most ${nearOne(s.frozenGain)}.`
    case 'sweep':
      return `Computed for this sweep: no energy comes back larger than ${nearOne(s.gammaN ?? 0)} of itself.`
    case 'frozen':
      return `Stable wherever the sweep is held, but nothing is certain while it moves${movingText(s)}.`
    case 'level':
      return `It may sing, but the line stays within ${quantity(s.level ?? 0)} times full scale.`
    case 'none':
      return s.pole === null
        ? `Diverges: the shaper sets no limit, and the loop gain reaches ${nearOne(s.frozenGain)}.`
        : `Diverges: the largest pole radius is ${nearOne(s.pole.radius)} at a delay of ${delaysText(s.pole.delaysSamples, sampleRate)}${set.loop.shaper === null ? '' : ', shaper included'}.`
  }
}

function movingText({ gammaN, gamma2, gammaInfinity, level }: Stability): string {
  const gain = gammaN === null ? Math.min(gammaInfinity, gamma2 ?? Number.POSITIVE_INFINITY) : gammaN
  const bounded = level === null ? '' : `; the line stays within ${quantity(level)} times full scale`
  return `: energy may come back ${nearOne(gain)} times itself${bounded}`
}

function raiseText(changes: readonly Raise[]): string {
  const [word] = changes.map((change) => change.word)
  if (word === undefined) return ''
  const same = changes.filter((change) => change.word === word).slice(0, 3)
  const text = same.map(changeText)
  const list = text.length === 1 ? text[0] : `${text.slice(0, -1).join(', ')} or ${text.at(-1)}`
  return ` ${word === 'proven' ? 'Proven' : 'Computed'} with ${list}.`
}

/** "feedback 0.985", "the loop read linearly". */
function changeText({ path, value }: Raise): string {
  if (path === 'loop.interpolation') return 'the loop read linearly'
  if (path === 'loop.delay') return 'the loop delay fixed'
  if (path === 'sweep.between') return 'a ramp between updates'
  if (path === 'loop.shaper') return 'no loop shaper'
  const row = parameter(path)
  const unit = 'unit' in row ? row.unit : ''
  return `${row.label.toLowerCase()} ${quantity(value as number, unit)}`
}

const LABELS: Readonly<Record<string, string>> = {
  'loop.interpolation': 'Read the loop linearly',
  'loop.delay': 'Fix the loop delay',
  'sweep.between': 'Ramp between updates',
  'loop.shaper': 'Take the loop shaper out',
}

function mendOf(change: Raise): Mend {
  const words = changeText(change)
  const label = LABELS[change.path] ?? `${words.charAt(0).toUpperCase()}${words.slice(1)}`
  return { label: change.word === 'computed' ? `${label} (for this sweep)` : label, path: change.path, value: change.value }
}
