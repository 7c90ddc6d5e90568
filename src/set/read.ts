// A set file's text in, a complete and valid set or every reason out.
import { readJson } from './jsonText.ts'
import { parseSet } from './parse.ts'
import type { Result } from './result.ts'
import type { ParameterSet } from './types.ts'

/** Reads a set file's text: at most 256 KiB of strict JSON, any known version; what it leaves out gets the table's default. */
export function readSet(text: string): Result<ParameterSet> {
  const json = readJson(text)
  return json.ok ? parseSet(json.value) : json
}
