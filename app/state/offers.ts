// Second changes that would make a typed value possible, each tried before it is offered.
import { parameter } from '../../src/set/parameters.ts'
import { withAt } from '../../src/set/path.ts'
import type { Problem } from '../../src/set/result.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { formatQuantity } from '../../src/set/units.ts'
import { setProblems } from '../../src/set/validity.ts'

export interface Offer {
  /** A button's words: "Also set depth to 0.70 ms". */
  readonly label: string
  readonly set: ParameterSet
}

/** Fields that mend by growing; the others mend by shrinking. */
const GROWS = new Set(['line.baseMs'])

/** Offers for a set that became invalid when the field at `path` was typed, from what its problems say would mend them. */
export function offersFor(set: ParameterSet, path: string, problems: readonly Problem[]): readonly Offer[] {
  const byPath = new Map<string, number | string>()
  for (const mend of problems.flatMap((problem) => problem.mends ?? [])) {
    const before = byPath.get(mend.path)
    const value =
      typeof before === 'number' && typeof mend.value === 'number'
        ? (GROWS.has(mend.path) ? Math.max : Math.min)(before, mend.value)
        : mend.value
    byPath.set(mend.path, value)
  }
  const offers = [...byPath].map(([mendPath, value]) => offer(set, path, mendPath, value))
  return offers.filter((one) => one !== null)
}

function offer(set: ParameterSet, path: string, mendPath: string, value: number | string): Offer | null {
  const candidates = typeof value === 'number' ? [roundNicely(value, GROWS.has(mendPath)), value] : [value]
  for (const candidate of candidates) {
    const mended = withAt(set, mendPath, candidate)
    if (setProblems(mended).length === 0) return { label: label(path, mendPath, candidate), set: mended }
  }
  return null
}

function label(path: string, mendPath: string, value: number | string): string {
  const row = parameter(mendPath)
  const text = typeof value === 'number' && 'unit' in row ? quantity(value, row.unit) : optionLabel(row, value)
  return path === mendPath ? `Use ${text} instead` : `Also set ${row.label.toLowerCase()} to ${text}`
}

function quantity(value: number, unit: string): string {
  const parts = formatQuantity(value, unit)
  return parts.unit === '' ? parts.number : `${parts.number} ${parts.unit}`
}

function optionLabel(row: ReturnType<typeof parameter>, value: number | string): string {
  return (row.kind === 'choice' && row.options.find((option) => option.value === value)?.label) || String(value)
}

/** On a grid of 0.05 from 0.2 up, 0.01 from 0.04, else 0.001, towards the safe side. */
export function roundNicely(value: number, up: boolean): number {
  const perUnit = value >= 0.2 ? 20 : value >= 0.04 ? 100 : 1000
  return (up ? Math.ceil(value * perUnit - 1e-9) : Math.floor(value * perUnit + 1e-9)) / perUnit
}
