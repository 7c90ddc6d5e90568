// A radius no pole of two crossed lines exceeds, and where on the circle the bound is highest.
import { logGain, logGainResult, wrapAngle } from './loopLine.ts'
import { type LoopPair, pairBoundOnCircle, pairDelay, pairModulusEquation, pairOpenPoles } from './loopPair.ts'
import { bisect, goldenMaximum, localMaxima } from './loopSearch.ts'
import { loopAngles } from './polesWinding.ts'

export interface BoundTop {
  readonly x: number
  readonly theta: number
}

export interface PairBound {
  /** Grid of angles, and x of the bound's curve there. */
  readonly theta: Float64Array
  readonly x: Float64Array
  /** Highest point known inside the cell that ends at each angle. */
  readonly cellTop: Float64Array
  /** Tops of the curve, highest first. */
  readonly tops: readonly BoundTop[]
  /** ln of a radius that no pole exceeds. */
  readonly bound: number
}

/** Branches either side of a top among which both lines' phases are compared. */
const REACH = 200

const scratch = logGainResult()

export function pairBound(pair: LoopPair): PairBound {
  const delay = pairDelay(pair)
  const start = Math.log(Math.abs(pair.lines[0].gain)) / delay
  const curve = (t: number) => pairModulusEquation(pair, t, start) ?? Number.NEGATIVE_INFINITY
  // Every second angle: the bound is one of smooth moduli, and its tops are followed up.
  const theta = loopAngles(delay, true)
  const x = theta.map(curve)
  const cellTop = Float64Array.from(x)
  const tops = localMaxima(x)
    .slice(0, 12)
    .map((i): BoundTop => {
      const to = Math.min(theta.length - 1, i + 1)
      const top = goldenMaximum(curve, theta[Math.max(0, i - 1)] as number, theta[to] as number, 0.2 / delay)
      if (top.value <= (x[i] as number)) return { x: x[i] as number, theta: theta[i] as number }
      const cell = top.at > (theta[i] as number) ? to : i
      cellTop[cell] = Math.max(cellTop[cell] as number, top.value)
      return { x: top.value, theta: top.at }
    })
    .sort((a, b) => b.x - a.x)
  const bound = circleBound(pair, tops[0]?.x ?? Number.NEGATIVE_INFINITY, Float64Array.from([...theta, ...tops.map((top) => top.theta)]))
  return { theta, x, cellTop, tops, bound }
}

/**
 * The curve's top, unless a filter's own pole is so near that the curve was followed inside it: then the radius outside every open-loop pole at which
 * the bound on the whole circle comes down to 1.
 */
function circleBound(pair: LoopPair, top: number, angles: Float64Array): number {
  const open = Math.log(Math.max(1e-300, ...pairOpenPoles(pair).map(Math.abs)))
  const exceeds = (x: number) => pairBoundOnCircle(pair, x, angles) > 0
  const least = 1e-12 / pairDelay(pair)
  if (top > open && !exceeds(top + least)) return top
  let high = Math.max(top, open) + 1 / pairDelay(pair)
  for (let i = 0; i < 60 && exceeds(high); i++) high = high * 2 - Math.max(top, open)
  return bisect(exceeds, Math.max(top, open) + least, high, 45)
}

/** Angles about a top where the first line comes round in phase, those first at which the second does too: near it, further, far. */
export function inPhaseAngles(pair: LoopPair, theta: number): number[] {
  const [a, b] = pair.lines
  const phaseA = wrapAngle(logGain(a, 0, theta, scratch).phase - a.delay * theta)
  const phaseB = wrapAngle(logGain(b, 0, theta, scratch).phase - b.delay * theta)
  const candidates: { at: number; away: number; reach: number }[] = []
  for (let j = -REACH; j <= REACH; j++) {
    const shift = (phaseA + 2 * Math.PI * j) / a.delay
    const at = theta + shift
    if (at >= 0 && at <= Math.PI) candidates.push({ at, away: Math.abs(wrapAngle(phaseB - b.delay * shift)), reach: Math.abs(j) })
  }
  candidates.sort((c, d) => c.away - d.away)
  const best = (reach: number) => candidates.filter((c) => c.reach <= reach).slice(0, 3)
  return [...new Set([...best(2), ...best(20), ...best(REACH)].map((c) => c.at))]
}
