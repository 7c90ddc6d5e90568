// How far a shaper's table is from the shaper: the actual largest error, and what theory promises beforehand.
import { createShaper } from '../dsp/shaper.ts'
import { readShaperTable, type ShaperTable, shaperTable, tablePoint } from '../dsp/shaperTable.ts'
import type { Shaper } from '../set/types.ts'
import { bendPlaces, beyondEnds, shaperCorners, steepestBend, worstCorners } from './tableErrorBend.ts'

export interface TableError {
  readonly table: ShaperTable
  /** Largest |table(x) − shaper(x)| over ±tableRange, and where; 0 where the two agree to rounding. */
  readonly largest: number
  readonly at: number
  /** What it cannot exceed. */
  readonly bound: number
  /** Which bound speaks: h²/8 · max|f''|, or h/4 · |change of slope| where the curve is straight lines with corners and has no f''. */
  readonly boundBy: 'bend' | 'corners'
  /** max|f''| of shaper(x) over the range, or the largest sum of changes of slope within one interval. */
  readonly measure: number
  /** Largest |shaper(x) − held end| beyond the range; null where the curve has no end. */
  readonly beyond: number | null
}

const straight = ({ curve }: Shaper) => curve === 'hardClip' || curve === 'deadZone' || curve === 'drawn'

/**
 * The table of `p` against its exact curve. The largest error is found, not sampled: on an interval without a corner the error has one hump (the curve is
 * concave or convex on each side of 0), found by golden section in the intervals that err most at their middle; straight lines err most at a corner.
 * Bounds: h²/8 · max|f''| of linear interpolation (FACTS 7: Stampfli 2017); a corner at the part a of an interval errs by h a(1 − a)|Δslope| ≤ h/4 |Δslope|.
 */
export function tableError(p: Shaper): TableError {
  const table = shaperTable(p)
  const { curve } = createShaper(p)
  const error = (x: number) => Math.abs(readShaperTable(table, x) - curve(x))
  const corners = shaperCorners(p, table.range)
  const places = corners.map(({ x }) => x)
  if (!straight(p)) for (const [from, to] of worstIntervals(p, table, error)) places.push(humpOf(error, from, to))
  // An odd table's middle points are not the curve's own where its halves differ.
  const moved = p.tableSize % 2 === 1 ? Math.abs(curve(table.step / 2) + curve(-table.step / 2)) / 2 : 0
  if (moved > 0) places.push(-table.step / 2, table.step / 2)
  // Below this there is only rounding: such a table is exact.
  let largest = ROUNDING * table.values.reduce((most, value) => Math.max(most, Math.abs(value)), 0)
  const least = largest
  let at = 0
  for (const x of places) {
    if (error(x) <= largest) continue
    largest = error(x)
    at = x
  }
  if (largest === least) largest = 0
  const measure = straight(p) ? worstCorners(corners, table.step) : steepestBend(p, table.range)
  const bound = moved + (straight(p) ? (table.step * measure) / 4 : (table.step * table.step * measure) / 8)
  return { table, largest, at, bound, boundBy: straight(p) ? 'corners' : 'bend', measure, beyond: beyondEnds(p, table.range, curve) }
}

const ROUNDING = 1e-14
/** Up to this many intervals are all looked at. */
const ALL = 4096
/** Beside each special place when there are more: past them the error only falls. */
const BESIDE = 4
const REFINED = 8

type Interval = readonly [from: number, to: number]

/** The intervals that err most at their middle, split at 0. An error with one hump is at its middle at least half of its most. */
function worstIntervals(p: Shaper, table: ShaperTable, error: (x: number) => number): Interval[] {
  const middles = intervalsToSee(p, table).flatMap((i): { readonly span: Interval; readonly size: number }[] => {
    const from = tablePoint(table, i)
    const to = tablePoint(table, i + 1)
    const spans: Interval[] =
      from < 0 && to > 0
        ? [
            [from, 0],
            [0, to],
          ]
        : [[from, to]]
    return spans.map((span) => ({ span, size: error((span[0] + span[1]) / 2) }))
  })
  return middles
    .sort((a, b) => b.size - a.size)
    .slice(0, REFINED)
    .map(({ span }) => span)
}

function intervalsToSee(p: Shaper, table: ShaperTable): number[] {
  const count = table.values.length - 1
  if (count <= ALL) return Array.from({ length: count }, (_, i) => i)
  const seen = new Set<number>()
  for (const x of [0, -table.range, table.range, ...bendPlaces(p)]) {
    const i = Math.floor(((x / table.range + 1) * count) / 2)
    for (let k = i - BESIDE; k <= i + BESIDE; k++) if (k >= 0 && k < count) seen.add(k)
  }
  return [...seen]
}

const GOLDEN = (Math.sqrt(5) - 1) / 2

/** x of the largest error of one hump, to a millionth of the interval. */
function humpOf(error: (x: number) => number, from: number, to: number): number {
  let low = from
  let high = to
  for (let i = 0; i < 30; i++) {
    const a = high - GOLDEN * (high - low)
    const b = low + GOLDEN * (high - low)
    if (error(a) > error(b)) high = b
    else low = a
  }
  return (low + high) / 2
}
