// Two lines fed into each other: det(I − X diag(L0, L1)) = 1 − (1−k)(L0 + L1) + (1−2k) L0 L1, with X = [[1−k, k], [k, 1−k]], k in (0, 1).
// X has norm 1, and by Perron and Frobenius no eigenvalue of X diag(L0, L1) is larger than the one of the moduli: that one is the bound.
import type { FrozenLoop } from './frozen.ts'
import { type LogGain, type LoopLine, logGain, logGainResult, loopLine, openLoopPoles, wrapAngle } from './loopLine.ts'

export interface LoopPair {
  readonly crossFeed: number
  readonly lines: readonly [LoopLine, LoopLine]
}

/** A frozen loop as independent lines where it falls apart (one line, k = 0, equal reads, k = 1), else as a crossed pair. G is feedback times `slope`. */
export function loopParts(
  loop: FrozenLoop,
  slope = loop.slope.slope,
): { readonly lines: readonly LoopLine[]; readonly pair: LoopPair | null } {
  const gain = loop.gain * slope
  const [first, second] = loop.reads
  const k = loop.crossFeed
  if (first === undefined) return { lines: [], pair: null }
  const single = (g: number, reads = [first]) => loopLine(loop, g, reads)
  if (second === undefined) return { lines: [single(gain)], pair: null }
  const equal = first.first === second.first && first.pole === second.pole && first.taps.every((tap, i) => tap === second.taps[i])
  if (equal) return { lines: [single(gain), single(gain * (1 - 2 * k))].slice(0, k === 0 ? 1 : 2), pair: null }
  if (k === 0) return { lines: [single(gain), single(gain, [second])], pair: null }
  if (k === 1) return { lines: [single(gain * gain, [first, second])], pair: null }
  return { lines: [], pair: { crossFeed: k, lines: [single(gain), single(gain, [second])] } }
}

/** The longer of both delays, samples. */
export const pairDelay = (pair: LoopPair): number => Math.max(pair.lines[0].delay, pair.lines[1].delay)

const g0 = logGainResult()
const g1 = logGainResult()

/** Radii (signed) of the poles of det: those of both lines, a filter's own pole twice. */
export const pairOpenPoles = (pair: LoopPair): number[] => pair.lines.flatMap(openLoopPoles)

/** det and its derivative by s at z = e^(x + iθ), into out = [re, im, d re, d im]. */
export function pairDeterminant(pair: LoopPair, x: number, theta: number, out: Float64Array): Float64Array {
  const [l0, l1] = pair.lines
  logGain(l0, x, theta, g0)
  logGain(l1, x, theta, g1)
  const [aRe, aIm] = gainValue(l0, g0, theta)
  const [bRe, bIm] = gainValue(l1, g1, theta)
  const direct = 1 - pair.crossFeed
  const both = 1 - 2 * pair.crossFeed
  const pRe = aRe * bRe - aIm * bIm
  const pIm = aRe * bIm + aIm * bRe
  const sumRe = g0.dRe + g1.dRe
  const sumIm = g0.dIm + g1.dIm
  out[0] = 1 - direct * (aRe + bRe) + both * pRe
  out[1] = -direct * (aIm + bIm) + both * pIm
  out[2] = -direct * (aRe * g0.dRe - aIm * g0.dIm + bRe * g1.dRe - bIm * g1.dIm) + both * (pRe * sumRe - pIm * sumIm)
  out[3] = -direct * (aRe * g0.dIm + aIm * g0.dRe + bRe * g1.dIm + bIm * g1.dRe) + both * (pRe * sumIm + pIm * sumRe)
  return out
}

function gainValue(line: LoopLine, gain: LogGain, theta: number): readonly [number, number] {
  const size = Math.exp(gain.ln)
  const angle = wrapAngle(gain.phase - line.delay * theta)
  return [size * Math.cos(angle), size * Math.sin(angle)]
}

/** Larger eigenvalue of X diag(p, q), p and q ≥ 0, and its derivative when p and q change by dp and dq. */
export function perron(k: number, p: number, q: number, dp = 0, dq = 0): { value: number; slope: number } {
  const trace = (1 - k) * (p + q)
  const root = Math.sqrt((1 - k) * (1 - k) * (p - q) * (p - q) + 4 * k * k * p * q)
  const value = (trace + root) / 2
  const slope = root === 0 ? (1 - k) * dp + k * dq : ((1 - k) * (dp + dq) * value - (1 - 2 * k) * (dp * q + p * dq)) / root
  return { value, slope }
}

/** x where the bound is 1 on the ray at angle θ: no pole at that angle lies outside it. null where there is no such point. */
export function pairModulusEquation(pair: LoopPair, theta: number, x: number): number | null {
  const [l0, l1] = pair.lines
  const longest = 2 / pairDelay(pair)
  for (let i = 0; i < 80; i++) {
    logGain(l0, x, theta, g0)
    logGain(l1, x, theta, g1)
    const p = Math.exp(g0.ln)
    const q = Math.exp(g1.ln)
    const bound = perron(pair.crossFeed, p, q, p * g0.dRe, q * g1.dRe)
    const step = (Math.log(bound.value) * bound.value) / bound.slope
    if (!Number.isFinite(step) || bound.slope >= 0) return null
    x -= Math.abs(step) > longest ? Math.sign(step) * longest : step
    if (Math.abs(step) < 1e-13 * longest) return x
  }
  return null
}

/** ln of the bound's largest value on the circle of radius e^x, over `angles`. Outside every open-loop pole it falls as x grows (three-circles theorem). */
export function pairBoundOnCircle(pair: LoopPair, x: number, angles: ArrayLike<number>): number {
  const [l0, l1] = pair.lines
  let top = Number.NEGATIVE_INFINITY
  for (let i = 0; i < angles.length; i++) {
    const theta = angles[i] as number
    const p = Math.exp(logGain(l0, x, theta, g0).ln)
    top = Math.max(top, perron(pair.crossFeed, p, Math.exp(logGain(l1, x, theta, g1).ln)).value)
  }
  return Math.log(top)
}
