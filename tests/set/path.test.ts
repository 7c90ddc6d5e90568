import { describe, expect, it } from 'vitest'
import { defaultSet, defaultShaper } from '../../src/set/defaults.ts'
import { getAt, withAt } from '../../src/set/path.ts'

describe('fields by path', () => {
  it('reads what stands there, and nothing below what is absent', () => {
    expect(getAt(defaultSet(), 'sweep.rateHz')).toBe(0.4)
    expect(getAt(defaultSet(), 'loop.shaper')).toBeNull()
    expect(getAt(defaultSet(), 'loop.shaper.drive')).toBeUndefined()
    expect(getAt(defaultSet(), 'name.length.x')).toBeUndefined()
  })

  it('replaces one field and shares everything that is not on its path', () => {
    const set = withAt(defaultSet(), 'loop.shaper', defaultShaper('tanh'))
    const changed = withAt(set, 'loop.shaper.drive', 3)
    expect([getAt(set, 'loop.shaper.drive'), getAt(changed, 'loop.shaper.drive')]).toEqual([1, 3])
    expect(changed.sweep).toBe(set.sweep)
    expect(changed.loop).not.toBe(set.loop)
  })

  it('throws where nothing holds the field', () => {
    expect(() => withAt(defaultSet(), 'loop.shaper.drive', 3)).toThrow('loop.shaper.drive')
  })
})
