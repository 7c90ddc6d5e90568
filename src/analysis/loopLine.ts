// The open loop of one line, L(z) = G · A(z) · F(z), as its logarithm in s = ln z = x + iθ: the form in which a loop of
// 40 000 samples is as smooth as one of 10. Two lines of a fully crossed loop (k = 1) make one loop of two reads: A = A0·A1, F².
//
//   A = Π v^first · taps(v) / (1 + pole v),  F = ((1 + v)/2 if averaged) · (1−a)/(1−a v) · (1+b)/2 · (1−v)/(1−b v),  v = e^−s
//
// 1 − v, 1 − a v and 1 − b v are formed from 1 − v without cancellation, so that roots near 0 Hz keep their digits.
import type { FrozenLoop } from './frozen.ts'
import type { FrozenRead } from './frozenRead.ts'

export interface LoopLine {
  /** G, signed: feedback times the shaper's gain. */
  readonly gain: number
  /** One read; two when both lines of a fully crossed loop are passed in turn. F counts once a read. */
  readonly reads: readonly FrozenRead[]
  readonly lowPass: number | null
  readonly highPass: number | null
  readonly averaged: boolean
  /** Delay once round without the filters, samples. */
  readonly delay: number
}

/** ln |L|, phase of L without its −delay · θ (wrapped to [−π, π]), and d ln L/ds; written by logGain. */
export interface LogGain {
  ln: number
  phase: number
  dRe: number
  dIm: number
}

export const logGainResult = (): LogGain => ({ ln: 0, phase: 0, dRe: 0, dIm: 0 })

/** The loop through `reads` at gain G, with the filters of `loop`. */
export function loopLine(loop: FrozenLoop, gain: number, reads: readonly FrozenRead[]): LoopLine {
  const half = loop.slope.averaged ? 0.5 : 0
  const delay = reads.reduce((sum, read) => sum + (read.kind === 'nearest' ? read.first : read.delaySamples) + half, 0)
  return { gain, reads, lowPass: loop.tone.lowPass, highPass: loop.tone.highPass, averaged: loop.slope.averaged, delay }
}

/** An angle in rad wrapped to [−π, π]. */
export function wrapAngle(angle: number): number {
  return angle - 2 * Math.PI * Math.round(angle / (2 * Math.PI))
}

// The product of factors so far, and Σ v f'/f: two complex numbers, kept between the factors of one evaluation only.
const product = new Float64Array(4)

/** Multiplies the product by a factor f, given v f' beside it. */
function times(re: number, im: number, slopeRe: number, slopeIm: number): void {
  const power = re * re + im * im
  const pRe = product[0] as number
  const pIm = product[1] as number
  product[0] = pRe * re - pIm * im
  product[1] = pRe * im + pIm * re
  product[2] = (product[2] as number) + (slopeRe * re + slopeIm * im) / power
  product[3] = (product[3] as number) + (slopeIm * re - slopeRe * im) / power
}

/** Divides the product by a factor f, given v f' beside it. */
function over(re: number, im: number, slopeRe: number, slopeIm: number): void {
  const power = re * re + im * im
  const pRe = product[0] as number
  const pIm = product[1] as number
  product[0] = (pRe * re + pIm * im) / power
  product[1] = (pIm * re - pRe * im) / power
  product[2] = (product[2] as number) - (slopeRe * re + slopeIm * im) / power
  product[3] = (product[3] as number) - (slopeIm * re - slopeRe * im) / power
}

/** Horner for the taps' polynomial in v and its derivative. */
function timesTaps(taps: readonly number[], vRe: number, vIm: number): void {
  let re = 0
  let im = 0
  let slopeRe = 0
  let slopeIm = 0
  for (let k = taps.length - 1; k >= 0; k--) {
    const nextSlopeRe = slopeRe * vRe - slopeIm * vIm + re
    slopeIm = slopeRe * vIm + slopeIm * vRe + im
    slopeRe = nextSlopeRe
    const nextRe = re * vRe - im * vIm + (taps[k] as number)
    im = re * vIm + im * vRe
    re = nextRe
  }
  times(re, im, vRe * slopeRe - vIm * slopeIm, vRe * slopeIm + vIm * slopeRe)
}

