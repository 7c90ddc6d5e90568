// Drawn points as text: one pair a line, "0.25, 1".
import { type PointRule, pointProblems } from '../../src/set/drawnPoints.ts'
import type { Point } from '../../src/set/types.ts'
import { decimalOf } from './decimal.ts'

export const pointsToText = (points: readonly Point[]): string => points.map(([x, y]) => `${x}, ${y}`.replaceAll('-', '−')).join('\n')

export type PointsRead = { readonly ok: true; readonly points: readonly Point[] } | { readonly ok: false; readonly why: string }

/** Reads pairs back: a comma, semicolon or space between the two numbers, empty lines skipped. Says the line that cannot be read. */
export function readPoints(text: string, rule: PointRule): PointsRead {
  const points: Point[] = []
  for (const [i, line] of text.split('\n').entries()) {
    if (line.trim() === '') continue
    const pair = line.trim().split(/\s*[,;\t]\s*|\s+/)
    const [x, y] = pair.map(decimalOf)
    if (pair.length !== 2 || x === null || y === null || x === undefined || y === undefined)
      return { ok: false, why: `line ${i + 1} must be two numbers, ${rule.xName} and ${rule.yName}, got “${line.trim()}”` }
    points.push([x, y])
  }
  const [problem] = pointProblems(points, rule, 'points', true)
  return problem ? { ok: false, why: problem.message } : { ok: true, points }
}
