import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { MAX_TEXT_BYTES, readJson } from '../../src/set/jsonText.ts'

const messages = (text: string) => {
  const result = readJson(text)
  if (result.ok) throw new Error('it was read')
  return result.problems.map((p) => p.message)
}

describe('JSON text from outside', () => {
  it.each([
    ['{"a":1,\n "b":}', 'the text is not JSON: unexpected "}" at line 2, column 6'],
    ['{"a":1', 'the text is not JSON: it ends too early at line 1, column 7'],
    ['[1,2,]', 'the text is not JSON: unexpected "]" at line 1, column 6'],
    ["{'a':1}", 'the text is not JSON: unexpected "\'" at line 1, column 2'],
    ['{a:1}', 'the text is not JSON: unexpected "a" at line 1, column 2'],
    ['{"a":1} x', 'the text is not JSON: unexpected "x" at line 1, column 9'],
    ['{"a":NaN}', 'the text is not JSON: unexpected "N" at line 1, column 6'],
    ['{"a":01}', 'the text is not JSON: unexpected "0" at line 1, column 6'],
    ['// no\n{}', 'the text is not JSON: unexpected "/" at line 1, column 1'],
    ['{\n"a":"b\tc"}', 'the text is not JSON: a line end or control character inside a text at line 2, column 5'],
    ['', 'the text is empty'],
    [' \n', 'the text is empty'],
  ])('%j: %s', (text, message) => {
    expect(messages(text)).toEqual([message])
  })

  it('a key written twice is refused at every depth, with both lines', () => {
    const text = '{"name":"a",\n"name":"b",\n"panel":[{"knob":1,\n\n"knob":2}], "\\u006eame": 3}'
    expect(messages(text)).toEqual([
      'name is written twice, first in line 1, again in line 2',
      'panel[0].knob is written twice, first in line 3, again in line 5',
      'name is written twice, first in line 2, again in line 5',
    ])
  })

  it('a text of 256 KiB is read, one of a byte more is not; bytes count, not characters', () => {
    const ofBytes = (count: number, letter: string, bytes: number) => `"${letter.repeat((count - 2) / bytes)}"`
    expect(readJson(ofBytes(MAX_TEXT_BYTES, 'x', 1)).ok).toBe(true)
    expect(messages(ofBytes(MAX_TEXT_BYTES + 1, 'x', 1))[0]).toContain(`has ${MAX_TEXT_BYTES + 1} bytes`)
    expect(readJson(ofBytes(MAX_TEXT_BYTES, 'é', 2)).ok).toBe(true)
    expect(readJson(ofBytes(MAX_TEXT_BYTES + 2, 'é', 2)).ok).toBe(false)
  })

  it('brackets nested past any set are refused before anything recurses into them', () => {
    expect(messages('['.repeat(200000))[0]).toContain('16 levels')
    expect(messages(`${'{"a":'.repeat(17)}1${'}'.repeat(17)}`)[0]).toContain('16 levels')
    expect(readJson(`"${'['.repeat(100)}"`).ok).toBe(true)
  })

  it('reads what the language itself reads, and refuses what it refuses', () => {
    const near = fc.oneof(
      fc.json({ maxDepth: 4 }),
      fc.json({ maxDepth: 3 }).chain((text) => fc.nat(text.length).map((at) => text.slice(0, at) + text.slice(at + 1))),
      fc.string(),
    )
    fc.assert(
      fc.property(near, (text) => {
        const result = readJson(text)
        let expected: unknown
        try {
          expected = JSON.parse(text)
        } catch {
          expect(result.ok).toBe(false)
          return
        }
        if (result.ok) expect(result.value).toEqual(expected)
        else expect(result.problems[0]?.message).toMatch(/is written twice/)
      }),
      { numRuns: 2000 },
    )
  })
})
