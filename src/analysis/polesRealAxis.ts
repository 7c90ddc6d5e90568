// Poles at 0 Hz and at fs/2: on either real axis 1 − L is real, so they are found by its sign, however close to a filter's own pole.
import { type LoopLine, logGain, logGainResult, openLoopPoles, wrapAngle } from './loopLine.ts'
import { bisect } from './loopSearch.ts'
import type { Pole } from './polesNewton.ts'

const scratch = logGainResult()

/** Distances, in x = ln radius, at which the axis is looked at on both sides of the unit circle and of every open-loop pole. */
const DISTANCES = Array.from({ length: 45 }, (_, i) => 10 ** (-10.9 + i / 4))

const COARSE = DISTANCES.filter((_, i) => i % 3 === 0)

/** Real poles, positive (θ = 0) and negative (θ = π), radius above about 0.05. `quick`: on a third of the places. */
export function realPoles(line: LoopLine, quick = false): Pole[] {
  return [...polesOnAxis(line, 0, quick), ...polesOnAxis(line, Math.PI, quick)]
}

/** x at which an axis is looked at: around 1 and around every positive one of `poles` (radii). */
export function axisGrid(poles: readonly number[], distances: readonly number[] = DISTANCES): Float64Array {
  const centres = [0, ...poles.filter((pole) => pole > 0).map(Math.log)]
  return Float64Array.from(new Set(centres.flatMap((c) => distances.flatMap((d) => [c - d, c + d]))))
    .filter((x) => x > -3)
    .sort()
}

function polesOnAxis(line: LoopLine, theta: number, quick: boolean): Pole[] {
  const sign = theta === 0 ? 1 : -1
  const open = openLoopPoles(line).map((pole) => pole * sign)
  const grid = axisGrid(open, quick ? COARSE : DISTANCES)
  // (1 − L) times L's denominator: no poles, so every change of sign is a root.
  const positive = (x: number) => {
    logGain(line, x, theta, scratch)
    const towardsOne = Math.abs(wrapAngle(scratch.phase - line.delay * theta)) < Math.PI / 2
    const radius = Math.exp(x)
    return (towardsOne && scratch.ln > 0) === open.filter((pole) => pole > radius).length % 2 > 0
  }
  const found: Pole[] = []
  let before = positive(grid[0] as number)
  for (let i = 1; i < grid.length; i++) {
    const to = grid[i] as number
    const after = positive(to)
    if (after !== before) found.push({ x: bisect(positive, grid[i - 1] as number, to), theta })
    before = after
  }
  return found
}
