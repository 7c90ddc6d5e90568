// Why a value cannot stand, in the words of the page: labels instead of paths.
import { CLOSE_TOLERANCE, delayRange } from '../../src/set/delayRange.ts'
import { isParameterPath, parameter } from '../../src/set/parameters.ts'
import type { Problem } from '../../src/set/result.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { rangeText } from '../../src/set/valueProblem.ts'
import type { Change, Offer } from '../state/offers.ts'
import { showIn, showQuantity } from './quantity.ts'

/** One sentence for a typed value that was not applied; `set` is what it would have become, when it got that far. */
export function whyNot(path: string, problem: Problem, set: ParameterSet | null): string {
  const close = set && closeRead(set)
  if (close) return close
  const knob = set?.panel[Number(/^panel\[(\d+)\]/.exec(problem.path)?.[1])]
  if (knob) return `Knob ${knob.knob} moves something of what would be gone`
  if (isParameterPath(path) && problem.path === path) {
    const row = parameter(path)
    return `${row.label} takes ${withMinus(rangeText(row))}`
  }
  return withMinus(sentence(problem.message))
}

/** A button's words: "Also set depth to 0.70 ms", "Use 4.55 ms instead". */
export function offerLabel({ instead, changes, words }: Offer): string {
  if (words !== undefined) return words
  if (instead) return `Use ${changes.map(changeText).join(', ')} instead`
  return `Also set ${changes.map((change) => `${parameter(change.path).label.toLowerCase()} to ${changeText(change)}`).join(' and ')}`
}

function changeText({ path, value }: Change): string {
  const row = parameter(path)
  if (typeof value === 'number' && 'unit' in row) return showQuantity(value, row).replace('\u00a0', ' ')
  return (row.kind === 'choice' && row.options.find((option) => option.value === value)?.label) || String(value)
}

/** "The delay would come to −1.75 ms; a voice reads no closer than 0.02 ms"; null when nothing reads too close. */
function closeRead(set: ParameterSet): string | null {
  const { voices, loop, voiceLimitSamples, loopLimitSamples } = delayRange(set)
  const ms = (samples: number) => showIn(rounded((samples * 1000) / set.sampleRate), 'ms')
  if (voices.minSamples < voiceLimitSamples - CLOSE_TOLERANCE)
    return `The delay would come to ${ms(voices.minSamples)}; a voice reads no closer than ${ms(voiceLimitSamples)}`
  if (set.loop.feedback !== 0 && loop.minSamples < loopLimitSamples - CLOSE_TOLERANCE)
    return `The loop’s delay would come to ${ms(loop.minSamples)}; it reads no closer than ${ms(loopLimitSamples)}`
  return null
}

/** Two decimals of a millisecond, two digits below a tenth. */
const rounded = (ms: number) => Number(Math.abs(ms) < 0.1 ? ms.toPrecision(2) : ms.toFixed(2))
export const sentence = (text: string) => text.charAt(0).toUpperCase() + text.slice(1)
/** Minus signs of a message made for terminals, as the page writes them. */
export const withMinus = (text: string) => text.replace(/(^|[\s(])-(?=\d)/g, '$1−')