/**
 * ln L and its derivative at z = e^(x + iθ): ln|L| and the phase relative to −delay · θ. x any real, θ in rad. Where L is 0 the
 * logarithm is −∞, at a filter's pole +∞.
 */
export function logGain(line: LoopLine, x: number, theta: number, out: LogGain): LogGain {
  const e = Math.exp(-x)
  const half = Math.sin(theta / 2)
  const vRe = e * Math.cos(theta)
  const vIm = -e * Math.sin(theta)
  const uRe = -Math.expm1(-x) + 2 * e * half * half
  const uIm = -vIm
  const { lowPass: a, highPass: b } = line
  product[0] = 1
  product[1] = 0
  product[2] = 0
  product[3] = 0
  let whole = 0
  let scale = Math.abs(line.gain)
  for (const read of line.reads) {
    whole += read.first
    timesTaps(read.taps, vRe, vIm)
    if (read.pole !== 0) over(1 + read.pole * vRe, read.pole * vIm, read.pole * vRe, read.pole * vIm)
    if (line.averaged) times(1 - uRe / 2, -uIm / 2, vRe / 2, vIm / 2)
    if (a !== null) {
      over(1 - a + a * uRe, a * uIm, -a * vRe, -a * vIm)
      scale *= 1 - a
    }
    if (b !== null) {
      times(uRe, uIm, -vRe, -vIm)
      over(1 - b + b * uRe, b * uIm, -b * vRe, -b * vIm)
      scale *= (1 + b) / 2
    }
  }
  const re = product[0] as number
  const im = product[1] as number
  out.ln = Math.log(scale * Math.sqrt(re * re + im * im)) - whole * x
  out.phase = wrapAngle(Math.atan2(im, re) + (line.delay - whole) * theta + (line.gain < 0 ? Math.PI : 0))
  out.dRe = -whole - (product[2] as number)
  out.dIm = -(product[3] as number)
  return out
}

/** Radii of the poles of L itself (filters and all-pass reads), where L has a value to encircle. */
export function openLoopPoles(line: LoopLine): number[] {
  return line.reads.flatMap((read) => [
    ...(read.pole === 0 ? [] : [-read.pole]),
    ...(line.lowPass === null ? [] : [line.lowPass]),
    ...(line.highPass === null ? [] : [line.highPass]),
  ])
}

/** Number of closed-loop poles that are not at z = 0. */
export function loopOrder(line: LoopLine): number {
  let zeros = 0
  for (const read of line.reads) {
    let last = read.taps.length - 1
    while (last > 0 && read.taps[last] === 0) last--
    zeros += read.first + last + (line.averaged ? 1 : 0) + (line.highPass === null ? 0 : 1)
  }
  return Math.max(zeros, openLoopPoles(line).length)
}

/**
 * The pair that damping and low cut make between them when both are slow against the delay: at such angles the read is as good as 1, which
 * leaves (1 − a v)(1 − b v) − G (1−a)(1+b)/2 (1 − v) = 0. null when its roots are real, which the real axis shows.
 */
export function slowPair({ lowPass: a, highPass: b, gain }: LoopLine): { x: number; theta: number } | null {
  if (a === null || b === null) return null
  const k = (gain * (1 - a) * (1 + b)) / 2
  // In z: z² (1 − k) − z (a + b − k) + a b = 0, |z|² = a b/(1 − k).
  const cosine = (a + b - k) / (2 * Math.sqrt(a * b * (1 - k)))
  if (!(Math.abs(cosine) < 1)) return null
  return { x: Math.log((a * b) / (1 - k)) / 2, theta: Math.acos(cosine) }
}
