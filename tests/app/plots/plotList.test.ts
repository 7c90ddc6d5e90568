import { describe, expect, it } from 'vitest'
import { PLOTS } from '../../../app/plots/plotList.ts'
import { accepted, KEEP_VIEW } from '../../../app/state/keep.ts'

const kept = (plots: unknown) => accepted({ plots }, KEEP_VIEW, 'tab')

describe('the plots', () => {
  it('stand in the order of the design', () => {
    expect(PLOTS.map(({ label }) => label)).toEqual(['Response', 'Sweep', 'Map', 'Loop', 'Scope', 'Curve'])
  })

  it('come back after a reload, each of them; what is none is left out', () => {
    for (const { id } of PLOTS) expect(kept([id, 'sweep'])).toEqual({ plots: [id, 'sweep'] })
    expect(kept(['response', 'harmonics'])).toEqual({})
    expect(kept(['response'])).toEqual({})
  })
})
