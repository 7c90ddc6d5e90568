// The poles of two crossed lines. They lie under the bound's curve but not on it, so the largest is searched for where the bound is highest
// and both lines come round in phase, then everywhere the bound still exceeds what was found, as far as that is affordable.
import { slowPair, wrapAngle } from './loopLine.ts'
import { type LoopPair, pairDelay, pairDeterminant, pairModulusEquation, pairOpenPoles } from './loopPair.ts'
import { bisect } from './loopSearch.ts'
import type { Pole } from './polesNewton.ts'
import { inPhaseAngles, type PairBound, pairBound } from './polesPairBound.ts'
import { pairPolesOutside } from './polesPairWinding.ts'
import { axisGrid } from './polesRealAxis.ts'

export interface PairPole {
  readonly pole: Pole
  /** ln of a radius that no pole exceeds; equal to pole.x where the search was complete. */
  readonly bound: number
}

/** Newton runs a position may cost unless more are allowed, and the longest pair whose poles outside a radius are counted along the whole circle. */
const STARTS = 500
const COUNTED_DELAY = 600

const det = new Float64Array(4)

/**
 * Largest pole of a crossed pair, with the bound, at a cost of at most about `starts` Newton runs. null without a loop. `quick`: without counting what a short pair
 * may hide near a filter's own pole, to choose among many pairs one that is then looked at in full.
 */
export function largestPoleOfPair(pair: LoopPair, { starts = STARTS, quick = false } = {}): PairPole | null {
  if (pair.lines[0].gain === 0) return null
  const curve = pairBound(pair)
  let best: Pole | null = null
  const consider = (pole: Pole | null) => {
    if (pole !== null && (best === null || pole.x > best.x)) best = pole
  }
  for (const pole of realPolesOfPair(pair)) consider(pole)
  for (const { x, theta } of startsNearDc(pair, curve)) consider(newtonOfPair(pair, x, theta))
  for (const { x, theta } of curve.tops.slice(0, 6)) for (const angle of inPhaseAngles(pair, theta)) consider(newtonOfPair(pair, x, angle))
  const complete = searchUnderBound(pair, curve, { floor: best, starts }, consider)
  const pole = best as Pole | null
  if (pole === null) return null
  const slow = pairOpenPoles(pair).some((open) => Math.log(Math.abs(open)) > pole.x - 4 / pairDelay(pair))
  if (complete && !slow) return { pole, bound: pole.x }
  return quick || pairDelay(pair) > COUNTED_DELAY ? { pole, bound: Math.max(curve.bound, pole.x) } : counted(pair, pole)
}

/** The pole if counting finds none outside it; else the radius at which the count drops to none. */
function counted(pair: LoopPair, pole: Pole): PairPole {
  const margin = 1e-8 / pairDelay(pair) + 1e-15
  if (pairPolesOutside(pair, pole.x + margin) === 0) return { pole, bound: pole.x }
  let high = pole.x + 1 / pairDelay(pair)
  for (let i = 0; i < 60 && pairPolesOutside(pair, high) > 0; i++) high += high - pole.x
  const x = bisect((t) => pairPolesOutside(pair, t) > 0, pole.x + margin, high, 48)
  return { pole: { x, theta: Number.NaN }, bound: x }
}

/** Newton from four starts a branch in every cell whose bound exceeds the best so far; false when there are too many. */
function searchUnderBound(
  pair: LoopPair,
  curve: PairBound,
  limits: { floor: Pole | null; starts: number },
  consider: (pole: Pole | null) => void,
): boolean {
  const floor = limits.floor?.x ?? Number.NEGATIVE_INFINITY
  const spacing = Math.PI / (2 * pairDelay(pair))
  const cells: { from: number; to: number; x: number; starts: number }[] = []
  for (let i = 1; i < curve.theta.length; i++) {
    const x = Math.max(curve.x[i - 1] as number, curve.x[i] as number, curve.cellTop[i] as number)
    if (x <= floor) continue
    const from = curve.theta[i - 1] as number
    const to = curve.theta[i] as number
    cells.push({ from, to, x, starts: Math.ceil((to - from) / spacing) + 1 })
  }
  if (cells.reduce((sum, cell) => sum + cell.starts, 0) > limits.starts) return false
  for (const { from, to, x, starts } of cells)
    for (let j = 0; j < starts; j++) consider(newtonOfPair(pair, x, from + ((to - from) * j) / Math.max(1, starts - 1)))
  return true
}

