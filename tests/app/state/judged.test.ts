import { describe, expect, it } from 'vitest'
import { countStatus, listOrder } from '../../../app/state/judged.ts'
import { runChecks } from '../../../src/checks/registry.ts'
import type { Check, Status } from '../../../src/checks/types.ts'
import { defaultSet } from '../../../src/set/defaults.ts'

const all = runChecks(defaultSet())
/** Real checks with their statuses replaced, in the table's order. */
const withStatus = (...statuses: Status[]): Check[] => statuses.map((status, i) => ({ ...(all[i] as Check), status }))
const ids = all.map(({ id }) => id)

describe('the order of the checks', () => {
  it('is fails, near, note, holds, and the table’s order within each', () => {
    const checks = withStatus('holds', 'near', 'fails', 'holds', 'note', 'fails')
    expect(listOrder(checks)).toEqual([ids[2], ids[5], ids[1], ids[4], ids[0], ids[3]])
  })

  it('stays as it stands while a gesture runs: what is kept keeps its place, whatever becomes of its status', () => {
    const before = listOrder(withStatus('holds', 'near', 'holds'))
    expect(listOrder(withStatus('fails', 'holds', 'holds'), before)).toEqual(before)
  })

  it('puts checks that were not there last, and leaves out those that are gone', () => {
    const checks = withStatus('holds', 'fails')
    expect(listOrder(checks, [ids[0] as Check['id'], ids[7] as Check['id']])).toEqual([ids[0], ids[1]])
  })
})

describe('the counts of the checks', () => {
  it('are one a status', () => {
    expect(countStatus(withStatus('holds', 'near', 'fails', 'holds'))).toEqual({ fails: 1, near: 1, note: 0, holds: 2 })
  })
})
