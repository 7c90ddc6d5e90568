// Judging one value by its row of the table, and saying what the row accepts. Every message about a value is made here.
import type { NumberParameter, Parameter } from './parameters/kinds.ts'
import type { Problem } from './result.ts'

/** What a row accepts, in words: "-2 to 2", "0.1 to 96000 Hz, or null", "sine, triangle, …", "true or false". */
export function rangeText(p: Parameter): string {
  const orNull = (text: string) => ('nullable' in p && p.nullable ? `${text}, or null` : text)
  switch (p.kind) {
    case 'number':
      return orNull(withUnit(`${p.min} to ${p.max}`, p.unit))
    case 'integer':
      return orNull(withUnit(integerText(p), p.unit))
    case 'choice':
      return p.options.map(optionValue).join(', ')
    case 'boolean':
      return 'true or false'
    case 'text':
      return `text of at most ${p.maxLength} characters`
  }
}

/**
 * What is wrong with `value` for this row, or null. `path` is where it stands, when that is not the row's own path.
 * A null is accepted where the row says so.
 */
export function valueProblem(p: Parameter, value: unknown, path = p.path): Problem | null {
  if (accepts(p, value)) return null
  const range = rangeText(p)
  const wanted = p.kind === 'choice' ? `one of ${range}` : range
  const message = value === undefined ? `${path} is missing, and must be ${wanted}` : `${path} must be ${wanted}, got ${valueText(value)}`
  const hint = choiceHint(p, value) ?? quotedHint(p, value)
  return { path, message, value, range, ...(hint && { hint }) }
}

function choiceHint(p: Parameter, value: unknown): string | undefined {
  if (p.kind !== 'choice' || typeof value !== 'string') return undefined
  return nearestHint(value, p.options.map(optionValue))
}

function quotedHint(p: Parameter, value: unknown): string | undefined {
  if (typeof value !== 'string' || p.kind === 'choice' || p.kind === 'text') return undefined
  return `write it without quotes${p.kind === 'boolean' ? '' : ' and without its unit'}`
}

const optionValue = (option: { readonly value: string }): string => option.value

export function accepts(p: Parameter, value: unknown): boolean {
  if (value === null) return 'nullable' in p && p.nullable === true
  switch (p.kind) {
    case 'number':
      return typeof value === 'number' && value >= p.min && value <= p.max
    case 'integer':
      return (
        Number.isInteger(value) &&
        (value as number) >= p.min &&
        (value as number) <= p.max &&
        (p.values?.includes(value as number) ?? true) &&
        !p.except?.includes(value as number)
      )
    case 'choice':
      return p.options.some((option) => option.value === value)
    case 'boolean':
      return typeof value === 'boolean'
    case 'text':
      return typeof value === 'string' && value.length <= p.maxLength
  }
}

/** The same row where null is not accepted: a knob's end, the curve of a shaper that is there. */
export const withoutNull = (p: Parameter): Parameter => ('nullable' in p ? { ...p, nullable: false } : p)

/** A value as it stands in a file, on one line and cut to 60 characters. */
export function valueText(value: unknown): string {
  if (value === undefined) return 'nothing'
  const text = typeof value === 'number' ? String(value) : jsonText(value)
  return text.length > 60 ? `${text.slice(0, 59)}…` : text
}

function jsonText(value: unknown): string {
  try {
    return JSON.stringify(value) ?? `a ${typeof value}`
  } catch {
    return `a ${typeof value} that JSON cannot hold`
  }
}

/** 'did you mean "depthMs"?' when one of the known words is close enough or goes on from this one, else undefined. */
export function nearestHint(word: string, known: readonly string[]): string | undefined {
  const lower = word.toLowerCase()
  const longest = Math.max(1, Math.floor(word.length / 3))
  const near = known
    .filter((candidate) => Math.abs(candidate.length - word.length) <= longest)
    .map((candidate) => ({ candidate, distance: editDistance(lower, candidate.toLowerCase()) }))
    .filter(({ distance }) => distance <= longest)
    .sort((a, b) => a.distance - b.distance)
  const best = near[0]?.candidate ?? known.find((candidate) => word.length >= 3 && candidate.toLowerCase().startsWith(lower))
  return best === undefined ? undefined : `did you mean "${best}"?`
}

function integerText({ min, max, values, except }: NumberParameter): string {
  if (values) return values.join(', ')
  return `a whole number from ${min} to ${max}${except ? ` but not ${except.join(', ')}` : ''}`
}

const withUnit = (text: string, unit: string) => (unit === '' ? text : `${text} ${unit}`)

/** Levenshtein's distance: single letters put in, left out or changed. */
function editDistance(a: string, b: string): number {
  let row = Array.from({ length: b.length + 1 }, (_, j) => j)
  for (let i = 1; i <= a.length; i++) {
    const next = [i]
    for (let j = 1; j <= b.length; j++)
      next.push(Math.min((row[j] as number) + 1, (next[j - 1] as number) + 1, (row[j - 1] as number) + (a[i - 1] === b[j - 1] ? 0 : 1)))
    row = next
  }
  return row[b.length] as number
}
