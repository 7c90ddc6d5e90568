// Newton's method for the poles of 1 − L(z) in s = ln z = x + iθ, where ln L is nearly linear: ln L(s) = 2πi k.
import { type LogGain, type LoopLine, logGain, logGainResult, wrapAngle } from './loopLine.ts'

/** A pole z = e^(x + iθ), θ in [0, π]; its conjugate is meant with it. Radius 1 − (−expm1 x): compare x, not the radius. */
export interface Pole {
  readonly x: number
  readonly theta: number
}

const scratch = logGainResult()

/**
 * The pole that Newton reaches from (x, θ), or null. Quadratic; two or three steps from a branch's own start. Steps are limited to 2 over
 * the delay, the distance within which ln L is trusted.
 */
export function newtonPole(line: LoopLine, x: number, theta: number): Pole | null {
  const longest = 2 / line.delay
  let settled = false
  for (let i = 0; i < 60; i++) {
    logGain(line, x, theta, scratch)
    const wIm = wrapAngle(scratch.phase - line.delay * theta)
    const d = scratch.dRe * scratch.dRe + scratch.dIm * scratch.dIm
    let stepX = (scratch.ln * scratch.dRe + wIm * scratch.dIm) / d
    let stepTheta = (wIm * scratch.dRe - scratch.ln * scratch.dIm) / d
    const size = Math.hypot(stepX, stepTheta)
    if (!Number.isFinite(size)) return null
    if (size > longest) {
      stepX *= longest / size
      stepTheta *= longest / size
    }
    x -= stepX
    theta -= stepTheta
    // One step past 1e-9 of a branch's width squares the error below rounding.
    if (settled) return folded(x, theta)
    settled = size < 1e-9 * longest
  }
  return null
}

/** The same pole or its conjugate with θ in [0, π]. */
function folded(x: number, theta: number): Pole {
  return { x, theta: Math.abs(wrapAngle(theta)) }
}

/** The modulus equation at every angle of a grid, each started from its neighbour's: to about 1e-8 of a branch's share, −∞ where there is none. */
export function modulusCurve(line: LoopLine, angles: Float64Array, start: number): Float64Array {
  const longest = 2 / line.delay
  const curve = new Float64Array(angles.length)
  let known = start
  for (let i = 0; i < angles.length; i++) {
    let x = known
    let found = Number.NEGATIVE_INFINITY
    for (let j = 0; j < 60; j++) {
      logGain(line, x, angles[i] as number, scratch)
      const step = scratch.ln / scratch.dRe
      if (!Number.isFinite(step) || scratch.dRe >= 0) break
      x -= Math.abs(step) > longest ? Math.sign(step) * longest : step
      if (Math.abs(step) > 1e-4 * longest) continue
      found = x
      known = x
      break
    }
    curve[i] = found
  }
  return curve
}

/**
 * x at which |L| = 1 on the ray at angle θ (the modulus equation): every pole at that angle lies on this curve. `x` starts the search; null
 * where the ray has no such point (under a low cut's zero).
 */
export function modulusEquation(line: LoopLine, theta: number, x: number, out: LogGain = scratch): number | null {
  const longest = 2 / line.delay
  for (let i = 0; i < 60; i++) {
    logGain(line, x, theta, out)
    const step = out.ln / out.dRe
    if (!Number.isFinite(step) || out.dRe >= 0) return null
    const limited = Math.abs(step) > longest ? Math.sign(step) * longest : step
    x -= limited
    if (Math.abs(step) < 1e-15 * longest + 1e-17) return x
    if (Math.abs(step) < 1e-10 * longest) {
      logGain(line, x, theta, out)
      return x - out.ln / out.dRe
    }
  }
  return null
}

/** Angles nearest to θ at which L is real and positive when x moves along the modulus equation: the `count` nearest branches. */
export function branchAngles(line: LoopLine, x: number, theta: number, count: number): number[] {
  logGain(line, x, theta, scratch)
  const slope = Math.min(scratch.dRe, -0.5 * line.delay)
  const nearest = theta - wrapAngle(scratch.phase - line.delay * theta) / slope
  const spacing = (2 * Math.PI) / -slope
  return Array.from({ length: count }, (_, i) => nearest + (i - (count - 1) / 2) * spacing).filter(
    (t) => t > -spacing && t < Math.PI + spacing,
  )
}
