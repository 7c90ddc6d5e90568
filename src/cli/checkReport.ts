// What `check` prints for people: a line a check, and under it, indented, how its figure was come by.
import { limitOf } from '../checks/limits.ts'
import { verdictOf } from '../checks/registry.ts'
import type { Check, Status, WorkingStep } from '../checks/types.ts'
import type { ParameterSet } from '../set/types.ts'
import { formatQuantity } from '../set/units.ts'
import { oneLine } from './output.ts'

export interface ReportOptions {
  /** Working under every check; else only under those that fail or are near. */
  readonly working?: boolean
}

const WIDTH = 100
const STATUS_WIDTH = 5
const INDENT = ' '.repeat(STATUS_WIDTH + 2)

/** The report of all checks of one set, in the checks' order, ending in a line end. Texts of the set are kept to one line each. */
export function checkReport(set: ParameterSet, checks: readonly Check[], { working = false }: ReportOptions = {}): string {
  const width = Math.max(...checks.map(({ id }) => id.length))
  const lines = checks.flatMap((check) => {
    const line = `${check.status.padEnd(STATUS_WIDTH)}  ${check.id.padEnd(width)}  ${oneLine(check.text)}`
    return working || check.status === 'fails' || check.status === 'near' ? [line, ...opened(set, check)] : [line]
  })
  return [`${oneLine(set.name)}: ${verdictOf(checks)}`, ...lines, '', tally(checks), ''].join('\n')
}

/** Each step as formula, numbers, result, source; then the limit, the panel's worst places, what would mend it. */
function opened(set: ParameterSet, check: Check): string[] {
  const limit = limitLine(set, check)
  const worst = check.worst?.filter(({ status }) => status === 'fails' || status === 'near') ?? []
  return [
    ...check.working.flatMap(stepLines),
    ...(limit === null ? [] : wrapped(limit, INDENT)),
    ...worst.flatMap(({ id, status, text }) => wrapped(`${status} ${id}: ${text}`, INDENT)),
    ...(check.mend ?? []).flatMap(({ label, path, value }) => wrapped(`would help: ${label} (${path} ${JSON.stringify(value)})`, INDENT)),
  ]
}

function stepLines({ formula, numbers, result, source }: WorkingStep): string[] {
  return [
    ...wrapped(formula, INDENT),
    ...(numbers === '' ? [] : wrapped(numbers, `${INDENT}  `)),
    ...wrapped(`= ${result}`, `${INDENT}  `),
    ...(source === '' ? [] : wrapped(`source: ${source}`, `${INDENT}  `)),
  ]
}

/** "limit 3 s, the set's own"; null where there is none. */
function limitLine(set: ParameterSet, { id, limit, unit }: Check): string | null {
  if (limit === null) return null
  if (typeof limit === 'string') return `limit: at least ${limit}`
  return `limit ${formatQuantity(limit, unit).number}${unit === '' ? '' : ` ${unit}`}${limitOf(set, id).own ? ', the set’s own' : ''}`
}

const COUNTED: readonly Status[] = ['fails', 'near', 'note', 'holds']

/** "1 fails, 2 near, 14 holds". */
function tally(checks: readonly Check[]): string {
  const counts = COUNTED.map((status) => ({ status, count: checks.filter((check) => check.status === status).length }))
  return counts
    .filter(({ count }) => count > 0)
    .map(({ status, count }) => `${count} ${status}`)
    .join(', ')
}

/** Lines of at most WIDTH characters, the first after `indent`, the others two deeper; a longer word keeps a line to itself. */
function wrapped(text: string, indent: string): string[] {
  const lines: string[] = []
  let line = indent
  for (const word of oneLine(text).split(' ')) {
    const empty = line.trim() === ''
    if (!empty && line.length + 1 + word.length > WIDTH) {
      lines.push(line)
      line = `${indent}  ${word}`
    } else line = empty ? `${line}${word}` : `${line} ${word}`
  }
  return [...lines, line]
}
