import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { defaultSet } from '../../src/set/defaults.ts'
import { FLAT_LENGTH, FLAT_PARAMETERS, flatIndex, flatPointsOffset, flatten } from '../../src/set/flat.ts'
import { PARAMETERS } from '../../src/set/parameters.ts'
import { anySet } from './anySet.ts'
import { unflatten } from './unflatten.ts'

describe('a set as one array', () => {
  it('comes back as it went, whatever the set: values, choices, what is off, shapers, drawn points', () => {
    fc.assert(
      fc.property(anySet, (set) => {
        expect(unflatten(flatten(set), set)).toEqual(set)
        // Nothing that is heard may come from the rest: a foreign one must do as well.
        const back = unflatten(flatten(set), { ...defaultSet(), name: set.name, notes: set.notes })
        const heard = ({ intent: _, panel: __, limits: ___, target: ____, ...audible }: typeof set) => audible
        expect(heard(back)).toEqual(heard(set))
      }),
      { numRuns: 200 },
    )
  })

  it('sends every audible parameter and nothing else', () => {
    const sent = FLAT_PARAMETERS.map((p) => p.path)
    expect(sent).toContain('sampleRate')
    expect(sent).toContain('mix.shaper.drive')
    expect(PARAMETERS.map((p) => p.path).filter((path) => !sent.includes(path))).toEqual([
      'name',
      'notes',
      'intent',
      ...PARAMETERS.filter((p) => p.path.startsWith('target.')).map((p) => p.path),
    ])
  })

  it('has a fixed length, which the receiver holds it to', () => {
    expect(flatten(defaultSet())).toHaveLength(FLAT_LENGTH)
    expect(() => flatten(defaultSet(), new Float64Array(3))).toThrow(RangeError)
    expect(() => flatIndex('name')).toThrow(RangeError)
  })

  it('clears points that were there before', () => {
    const drawn = {
      ...defaultSet(),
      sweep: {
        ...defaultSet().sweep,
        points: [
          [0.1, 1],
          [0.6, -1],
        ] as const,
      },
    }
    const flat = flatten(drawn)
    const at = flatPointsOffset('sweep')
    expect(Array.from(flat.slice(at, at + 5))).toEqual([2, 0.1, 1, 0.6, -1])
    expect(Array.from(flatten(defaultSet(), flat).slice(at, at + 5))).toEqual([0, 0, 0, 0, 0])
  })
})
