// The poles of one line, 1 − G A(z) F(z) = 0, exactly, however long the line. Every pole lies on the curve |L| = 1 (the modulus equation), one
// about every 2π/D; the largest is next to the curve's largest x. Poles near 0 Hz, where a filter's own pole is as near as a branch, are
// searched for from more starts.
import { type LoopLine, logGain, logGainResult, loopOrder, slowPair } from './loopLine.ts'
import { bisect, goldenMaximum, localMaxima } from './loopSearch.ts'
import { branchAngles, modulusCurve, modulusEquation, newtonPole, type Pole } from './polesNewton.ts'
import { allPolesOfShortLoop, SHORT_LOOP } from './polesPolynomial.ts'
import { realPoles } from './polesRealAxis.ts'
import { loopAngles, polesOutside } from './polesWinding.ts'

const scratch = logGainResult()

/** Humps of the modulus curve that are followed to their top: filters and interpolators make fewer. */
const TOPS = 12
/** The same for a quick look, on every second angle. */
const QUICK_TOPS = 5

/**
 * The pole of largest radius, or null without a loop (G = 0). Not certified: see certifiedPole. `quick`: on half the grid, to choose among many loops one
 * that is then looked at in full.
 */
export function largestPoleOfLine(line: LoopLine, quick = false): Pole | null {
  if (line.gain === 0) return null
  return loopOrder(line) <= SHORT_LOOP ? largest(allPolesOfShortLoop(line)) : largestOfLongLine(line, quick)
}

/** As largestPoleOfLine, for any length, by Newton's method alone. */
export function largestOfLongLine(line: LoopLine, quick = false): Pole | null {
  const start = Math.log(Math.abs(line.gain)) / line.delay
  const grid = loopAngles(line.delay, quick)
  const xs = modulusCurve(line, grid, start)
  // Without filters every pole is a branch, the real ones included.
  const found: Pole[] =
    line.lowPass === null && line.highPass === null ? [] : [...realPoles(line, quick), ...polesNearDc(line, quick ? 8 : 24)]
  for (const i of localMaxima(xs).slice(0, quick ? QUICK_TOPS : TOPS)) {
    const near = xs[i] as number
    const curve = (theta: number) => modulusEquation(line, theta, near) ?? Number.NEGATIVE_INFINITY
    const from = grid[Math.max(0, i - 1)] as number
    const to = grid[Math.min(grid.length - 1, i + 1)] as number
    const top = goldenMaximum(curve, from, to, 0.2 / line.delay)
    const [x, theta] = top.value > (xs[i] as number) ? [top.value, top.at] : [xs[i] as number, grid[i] as number]
    for (const angle of branchAngles(line, x, theta, 5)) pushPole(found, newtonPole(line, x, angle))
  }
  return largest(found)
}

/**
 * The largest pole with its certificate: no pole lies outside it by more than `tolerance` (relative to a branch's share of ln r). If the search missed
 * one, the radius is found by bisecting the count of poles outside instead, which cannot miss.
 */
export function certifiedPole(line: LoopLine): { pole: Pole; searched: boolean } | null {
  const pole = largestPoleOfLine(line)
  if (pole === null) return null
  const margin = 1e-9 / line.delay + 1e-15
  if (polesOutside(line, pole.x + margin) === 0) return { pole, searched: true }
  let high = pole.x + 1 / line.delay
  for (let i = 0; i < 60 && polesOutside(line, high) > 0; i++) high += (high - pole.x) * 1
  const x = bisect((t) => polesOutside(line, t) > 0, pole.x + margin, high, 60)
  return { pole: { x, theta: Number.NaN }, searched: false }
}

/** All poles with θ in [0, maxTheta], ascending in θ. */
export function allPolesOfLine(line: LoopLine, maxTheta: number): Pole[] {
  if (line.gain === 0) return []
  const poles =
    loopOrder(line) <= SHORT_LOOP ? allPolesOfShortLoop(line) : [...realPoles(line), ...polesNearDc(line), ...branches(line, maxTheta)]
  return distinctPoles(poles, line.delay).filter((pole) => pole.theta <= maxTheta)
}

/** One pole a branch k: D θ = phase + 2πk, from the previous branch's x. About two steps each. */
function branches(line: LoopLine, maxTheta: number): Pole[] {
  const poles: Pole[] = []
  const spacing = (2 * Math.PI) / line.delay
  let x = Math.log(Math.abs(line.gain)) / line.delay
  for (let theta = 0; theta <= maxTheta + spacing; theta += spacing) {
    logGain(line, x, theta, scratch)
    const pole = newtonPole(line, x, theta + scratch.phase / line.delay)
    if (pole === null) continue
    poles.push(pole)
    if (pole.x > -1 / line.delay - 4 * Math.abs(x)) x = pole.x
  }
  return poles
}

/** Free starts around 0 Hz, where a low cut comparable with 1/D leaves no branches to follow. */
function polesNearDc(line: LoopLine, starts = 24): Pole[] {
  const poles: Pole[] = []
  const x = Math.log(Math.abs(line.gain)) / line.delay
  for (let i = 0; i < starts; i++) {
    const theta = (0.03 / line.delay) * 400 ** (i / (starts - 1))
    for (const start of [Math.min(0, x), -theta]) pushPole(poles, newtonPole(line, start, theta))
  }
  const slow = slowPair(line)
  if (slow !== null) pushPole(poles, newtonPole(line, slow.x, slow.theta))
  return poles
}

function pushPole(poles: Pole[], pole: Pole | null): void {
  if (pole !== null) poles.push(pole)
}

function largest(poles: readonly Pole[]): Pole | null {
  return poles.reduce<Pole | null>((best, pole) => (best === null || pole.x > best.x ? pole : best), null)
}

/** Without repeats: two starts may reach one pole. Poles are about 2π/D apart. */
export function distinctPoles(poles: readonly Pole[], delay: number): Pole[] {
  const near = 1e-6 / delay
  const sorted = [...poles].sort((a, b) => a.theta - b.theta)
  const kept: Pole[] = []
  for (const pole of sorted) {
    let repeated = false
    for (let i = kept.length - 1; i >= 0 && pole.theta - (kept[i] as Pole).theta < near; i--)
      if (Math.abs(pole.x - (kept[i] as Pole).x) < near) repeated = true
    if (!repeated) kept.push(pole)
  }
  return kept
}
