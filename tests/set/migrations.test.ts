import { describe, expect, it } from 'vitest'
import { CURRENT_VERSION, checkedMigrations, type Migration, migrate } from '../../src/set/migrations.ts'

// A made-up history: version 2 renamed `depth`, version 3 took seconds to milliseconds.
const HISTORY: readonly Migration[] = [
  { to: 2, up: ({ depth, ...rest }) => ({ ...rest, depthS: depth }) },
  { to: 3, up: ({ depthS, ...rest }) => ({ ...rest, depthMs: (depthS as number) * 1000 }) },
]

describe('migrations', () => {
  it('take a document of any older version to the newest, step by step', () => {
    expect(migrate({ version: 1, depth: 0.002 }, HISTORY)).toEqual({ ok: true, value: { version: 3, depthMs: 2 } })
    expect(migrate({ version: 2, depthS: 0.002 }, HISTORY)).toEqual({ ok: true, value: { version: 3, depthMs: 2 } })
    expect(migrate({ version: 3, depthMs: 2 }, HISTORY)).toEqual({ ok: true, value: { version: 3, depthMs: 2 } })
  })

  it('leave the document they are given as it was', () => {
    const old = Object.freeze({ version: 1, depth: 0.002 })
    migrate(old, HISTORY)
    expect(old).toEqual({ version: 1, depth: 0.002 })
  })

  it.each([4, 1e9])('refuse version %d, naming it and the versions known', (version) => {
    expect(migrate({ version }, HISTORY)).toMatchObject({
      ok: false,
      problems: [{ path: 'version', message: `version ${version} is newer than this reader, which knows 1 to 3`, value: version }],
    })
  })

  it.each([0, -1, 1.5, '1', null, undefined, true])('refuse %s, which is no version', (version) => {
    const result = migrate({ version }, HISTORY)
    expect(result).toMatchObject({ ok: false, problems: [{ path: 'version', range: 'a whole number from 1 to 3' }] })
  })

  it.each<[string, readonly Migration[]]>([
    ['a gap', [HISTORY[0] as Migration, { to: 4, up: (older) => older }]],
    ['a wrong start', [{ to: 1, up: (older) => older }]],
    ['a wrong order', [...HISTORY].reverse()],
  ])('a list with %s is refused at load', (_, list) => {
    expect(() => checkedMigrations(list)).toThrow(RangeError)
  })

  it('the newest version is the one sets are written in', () => {
    expect(CURRENT_VERSION).toBe(1)
  })
})
