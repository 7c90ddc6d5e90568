// Smallest and largest level at each frequency over every position the sweep reaches.
import type { ParameterSet } from '../set/types.ts'
import { createPathSearch, type PathSearch, powerEnds } from './pathSearch.ts'
import { type PathTable, pathPositions, pathTable } from './pathTable.ts'
import { tune } from './pathValues.ts'
import { decibels } from './response.ts'
import { sweepPath } from './sweepPath.ts'

export interface ChannelEnvelope {
  readonly minDb: Float64Array
  readonly maxDb: Float64Array
}

/** Positions for every 2π that the fastest read turns against the dry sound. */
const POINTS_PER_TURN = 8
/** Positions a frequency never exceeds: further ones only repeat phases that others had. */
const MOST_POSITIONS = 2048
/** Frequencies share a table of positions up to this ratio. */
const CLASS_RATIO = 1.5

/**
 * Envelope of |H| over every position the sweep reaches, dB within ±400, one a channel. frequenciesHz: each in
 * [0, sampleRate/2] (throws RangeError). Every level given is reached. What is given falls short of the true largest by less than
 * 0.5 dB for loops up to |g| = 0.9, and of the true smallest by less than 1 dB down to 20 dB below the largest, while a cycle turns a
 * frequency's phase less than about 250 times; beyond that positions thin out and 2 dB may be lost (tests/analysis/envelope.test.ts
 * measures all three). A deeper null of several voices is met at one instant of the cycle only. `drift` moves as the sine; at rate 0 the
 * envelope is the response itself.
 */
export function sweepEnvelope(
  set: ParameterSet,
  frequenciesHz: ArrayLike<number>,
  options: { readonly sampleRate?: number } = {},
): ChannelEnvelope[] {
  const sampleRate = options.sampleRate ?? set.sampleRate
  const path = sweepPath(set, sampleRate)
  const search = createPathSearch(path, MOST_POSITIONS)
  const tables = new Map<number, PathTable>()
  const channels = Array.from({ length: path.outputs }, () => ({
    minDb: new Float64Array(frequenciesHz.length),
    maxDb: new Float64Array(frequenciesHz.length),
  }))
  for (let i = 0; i < frequenciesHz.length; i++) {
    const hz = frequenciesHz[i] as number
    if (!(hz >= 0 && hz <= sampleRate / 2)) throw new RangeError(`frequenciesHz[${i}] must be in [0, ${sampleRate / 2}] Hz, got ${hz}`)
    const omega = (2 * Math.PI * hz) / sampleRate
    tune(search.tuning, omega)
    const table = tableFor(search, tables, omega)
    for (let channel = 0; channel < path.walked; channel++) {
      const ends = powerEnds(search, table, channel)
      ;(channels[channel]?.minDb as Float64Array)[i] = decibels(ends.min)
      ;(channels[channel]?.maxDb as Float64Array)[i] = decibels(ends.max)
    }
  }
  const [first] = channels
  if (path.walked < path.outputs && first) channels[1] = { minDb: first.minDb.slice(), maxDb: first.maxDb.slice() }
  return channels
}

function tableFor(search: PathSearch, tables: Map<number, PathTable>, omega: number): PathTable {
  const level = Math.max(-24, Math.ceil(Math.log(Math.max(omega, 1e-9)) / Math.log(CLASS_RATIO)))
  const known = tables.get(level)
  if (known) return known
  const perSample = (POINTS_PER_TURN * CLASS_RATIO ** level) / (2 * Math.PI)
  const table = pathTable(search.path, pathPositions(search.path, search.stretches, perSample, MOST_POSITIONS))
  tables.set(level, table)
  return table
}
