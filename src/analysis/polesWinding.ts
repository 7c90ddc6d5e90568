// How many closed-loop poles lie outside a radius, counted and not searched: by the argument principle it is the number of poles of L
// outside plus the clockwise turns of L around 1 as θ goes once round. Only where |L| > 1 can a turn be made, and there the turns are
// the multiples of 2π its phase has passed, so a loop of any length is counted on a grid that only has to follow |L|.
// Source: argument principle; Nyquist's criterion for a circle of that radius.
import { type LoopLine, logGain, logGainResult, openLoopPoles, wrapAngle } from './loopLine.ts'
import { bisect, goldenMaximum, localMaxima } from './loopSearch.ts'

const scratch = logGainResult()

let lastAngles: { readonly low: number; readonly all: Float64Array; readonly half: Float64Array } | null = null

/**
 * Angles from 0 to π dense enough to follow filters and interpolators: equal ratios below 0.05 rad, equal steps above; every second one with `half`. `delay` in
 * samples. Shared by all callers: not to be written to.
 */
export function loopAngles(delay: number, half = false): Float64Array {
  const low = Math.min(0.01 / delay, 1e-5)
  if (lastAngles?.low !== low) {
    const all = anglesFrom(low)
    lastAngles = { low, all, half: all.filter((_, i) => i % 2 === 0 || i === all.length - 1) }
  }
  return half ? lastAngles.half : lastAngles.all
}

function anglesFrom(low: number): Float64Array {
  const below = 110
  const above = 180
  const angles = new Float64Array(1 + below + above + 1)
  for (let i = 0; i < below; i++) angles[1 + i] = low * (0.05 / low) ** (i / below)
  for (let i = 0; i <= above; i++) angles[1 + below + i] = 0.05 + (Math.PI - 0.05) * (i / above)
  return angles
}

/** Number of poles of 1/(1 − L) with |z| > e^x, conjugates counted. x must miss every pole by more than rounding. */
export function polesOutside(line: LoopLine, x: number): number {
  const radius = Math.exp(x)
  return openLoopPoles(line).filter((pole) => Math.abs(pole) > radius).length - turns(line, x)
}

/** The grid, with the top of every hump of |L| that would rise above 1 between two of its angles put in. */
function anglesToFollow(line: LoopLine, x: number): Float64Array {
  const ln = (theta: number) => logGain(line, x, theta, scratch).ln
  const grid = loopAngles(line.delay)
  const values = grid.map(ln)
  const tops: number[] = []
  for (const i of localMaxima(values)) {
    if ((values[i] as number) > 0) continue
    const top = goldenMaximum(ln, grid[Math.max(0, i - 1)] as number, grid[Math.min(grid.length - 1, i + 1)] as number, 1e-3 / line.delay)
    if (top.value > 0) tops.push(top.at)
  }
  return tops.length === 0 ? grid : Float64Array.from([...grid, ...tops]).sort()
}

/** Net crossings of the real axis beyond 1, anticlockwise positive, over the whole circle; the lower half mirrors the upper one. */
function turns(line: LoopLine, x: number): number {
  const at = (theta: number) => logGain(line, x, theta, scratch)
  let sum = 0
  let from = 0
  let inside = at(0).ln > 0
  // Phase without −delay · θ, unwrapped. On the real axis L is real: a whole number of half turns.
  const startPhase = Number.isFinite(scratch.ln) ? halfTurns(scratch.phase) : 0
  let phase = Number.isFinite(scratch.ln) ? startPhase : at(1e-12).phase
  // Where the arc outside 1 was entered; null while it is the one that holds θ = 0 and so begins at its own mirror image.
  let entered: number | null = null
  for (const theta of anglesToFollow(line, x)) {
    const next = at(theta).ln > 0
    if (Number.isFinite(scratch.ln)) phase += wrapAngle(scratch.phase - phase)
    if (next !== inside) {
      const edge = bisect((t) => at(t).ln > 0, from, theta)
      const edgePhase = phase + wrapAngle(at(edge).phase - phase) - line.delay * edge
      if (next) entered = edgePhase
      else sum += entered === null ? passed(2 * startPhase - edgePhase, edgePhase) : 2 * passed(entered, edgePhase)
    }
    inside = next
    from = theta
  }
  if (!inside) return sum
  const endPhase = halfTurns(phase - line.delay * Math.PI)
  // All round outside 1: whole turns.
  if (entered === null) return sum + Math.round((endPhase - startPhase) / Math.PI)
  return sum + passed(entered, 2 * endPhase - entered)
}

const halfTurns = (phase: number): number => Math.PI * Math.round(phase / Math.PI)

/** Multiples of 2π passed between two phases, with sign. */
function passed(from: number, to: number): number {
  return Math.floor(to / (2 * Math.PI)) - Math.floor(from / (2 * Math.PI))
}
