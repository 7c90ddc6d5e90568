// JSON from outside: bounded in size and depth, refused with line and column, a key written twice refused too.
// The language's own parser decides and makes the value; the parser with positions only says where.
import { type AnyNode, type MemberNode, parse as parseWithPositions, type Token, tokenize } from '@humanwhocodes/momoa'
import { bad, good, type Problem, type Result } from './result.ts'

export const MAX_TEXT_BYTES = 256 * 1024
const MAX_DEPTH = 16
const IS_IT_A_SET = 'is it a set file?'

/** The value of a JSON text, or why it is none. A byte-order mark at its start is passed over. */
export function readJson(text: string): Result<unknown> {
  const source = text.startsWith('\uFEFF') ? text.slice(1) : text
  const bytes = utf8Length(source)
  if (bytes > MAX_TEXT_BYTES) return bad(tooLarge(bytes))
  if (nesting(source) > MAX_DEPTH) {
    const message = `the text nests more than ${MAX_DEPTH} levels deep, which no set does`
    return bad({ path: '', message, range: `at most ${MAX_DEPTH} levels`, hint: IS_IT_A_SET })
  }
  let value: unknown
  try {
    value = JSON.parse(source)
  } catch {
    return bad(notJson(source))
  }
  const repeated = repeatedKeys(parseWithPositions(source).body, '')
  return repeated.length > 0 ? bad(...repeated) : good(value)
}

/** The refusal of a text of so many bytes. */
export function tooLarge(bytes: number): Problem {
  const message = `the text has ${bytes} bytes, where a set has at most ${MAX_TEXT_BYTES}`
  return { path: '', message, value: bytes, range: `at most ${MAX_TEXT_BYTES} bytes`, hint: IS_IT_A_SET }
}

function notJson(source: string): Problem {
  const hint = 'a set file is strict JSON: double quotes, no comments, no comma after the last entry'
  const at = brokenAt(source)
  if (source.trim() === '') return { path: '', message: 'the text is empty', hint }
  if (!at) return { path: '', message: 'the text is not JSON', hint }
  return { path: '', message: `the text is not JSON: ${at.what} at line ${at.line}, column ${at.column}`, hint }
}

interface Broken {
  readonly what: string
  readonly line: number
  readonly column: number
}

function brokenAt(source: string): Broken | null {
  try {
    parseWithPositions(source)
  } catch (error) {
    const { line, column } = error as { line?: number; column?: number }
    if (line === undefined || column === undefined) return null
    const found = source.split('\n')[line - 1]?.[column - 1]
    return { what: found === undefined ? 'it ends too early' : `unexpected ${JSON.stringify(found)}`, line, column }
  }
  return controlCharacterAt(source)
}

/** The parser with positions lets line ends and tabs inside texts pass; the language's own does not. */
function controlCharacterAt(source: string): Broken | null {
  for (const { type, loc } of tokenize(source, { ranges: false }) as Token[]) {
    if (type !== 'String') continue
    const inside = source.slice(loc.start.offset, loc.end.offset)
    if ([...inside].some((c) => c < ' '))
      return { what: 'a line end or control character inside a text', line: loc.start.line, column: loc.start.column }
  }
  return null
}

function repeatedKeys(node: AnyNode, path: string): Problem[] {
  if (node.type === 'Array') return node.elements.flatMap((element, i) => repeatedKeys(element.value, `${path}[${i}]`))
  if (node.type !== 'Object') return []
  const seen = new Map<string, MemberNode>()
  return node.members.flatMap((member) => {
    const key = member.name.type === 'String' ? member.name.value : member.name.name
    const at = path === '' ? key : `${path}.${key}`
    const first = seen.get(key)
    seen.set(key, member)
    const inside = repeatedKeys(member.value, at)
    if (!first) return inside
    const lines = `first in line ${first.loc.start.line}, again in line ${member.loc.start.line}`
    return [{ path: at, message: `${at} is written twice, ${lines}`, hint: 'keep one of them' }, ...inside]
  })
}

function utf8Length(text: string): number {
  let bytes = 0
  for (const character of text) {
    const code = character.codePointAt(0) as number
    bytes += code < 0x80 ? 1 : code < 0x800 ? 2 : code < 0x10000 ? 3 : 4
  }
  return bytes
}

/** Deepest nesting of brackets outside texts; no recursion, as the text may be hostile. */
function nesting(source: string): number {
  let depth = 0
  let deepest = 0
  let inText = false
  for (let i = 0; i < source.length; i++) {
    const c = source[i]
    if (inText) {
      if (c === '\\') i++
      else if (c === '"') inText = false
    } else if (c === '"') inText = true
    else if (c === '{' || c === '[') deepest = Math.max(deepest, ++depth)
    else if (c === '}' || c === ']') depth--
  }
  return deepest
}
