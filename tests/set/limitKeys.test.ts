import { describe, expect, it } from 'vitest'
import { CHECK_IDS, LIMITABLE_IDS } from '../../src/set/checkIds.ts'
import { defaultSet } from '../../src/set/defaults.ts'
import { parseSet } from '../../src/set/parse.ts'
import { setProblems } from '../../src/set/validity.ts'

const head = { format: 'combwright-set', version: 1 }

describe('a set’s own limits', () => {
  it.each(LIMITABLE_IDS)('%s takes one', (id) => {
    expect(parseSet({ ...head, limits: { [id]: 1.5 } })).toMatchObject({ ok: true, value: { limits: { [id]: 1.5 } } })
    expect(setProblems({ ...defaultSet(), limits: { [id]: 1.5 } })).toEqual([])
  })

  it.each(CHECK_IDS.filter((id) => !(LIMITABLE_IDS as readonly string[]).includes(id)))(
    '%s, which holds no figure against a number, is refused in file and document, with the reason',
    (id) => {
      const read = parseSet({ ...head, limits: { [id]: 1 } })
      const problems = read.ok ? [] : read.problems
      expect(problems.map(({ path }) => path)).toEqual([`limits.${id}`])
      expect(problems[0]?.message).toBe(`limits.${id}: ${id} is not judged by a number, so it has no limit to set`)
      expect(problems[0]?.range).toBe(LIMITABLE_IDS.join(', '))
      expect(setProblems({ ...defaultSet(), limits: { [id]: 1 } })).toEqual(problems)
    },
  )
})
