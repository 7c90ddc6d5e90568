// How many poles of two crossed lines lie outside a radius: poles of det outside plus the clockwise turns of det around 0, followed
// along the circle in steps that never turn far. It costs the delay's length, so it serves short lines and single questions.
import { wrapAngle } from './loopLine.ts'
import { type LoopPair, pairDeterminant, pairOpenPoles } from './loopPair.ts'
import { loopAngles } from './polesWinding.ts'

const det = new Float64Array(4)

/** Number of poles with |z| > e^x, conjugates counted. x must miss every pole by more than rounding. */
export function pairPolesOutside(pair: LoopPair, x: number): number {
  const radius = Math.exp(x)
  const open = pairOpenPoles(pair).filter((pole) => Math.abs(pole) > radius).length
  return open - Math.round((2 * turned(pair, x)) / (2 * Math.PI))
}

/** Change of arg det from θ = 0 to π: half of the whole circle's. */
function turned(pair: LoopPair, x: number): number {
  const step = Math.PI / (6 * (pair.lines[0].delay + pair.lines[1].delay))
  let sum = 0
  let from = 0
  let before = argument(pair, x, 0)
  for (const angle of loopAngles(pair.lines[0].delay)) {
    const pieces = Math.max(1, Math.ceil((angle - from) / step))
    const start = from
    for (let i = 1; i <= pieces; i++) {
      const to = i === pieces ? angle : start + ((angle - start) * i) / pieces
      const after = argument(pair, x, to)
      sum += between(pair, x, { from, before, to, after, depth: 0 })
      from = to
      before = after
    }
  }
  return sum
}

interface Step {
  readonly from: number
  readonly before: number
  readonly to: number
  readonly after: number
  readonly depth: number
}

/** Change of argument over a step, halved until no half turns by more than a sixth of a circle. */
function between(pair: LoopPair, x: number, { from, before, to, after, depth }: Step): number {
  const turn = wrapAngle(after - before)
  if ((Math.abs(turn) < 1 && depth > 0) || depth > 40 || to - from < 1e-15) return turn
  const middle = (from + to) / 2
  const half = argument(pair, x, middle)
  const first = wrapAngle(half - before)
  const second = wrapAngle(after - half)
  if (Math.abs(first) + Math.abs(second) < 1) return first + second
  return (
    between(pair, x, { from, before, to: middle, after: half, depth: depth + 1 }) +
    between(pair, x, { from: middle, before: half, to, after, depth: depth + 1 })
  )
}

function argument(pair: LoopPair, x: number, theta: number): number {
  pairDeterminant(pair, x, theta, det)
  return Math.atan2(det[1] as number, det[0] as number)
}
