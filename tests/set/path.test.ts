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

describe('fields of the panel by path', () => {
  const move = { parameter: 'mix.wet', min: 0, max: 1, taper: 'linear', points: [] } as const
  const set = {
    ...defaultSet(),
    panel: [{ knob: 'K', position: 0.5, steps: 0, smoothMs: 30, moves: [move, { ...move, parameter: 'mix.dry' }] }],
  }

  it('are read and replaced', () => {
    expect(getAt(set, 'panel[0].moves[1].max')).toBe(1)
    const changed = withAt(set, 'panel[0].moves[1].max', 0.5)
    expect(changed.panel[0]?.moves.map(({ max }) => max)).toEqual([1, 0.5])
    expect(changed.panel[0]?.moves[0]).toBe(move)
    expect(getAt(withAt(set, 'panel[0].position', 0.1), 'panel[0].position')).toBe(0.1)
  })

  it('that are not there read as undefined and cannot be replaced', () => {
    expect(getAt(set, 'panel[1].position')).toBeUndefined()
    expect(() => withAt(set, 'panel[1].position', 0)).toThrow(RangeError)
  })
})