/** All poles with θ in [0, maxTheta], from four starts a branch of the longer line. */
export function allPolesOfPair(pair: LoopPair, maxTheta: number): Pole[] {
  if (pair.lines[0].gain === 0) return []
  const spacing = Math.PI / (2 * pairDelay(pair))
  const poles: Pole[] = realPolesOfPair(pair)
  let x = Math.log(Math.abs(pair.lines[0].gain)) / pairDelay(pair)
  for (let theta = 0; theta <= maxTheta + spacing; theta += spacing) {
    x = pairModulusEquation(pair, theta, x) ?? x
    const pole = newtonOfPair(pair, x, theta)
    if (pole !== null) poles.push(pole)
  }
  return poles
}

function startsNearDc(pair: LoopPair, curve: PairBound): Pole[] {
  const delay = pairDelay(pair)
  const [line] = pair.lines
  const x = Math.min(curve.tops[0]?.x ?? 0, 0)
  // At such angles both lines read alike: the sum of both runs with gain g, the difference with g (1 − 2k).
  const slow = [1, 1 - 2 * pair.crossFeed].map((share) => slowPair({ ...line, gain: line.gain * share })).filter((pole) => pole !== null)
  return [...slow, ...Array.from({ length: 12 }, (_, i): Pole => ({ x, theta: (0.05 / delay) * 200 ** (i / 11) }))]
}

/** Newton on det times its denominators, which has no poles to be thrown away by: the step is 1/(ln det + Σ ln(1 − p v))'. */
function newtonOfPair(pair: LoopPair, x: number, theta: number): Pole | null {
  const longest = 0.5 / pairDelay(pair)
  const open = pairOpenPoles(pair)
  let settled = false
  for (let i = 0; i < 80; i++) {
    pairDeterminant(pair, x, theta, det)
    const [re, im, dRe, dIm] = det as unknown as [number, number, number, number]
    const d = re * re + im * im
    if (d === 0) return { x, theta: Math.abs(wrapAngle(theta)) }
    let qRe = (dRe * re + dIm * im) / d
    let qIm = (dIm * re - dRe * im) / d
    const radius = Math.exp(x)
    for (const pole of open) {
      const bRe = radius * Math.cos(theta) - pole
      const bIm = radius * Math.sin(theta)
      const b = bRe * bRe + bIm * bIm
      qRe += (pole * bRe) / b
      qIm -= (pole * bIm) / b
    }
    const q = qRe * qRe + qIm * qIm
    const size = 1 / Math.sqrt(q)
    if (!Number.isFinite(size)) return null
    const scale = (size > longest ? longest / size : 1) / q
    x -= qRe * scale
    theta += qIm * scale
    if (settled) return { x, theta: Math.abs(wrapAngle(theta)) }
    settled = size < 1e-8 * longest
  }
  return null
}

/** Real poles by the sign of det times its denominators; only the all-pass reads' own poles can turn it, the filters' count twice. */
function realPolesOfPair(pair: LoopPair): Pole[] {
  const open = pairOpenPoles(pair)
  const found: Pole[] = []
  for (const theta of [0, Math.PI]) {
    const poles = open.map((pole) => (theta === 0 ? pole : -pole))
    const positive = (x: number) =>
      (pairDeterminant(pair, x, theta, det)[0] as number) > 0 === (poles.filter((pole) => pole > Math.exp(x)).length % 2 === 0)
    const grid = axisGrid(poles)
    let before = positive(grid[0] as number)
    for (let i = 1; i < grid.length; i++) {
      const to = grid[i] as number
      const after = positive(to)
      if (after !== before) found.push({ x: bisect(positive, grid[i - 1] as number, to), theta })
      before = after
    }
  }
  return found
}
