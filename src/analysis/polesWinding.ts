// How many closed-loop poles lie outside a radius, counted and not searched: by the argument principle it is the number of poles of L
// outside plus the clockwise turns of L around 1 as θ goes once round. Only where |L| > 1 can a turn be made, and there the turns are
// the multiples of 2π its phase has passed, so a loop of any length is counted on a grid that only has to follow |L|.
// Source: argument principle; Nyquist's criterion for a circle of that radius.
import { type LoopLine, logGain, logGainResult, openLoopPoles, wrapAngle } from './loopLine.ts'

const scratch = logGainResult()

/** Angles in (0, π) dense enough to follow filters and interpolators: equal ratios below 0.05 rad, equal steps above. */
export function loopAngles(delay: number): Float64Array {
  const low = Math.min(0.01 / delay, 1e-5)
  const below = 120
  const above = 200
  const angles = new Float64Array(below + above + 1)
  for (let i = 0; i < below; i++) angles[i] = low * (0.05 / low) ** (i / below)
  for (let i = 0; i <= above; i++) angles[below + i] = 0.05 + (Math.PI - 0.05) * (i / above)
  return angles
}

/** Number of poles of 1/(1 − L) with |z| > e^x, conjugates counted. x must miss every pole by more than rounding. */
export function polesOutside(line: LoopLine, x: number): number {
  const radius = Math.exp(x)
  const open = openLoopPoles(line).filter((pole) => Math.abs(pole) > radius).length
  return open - turns(line, x)
}

/** Net crossings of the real axis beyond 1, anticlockwise positive, over the whole circle. */
function turns(line: LoopLine, x: number): number {
  const angles = loopAngles(line.delay)
  let sum = 0
  let phase = 0
  // The circle starts on the real axis, where L is real: its phase is 0 or π.
  logGain(line, x, 0, scratch)
  let inside = scratch.ln > 0
  let from = 0
  const startPhase = Number.isFinite(scratch.ln) ? halfTurns(scratch.phase) : 0
  phase = Number.isFinite(scratch.ln) ? startPhase : Number.NaN
  // Conjugate symmetry: the arc [−θ, θ] starts at the mirror image of where [0, θ] ends.
  let entered = Number.NaN
  let mirrored = inside
  for (const theta of angles) {
    logGain(line, x, theta, scratch)
    const next = scratch.ln > 0
    const unwrapped = Number.isNaN(phase) ? scratch.phase : phase + wrapAngle(scratch.phase - phase)
    if (next !== inside) {
      const edge = levelCrossing(line, x, from, theta)
      logGain(line, x, edge, scratch)
      const edgePhase = unwrapped + wrapAngle(scratch.phase - unwrapped) - line.delay * edge
      if (next) entered = edgePhase
      else {
        sum += mirrored ? passed(2 * startPhase - edgePhase, edgePhase) : 2 * passed(entered, edgePhase)
        mirrored = false
      }
    }
    inside = next
    phase = unwrapped
    from = theta
  }
  if (!inside) return sum
  const endPhase = halfTurns(phase - line.delay * Math.PI)
  if (mirrored) return sum + passed(2 * startPhase - endPhase, endPhase, true)
  return sum + passed(entered, 2 * endPhase - entered)
}

/** On the real axis a phase is a whole number of half turns; rounding apart. */
function halfTurns(phase: number): number {
  return Math.PI * Math.round(phase / Math.PI)
}

/** Multiples of 2π between two phases, with sign. A closed circle returns to where it began and counts whole turns. */
function passed(from: number, to: number, closed = false): number {
  if (closed) return Math.round((to - from) / (2 * Math.PI))
  return Math.floor(to / (2 * Math.PI)) - Math.floor(from / (2 * Math.PI))
}

/** The angle between `from` and `to` where ln |L| changes sign, by bisection. */
function levelCrossing(line: LoopLine, x: number, from: number, to: number): number {
  logGain(line, x, from, scratch)
  const sign = scratch.ln > 0
  for (let i = 0; i < 60; i++) {
    const middle = (from + to) / 2
    logGain(line, x, middle, scratch)
    if (scratch.ln > 0 === sign) from = middle
    else to = middle
    if (to - from < 1e-15 * to) break
  }
  return (from + to) / 2
}
