// Values of options: numbers with their unit and range, lists, choices. A refusal names the option, the value and the range.
import { parseQuantity } from '../set/units.ts'
import { nearestHint, valueText } from '../set/valueProblem.ts'
import { fail } from './failure.ts'

export interface NumberOption {
  /** As typed: "--position". */
  readonly name: string
  readonly unit: string
  readonly min: number
  readonly max: number
  readonly whole?: boolean
  /** A word that is accepted in place of a number; whoever calls has looked for it. */
  readonly orElse?: string
  /** Said when a value is out of range. */
  readonly hint?: string
}

/** One number with or without its unit. */
export function readNumberOption(text: string, option: NumberOption): number {
  const { name, unit, min, max, whole = false, orElse } = option
  const range = `${whole ? 'a whole number from ' : ''}${min} to ${max}${unit === '' ? '' : ` ${unit}`}${orElse ? `, or ${orElse}` : ''}`
  const result = parseQuantity(text, unit)
  if (!result.ok) return fail(`${name} must be ${range}, got ${valueText(text)}`, result.problems[0]?.hint ?? `give ${range}`)
  if (!(result.value >= min && result.value <= max) || (whole && !Number.isInteger(result.value)))
    return fail(`${name} must be ${range}, got ${text.trim() || 'nothing'}`, option.hint ?? `give ${range}`)
  return result.value
}

/** Numbers with commas between them; here a comma is never a decimal one. */
export function readNumberList(text: string, option: NumberOption): number[] {
  return text.split(',').map((part) => readNumberOption(part, option))
}

export function readChoice<T extends string>(text: string, name: string, choices: readonly T[]): T {
  const found = choices.find((choice) => choice === text)
  if (found !== undefined) return found
  const list = choices.join(', ')
  return fail(`${name} must be one of ${list}, got ${valueText(text)}`, nearestHint(text, choices) ?? `choose one of ${list}`)
}
