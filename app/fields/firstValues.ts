// Where a field that is off starts when it is switched on: where it last stood, else a useful middle.
import { parameter } from '../../src/set/parameters.ts'
import { getAt } from '../../src/set/path.ts'
import { subscribeSet } from '../state/current.ts'
import { trackHigh, trackLow } from './taper.ts'

const last = new Map<string, number>()
const nullable = ['loop.dampingHz', 'loop.lowCutHz', 'mix.wetLowCutHz', 'mix.wetHighCutHz']

subscribeSet((set) => {
  for (const path of nullable) {
    const value = getAt(set, path)
    if (typeof value === 'number') last.set(path, value)
  }
})

/** A value of the field at `path` to start from. Throws RangeError for a path that is no number. */
export function firstValue(path: string): number {
  const kept = last.get(path)
  if (kept !== undefined) return kept
  const row = parameter(path)
  if (row.kind !== 'number' && row.kind !== 'integer') throw new RangeError(`${path} is no number`)
  if (row.default !== null) return row.default
  return Number(Math.sqrt(trackLow(row) * trackHigh(row)).toPrecision(2))
}
