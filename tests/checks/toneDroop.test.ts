// tone.droop. Oracle: FACTS 3 (computed there): linear at half a sample −2.01 dB at 10 kHz of 48 kHz, Lagrange −0.534 dB.
import { describe, expect, it } from 'vitest'
import { toneDroop } from '../../src/checks/toneDroop.ts'
import { withAt } from '../../src/set/path.ts'
import { expectWhole, run, swept } from './sweepSets.ts'

describe('tone.droop', () => {
  const linear = swept(10, 1, 0.5, (set) => {
    set.line.interpolation = 'linear'
  })

  it('the worst loss of voices and loop, a note, never worse', () => {
    const found = run(toneDroop, linear)
    expect(found).toMatchObject({ status: 'note', limit: null, unit: 'dB' })
    expect(found.value).toBeCloseTo(2.0107, 3)
    const looped = { ...linear, loop: { ...linear.loop, feedback: 0.5, interpolation: 'linear' as const } }
    const both = run(toneDroop, withAt(looped, 'line.interpolation', 'lagrange3'))
    expect(both.value).toBeCloseTo(2.0107, 3)
    expect(both.text).toMatch(/loop’s linear read loses up to 2.01 dB.*each pass/)
    expect(both.working).toHaveLength(2)
  })

  it('holds where nothing is lost', () => {
    expect(run(toneDroop, withAt(linear, 'line.interpolation', 'allpass1'))).toMatchObject({ status: 'holds', value: 0 })
    expect(run(toneDroop, withAt(linear, 'line.interpolation', 'nearest'))).toMatchObject({ status: 'holds', value: 0 })
  })

  it('offers four points to a linear read, and nothing to four points', () => {
    const [mend, ...more] = run(toneDroop, linear).mend ?? []
    expect(more).toEqual([])
    expect(mend).toMatchObject({ path: 'line.interpolation', value: 'lagrange3' })
    expect(run(toneDroop, withAt(linear, 'line.interpolation', 'lagrange3')).value).toBeCloseTo(0.534, 3)
    expect(run(toneDroop, withAt(linear, 'line.interpolation', 'lagrange3')).mend).toBeUndefined()
  })

  it('label of the table, a sentence, complete working, JSON without loss', () => {
    expectWhole(toneDroop)
  })
})
