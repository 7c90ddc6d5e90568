// How far a frozen line is from singing at any loop gain: the largest |L| at which L comes back in phase. With L taken at full gain, the line is
// stable for every gain κ in [0, 1] exactly when that is below 1, because poles can leave the circle only where κ L = 1.
// Source: Nyquist's criterion.
import { type LoopLine, logGain, logGainResult, wrapAngle } from './loopLine.ts'
import { goldenMaximum, localMaxima } from './loopSearch.ts'
import { loopAngles } from './polesWinding.ts'

const scratch = logGainResult()

/** Longest line whose every crossing is looked at; on longer ones they are so dense that only those next to the tops of |L| matter. */
const EVERY_CROSSING = 400

/** Largest |L| on the unit circle where L is real and positive. 0 without a loop. */
export function largestCrossing(line: LoopLine): number {
  if (line.gain === 0) return 0
  let best = Number.NEGATIVE_INFINITY
  for (const start of startAngles(line)) {
    const theta = inPhase(line, start)
    if (theta !== null) best = Math.max(best, logGain(line, 0, theta, scratch).ln)
  }
  return Math.exp(best)
}

function startAngles(line: LoopLine): number[] {
  const spacing = (2 * Math.PI) / line.delay
  const starts: number[] = [0, Math.PI]
  // Near 0 Hz a low cut turns the phase faster than the delay does.
  for (let i = 0; i < 40; i++) starts.push((1e-3 / line.delay) * 1e4 ** (i / 39))
  if (line.delay <= EVERY_CROSSING) {
    for (let theta = 0; theta < Math.PI + spacing; theta += spacing / 3) starts.push(theta)
    return starts
  }
  const grid = loopAngles(line.delay)
  const ln = (theta: number) => logGain(line, 0, theta, scratch).ln
  const values = grid.map(ln)
  for (const i of localMaxima(values).slice(0, 8)) {
    const from = grid[Math.max(0, i - 1)] as number
    const top = goldenMaximum(ln, from, grid[Math.min(grid.length - 1, i + 1)] as number, 0.1 / line.delay)
    for (let j = -3; j <= 3; j++) starts.push(top.at + j * spacing)
  }
  return starts
}

/** The angle near `theta`, folded into [0, π], at which the phase of L is a whole turn; null when Newton does not settle. */
function inPhase(line: LoopLine, theta: number): number | null {
  const longest = 1 / line.delay
  for (let i = 0; i < 60; i++) {
    logGain(line, 0, theta, scratch)
    const off = wrapAngle(scratch.phase - line.delay * theta)
    const step = off / scratch.dRe
    if (!Number.isFinite(step)) return null
    theta -= Math.max(-longest, Math.min(longest, step))
    if (Math.abs(step) < 1e-12 * longest + 1e-15) return Math.abs(wrapAngle(theta))
  }
  return null
}
