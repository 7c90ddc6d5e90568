import { describe, expect, it } from 'vitest'
import { LIMITS } from '../../src/checks/limits.ts'
import { CHECK_IDS } from '../../src/set/checkIds.ts'
import { defaultSet, defaultShaper } from '../../src/set/defaults.ts'
import { isMovable } from '../../src/set/panelProblems.ts'
import { PARAMETERS, parameter } from '../../src/set/parameters.ts'
import { getAt } from '../../src/set/path.ts'
import { accepts, nearestHint, rangeText, valueProblem } from '../../src/set/valueProblem.ts'

describe('the parameter table', () => {
  it('paths and C names are unique', () => {
    const unique = (values: readonly string[]) => expect(new Set(values).size).toBe(values.length)
    unique(PARAMETERS.map((p) => p.path))
    unique(PARAMETERS.map((p) => p.cName))
  })

  it.each(PARAMETERS.map((p) => [p.path, p] as const))(
    '%s: its default is accepted, its help is a sentence, its C name a C name',
    (_, p) => {
      expect(accepts(p, p.default)).toBe(true)
      expect(p.help).toMatch(/^[A-Z].+\.$/)
      expect(p.cName).toMatch(/^[a-z][a-z0-9_]*$/)
      expect(p.label).not.toBe('')
      if ('trackMin' in p && p.trackMin !== undefined) expect(accepts(p, p.trackMin)).toBe(true)
      if ('trackMax' in p && p.trackMax !== undefined) expect(accepts(p, p.trackMax)).toBe(true)
      // A log track needs a start above 0.
      if ('taper' in p && p.taper === 'log') expect(p.trackMin ?? p.min).toBeGreaterThan(0)
    },
  )

  it('every field of a set stands in the table, and every row in the set', () => {
    const set = { ...defaultSet(), input: { gainDb: 0, shaper: defaultShaper('tanh') } }
    for (const p of PARAMETERS.filter(({ path }) => !/^(loop|mix)\.shaper/.test(path)))
      expect(getAt(set, p.path), p.path).not.toBeUndefined()
    const leaves = (value: unknown, path: string): string[] =>
      value !== null && typeof value === 'object' && !Array.isArray(value)
        ? Object.entries(value).flatMap(([key, inner]) => leaves(inner, path === '' ? key : `${path}.${key}`))
        : [path]
    const apart = /^(format|version|panel|limits)$|\.points$|^(loop|mix)\.shaper$/
    for (const path of leaves(set, '').filter((leaf) => !apart.test(leaf))) expect(() => parameter(path)).not.toThrow()
  })

  it('knows the ids of the checks', () => {
    expect(CHECK_IDS).toEqual(LIMITS.map((row) => row.id))
  })

  it('moves what is heard and not what is built', () => {
    const movable = PARAMETERS.filter(isMovable).map((p) => p.path)
    expect(movable).toContain('sweep.rateHz')
    expect(movable).toContain('sweep.shape')
    expect(movable).toContain('mix.invertRight')
    expect(movable).not.toContain('sampleRate')
    expect(movable).not.toContain('name')
    expect(movable.some((path) => path.startsWith('target.'))).toBe(false)
  })

  it('throws for a path that is not in it', () => {
    expect(() => parameter('sweep.rate')).toThrow(RangeError)
  })
})

describe('judging one value', () => {
  it.each([
    ['sweep.rateHz', -1, 'sweep.rateHz must be 0 to 100 Hz, got -1'],
    ['sweep.rateHz', '1', 'sweep.rateHz must be 0 to 100 Hz, got "1"'],
    ['sweep.rateHz', Number.NaN, 'sweep.rateHz must be 0 to 100 Hz, got NaN'],
    ['sweep.rateHz', null, 'sweep.rateHz must be 0 to 100 Hz, got null'],
    ['loop.dampingHz', 0, 'loop.dampingHz must be 1 to 96000 Hz, or null, got 0'],
    ['voices.count', 2.5, 'voices.count must be a whole number from 1 to 8, got 2.5'],
    ['sweep.updateEvery', 3, 'sweep.updateEvery must be 1, 2, 4, 8, 16, 32, 64 samples, got 3'],
    ['layout', 'Stereo', 'layout must be one of mono, stereo, monoToStereo, got "Stereo"'],
    ['mix.invertRight', 1, 'mix.invertRight must be true or false, got 1'],
    ['name', 7, 'name must be text of at most 120 characters, got 7'],
    ['name', undefined, 'name is missing, and must be text of at most 120 characters'],
  ])('%s %s: %s', (path, value, message) => {
    expect(valueProblem(parameter(path), value)).toMatchObject({ path, message, range: rangeText(parameter(path)) })
  })

  it.each([
    ['sweep.rateHz', 0],
    ['sweep.rateHz', 100],
    ['loop.dampingHz', null],
    ['sweep.seed', 4294967295],
    ['layout', 'monoToStereo'],
  ])('%s %s is accepted', (path, value) => {
    expect(valueProblem(parameter(path), value)).toBeNull()
  })

  it('hints at quotes around what is no text', () => {
    expect(valueProblem(parameter('sweep.rateHz'), '2 Hz')?.hint).toBe('write it without quotes and without its unit')
    expect(valueProblem(parameter('mix.invertRight'), 'true')?.hint).toBe('write it without quotes')
  })

  it('hints at the nearest word, and at none when none is near', () => {
    expect(nearestHint('depthMS', ['depthMs', 'depthOctaves'])).toBe('did you mean "depthMs"?')
    expect(nearestHint('rate', ['rateHz', 'range'])).toBe('did you mean "rateHz"?')
    expect(nearestHint('flnger', ['chorus', 'flanger'])).toBe('did you mean "flanger"?')
    expect(nearestHint('q', ['rateHz'])).toBeUndefined()
  })
})
