// A set from JSON already read: its fields in, a complete and valid set or every reason out.
// Apart from reading text, which needs a parser with positions that the page loads only to open a file.
import { migrate } from './migrations.ts'
import { bad, good, type Result } from './result.ts'
import { SET_SCHEMA } from './schema.ts'
import { schemaProblems } from './schemaProblems.ts'
import type { ParameterSet } from './types.ts'
import { setProblems } from './validity.ts'
import { valueText } from './valueProblem.ts'

/** Reads a set from any known version of its JSON, such as a kept state's or a link's; what it leaves out gets the table's default. Never throws, whatever it is given. */
export function parseSet(json: unknown): Result<ParameterSet> {
  if (json === null || typeof json !== 'object' || Array.isArray(json)) {
    const message = `a set must be a JSON object, got ${valueText(json)}`
    return bad({ path: '', message, range: 'a JSON object', hint: NOT_A_SET })
  }
  const document = json as Record<string, unknown>
  if (document.format !== FORMAT) {
    const message = `format must be ${valueText(FORMAT)}, got ${valueText(document.format)}`
    return bad({ path: 'format', message, value: document.format, range: valueText(FORMAT), hint: NOT_A_SET })
  }
  const newest = migrate(document)
  if (!newest.ok) return newest
  const parsed = SET_SCHEMA.safeParse(newest.value)
  if (!parsed.success) return bad(...schemaProblems(newest.value, parsed.error.issues))
  // The schema is made from the same table as the type is written for; a test holds the two together.
  const set = parsed.data as unknown as ParameterSet
  const problems = setProblems(set)
  return problems.length > 0 ? bad(...problems) : good(set)
}

const FORMAT: ParameterSet['format'] = 'combwright-set'
const NOT_A_SET = 'a set file starts with "format": "combwright-set", "version": 1'
