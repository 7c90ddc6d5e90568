// All poles of a short loop at once: the Ehrlich-Aberth iteration on p(z) = zⁿ · Den(1/z) · (1 − L(z)).
// Source: O. Aberth, "Iteration methods for finding all zeros of a polynomial simultaneously", Math. Comp. 27 (1973), from memory;
// tests compare with numpy.roots.
import { type LoopLine, logGain, logGainResult, loopOrder, openLoopPoles, wrapAngle } from './loopLine.ts'
import type { Pole } from './polesNewton.ts'

/** Loops of at most this order are solved here: the iteration costs the order squared, and no start has to be guessed. */
export const SHORT_LOOP = 40

/** Angles from the real axis below this, rad, are rounding. */
const REAL = 1e-9

const scratch = logGainResult()

/** Every pole with θ in [0, π], conjugates and real ones once each. For loopOrder(line) up to a few hundred. */
export function allPolesOfShortLoop(line: LoopLine): Pole[] {
  const order = loopOrder(line)
  const den = openLoopPoles(line)
  const re = new Float64Array(order)
  const im = new Float64Array(order)
  const start = Math.exp(Math.log(Math.max(Math.abs(line.gain), 1e-12)) / order)
  for (let i = 0; i < order; i++) {
    // Off the real axis and off each other's conjugates: symmetric starts never leave their symmetry.
    const angle = (2 * Math.PI * (i + 0.29)) / order
    re[i] = start * Math.cos(angle)
    im[i] = start * Math.sin(angle)
  }
  let before = Number.POSITIVE_INFINITY
  for (let round = 0; round < 200; round++) {
    let moved = 0
    for (let i = 0; i < order; i++) moved = Math.max(moved, improve(line, den, re, im, i))
    // Convergence is cubic: from 1e-12 on, what no longer shrinks is rounding.
    if (moved < 4e-16 || (moved < 1e-12 && moved >= before)) break
    before = moved
  }
  const poles: Pole[] = []
  for (let i = 0; i < order; i++) {
    const x = Math.log(Math.hypot(re[i] as number, im[i] as number))
    const theta = Math.atan2(im[i] as number, re[i] as number)
    const real = Math.abs(theta) < REAL ? 0 : Math.PI - Math.abs(theta) < REAL ? Math.PI : null
    if (real !== null || theta > 0) poles.push({ x, theta: real ?? theta })
  }
  return poles
}

/** One Aberth step of root i; returns how far it moved, relative to its size. */
function improve(line: LoopLine, den: readonly number[], re: Float64Array, im: Float64Array, i: number): number {
  const zRe = re[i] as number
  const zIm = im[i] as number
  const size = zRe * zRe + zIm * zIm
  // z p'/p = n + Σ p v/(1 − p v) + d · L/(L − 1), v = 1/z, d = d ln L/ds.
  let qRe = re.length
  let qIm = 0
  for (const pole of den) {
    const bRe = zRe - pole
    const b = bRe * bRe + zIm * zIm
    qRe += (pole * bRe) / b
    qIm -= (pole * zIm) / b
  }
  const theta = Math.atan2(zIm, zRe)
  logGain(line, Math.log(size) / 2, theta, scratch)
  const angle = wrapAngle(scratch.phase - line.delay * theta)
  // 1 − 1/L without overflow on either side: near a root it is small, far inside the circle it is 1.
  const inverse = Math.exp(-scratch.ln)
  if (Number.isFinite(inverse)) {
    const cRe = -Math.expm1(-scratch.ln) + 2 * inverse * Math.sin(angle / 2) ** 2
    const cIm = inverse * Math.sin(angle)
    const c = cRe * cRe + cIm * cIm
    qRe += (scratch.dRe * cRe + scratch.dIm * cIm) / c
    qIm += (scratch.dIm * cRe - scratch.dRe * cIm) / c
  }
  if (!(Number.isFinite(qRe) && Number.isFinite(qIm))) return 0
  for (let j = 0; j < re.length; j++) {
    if (j === i) continue
    const dRe = zRe - (re[j] as number)
    const dIm = zIm - (im[j] as number)
    const d = dRe * dRe + dIm * dIm
    // z/(z − z_j)
    qRe -= (zRe * dRe + zIm * dIm) / d
    qIm -= (zIm * dRe - zRe * dIm) / d
  }
  const q = qRe * qRe + qIm * qIm
  const stepRe = (zRe * qRe + zIm * qIm) / q
  const stepIm = (zIm * qRe - zRe * qIm) / q
  if (!(Number.isFinite(stepRe) && Number.isFinite(stepIm))) return 0
  re[i] = zRe - stepRe
  im[i] = zIm - stepIm
  return Math.sqrt((stepRe * stepRe + stepIm * stepIm) / size)
}
