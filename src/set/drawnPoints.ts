// Points of drawn curves: how many, in what order, in what range. Zero points are accepted where nothing is drawn, so that a curve survives being switched away from.
import { MAX_POINTS } from './parameters.ts'
import { getAt } from './path.ts'
import type { Problem } from './result.ts'
import type { ParameterSet, Point } from './types.ts'
import { valueText } from './valueProblem.ts'

export interface PointRule {
  readonly xName: string
  readonly yName: string
  readonly xMin: number
  readonly xMax: number
  /** The largest x itself is left out: phases, where 1 is 0 again. */
  readonly openEnd: boolean
  readonly yMin: number
  readonly yMax: number
  readonly startsAtOrigin: boolean
}

export const SWEEP_POINTS: PointRule = {
  xName: 'phase',
  yName: 's',
  xMin: 0,
  xMax: 1,
  openEnd: true,
  yMin: -1,
  yMax: 1,
  startsAtOrigin: false,
}
export const SHAPER_POINTS: PointRule = {
  xName: 't',
  yName: 'k',
  xMin: 0,
  xMax: 1000,
  openEnd: false,
  yMin: -100,
  yMax: 100,
  startsAtOrigin: true,
}
export const TAPER_POINTS: PointRule = {
  xName: 'position',
  yName: 'part',
  xMin: 0,
  xMax: 1,
  openEnd: false,
  yMin: 0,
  yMax: 1,
  startsAtOrigin: false,
}

/** "phase from 0 to below 1, s from -1 to 1": what one pair accepts. */
export function pointRangeText({ xName, yName, xMin, xMax, openEnd, yMin, yMax }: PointRule): string {
  return `[${xName}, ${yName}] with ${xName} from ${xMin} to ${openEnd ? 'below ' : ''}${xMax} and ${yName} from ${yMin} to ${yMax}`
}

/** Problems of a list of pairs of finite numbers. `needed`: the curve is drawn, so that no points is a problem too. */
export function pointProblems(points: readonly Point[], rule: PointRule, path: string, needed: boolean): Problem[] {
  const count = points.length
  if (count === 0 && !needed) return []
  if (count < 2 || count > MAX_POINTS) {
    const range = `2 to ${MAX_POINTS} points`
    return [
      {
        path,
        message: `${path} must have ${range} when the curve is drawn, got ${count}`,
        value: count,
        range,
        hint: `each is ${pointRangeText(rule)}`,
      },
    ]
  }
  const problems: Problem[] = []
  const add = (i: number, what: string, range: string) =>
    problems.push({ path: `${path}[${i}]`, message: `${path}[${i}] ${what}, got ${valueText(points[i])}`, value: points[i], range })
  points.forEach(([x, y], i) => {
    if (!(x >= rule.xMin && (rule.openEnd ? x < rule.xMax : x <= rule.xMax) && y >= rule.yMin && y <= rule.yMax))
      add(i, `must be ${pointRangeText(rule)}`, pointRangeText(rule))
    else if (i === 0 && rule.startsAtOrigin && (x !== 0 || y !== 0)) add(i, 'must be [0, 0]', '[0, 0]')
    else if (i > 0 && x <= (points[i - 1] as Point)[0])
      add(i, `must have a larger ${rule.xName} than the point before it`, `${rule.xName} above ${(points[i - 1] as Point)[0]}`)
  })
  return problems
}

/** Problems of the drawn sweep and the drawn shapers of a set. */
export function drawnProblems(set: ParameterSet): Problem[] {
  const shapers = ['input.shaper', 'loop.shaper', 'mix.shaper'].flatMap((path) => {
    const shaper = getAt(set, path) as ParameterSet['loop']['shaper']
    return shaper ? pointProblems(shaper.points, SHAPER_POINTS, `${path}.points`, shaper.curve === 'drawn') : []
  })
  return [...pointProblems(set.sweep.points, SWEEP_POINTS, 'sweep.points', set.sweep.shape === 'drawn'), ...shapers]
}
