// What may happen to drawn points: one moves between its neighbours, one comes, one goes. Nothing is snapped: numbers are only
// rounded far below a pixel, so that files stay legible.
import type { PointRule } from '../../../src/set/drawnPoints.ts'
import { MAX_POINTS } from '../../../src/set/parameters.ts'
import type { Point } from '../../../src/set/types.ts'

export type Changed =
  | { readonly ok: true; readonly points: readonly Point[]; readonly index: number }
  | { readonly ok: false; readonly why: string }

/** The step numbers are rounded to: a ten-thousandth of the decade of what is shown. */
export function quantumOf([low, high]: readonly [number, number]): number {
  return 10 ** (Math.floor(Math.log10(high - low)) - 4)
}

/** Least and largest x that the point may take between its neighbours, at least `quantum` from each. */
export function xLimits(points: readonly Point[], index: number, rule: PointRule, quantum: number): readonly [number, number] {
  const before = points[index - 1]
  const after = points[index + 1]
  const highest = rule.openEnd ? rule.xMax - quantum : rule.xMax
  return [before ? before[0] + quantum : rule.xMin, after ? after[0] - quantum : highest]
}

/** The points with one of them moved as near to `to` as the rule and its neighbours let it. */
export function moved(points: readonly Point[], index: number, to: Point, rule: PointRule, quanta: Point): readonly Point[] {
  const from = points[index]
  if (!from || isFixed(index, rule)) return points
  const [low, high] = xLimits(points, index, rule, quanta[0])
  // Neighbours typed closer than a quantum leave no room.
  const x = low > high ? from[0] : clamp(rounded(to[0], quanta[0]), low, high)
  const y = clamp(rounded(to[1], quanta[1]), rule.yMin, rule.yMax)
  if (x === from[0] && y === from[1]) return points
  return points.map((point, i) => (i === index ? [x, y] : point))
}

export const isFixed = (index: number, rule: PointRule): boolean => index === 0 && rule.startsAtOrigin

/** The points with one more. */
export function added(points: readonly Point[], at: Point, rule: PointRule, quanta: Point): Changed {
  if (points.length >= MAX_POINTS) return { ok: false, why: `a drawn curve takes ${MAX_POINTS} points at most` }
  const x = rounded(at[0], quanta[0])
  const y = clamp(rounded(at[1], quanta[1]), rule.yMin, rule.yMax)
  const index = points.filter(([other]) => other < x).length
  const spread = [...points.slice(0, index), [x, y] as const, ...points.slice(index)]
  const [low, high] = xLimits(spread, index, rule, quanta[0])
  // Half a quantum for what rounding does to the sums.
  if (x < low - quanta[0] / 2 || x > high + quanta[0] / 2) return { ok: false, why: `no room for a point at ${rule.xName} ${x}` }
  return { ok: true, points: spread, index }
}

export function removed(points: readonly Point[], index: number, rule: PointRule): Changed {
  if (isFixed(index, rule)) return { ok: false, why: 'the first point stays at 0, 0' }
  if (points.length <= 2) return { ok: false, why: 'a drawn curve needs 2 points' }
  return { ok: true, points: points.filter((_, i) => i !== index), index: Math.min(index, points.length - 2) }
}

/** Half-way on the curve from a point to the next; after the last of an open curve, half-way from the one before. */
export function halfWay(points: readonly Point[], index: number, rule: PointRule, closed: boolean): Point | null {
  const here = points[index]
  if (!here) return null
  const next = points[index + 1]
  if (next) return [(here[0] + next[0]) / 2, (here[1] + next[1]) / 2]
  const [first] = points
  const before = points[index - 1]
  if (closed && first) {
    const span = rule.xMax - rule.xMin
    const x = (here[0] + first[0] + span) / 2
    return [x >= rule.xMax ? x - span : x, (here[1] + first[1]) / 2]
  }
  return before ? [(before[0] + here[0]) / 2, (before[1] + here[1]) / 2] : null
}

/** y of the straight lines at x: around the end of a closed curve, level past the ends of an open one. */
export function straightAt(points: readonly Point[], x: number, rule: PointRule, closed: boolean): number {
  const next = points.findIndex(([px]) => px > x)
  const span = rule.xMax - rule.xMin
  const first = points[0] as Point
  const last = points.at(-1) as Point
  const before = next === 0 ? (closed ? ([last[0] - span, last[1]] as const) : first) : next < 0 ? last : (points[next - 1] as Point)
  const after = next < 0 ? (closed ? ([first[0] + span, first[1]] as const) : last) : (points[next] as Point)
  return after[0] === before[0] ? before[1] : before[1] + ((after[1] - before[1]) * (x - before[0])) / (after[0] - before[0])
}

/** The corners of the straight lines from one end of the shown range to the other. */
export function corners(points: readonly Point[], [low, high]: readonly [number, number], rule: PointRule, closed: boolean): Point[] {
  const at = (x: number): Point => [x, straightAt(points, x, rule, closed)]
  return [at(low), ...points.filter(([x]) => x > low && x < high), at(high)]
}

/** To a multiple of `quantum`, without the noise of the product. */
function rounded(value: number, quantum: number): number {
  const decimals = Math.max(0, Math.min(12, -Math.round(Math.log10(quantum))))
  return Number((Math.round(value / quantum) * quantum).toFixed(decimals)) + 0
}

const clamp = (value: number, low: number, high: number) => Math.max(low, Math.min(high, value))
