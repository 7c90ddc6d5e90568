// sweep.fusion. Oracle: the table of DESIGN 5.
import { describe, expect, it } from 'vitest'
import { sweepFusion } from '../../src/checks/sweepFusion.ts'
import { changedSet } from '../dsp/sets.ts'
import { expectWhole, run, swept } from './sweepSets.ts'

describe('sweep.fusion', () => {
  it('the longest delay of any voice; past 50 ms a note, never worse', () => {
    expect(
      run(
        sweepFusion,
        changedSet(() => {}),
      ),
    ).toMatchObject({ status: 'holds', value: 16.5, limit: 50, unit: 'ms' })
    const late = run(sweepFusion, swept(300, 1, 1))
    expect(late).toMatchObject({ status: 'note', value: 301 })
    expect(late.text).toMatch(/sound of its own/)
    expect(run(sweepFusion, swept(49, 1, 1)).status).toBe('holds')
  })

  it('a set’s own limit counts', () => {
    const set = { ...swept(30, 1, 1), limits: { 'sweep.fusion': 20 } }
    expect(run(sweepFusion, set)).toMatchObject({ status: 'note', limit: 20 })
  })

  it('label of the table, a sentence, complete working, JSON without loss', () => {
    expectWhole(sweepFusion)
  })
})
