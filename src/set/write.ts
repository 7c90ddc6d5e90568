// A set as the text of its file: every field, in the table's order, so that two files differ only where their sets do.
import { SET_SCHEMA } from './schema.ts'
import type { ParameterSet } from './types.ts'

/** Canonical JSON: two spaces, points one a line, a final newline. Throws RangeError for a set that would not read back. */
export function writeSet(set: ParameterSet): string {
  const ordered = SET_SCHEMA.safeParse(set)
  if (!ordered.success) throw new RangeError(`the set cannot be written: ${ordered.error.issues[0]?.path.join('.')} is out of range`)
  const text = JSON.stringify(ordered.data, null, 2)
  return `${text.replace(/\[\n\s+(-?[\d.e+-]+),\n\s+(-?[\d.e+-]+)\n\s+\]/g, '[$1, $2]')}\n`
}
