// Data on standard output: JSON or CSV. Talk on standard error.

/** One JSON document on one line. JSON knows no NaN and no infinity: a figure that is none must not get this far. */
export function printJson(value: unknown): void {
  process.stdout.write(`${JSON.stringify(value, refuseNonFinite)}\n`)
}

function refuseNonFinite(key: string, value: unknown): unknown {
  if (typeof value === 'number' && !Number.isFinite(value)) throw new RangeError(`${key} is ${value}, which JSON cannot hold`)
  return ArrayBuffer.isView(value) ? Array.from(value as Float64Array) : value
}

/** Comma-separated values (RFC 4180) with a header line; numbers in full precision. */
export function printCsv(header: readonly string[], rows: Iterable<readonly (string | number | null)[]>): void {
  const lines = [header.join(',')]
  for (const row of rows) lines.push(row.map((cell) => (cell === null ? '' : csvCell(cell))).join(','))
  process.stdout.write(`${lines.join('\n')}\n`)
}

const csvCell = (cell: string | number) =>
  typeof cell === 'string' && /[",\n\r]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : String(cell)

/** One line for the user on standard error. */
export function talk(text: string): void {
  process.stderr.write(`${oneLine(text)}\n`)
}

/** A path or a text from a file may hold line ends and control characters: they must not forge lines of their own. */
export const oneLine = (text: string): string => text.replace(/\p{Cc}+/gu, ' ').trim()
